import { describe, expect, it } from 'vitest';
import { findPeaks } from '../../../src/science/fit/find-peaks';
import { createRandom } from '../../../src/science/numeric/random';
import { shapeByName } from '../../../src/science/peaks/shape-by-name';
import { countsOf, evenGrid } from '../peaks/made-grid';

const grid = evenGrid(1.8, 2.06, 512);

/** Poisson counts of gaussians on a flat background. */
function made(peaks: readonly (readonly [number, number, number])[], seed: number, level = 20) {
  const expected = new Float64Array(512).fill(level);
  for (const values of peaks) {
    const counts = countsOf(shapeByName('gaussian'), grid, values);
    for (let k = 0; k < 512; k++) expected[k] = (expected[k] as number) + (counts[k] as number);
  }
  const random = createRandom(seed, 0);
  return expected.map((mean) => random.poisson(mean));
}

describe('peaks of a spectrum', () => {
  it('are found with place, width and area', () => {
    const counts = made(
      [
        [40_000, 1.9, 0.05],
        [30_000, 2.005, 0.036],
      ],
      1,
    );
    const [first, second, ...others] = findPeaks(grid, counts, counts).toSorted(
      (a, b) => a.centreEv - b.centreEv,
    );
    expect(others).toEqual([]);
    expect(first?.centreEv).toBeCloseTo(1.9, 2);
    expect(second?.centreEv).toBeCloseTo(2.005, 2);
    for (const [peak, width, area] of [
      [first, 0.05, 40_000],
      [second, 0.036, 30_000],
    ] as const) {
      expect((peak?.fwhmEv ?? 0) / width).toBeGreaterThan(0.75);
      expect((peak?.fwhmEv ?? 0) / width).toBeLessThan(1.33);
      expect((peak?.area ?? 0) / area).toBeGreaterThan(0.7);
      expect((peak?.area ?? 0) / area).toBeLessThan(1.4);
    }
  });

  it('include a narrow line riding on a wide one', () => {
    const counts = made(
      [
        [60_000, 1.95, 0.08],
        [1500, 1.96, 0.003],
      ],
      2,
    );
    const widths = findPeaks(grid, counts, counts).map(({ fwhmEv }) => fwhmEv);
    expect(widths.some((width) => width > 0.05)).toBe(true);
    expect(widths.some((width) => width < 0.005)).toBe(true);
  });

  it('are none in noise, hardly ever', () => {
    let found = 0;
    for (let seed = 0; seed < 40; seed++) {
      const counts = made([], seed, 50);
      found += findPeaks(grid, counts, counts).length;
    }
    expect(found).toBeLessThanOrEqual(1);
  });

  it('are none in a straight background, and none where there is no data', () => {
    const line = Float64Array.from({ length: 512 }, (_, k) => 100 + k);
    expect(findPeaks(grid, line, line).filter(({ significance }) => significance > 8)).toEqual([]);
    const none = new Float64Array(512).fill(Number.NaN);
    expect(findPeaks(grid, none, new Float64Array(512).fill(1))).toEqual([]);
  });
});
