/** Quantiles in the cases a map brings: nothing measured, ties, sorted ramps, long runs. */
import { describe, expect, it } from 'vitest';
import { quantiles } from '../../../src/science/statistics/quantile';

describe('quantiles', () => {
  it('are NaN where there is no value', () => {
    expect(quantiles(new Float64Array(0), [0, 0.5])).toEqual([Number.NaN, Number.NaN]);
    expect(quantiles(Float64Array.of(Number.NaN), [0.5])).toEqual([Number.NaN]);
  });

  it('are the one value there is', () => {
    expect(quantiles(Float64Array.of(Number.NaN, 7), [0, 0.3, 1])).toEqual([7, 7, 7]);
  });

  it('come in the order asked for', () => {
    expect(quantiles(Float64Array.of(4, 0, 2), [1, 0, 0.5])).toEqual([4, 0, 2]);
  });

  it('are exact beside infinite values', () => {
    const values = Float64Array.of(1, 2, Number.POSITIVE_INFINITY);
    expect(quantiles(values, [0, 0.5, 1])).toEqual([1, 2, Number.POSITIVE_INFINITY]);
  });

  it.each([
    ['ascending', (i: number) => i],
    ['descending', (i: number) => -i],
    ['all equal', () => 5],
    ['an organ pipe', (i: number) => Math.min(i, 65_535 - i)],
  ] as const)('are found among 65 536 values that are %s', (_, valueAt) => {
    const values = Float64Array.from({ length: 65_536 }, (_, i) => valueAt(i));
    const sorted = values.slice().sort();
    expect(quantiles(values, [0, 0.2, 1])).toEqual([sorted[0], sorted[13_107], sorted[65_535]]);
  });
});
