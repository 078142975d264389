/**
 * Conditioned rows of a scan: what the steps of the recipe's `condition` block take and give.
 *
 * `counts` is what is shown, summed and fitted. What the detector counted is not lost on the way:
 *
 *     detected = counts × factor + background
 *
 * with a factor per channel (the response) and a background per channel, or per pixel and channel
 * (offset, far field, baseline), in the detector's own counts. A fit of model m to Poisson data compares
 * m × factor + background with `detected`, under the noise model `noise`, which follows sums of channels.
 *
 * `variances` starts as the noise model's and is then carried by every step: scaled with the square of
 * a division, added where something recorded is subtracted, summed where counts are. It is therefore
 * never less than noise(detected)/factor², and more where a step brought noise of its own.
 *
 * `replaced` marks counts that are guesses (a cosmic ray's place): a fit leaves them out.
 * `isIndependent` turns false where values begin to share noise with their neighbours (rows moved by a
 * part of a pixel, components cut off): errors of single channels stay right, `detected` no longer is
 * anything that was counted, and a fit must say so.
 */
import { countVariance } from '../noise';
import type { EnergyAxis, NoiseModel, PositionAxis, ScanShape, Slab } from '../scan';

export type ConditionedArray = Float32Array | Float64Array;

/** Counts of the detector beneath the spectrum, in the detector's counts. */
export type Background =
  | { readonly kind: 'channel' /** (nk) */; readonly values: Float64Array }
  | { readonly kind: 'pixel' /** (ny, nx, nk) */; readonly values: ConditionedArray };

export interface ConditionedSlab {
  /** first row of these on the grid of the step that made them */
  readonly y0: number;
  readonly shape: ScanShape;
  readonly axis: EnergyAxis;
  /** of `detected`, as channels and pixels now are: two summed have twice the offset */
  readonly noise: NoiseModel;
  /** (ny, nx, nk); no data is NaN */
  readonly counts: ConditionedArray;
  /** (ny, nx, nk), counts²; null without a noise model */
  readonly variances: ConditionedArray | null;
  /** (nk), dimensionless; NaN where a channel has no data at all */
  readonly factor: Float64Array;
  readonly background: Background;
  /** (ny, nx, nk), 1 where the counts are a guess; null where none is */
  readonly replaced: Uint8Array | null;
  readonly isIndependent: boolean;
}

/** What is the same for all rows of a scan at one place of the chain. */
export interface Grid {
  readonly shape: ScanShape;
  readonly axis: EnergyAxis;
  readonly x: PositionAxis;
  readonly y: PositionAxis;
  readonly noise: NoiseModel;
  /** eV; null when unknown */
  readonly laserEv: number | null;
}

/** `float32` halves the memory and keeps counts exact up to 2²⁴. */
export type Precision = 'float32' | 'float64';

/**
 * Rows as they were recorded, nothing done yet. Infinite counts become no data.
 *
 * @param noise - `none` where the counts turned out not to be counts
 */
export function conditionedFrom(
  { y0, shape, counts: recorded }: Slab,
  { axis, noise }: Pick<Grid, 'axis' | 'noise'>,
  precision: Precision = 'float64',
): ConditionedSlab {
  const make = (): ConditionedArray =>
    precision === 'float32' ? new Float32Array(recorded.length) : new Float64Array(recorded.length);
  const counts = make();
  const variances = noise.kind === 'none' ? null : make();
  for (let i = 0; i < recorded.length; i++) {
    const value = Number.isFinite(recorded[i]) ? recorded[i] : Number.NaN;
    counts[i] = value;
    if (variances !== null) variances[i] = countVariance(value, noise);
  }
  return {
    y0,
    shape,
    axis,
    noise,
    counts,
    variances,
    factor: new Float64Array(shape.nk).fill(1),
    background: { kind: 'channel', values: new Float64Array(shape.nk) },
    replaced: null,
    isIndependent: true,
  };
}

/** Zeros of the same kind of number. */
export function zerosLike(array: ConditionedArray, length: number): ConditionedArray {
  return array instanceof Float32Array ? new Float32Array(length) : new Float64Array(length);
}

/** What the detector counted at a pixel of the slab, (nk): counts × factor + background. */
export function detectedCounts(
  slab: ConditionedSlab,
  pixel: number,
  out: Float64Array,
): Float64Array {
  const { counts, factor, background } = slab;
  const { nk } = slab.shape;
  const at = pixel * nk;
  const under = background.kind === 'channel' ? 0 : at;
  for (let k = 0; k < nk; k++) {
    out[k] = counts[at + k] * factor[k] + background.values[under + k];
  }
  return out;
}

/** What is subtracted from counts: the same spectrum everywhere, or one for each pixel. */
export type Subtrahend = Background;

/**
 * The slab after counts were subtracted that the detector did count: they move to the background. The
 * variance stays, but for `addedVariances` of the subtrahend.
 *
 * @param taken - counts as they now are (not the detector's), (nk) or (ny, nx, nk); NaN makes no data
 * @param addedVariances - counts², of the same kind as `taken`; null where it brings no noise
 */
export function subtracted(
  slab: ConditionedSlab,
  taken: Subtrahend,
  addedVariances: ConditionedArray | null = null,
): ConditionedSlab {
  const { nk } = slab.shape;
  const counts = slab.counts.slice();
  const variances = addedVariances === null ? slab.variances : (slab.variances?.slice() ?? null);
  const step = taken.kind === 'channel' ? 0 : nk;
  for (let pixel = 0; pixel * nk < counts.length; pixel++) {
    for (let k = 0; k < nk; k++) {
      counts[pixel * nk + k] -= taken.values[pixel * step + k];
      if (variances !== null && addedVariances !== null) {
        variances[pixel * nk + k] += addedVariances[pixel * step + k];
      }
    }
  }
  return { ...slab, counts, variances, background: raisedBackground(slab, taken) };
}

function raisedBackground(slab: ConditionedSlab, taken: Subtrahend): Background {
  const { factor, background, counts } = slab;
  const { nk } = slab.shape;
  if (background.kind === 'channel' && taken.kind === 'channel') {
    const values = background.values.map((value, k) => value + taken.values[k] * factor[k]);
    return { kind: 'channel', values };
  }
  const values = zerosLike(counts, counts.length);
  const backgroundStep = background.kind === 'channel' ? 0 : nk;
  const takenStep = taken.kind === 'channel' ? 0 : nk;
  for (let pixel = 0; pixel * nk < values.length; pixel++) {
    for (let k = 0; k < nk; k++) {
      values[pixel * nk + k] =
        background.values[pixel * backgroundStep + k] +
        taken.values[pixel * takenStep + k] * factor[k];
    }
  }
  return { kind: 'pixel', values };
}

/** Rows y0 ≤ y < y1 of the slab's grid, which it must have; copies, unless they are all of it. */
export function rowsOf(slab: ConditionedSlab, y0: number, y1: number): ConditionedSlab {
  const { nx, nk, ny } = slab.shape;
  if (y0 === slab.y0 && y1 === slab.y0 + ny) return slab;
  const from = (y0 - slab.y0) * nx * nk;
  const to = (y1 - slab.y0) * nx * nk;
  const { background } = slab;
  return {
    ...slab,
    y0,
    shape: { ny: y1 - y0, nx, nk },
    counts: slab.counts.slice(from, to),
    variances: slab.variances?.slice(from, to) ?? null,
    background:
      background.kind === 'channel'
        ? background
        : { kind: 'pixel', values: background.values.slice(from, to) },
    replaced: slab.replaced?.slice(from, to) ?? null,
  };
}
