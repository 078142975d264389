import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  formatCount,
  formatEnergy,
  formatLength,
  formatMeasured,
  formatSignificant,
  formatUnit,
  withUnit,
} from '../../src/science/format';

describe('formatMeasured', () => {
  it.each([
    [2.01239, 0.00112, 'eV', '2.0124 ± 0.0011 eV'],
    [-38.2, 2.04, 'meV', '−38.2 ± 2.0 meV'],
    [1.0, 0.0996, 'eV', '1.00 ± 0.10 eV'],
    [12345, 678, 'counts', '12350 ± 680 counts'],
    [418.03, 0.5, 'cm-1', '418.03 ± 0.50 cm⁻¹'],
    [0.0004, 0.02, 'percent', '0.000 ± 0.020 %'],
    [-0.0004, 0.02, 'percent', '0.000 ± 0.020 %'],
    [45, 3, 'degrees', '45.0 ± 3.0°'],
    [1.234e-7, 5.6e-9, 'eV', '(1.234 ± 0.056)×10⁻⁷ eV'],
    [3.21e9, 4.5e7, '', '(3.210 ± 0.045)×10⁹'],
    [0, 0.03, 'eV', '0.000 ± 0.030 eV'],
  ])('shows %f ± %f %s as %s', (value, err, unit, text) => {
    expect(formatMeasured(value, err, unit)).toBe(text);
  });

  it('leaves out an uncertainty that is none', () => {
    expect(formatMeasured(2.5, null, 'eV')).toBe('2.5000 eV');
    expect(formatMeasured(2.5, Number.NaN, 'eV')).toBe('2.5000 eV');
    expect(formatMeasured(2.5, 0, 'eV')).toBe('2.5000 eV');
    expect(formatMeasured(Number.NaN, 0.1, 'eV')).toBe('–');
  });

  it('never moves the value by more than half a unit of the uncertainty’s second digit', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -1e5, max: 1e5, noNaN: true }),
        fc.double({ min: 1e-4, max: 1e4, noNaN: true }),
        (value, err) => {
          const [shown, shownErr] = formatMeasured(value, err, '')
            .replace(/−/g, '-')
            .replace(/[()]/g, '')
            .split(/×/)[0]
            .split(' ± ')
            .map(Number);
          fc.pre(Math.abs(value) > 1e-3 || err > 1e-3);
          // two digits: the last is worth at most a tenth of the uncertainty
          expect(Math.abs(shown - value)).toBeLessThanOrEqual(0.0501 * err);
          expect(Math.abs(shownErr - err)).toBeLessThanOrEqual(0.0501 * err);
        },
      ),
    );
  });
});

describe('other numbers', () => {
  it('significant digits are kept, powers of ten where zeros would pile up', () => {
    expect(formatSignificant(0.00012345, 3)).toBe('0.000123');
    expect(formatSignificant(0.000012345, 3)).toBe('1.23×10⁻⁵');
    expect(formatSignificant(9.996, 3)).toBe('10.0');
    expect(formatSignificant(-1234567, 2)).toBe('−1200000');
    expect(formatSignificant(12345678, 3)).toBe('1.23×10⁷');
    expect(formatSignificant(0, 3)).toBe('0');
    expect(formatSignificant(Number.NEGATIVE_INFINITY, 3)).toBe('−∞');
  });

  it('lengths change unit where their digits would pile up', () => {
    expect(formatLength(0.3153)).toBe('0.315 nm');
    expect(formatLength(15)).toBe('15 nm');
    expect(formatLength(999.4)).toBe('999 nm');
    expect(formatLength(999.6)).toBe('1 µm');
    expect(formatLength(100_000)).toBe('100 µm');
    expect(formatLength(2_250_000)).toBe('2.25 mm');
    expect(formatLength(Number.NaN)).toBe('–');
  });

  it('counts are cut to a letter', () => {
    expect(formatCount(0)).toBe('0');
    expect(formatCount(0.25)).toBe('0.25');
    expect(formatCount(950)).toBe('950');
    expect(formatCount(999.6)).toBe('1.0k');
    expect(formatCount(1234)).toBe('1.2k');
    expect(formatCount(57_300)).toBe('57k');
    expect(formatCount(-1_200_000)).toBe('−1.2M');
    expect(formatCount(3.4e9)).toBe('3.4G');
  });

  it('energies show what the channel step resolves', () => {
    expect(formatEnergy(2.0123456)).toBe('2.0123 eV');
    expect(formatEnergy(2.0123456, 1e-4)).toBe('2.01235 eV');
    expect(formatEnergy(0.25, 0.02)).toBe('0.250 eV');
  });

  it('units are shown as the trade writes them', () => {
    expect(formatUnit('cm-1')).toBe('cm⁻¹');
    expect(withUnit('1.2', 'percent')).toBe('1.2 %');
    expect(withUnit('–', 'eV')).toBe('–');
    expect(withUnit('30', 'degrees')).toBe('30°');
  });
});
