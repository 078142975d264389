/** Ends of colour scales as text. */
import { describe, expect, it } from 'vitest';
import { formatLimits } from '../../src/science/limit-text';

describe('formatLimits', () => {
  it.each([
    [1.8932, 1.9521, 'eV', '1.8932', '1.9521 eV'],
    [41_360, 163_200, 'counts', '41k', '163k counts'],
    [-0.0242, 15.31, 'nm', '−0.024', '15.3 nm'],
    [-1.25, 1.25, 'percent', '−1.25', '1.25 %'],
    [0, 2.5, '', '0', '2.50'],
  ])('tells %d and %d %s apart', (low, high, unit, lowText, highText) => {
    const text = formatLimits({ low, high }, unit);
    expect([text.low, text.highWithUnit]).toEqual([lowText, highText]);
  });

  it('keeps the digits in which large counts differ', () => {
    const { low, high } = formatLimits({ low: 41_360.8, high: 41_363.9 }, 'counts');
    expect(low).not.toBe(high);
  });

  it('shows a dash for a map without values', () => {
    expect(formatLimits({ low: Number.NaN, high: Number.NaN }, 'eV').highWithUnit).toBe('–');
  });
});
