/** Points on a grid, in whatever order, complete or not, exact or not. */
import { describe, expect, it } from 'vitest';
import { findGrid, findRepeat } from '../../../src/io/text/grid';

const gridOf = (points: readonly (readonly [number, number])[]) =>
  findGrid(
    Float64Array.from(points, ([x]) => x),
    Float64Array.from(points, ([, y]) => y),
  );

const full = [0, 1, 2].flatMap((y) => [0, 10, 30].map((x) => [x, y] as const));

describe('points', () => {
  it('form a grid of ascending positions, evenly spaced or not', () => {
    const grid = gridOf(full.toReversed());
    expect(grid).toMatchObject({ missing: 0, wander: 0 });
    expect([...(grid?.x ?? [])]).toEqual([0, 10, 30]);
    expect([...(grid?.y ?? [])]).toEqual([0, 1, 2]);
    expect([...(grid?.pixelOf ?? [])]).toEqual([8, 7, 6, 5, 4, 3, 2, 1, 0]);
  });

  it('form a grid in one row, one column or one place', () => {
    expect(
      gridOf([
        [3, 1],
        [2, 1],
        [7, 1],
      ])?.pixelOf,
    ).toEqual(Int32Array.of(1, 0, 2));
    expect(
      gridOf([
        [1, 3],
        [1, 2],
        [1, 7],
      ])?.pixelOf,
    ).toEqual(Int32Array.of(1, 0, 2));
    expect(gridOf([[5, 5]])?.missing).toBe(0);
  });

  it('form a grid with a few of them missing', () => {
    expect(gridOf(full.slice(0, 7))?.missing).toBe(2);
    expect(gridOf(full.filter((_, i) => i !== 4))?.missing).toBe(1);
  });

  it('are scattered where the grid would be mostly empty', () => {
    expect(
      gridOf([
        [0, 0],
        [1, 1],
      ]),
    ).toBeNull();
    expect(
      gridOf([
        [0, 0],
        [0, 1],
        [1, 0],
      ]),
    ).toBeNull();
    expect(
      gridOf([
        [0, 0],
        [1, 1],
        [2, 2],
        [3, 3],
      ]),
    ).toBeNull();
  });

  it('form a grid though each is a little off', () => {
    const off = full.map(([x, y], i) => [x + 0.01 * ((7 * i) % 4), y - 0.004 * (i % 2)] as const);
    const grid = gridOf(off);
    expect(grid?.pixelOf).toEqual(Int32Array.of(0, 1, 2, 3, 4, 5, 6, 7, 8));
    expect(grid?.wander).toBeGreaterThan(0.004);
    expect(grid?.wander).toBeLessThan(0.031);
    expect(grid?.x[0]).toBeCloseTo((0 + 0.01 + 0.02) / 3, 9);
  });

  it('are scattered where they are as far off as the columns are apart', () => {
    const points = Array.from({ length: 30 }, (_, i) => [(i * 7.31) % 11, (i * 3.77) % 5] as const);
    expect(gridOf(points)).toBeNull();
  });
});

describe('a repeated place', () => {
  it('is found at its second point', () => {
    expect(findRepeat(Float64Array.of(0, 1, 0, 1), Float64Array.of(0, 0, 1, 0))).toBe(3);
    expect(findRepeat(Float64Array.of(0, 1, 0), Float64Array.of(0, 0, 1))).toBeNull();
    expect(findRepeat(Float64Array.of(0, -0), Float64Array.of(1, 1))).toBe(1);
  });
});
