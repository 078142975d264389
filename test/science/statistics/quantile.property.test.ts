/** Laws of quantiles, against plain sorting. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { quantiles } from '../../../src/science/statistics/quantile';

const value = fc.oneof(
  { weight: 6, arbitrary: fc.double({ min: -1e6, max: 1e6, noNaN: true }) },
  { weight: 3, arbitrary: fc.integer({ min: -3, max: 3 }) },
  { weight: 1, arbitrary: fc.constant(Number.NaN) },
);
const values = fc
  .array(value, { minLength: 1, maxLength: 200 })
  .map((list) => Float64Array.from(list));
const shares = fc.array(fc.double({ min: 0, max: 1, noNaN: true }), { minLength: 1, maxLength: 6 });

/** Straight from the definition: h = (n − 1) p, between the two order statistics next to it. */
function bySorting(list: Float64Array, share: number): number {
  const sorted = list.filter((one) => !Number.isNaN(one)).sort();
  if (sorted.length === 0) return Number.NaN;
  const position = share * (sorted.length - 1);
  const rank = Math.floor(position);
  const lower = sorted[rank]!;
  const upper = sorted[Math.min(rank + 1, sorted.length - 1)]!;
  return lower + (position - rank) * (upper - lower);
}

describe('quantiles', () => {
  it('are what sorting gives', () => {
    fc.assert(
      fc.property(values, shares, (list, wanted) => {
        const found = quantiles(list, wanted);
        wanted.forEach((share, index) => {
          const expected = bySorting(list, share);
          if (Number.isNaN(expected)) expect(found[index]).toBeNaN();
          // 1e6 × 2⁻⁵² × a few: the interpolation is written the other way round
          else expect(Math.abs(found[index]! - expected)).toBeLessThanOrEqual(1e-9);
        });
      }),
    );
  });

  it('lie between the least and the greatest value, and rise with the share', () => {
    fc.assert(
      fc.property(values, shares, (list, wanted) => {
        const known = list.filter((one) => !Number.isNaN(one));
        fc.pre(known.length > 0);
        const found = quantiles(
          list,
          [...wanted].sort((a, b) => a - b),
        );
        const bounded = [Math.min(...known), ...found, Math.max(...known)];
        for (let i = 1; i < bounded.length; i++)
          expect(bounded[i]!).toBeGreaterThanOrEqual(bounded[i - 1]!);
      }),
    );
  });

  it('leave the values as they were', () => {
    fc.assert(
      fc.property(values, shares, (list, wanted) => {
        const before = list.slice();
        quantiles(list, wanted);
        expect(list).toEqual(before);
      }),
    );
  });
});
