/** Sums over whole channels between two edges, and the partly covered channels at their ends. */
import type { LowPlanes } from './moment-kernel';
import type { Tile } from './tiled-counts';

/** A number for each of the band's two end channels. */
export interface EndPair {
  readonly first: number;
  readonly last: number;
}

/** Multiplies values from ≤ i < to, in place. */
export function scale(values: Float64Array, from: number, to: number, by: number): void {
  if (by === 1) return;
  for (let i = from; i < to; i++) values[i] *= by;
}

/** Whole channels between two edges, and where the channels outside them lie. */
export interface Between {
  readonly below: LowPlanes;
  readonly above: LowPlanes;
  readonly energies: EndPair;
  readonly tile: Tile;
}

/** Zeroth to second moments of the whole channels and the weighted end channels. */
export function sumOnce(
  { below: [b0, b1, b2], above: [a0, a1, a2], energies, tile }: Between,
  [first, last]: readonly Float64Array[],
  { first: w1, last: w2 }: EndPair,
  [s0, s1, s2]: readonly Float64Array[],
): void {
  const { first: e1, last: e2 } = energies;
  for (let p = 0; p < tile.pixels; p++) {
    const at = tile.first + p;
    const c1 = first[p] * w1;
    const c2 = last[p] * w2;
    const c1e = c1 * e1;
    const c2e = c2 * e2;
    s0[p] = a0[at] - b0[at] + (c1 + c2);
    s1[p] = a1[at] - b1[at] + (c1e + c2e);
    s2[p] = a2[at] - b2[at] + (c1e * e1 + c2e * e2);
  }
}

/** The same with two sets of weights at once. */
export function sumTwice(
  { below: [b0, b1, b2], above: [a0, a1, a2], energies, tile }: Between,
  [first, last]: readonly Float64Array[],
  { first: w1, last: w2 }: EndPair,
  [s0, s1, s2]: readonly Float64Array[],
  { first: x1, last: x2 }: EndPair,
  [v0, v1, v2]: readonly Float64Array[],
): void {
  const { first: e1, last: e2 } = energies;
  const ee1 = e1 * e1;
  const ee2 = e2 * e2;
  for (let p = 0; p < tile.pixels; p++) {
    const at = tile.first + p;
    const whole0 = a0[at] - b0[at];
    const whole1 = a1[at] - b1[at];
    const whole2 = a2[at] - b2[at];
    const c1 = first[p] * w1;
    const c2 = last[p] * w2;
    s0[p] = whole0 + (c1 + c2);
    s1[p] = whole1 + (c1 * e1 + c2 * e2);
    s2[p] = whole2 + (c1 * ee1 + c2 * ee2);
    const d1 = first[p] * x1;
    const d2 = last[p] * x2;
    v0[p] = whole0 + (d1 + d2);
    v1[p] = whole1 + (d1 * e1 + d2 * e2);
    v2[p] = whole2 + (d1 * ee1 + d2 * ee2);
  }
}
