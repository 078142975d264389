import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { joined, joinedMaps, meanOfRows, splitRows } from '../../workers/assemble';
import { combineProgress } from '../../workers/progress';

describe('rows shared out', () => {
  it('are all rows once, in order, in nearly equal parts and no empty ones', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 500 }),
        fc.integer({ min: 1, max: 64 }),
        (ny, workers) => {
          const parts = splitRows(ny, workers);
          expect(parts).toHaveLength(Math.min(ny, workers));
          let next = 0;
          for (const { y0, y1 } of parts) {
            expect(y0).toBe(next);
            next = y1;
          }
          expect(next).toBe(ny);
          const lengths = parts.map(({ y0, y1 }) => y1 - y0);
          expect(Math.min(...lengths)).toBeGreaterThan(0);
          expect(Math.max(...lengths) - Math.min(...lengths)).toBeLessThanOrEqual(1);
        },
      ),
    );
  });
});

describe('parts put together', () => {
  it('follow each other', () => {
    expect(joined([Float64Array.of(1, 2), Float64Array.of(3)])).toEqual(Float64Array.of(1, 2, 3));
  });

  it('keep the order of quantities, and errors where all parts have them', () => {
    const part = (value: number) => [
      {
        quantity: 'peak' as const,
        values: Float64Array.of(value),
        errors: Float64Array.of(-value),
      },
      { quantity: 'peak_at' as const, values: Float64Array.of(10 * value), errors: null },
    ];
    expect(joinedMaps([part(1), part(2)])).toEqual([
      { quantity: 'peak', values: Float64Array.of(1, 2), errors: Float64Array.of(-1, -2) },
      { quantity: 'peak_at', values: Float64Array.of(10, 20), errors: null },
    ]);
  });

  it('have the mean over pixels with data, NaN where there is none', () => {
    const parts = [
      { sums: Float64Array.of(6, 0, 1, 0), pixels: Uint32Array.of(2, 0, 1, 0) },
      { sums: Float64Array.of(5, 0), pixels: Uint32Array.of(1, 0) },
    ];
    expect(meanOfRows(parts, 2)).toEqual(Float64Array.of(12 / 4, Number.NaN));
  });
});

describe('combined progress', () => {
  it('weighs parts by their work, only rises, and ends at 1', () => {
    const shares: number[] = [];
    const { part, finish } = combineProgress([3, 1], (share) => shares.push(share));
    part(0)(0.5);
    part(1)(1);
    part(0)(0.1);
    part(0)(0.9);
    finish();
    part(0)(0.2);
    expect(shares).toEqual([0.375, 0.625, 0.925, 1]);
  });

  it('says nothing more once dropped', () => {
    const shares: number[] = [];
    const { part, drop, finish } = combineProgress([1], (share) => shares.push(share));
    part(0)(0.5);
    drop();
    part(0)(0.8);
    finish();
    expect(shares).toEqual([0.5]);
  });
});
