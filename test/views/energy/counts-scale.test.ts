import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { countsLimits, roundUp } from '../../../src/views/energy/counts-scale';

const all = { from: 0, to: 4 };

describe('the counts axis', () => {
  it('takes in every count in view, from zero', () => {
    const spectra = [Float64Array.of(3, 120, 40, Number.NaN), Float64Array.of(0, 7, 960, 2)];
    expect(countsLimits(spectra, all, false)).toEqual({ low: 0, high: 1000 });
    expect(countsLimits(spectra, { from: 0, to: 2 }, false).high).toBe(125);
  });

  it('reaches below zero where values do', () => {
    expect(countsLimits([Float64Array.of(-90, 10)], { from: 0, to: 2 }, false).low).toBe(-100);
  });

  it('stays above zero on a logarithmic scale', () => {
    const { low, high } = countsLimits([Float64Array.of(0, 0, 5, 2000)], all, true);
    expect(low).toBe(5);
    expect(high).toBeGreaterThan(2000);
  });

  it('holds while counts change a little: limits are round', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-6, max: 1e9, noNaN: true }), (value) => {
        const limit = roundUp(value);
        expect(limit).toBeGreaterThanOrEqual(value);
        expect(limit).toBeLessThanOrEqual(value * 1.4);
        expect(Number(limit.toPrecision(3))).toBeCloseTo(limit, 9);
      }),
    );
  });
});
