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

  it('takes no notice of what is not finite, and ends for any counts', () => {
    const odd = Float64Array.of(Number.POSITIVE_INFINITY, 7, Number.NEGATIVE_INFINITY, Number.NaN);
    expect(countsLimits([odd], all, false)).toEqual({ low: 0, high: 8 });
    const huge = countsLimits([Float64Array.of(1e308, 1)], { from: 0, to: 2 }, true);
    expect(Number.isFinite(huge.high)).toBe(true);
    expect(huge.low).toBeGreaterThan(0);
  });

  it('has room where there are no counts at all', () => {
    const empty = Float64Array.of(0, 0, Number.NaN, 0);
    expect(countsLimits([empty], all, false)).toEqual({ low: 0, high: 1 });
    const { low, high } = countsLimits([empty], all, true);
    expect(low).toBeGreaterThan(0);
    expect(high).toBeGreaterThan(low);
  });
});
