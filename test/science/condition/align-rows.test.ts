import { describe, expect, it } from 'vitest';
import { findRowShifts, moveRows, rowProfiles } from '../../../src/science/condition/align-rows';
import { createRandom } from '../../../src/science/numeric/random';
import { noNoise, place, slabOf } from './made-conditioned';

const ny = 40;
const nx = 64;

/** Round spots, each row shifted to the right by `shiftOf`. */
function spots(shiftOf: (y: number) => number, seed: number | null = null): Float64Array {
  const random = createRandom(seed ?? 0);
  return Float64Array.from({ length: ny * nx }, (_, at) => {
    const y = Math.floor(at / nx);
    const x = (at % nx) - shiftOf(y);
    let mean = 200;
    for (const [cy, cx, width] of [
      [8, 14, 5],
      [20, 40, 7],
      [30, 20, 6],
      [35, 50, 5],
      [12, 52, 6],
    ]) {
      mean += 4000 * Math.exp(-((y - cy) ** 2 + (x - cx) ** 2) / (2 * width * width));
    }
    return seed === null ? mean : random.poisson(mean);
  });
}

const rms = (a: Float64Array, b: (y: number) => number): number => {
  const mean = a.reduce((sum, value, y) => sum + value - b(y), 0) / a.length;
  return Math.sqrt(a.reduce((sum, value, y) => sum + (value - b(y) - mean) ** 2, 0) / a.length);
};

describe('row shifts', () => {
  it('are none where rows lie well, spots and all', () => {
    const { shiftsPx, serpentinePx } = findRowShifts(
      spots(() => 0),
      { ny, nx },
      3,
      place,
    );
    expect(rms(shiftsPx, () => 0)).toBeLessThan(0.3);
    expect(Math.abs(serpentinePx)).toBeLessThan(0.02);
  });

  it.each([0.3, 1.4, -2.5])('find a serpentine of %d px', (offset) => {
    const shiftOf = (y: number): number => (y % 2 === 1 ? offset : 0);
    const found = findRowShifts(spots(shiftOf, 4), { ny, nx }, 3, place);
    expect(Math.abs(found.serpentinePx - offset)).toBeLessThan(0.1);
    expect(rms(found.shiftsPx, shiftOf)).toBeLessThan(0.35);
  });

  it('find rows that jitter, from row to row; their slow wander is the sample’s', () => {
    const jitter = Array.from({ length: ny }, (_, y) => 0.7 * createRandom(9, y).normal());
    const scan = spots((y) => jitter[y], 5);
    const { shiftsPx } = findRowShifts(scan, { ny, nx }, 3, place);
    const steps = shiftsPx.slice(1).map((shift, y) => shift - shiftsPx[y]);
    expect(rms(steps, (y) => jitter[y + 1] - jitter[y])).toBeLessThan(0.2);
  });

  it('stay within the greatest allowed, and count rows that were cut', () => {
    const found = findRowShifts(
      spots((y) => (y === 20 ? 3 : 0)),
      { ny, nx },
      1.5,
      place,
    );
    expect(Math.max(...found.shiftsPx)).toBe(1.5);
    expect(found.limitedRows).toBe(1);
  });

  it('are not taken from noise', () => {
    const noise = Float64Array.from({ length: ny * nx }, (_, at) =>
      createRandom(6, at).poisson(100),
    );
    const found = findRowShifts(noise, { ny, nx }, 3, place);
    expect(found.unsureRows).toBeGreaterThan(ny - 4);
    expect(Math.max(...found.shiftsPx.map(Math.abs))).toBeLessThan(1.5);
  });

  it('of constant and of empty rows are 0', () => {
    for (const value of [7, Number.NaN]) {
      const found = findRowShifts(new Float64Array(ny * nx).fill(value), { ny, nx }, 3, place);
      expect([...found.shiftsPx].every((shift) => shift === 0)).toBe(true);
    }
  });

  it.each([0, -1, 17, Number.NaN])('of up to %d px are refused', (most) => {
    expect(() => findRowShifts(new Float64Array(ny * nx), { ny, nx }, most, place)).toThrow(place);
  });

  it('are refused in rows too short', () => {
    expect(() => findRowShifts(new Float64Array(8), { ny: 2, nx: 4 }, 1, place)).toThrow(
      'too short',
    );
  });
});

describe('moving rows', () => {
  const shape = { ny: 2, nx: 4, nk: 2 };
  const slab = slabOf([0, 0, 10, 20, 30, 40, 50, 60, 0, 0, 10, 20, 30, 40, 50, 60], shape);

  it('by whole pixels copies, and leaves no data where nothing was', () => {
    const moved = moveRows(slab, Float64Array.of(0, 1));
    expect([...moved.counts]).toEqual([
      0,
      0,
      10,
      20,
      30,
      40,
      50,
      60,
      10,
      20,
      30,
      40,
      50,
      60,
      NaN,
      NaN,
    ]);
    expect(moved.isIndependent).toBe(false);
  });

  it('by parts of one mixes neighbours, their variances with squared weights', () => {
    const moved = moveRows(slab, Float64Array.of(0.25, -0.25));
    expect(moved.counts[2]).toBeCloseTo(0.75 * 10 + 0.25 * 30, 12);
    expect(moved.variances?.[2]).toBeCloseTo(0.5625 * 10 + 0.0625 * 30, 12);
    expect(moved.counts[8 + 2]).toBeCloseTo(0.25 * 0 + 0.75 * 10, 12);
    // A quarter of a pixel over the edge is still the edge's pixel.
    expect([...moved.counts].slice(8, 10)).toEqual([0, 0]);
  });

  it('back again what was displaced leaves rows alike', () => {
    const shiftOf = (y: number): number => (y % 2 === 1 ? 1.5 : 0);
    const totals = spots(shiftOf);
    const scan = slabOf(totals, { ny, nx, nk: 1 }, noNoise);
    const { shiftsPx } = findRowShifts(rowProfiles(scan), { ny, nx }, 3, place);
    const moved = moveRows(scan, shiftsPx);
    const unlike = (values: ArrayLike<number>): number => {
      let sum = 0;
      for (let y = 1; y < ny; y++) {
        for (let x = 4; x < nx - 4; x++)
          sum += (values[y * nx + x] - values[(y - 1) * nx + x]) ** 2;
      }
      return sum;
    };
    expect(unlike(moved.counts)).toBeLessThan(0.35 * unlike(totals));
  });
});
