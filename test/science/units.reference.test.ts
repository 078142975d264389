/** Units and air against constants, tables and the trade's standard lines from outside. */
import { describe, expect, it } from 'vitest';
import { airNmFromVacuum, airRefractivity, vacuumNmFromAir } from '../../src/science/air';
import { laserEvFrom } from '../../src/science/laser';
import {
  cm1FromEv,
  cm1PerEv,
  evFromCm1,
  evFromNm,
  evFromShiftCm1,
  evPerNm,
  hcEvNm,
  nmFromEv,
  shiftCm1FromEv,
} from '../../src/science/units';

describe('hc', () => {
  it('is the double nearest to h c / e of the exact SI constants', () => {
    // SI 2019 / CODATA 2018: h = 6.62607015e-34, c = 299792458, e = 1.602176634e-19, exact.
    // hc/e in eV·nm = 662607015 · 299792458 / 1602176634 · 1e-5, here to 20 decimals in whole numbers.
    const scaled = (662607015n * 299792458n * 10n ** 20n) / 1602176634n;
    const nearest = Number(scaled) * 1e-25;
    expect(hcEvNm).toBeCloseTo(nearest, 12);
    const exact = (value: number): bigint => BigInt(Math.round(value * 2 ** 42)) * 10n ** 25n;
    const distance = (value: number): bigint => {
      const gap = exact(value) - scaled * 2n ** 42n;
      return gap < 0n ? -gap : gap;
    };
    const ulp = 2 ** -42;
    expect(distance(hcEvNm)).toBeLessThan(distance(hcEvNm + ulp));
    expect(distance(hcEvNm)).toBeLessThan(distance(hcEvNm - ulp));
  });

  it('agrees with the tabulated 1239.841 984 332 eV nm and 8065.543 937 cm-1 per eV (CODATA 2018)', () => {
    expect(Math.abs(hcEvNm - 1239.841984332)).toBeLessThan(1e-9);
    expect(Math.abs(cm1PerEv - 8065.543937)).toBeLessThan(1e-6);
  });
});

describe('air', () => {
  // Ciddor, Appl. Opt. 35, 1566 (1996), eq. 1, evaluated at the vacuum wavelength; 5 digits given.
  it.each([
    [532.0, 2.7821],
    [594.1, 2.7707],
    [632.8, 2.7653],
    [785.0, 2.7514],
    [1000.0, 2.7417],
  ])('has Ciddor’s refractivity at %f nm', (nm, tenThousandths) => {
    expect(Math.abs(airRefractivity(nm) * 1e4 - tenThousandths)).toBeLessThan(0.6e-4);
  });

  // Edlén, Metrologia 2, 71 (1966): an independent formula; the two agree to a few parts in 1e8 (Ciddor 1996, §4).
  it.each([400, 532, 594.1, 632.8, 785, 1000])('agrees with Edlén’s formula at %f nm', (nm) => {
    const sigma2 = (1000 / nm) ** 2;
    const edlen = (8342.13 + 2406030 / (130 - sigma2) + 15997 / (38.9 - sigma2)) * 1e-8;
    expect(Math.abs(airRefractivity(nm) - edlen)).toBeLessThan(4e-8);
  });

  // Ne I levels of NIST ASD (Saloman & Sansonetti, J. Phys. Chem. Ref. Data 33 (2004)): air wavelength,
  // and the vacuum wavelength as the reciprocal difference of the levels, cm-1 (levels from memory).
  it.each([
    [585.24879, 152970.7328, 135888.7173], // 2p1 → 1s2
    [640.2248, 149657.0393, 134041.84], // 2p9 → 1s5
  ])(
    'takes the neon line at %f nm in air to the difference of its levels',
    (airNm, upper, lower) => {
      const vacuumNm = 1e7 / (upper - lower);
      // levels and lines are good to 0.0001 nm; air against vacuum is 0.16 nm
      expect(Math.abs(vacuumNmFromAir(airNm) - vacuumNm)).toBeLessThan(3e-4);
    },
  );

  it('takes the red helium-neon laser from 632.816 nm in air to 632.991 nm in vacuum', () => {
    // 632.816 → 632.9910 computed by Ciddor 1996; the BIPM's vacuum value is 632.99121 nm (mise en pratique, from memory)
    expect(vacuumNmFromAir(632.816)).toBeCloseTo(632.991, 4);
    expect(airNmFromVacuum(632.99121)).toBeCloseTo(632.8162, 3);
    expect(laserEvFrom({ value: 632.816, unit: 'nm' }, 'air')).toBeCloseTo(hcEvNm / 632.991, 7);
  });
});

describe('Raman shift', () => {
  it('puts the silicon line under a helium-neon laser where the two wavelengths say', () => {
    // 520.7 cm-1 from 632.991 nm vacuum: 1e7/(1e7/632.991 − 520.7) = 654.5654 nm vacuum, 654.3846 nm air
    const laserEv = evFromNm(vacuumNmFromAir(632.816));
    const line = nmFromEv(evFromShiftCm1(520.7, laserEv));
    expect(Math.abs(line - 654.5654)).toBeLessThan(2e-4);
    expect(Math.abs(airNmFromVacuum(line) - 654.3846)).toBeLessThan(2e-4);
  });

  // Polystyrene and cyclohexane, ASTM E1840 (digits from memory): shift against the absolute wavelength
  // by Δν = 1e7/λ0 − 1e7/λ, independent of hc.
  it.each([620.9, 1001.4, 1602.3, 3054.3, 801.3, 2852.9])(
    'of the standard line at %f cm-1 is that of its absolute wavelength',
    (shift) => {
      const laserNm = 532.07;
      const lineNm = 1e7 / (1e7 / laserNm - shift);
      expect(shiftCm1FromEv(evFromNm(lineNm), evFromNm(laserNm))).toBeCloseTo(shift, 8);
      expect(nmFromEv(evFromShiftCm1(shift, evFromNm(laserNm)))).toBeCloseTo(lineNm, 9);
    },
  );
});

describe('widths and wavenumbers', () => {
  it('make 1 nm 3.2586 meV at 2.01 eV and 2.1958 meV at 1.65 eV', () => {
    // I(E) = I(λ) λ²/hc, so 1 nm is E²/hc; λ(2.01 eV) = 616.837 nm, λ(1.65 eV) = 751.419 nm
    expect(evPerNm(2.01) * 1e3).toBeCloseTo(3.2586, 4);
    expect(evPerNm(1.65) * 1e3).toBeCloseTo(2.1958, 4);
    expect(nmFromEv(2.01)).toBeCloseTo(616.837, 3);
    expect(nmFromEv(1.65)).toBeCloseTo(751.419, 3);
  });

  it('run both ways', () => {
    expect(evFromCm1(cm1PerEv)).toBeCloseTo(1, 14);
    expect(cm1FromEv(evFromCm1(2370))).toBeCloseTo(2370, 10);
  });
});
