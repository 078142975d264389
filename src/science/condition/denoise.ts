/**
 * Truncated singular value decomposition of the whole scan, counts over their noise: the strongest
 * components are kept. Three looks at the scan (variances, greatest value, products of channels), each a
 * summary per slab that adds up to the same bits however the rows are shared out; then each pixel by
 * itself is put on the components.
 */
import { SymmetricEigen } from '../numeric/symmetric-eigen';
import type { ConditionedSlab } from './conditioned';
import { ExactGram, type ExactStep, exactStep, joinGrams } from './exact-gram';
import { optimalRank } from './hard-threshold';
import { type NoiseScaling, scalePixel } from './noise-scaling';
import { type StepPlace, stepError } from './step-errors';

/** Components kept, or as many as stand above the noise. */
export type WantedRank = number | 'auto';

export interface GreatestValue {
  /** of scaled counts, in size */
  readonly greatest: number;
  /** pixels that take part */
  readonly pixels: number;
}

export interface ScanComponents {
  readonly scaling: NoiseScaling;
  /** the components kept, each (channels), orthonormal, strongest first */
  readonly vectors: readonly Float64Array[];
  /** all singular values, descending; noise alone has them around √pixels and below */
  readonly singular: Float64Array;
  readonly rank: number;
  /** singular values above this stand out of the noise */
  readonly threshold: number;
  /** components above it */
  readonly suggestedRank: number;
  /** pixels decomposed; the others are left as they are */
  readonly pixels: number;
}

export function summariseGreatest(slab: ConditionedSlab, scaling: NoiseScaling): GreatestValue {
  const values = new Float64Array(scaling.channels.length);
  let greatest = 0;
  let pixels = 0;
  for (let pixel = 0; pixel < slab.shape.ny * slab.shape.nx; pixel++) {
    if (scalePixel(slab, pixel, scaling, values) === 0) continue;
    pixels++;
    for (let i = 0; i < values.length; i++) greatest = Math.max(greatest, Math.abs(values[i]));
  }
  return { greatest, pixels };
}

/** How finely the products are kept, from the summaries of all slabs in any order. */
export function joinGreatest(parts: readonly GreatestValue[]): ExactStep {
  const greatest = parts.reduce((most, part) => Math.max(most, part.greatest), 0);
  const pixels = parts.reduce((sum, part) => sum + part.pixels, 0);
  return exactStep(greatest, pixels);
}

/** Products of a slab's channels, upper half of (channels × channels), in steps². */
export interface SlabProducts {
  readonly sums: Float64Array;
  readonly pixels: number;
}

export function summariseProducts(
  slab: ConditionedSlab,
  scaling: NoiseScaling,
  step: ExactStep,
): SlabProducts {
  const values = new Float64Array(scaling.channels.length);
  const gram = new ExactGram(values.length, step);
  for (let pixel = 0; pixel < slab.shape.ny * slab.shape.nx; pixel++) {
    if (scalePixel(slab, pixel, scaling, values) !== 0) gram.add(values);
  }
  gram.flush();
  return { sums: gram.sums, pixels: gram.pixels };
}

/**
 * The scan's components. The rank for `auto` is Gavish and Donoho's, at least 1; the noise is 1 by the
 * scaling, or unknown where there is no noise model.
 *
 * @param parts - of all slabs, in any order
 * @throws RimlightError 'recipe' - when there are fewer pixels or channels than components asked for
 */
export function findComponents(
  parts: readonly SlabProducts[],
  scaling: NoiseScaling,
  step: ExactStep,
  { rank: wanted, hasNoise }: { readonly rank: WantedRank; readonly hasNoise: boolean },
  place: StepPlace,
): ScanComponents {
  const n = scaling.channels.length;
  const pixels = parts.reduce((sum, part) => sum + part.pixels, 0);
  const most = Math.min(n, pixels);
  assertRank(wanted, most, place);
  const sums = parts.map((part) => part.sums);
  const eigen = new SymmetricEigen({ n, values: joinGrams(sums, n, step) });
  const singular = eigen.values.slice(0, most).map((value) => Math.sqrt(Math.max(0, value)));
  const { rank: standing, threshold } = optimalRank(singular, [pixels, n], hasNoise ? 1 : null);
  const rank = wanted === 'auto' ? Math.max(1, standing) : wanted;
  return {
    scaling,
    vectors: eigen.vectors(rank),
    singular,
    rank,
    threshold,
    suggestedRank: standing,
    pixels,
  };
}

export interface Denoised {
  readonly slab: ConditionedSlab;
  /** (ny × nx) mean square of what was removed, over the noise: about 1 where it was noise; NaN for pixels left as they are */
  readonly removed: Float64Array;
  /** (ny × nk) each row's removed counts, summed: signal that was cut off shows as bumps */
  readonly removedRows: Float64Array;
}

/**
 * Every pixel put on the components.
 *
 * Variances stay as they were: projecting noise never adds to that of any weighted sum of channels, so
 * errors of bands stay upper bounds. Channels share their noise from now on.
 */
export function keepComponents(slab: ConditionedSlab, components: ScanComponents): Denoised {
  const { ny, nx, nk } = slab.shape;
  const { scaling, vectors } = components;
  const { channels, channelScale } = scaling;
  const counts = slab.counts.slice();
  const removed = new Float64Array(ny * nx).fill(Number.NaN);
  const removedRows = new Float64Array(ny * nk);
  const values = new Float64Array(channels.length);
  const kept = new Float64Array(channels.length);
  for (let pixel = 0; pixel < ny * nx; pixel++) {
    const scale = scalePixel(slab, pixel, scaling, values);
    if (scale === 0) continue;
    project(values, vectors, kept);
    let squares = 0;
    const row = Math.floor(pixel / nx) * nk;
    for (let i = 0; i < channels.length; i++) {
      const at = pixel * nk + channels[i];
      counts[at] = kept[i] * scale * channelScale[i];
      squares += (values[i] - kept[i]) * (values[i] - kept[i]);
      removedRows[row + channels[i]] += slab.counts[at] - counts[at];
    }
    removed[pixel] = squares / channels.length;
  }
  return { slab: { ...slab, counts, isIndependent: false }, removed, removedRows };
}

function project(values: Float64Array, vectors: readonly Float64Array[], out: Float64Array): void {
  out.fill(0);
  for (const vector of vectors) {
    let sum = 0;
    for (let i = 0; i < values.length; i++) sum += vector[i] * values[i];
    for (let i = 0; i < values.length; i++) out[i] += sum * vector[i];
  }
}

function assertRank(wanted: WantedRank, most: number, place: StepPlace): void {
  if (most < 2) {
    throw stepError(
      place,
      `only ${most} pixels have data in every channel`,
      'Crop the channels or rows that are missing, or switch the step off.',
    );
  }
  if (wanted === 'auto' || (Number.isInteger(wanted) && wanted >= 1 && wanted <= most)) return;
  throw stepError(
    place,
    `${wanted} components cannot be kept of ${most}`,
    `Give a whole number from 1 to ${most}, or "auto".`,
  );
}
