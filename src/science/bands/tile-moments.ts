/** Integral, centroid and spread of one tile's pixels from the band's sums. */
import type { BandQuantity } from './band';
import type { BandPlan } from './band-plan';
import type { TileSums } from './band-sums';
import { leastLeft, nothingOf } from './floor-line';
import { type Magnitudes, trusted } from './magnitudes';
import type { TileFloor } from './tile-floor';
import type { Tile } from './tiled-counts';

/** A quantity's map of the slab, written tile by tile. */
export interface MapInProgress {
  readonly quantity: BandQuantity;
  readonly values: Float64Array;
  readonly errors: Float64Array | null;
  /** (pixels of the tile) 0, or how the pixel is to be computed instead */
  readonly doubts: Uint8Array;
}

/** Rounding of kept sums would show: sum this pixel's channels one by one. */
export const bySpan = 1;
/** Channels without data matter: compute this pixel by the definition. */
export const byDefinition = 2;

export interface MomentInputs {
  readonly plan: BandPlan;
  readonly tile: Tile;
  readonly sums: TileSums;
  /** null for floor "none" */
  readonly floor: TileFloor | null;
  /** null where sums are made channel by channel: these are trusted */
  readonly magnitudes: Magnitudes | null;
  /** sums of counts are exact: whole numbers */
  readonly isExact: boolean;
  /** the second time, for pixels marked `bySpan` only */
  readonly isRepeat: boolean;
}

/** What `trusted` is for sums, for the error of a spread, a difference of fourth powers, 2⁻²²: rounding below 1e-9 of it. */
const trustedFourth = 1 / 4194304;
/** The root of a variance and what a floor adds to it, which may take nearly all of it away. */
export function errorOf(own: number, extra: number): number {
  const variance = own + extra;
  return variance < nothingOf(own) ? 0 : Math.sqrt(variance);
}

export function writeIntegrals(
  { tile, sums, floor, magnitudes, isExact, isRepeat }: MomentInputs,
  { values, errors, doubts }: MapInProgress,
): void {
  const [s0] = sums.counts;
  const [v0] = sums.variances;
  const scale = magnitudes?.counts ?? null;
  for (let p = 0; p < tile.pixels; p++) {
    if (isRepeat && doubts[p] !== bySpan) continue;
    const at = tile.first + p;
    if (scale !== null && !isExact && !(Math.abs(s0[p]) > trusted * scale[at])) {
      if (doubts[p] === 0) doubts[p] = bySpan;
    }
    values[at] = s0[p];
    if (errors === null) continue;
    const extra = floor === null ? 0 : floor.extraVariance(p, 1, 0, 0);
    errors[at] = errorOf(v0[p], extra);
  }
}

export function writeCentroids(
  { plan, tile, sums, floor, magnitudes, isExact, isRepeat }: MomentInputs,
  { values, errors, doubts }: MapInProgress,
): void {
  const [s0, s1] = sums.counts;
  const [v0, v1, v2] = sums.variances;
  const { referenceEv, reach } = plan;
  const square = reach * reach;
  const scale = magnitudes?.counts ?? null;
  const varianceScale = magnitudes?.variances ?? null;
  const slope = trusted * square * (magnitudes?.slope ?? 0);
  const constant = trusted * square * (magnitudes?.constant ?? 0);
  for (let p = 0; p < tile.pixels; p++) {
    if (isRepeat && doubts[p] !== bySpan) continue;
    const at = tile.first + p;
    const integral = s0[p];
    const least = floor === null ? 0 : leastLeft(sums.gross[p]);
    if (scale !== null && !(Math.abs(integral) > trusted * scale[at])) {
      // Whole numbers leave no doubt that there is nothing.
      if (doubts[p] === 0 && !(isExact && !(integral > least))) doubts[p] = bySpan;
      values[at] = Number.NaN;
      if (errors !== null) errors[at] = Number.NaN;
      continue;
    }
    if (!(integral > least)) {
      values[at] = Number.NaN;
      if (errors !== null) errors[at] = Number.NaN;
      continue;
    }
    const mean = s1[p] / integral;
    values[at] = referenceEv + mean;
    if (errors === null) continue;
    let own = v2[p] - 2 * mean * v1[p] + mean * mean * v0[p];
    if (varianceScale === null) {
      if (own < nothingOf(v0[p] * square)) own = 0;
    } else if (!(own > slope * varianceScale[at] + constant) && doubts[p] === 0) {
      doubts[p] = bySpan;
    }
    const extra = floor === null ? 0 : floor.extraVariance(p, -mean, 1, 0);
    errors[at] = errorOf(own, extra) / integral;
  }
}

export function writeSpreads(
  { plan, tile, sums, floor, magnitudes, isExact, isRepeat }: MomentInputs,
  { values, errors, doubts }: MapInProgress,
): void {
  const [s0, s1, s2] = sums.counts;
  const [v0, v1, v2, v3, v4] = sums.variances;
  const square = plan.reach * plan.reach;
  for (let p = 0; p < tile.pixels; p++) {
    if (isRepeat && doubts[p] !== bySpan) continue;
    const at = tile.first + p;
    const integral = s0[p];
    const least = floor === null ? 0 : leastLeft(sums.gross[p]);
    const isThere = integral > least;
    values[at] = Number.NaN;
    if (errors !== null) errors[at] = Number.NaN;
    if (isExact && !isThere) continue;
    const mean = s1[p] / integral;
    const meanSquare = mean * mean;
    let squared = s2[p] / integral - meanSquare;
    if (magnitudes !== null) {
      if (!(integral * squared > trusted * magnitudes.counts[at] * square)) {
        if (doubts[p] === 0) doubts[p] = bySpan;
        continue;
      }
    } else {
      const gross = floor === null ? integral : sums.gross[p];
      if (Math.abs(squared * integral) <= nothingOf(gross * square)) squared = 0;
    }
    if (!isThere) continue;
    const spread = Math.sqrt(squared);
    values[at] = spread;
    if (errors === null || spread === 0) continue;
    const second = v2[p] - 2 * mean * v1[p] + meanSquare * v0[p];
    const fourth =
      v4[p] -
      4 * mean * v3[p] +
      6 * meanSquare * v2[p] -
      4 * meanSquare * mean * v1[p] +
      meanSquare * meanSquare * v0[p];
    let own = fourth - 2 * squared * second + squared * squared * v0[p];
    if (magnitudes === null) {
      if (own < nothingOf(v0[p] * square * square)) own = 0;
    } else {
      const scale = magnitudes.slope * magnitudes.variances[at] + magnitudes.constant;
      if (!(own > trustedFourth * scale * square * square) && doubts[p] === 0) doubts[p] = bySpan;
    }
    const extra = floor === null ? 0 : floor.extraVariance(p, meanSquare - squared, -2 * mean, 1);
    errors[at] = errorOf(own, extra) / (2 * spread * integral);
  }
}
