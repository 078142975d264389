import { describe, expect, it } from 'vitest';
import { gaussian } from '../../../src/science/peaks/gaussian';
import type { Shape } from '../../../src/science/peaks/shape';
import { shapeByName } from '../../../src/science/peaks/shape-by-name';
import { columnsOf, countsOf, evenGrid, sum } from './made-grid';

const grid = evenGrid(1.9, 2.1, 160);
const [fano, lorentzian, pseudoVoigt, tailed, voigt] = [
  'fano',
  'lorentzian',
  'pseudo-voigt',
  'tailed',
  'voigt',
].map(shapeByName) as [Shape, Shape, Shape, Shape, Shape];

/** Greatest difference of two peaks over the height of the second. */
function apart(found: Float64Array, wanted: Float64Array): number {
  const height = Math.max(...wanted.map(Math.abs));
  return Math.max(...found.map((value, k) => Math.abs(value - (wanted[k] as number)))) / height;
}

describe('shapes go over into each other', () => {
  it('pseudo-Voigt into the Gaussian and the Lorentzian, with their derivatives', () => {
    for (const [eta, plain] of [
      [0, gaussian],
      [1, lorentzian],
    ] as const) {
      const values = [800, 2.003, 0.012];
      expect(
        apart(countsOf(pseudoVoigt, grid, [...values, eta]), countsOf(plain, grid, values)),
      ).toBeLessThan(1e-15);
      const columns = columnsOf(pseudoVoigt, grid, [...values, eta]);
      for (const [i, column] of columnsOf(plain, grid, values).entries()) {
        expect(apart(columns[i] as Float64Array, column)).toBeLessThan(1e-14);
      }
    }
  });

  it.each([0.0004, 0.02])('Voigt into either, at a width of exactly 0 of the other: %d eV', (w) => {
    const [g, l] = [countsOf(gaussian, grid, [1, 2, w]), countsOf(lorentzian, grid, [1, 2, w])];
    // 2e-7: the series of the Gaussian's own channels.
    expect(apart(countsOf(voigt, grid, [1, 2, w, 0]), g)).toBeLessThan(2e-7);
    expect(apart(countsOf(voigt, grid, [1, 2, 0, w]), l)).toBeLessThan(1e-8);
  });

  it('Voigt without a step where its Gaussian becomes too narrow to be seen', () => {
    const at = (share: number): Float64Array => countsOf(voigt, grid, [1, 2, share * 0.02, 0.02]);
    expect(apart(at(1e-3 * (1 - 1e-12)), at(1e-3 * (1 + 1e-12)))).toBeLessThan(1e-11);
    expect(apart(at(2e-4), countsOf(lorentzian, grid, [1, 2, 0.02]))).toBeLessThan(1e-6);
  });

  it('tailed into the Gaussian without a tail, and without a step where the series takes over', () => {
    const wanted = countsOf(gaussian, grid, [1, 2, 0.02]);
    expect(apart(countsOf(tailed, grid, [1, 2, 0.02, 0]), wanted)).toBeLessThan(2e-7);
    // σ over the tail is 100 there.
    const switchEv = 0.02 / 2.3548200450309493 / 100;
    const either = [1 - 1e-12, 1 + 1e-12].map((by) => [1, 2, 0.02, switchEv * by]);
    const [below = [], above = []] = either;
    expect(apart(countsOf(tailed, grid, below), countsOf(tailed, grid, above))).toBeLessThan(1e-11);
    const columns = columnsOf(tailed, grid, above);
    for (const [i, column] of columnsOf(tailed, grid, below).entries()) {
      expect(apart(column, columns[i] as Float64Array)).toBeLessThan(1e-9);
    }
  });

  it('tailed into a one-sided exponential without a Gaussian', () => {
    const counts = countsOf(tailed, grid, [1, 2, 0, 0.03]);
    const exponential = grid.edgesEv.map((edge) => Math.exp(Math.min(0, edge - 2) / 0.03));
    const wanted = counts.map((_, k) => exponential[k + 1]! - exponential[k]!);
    expect(apart(counts, wanted)).toBeLessThan(1e-9);
  });

  it('Fano into the Lorentzian for q toward either infinity', () => {
    const wanted = countsOf(lorentzian, grid, [1, 2, 0.01]);
    for (const q of [1e300, -1e300, Infinity, -Infinity]) {
      expect(apart(countsOf(fano, grid, [1, 2, 0.01, q]), wanted)).toBeLessThan(1e-12);
      for (const column of columnsOf(fano, grid, [1, 2, 0.01, q])) {
        expect(column.every(Number.isFinite)).toBe(true);
      }
    }
  });
});

describe('areas', () => {
  it.each([-4, -1, 0, 0.5, 3])('of a Fano line of q = %d are area × (q² − 1)/(q² + 1)', (q) => {
    // The odd part cancels over a window around the centre, the even one lacks 2/π × half width/reach.
    const wide = evenGrid(-998, 1002, 4000);
    const total = sum(countsOf(fano, wide, [500, 2, 0.02, q]));
    expect(total).toBeCloseTo((500 * (q * q - 1)) / (q * q + 1), 1);
  });

  it('of Voigt peaks are whole but for the wings of the Lorentzian beyond the window', () => {
    for (const [g, l] of [
      [0.0002, 0.0003],
      [0.01, 0.002],
      [0.003, 0.03],
    ] as const) {
      const beyond = 1 - sum(countsOf(voigt, evenGrid(1, 3, 2000), [1, 2, g, l]));
      // (2/π) atan(half width/reach), to the square of widths over reach
      const expected = (2 / Math.PI) * Math.atan(l / 2);
      expect(Math.abs(beyond - expected)).toBeLessThan(1e-7 + 2e-4 * expected);
    }
  });
});
