/**
 * The inner loops of bands: sums of values, and of values times powers of energy, over a run of
 * channels for all pixels of a tile. Here as an interface and in plain code; the workers bring a faster
 * one that gives the same bits.
 */

import type { CountsArray } from '../scan';

/** The kernel's input holds values of channels k0 ≤ k < k1 of a tile: (channels, pixels), C order. */
export interface TileRun {
  readonly pixels: number;
  readonly k0: number;
  readonly k1: number;
}

/** One value of each pixel: zeroth, first and second moment. */
export type LowPlanes = readonly [Float64Array, Float64Array, Float64Array];
/** Third and fourth moment. */
export type HighPlanes = readonly [Float64Array, Float64Array];

/**
 * Sums with their own memory. A pixel's sum runs in channel order, starting from 0, and every product is
 * rounded: v e, (v e) e; v (e e e), (v (e e e)) e. So all kernels give the same bits, and none depends
 * on which pixels are neighbours.
 */
export interface MomentKernel {
  readonly kind: 'plain' | 'vectors';
  /** Fills the input with counts, as doubles. The view given back may be changed, and is valid until the next call. */
  fill(counts: CountsArray): Float64Array;
  /** Σ v, Σ v e and Σ v e² of the run in the input. The planes are at least as long as the run has pixels, and valid until the next call. */
  low(run: TileRun, energies: Float64Array): LowPlanes;
  /** Σ v e³ and Σ v e⁴, likewise. */
  high(run: TileRun, energies: Float64Array): HighPlanes;
}

/** @param tilePixels - most pixels of a run */
export function createPlainKernel(tilePixels: number): MomentKernel {
  const plane = (): Float64Array => new Float64Array(tilePixels);
  const lows: LowPlanes = [plane(), plane(), plane()];
  const highs: HighPlanes = [plane(), plane()];
  let input = new Float64Array(0);
  return {
    kind: 'plain',
    fill: (counts) => {
      if (input.length < counts.length) input = new Float64Array(counts.length);
      input.set(counts);
      return input;
    },
    low: (run, energies) => {
      lowMoments(input, run, energies, lows);
      return lows;
    },
    high: (run, energies) => {
      highMoments(input, run, energies, highs);
      return highs;
    },
  };
}

function lowMoments(
  values: Float64Array,
  { pixels, k0, k1 }: TileRun,
  energies: Float64Array,
  [out0, out1, out2]: LowPlanes,
): void {
  for (let p = 0; p < pixels; p++) {
    let s0 = 0;
    let s1 = 0;
    let s2 = 0;
    let at = p;
    for (let k = k0; k < k1; k++) {
      const e = energies[k];
      const v = values[at];
      const ve = v * e;
      s0 += v;
      s1 += ve;
      s2 += ve * e;
      at += pixels;
    }
    out0[p] = s0;
    out1[p] = s1;
    out2[p] = s2;
  }
}

function highMoments(
  values: Float64Array,
  { pixels, k0, k1 }: TileRun,
  energies: Float64Array,
  [out3, out4]: HighPlanes,
): void {
  for (let p = 0; p < pixels; p++) {
    let s3 = 0;
    let s4 = 0;
    let at = p;
    for (let k = k0; k < k1; k++) {
      const e = energies[k];
      const v = values[at] * (e * e * e);
      s3 += v;
      s4 += v * e;
      at += pixels;
    }
    out3[p] = s3;
    out4[p] = s4;
  }
}

/** No data as nothing: a sum then leaves it out. In place, over the first `length` values. */
export function zeroNoData(values: Float64Array, length: number): void {
  for (let i = 0; i < length; i++) {
    if (Number.isNaN(values[i])) values[i] = 0;
  }
}
