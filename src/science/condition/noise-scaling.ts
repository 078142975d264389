/**
 * Counts over their noise, for a decomposition of the whole scan: each value is divided by √(a b/S), with
 * a the pixel's variance summed over channels, b the channel's summed over pixels, S the sum of all. That
 * is the nearest product of a pixel's and a channel's share to the variances themselves, and keeps sums of
 * spectra sums of spectra, which a square root of the counts would not.
 *
 * @see M. R. Keenan and P. G. Kotula, Surf. Interface Anal. 36, 203 (2004), from memory
 */
import type { ConditionedSlab } from './conditioned';
import { type StepPlace, stepError } from './step-errors';

/** Of each row of a slab. */
export interface RowVariances {
  readonly y0: number;
  /** (ny × nk) pixels with data */
  readonly known: Uint32Array;
  /** (ny × nk) their variances, summed in x order; null without a noise model */
  readonly variances: Float64Array | null;
}

/** The same for every pixel of a scan. */
export interface NoiseScaling {
  /** channels that take part: with data in half of the pixels at least, and some noise */
  readonly channels: Int32Array;
  /** √(b/S) of those channels; 1 without a noise model */
  readonly channelScale: Float64Array;
}

export function summariseVariances(slab: ConditionedSlab): RowVariances {
  const { ny, nx, nk } = slab.shape;
  const known = new Uint32Array(ny * nk);
  const variances = slab.variances === null ? null : new Float64Array(ny * nk);
  for (let pixel = 0; pixel < ny * nx; pixel++) {
    const row = Math.floor(pixel / nx) * nk;
    for (let k = 0; k < nk; k++) {
      if (Number.isNaN(slab.counts[pixel * nk + k])) continue;
      known[row + k]++;
      if (variances !== null && slab.variances !== null) {
        variances[row + k] += slab.variances[pixel * nk + k];
      }
    }
  }
  return { y0: slab.y0, known, variances };
}

/**
 * @param rows - of all rows of the scan, in their order
 * @throws RimlightError 'recipe' - when fewer than two channels can take part
 */
export function planScaling(
  rows: readonly RowVariances[],
  { nk, pixels }: { readonly nk: number; readonly pixels: number },
  place: StepPlace,
): NoiseScaling {
  const known = new Float64Array(nk);
  const sums = new Float64Array(nk);
  for (const part of rows) {
    for (let at = 0; at < part.known.length; at++) {
      known[at % nk] += part.known[at];
      sums[at % nk] += part.variances === null ? 1 : part.variances[at];
    }
  }
  const channels = Int32Array.from(
    Array.from({ length: nk }, (_, k) => k).filter((k) => 2 * known[k] >= pixels && sums[k] > 0),
  );
  if (channels.length < 2) {
    throw stepError(
      place,
      `only ${channels.length} of ${nk} channels have counts in half of the pixels`,
      'Check the steps before; a scan without counts has no components.',
    );
  }
  const total = channels.reduce((sum, k) => sum + sums[k], 0);
  const hasNoise = rows.every(({ variances }) => variances !== null);
  const channelScale = Float64Array.from(channels, (k) =>
    hasNoise ? Math.sqrt(sums[k] / total) : 1,
  );
  return { channels, channelScale };
}

/**
 * A pixel's counts over their noise.
 *
 * @param out - (channels) overwritten
 * @returns what the pixel's counts were divided by beside the channel's scale; 0 for a pixel that lacks a
 * channel or has no noise, which takes no part
 */
export function scalePixel(
  slab: ConditionedSlab,
  pixel: number,
  { channels, channelScale }: NoiseScaling,
  out: Float64Array,
): number {
  const at = pixel * slab.shape.nk;
  let variance = 0;
  for (let i = 0; i < channels.length; i++) {
    const value = slab.counts[at + channels[i]];
    if (Number.isNaN(value)) return 0;
    out[i] = value / channelScale[i];
    if (slab.variances !== null) variance += slab.variances[at + channels[i]];
  }
  if (slab.variances === null) return 1;
  if (!(variance > 0)) return 0;
  const scale = Math.sqrt(variance);
  for (let i = 0; i < channels.length; i++) out[i] /= scale;
  return scale;
}
