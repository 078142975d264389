/** From the workers' parts to the whole scan: rows shared out, maps and sums put together. */

import type { PixelMap, ScanMeta, ScanShape } from '../src/science/scan';
import type { BandMap, RowRange, ScanOverview, SlabSummary } from './engine';

/** Rows in as many nearly equal ranges as there are workers, but no empty ones. */
export function splitRows(ny: number, workers: number): readonly RowRange[] {
  const parts = Math.min(ny, workers);
  return Array.from({ length: parts }, (_, part) => ({
    y0: Math.floor((part * ny) / parts),
    y1: Math.floor(((part + 1) * ny) / parts),
  }));
}

/** One after the other, in row order. */
export function joined(parts: readonly Float64Array[]): Float64Array {
  if (parts.length === 1) return parts[0];
  const whole = new Float64Array(parts.reduce((sum, { length }) => sum + length, 0));
  let at = 0;
  for (const part of parts) {
    whole.set(part, at);
    at += part.length;
  }
  return whole;
}

/** @param parts - of each worker in row order, the quantities of each in the same order */
export function joinedMaps(parts: readonly (readonly BandMap[])[]): readonly BandMap[] {
  return parts[0].map(({ quantity }, index) => {
    const errors = parts.flatMap((maps) => maps[index].errors ?? []);
    return {
      quantity,
      values: joined(parts.map((maps) => maps[index].values)),
      errors: errors.length === parts.length ? joined(errors) : null,
    };
  });
}

/** Sums over a row's pixels of each channel, and how many had data there; (rows × nk). */
export interface RowSums {
  readonly sums: Float64Array;
  readonly pixels: Uint32Array;
}

/**
 * Mean spectrum, rows added in order, so that its bits do not depend on the number of workers.
 *
 * @returns (nk); NaN where no pixel had data
 */
export function meanOfRows(parts: readonly RowSums[], nk: number): Float64Array {
  const mean = new Float64Array(nk);
  const count = new Float64Array(nk);
  for (const { sums, pixels } of parts) {
    for (let at = 0; at < sums.length; at++) {
      mean[at % nk] += sums[at];
      count[at % nk] += pixels[at];
    }
  }
  for (let k = 0; k < nk; k++) mean[k] /= count[k];
  return mean;
}

/** What is known of the scan once every slab is loaded. */
export function overviewOf(
  meta: ScanMeta,
  summaries: readonly SlabSummary[],
  height: PixelMap | null,
): ScanOverview {
  const { ny, nx, nk } = meta.shape;
  const minCounts = Math.min(...summaries.map((slab) => slab.minCounts));
  const isCounts = minCounts >= 0 && summaries.every((slab) => slab.isWholeNumbers);
  const isMistaken = meta.noise.kind === 'poisson' && !isCounts;
  const sum = (of: (slab: SlabSummary) => number): number =>
    summaries.reduce((total, slab) => total + of(slab), 0);
  return {
    meta: isMistaken ? { ...meta, noise: { kind: 'none' } } : meta,
    totals: { ny, nx, values: joined(summaries.map(({ totals }) => totals)) },
    height,
    meanSpectrum: meanOfRows(
      summaries.map(({ rowSums, rowPixels }) => ({ sums: rowSums, pixels: rowPixels })),
      nk,
    ),
    countsBytes: sum((slab) => slab.countsBytes),
    sumsBytes: sum((slab) => slab.sumsBytes),
    minCounts,
    maxCounts: Math.max(...summaries.map((slab) => slab.maxCounts)),
    noDataValues: sum((slab) => slab.noDataValues),
    warnings: isMistaken ? [notCounts(minCounts)] : [],
  };
}

/** A scan is looked at in part before it is loaded, and what was seen there were counts. */
function notCounts(minCounts: number): string {
  const why =
    minCounts < 0 ? `negative values down to ${minCounts}` : 'values that are not whole numbers';
  return `The scan has ${why} beyond the part looked at first, so its values are not counts and it has no noise model; state scan.detector to give it one.`;
}

/** What a whole scan's shape leaves of a mask for some rows. */
export function maskRows(mask: Uint8Array, { nx }: ScanShape, { y0, y1 }: RowRange): Uint8Array {
  return mask.slice(y0 * nx, y1 * nx);
}
