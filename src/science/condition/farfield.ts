/**
 * The signal recorded with the tip away, taken off: what is left is the near field. Its scale is given,
 * or fitted in a window where only far field is seen.
 */
import {
  type ConditionedArray,
  type ConditionedSlab,
  type Subtrahend,
  subtracted,
  zerosLike,
} from './conditioned';
import type { ChannelRange } from './read-noise';
import { type ReferenceRecording, takenAt } from './reference-recording';
import { type StepPlace, stepError } from './step-errors';

/** Sums over a window, that a scale is the quotient of. */
export interface WindowSums {
  /** counts of the scan and of the recording, over channels where both have data */
  readonly inside: number;
  readonly outside: number;
  readonly insideVariance: number;
  readonly outsideVariance: number;
}

export interface FarFieldScale {
  /** 0 or more */
  readonly scale: number;
  /** one sigma; 0 for a scale that is given, NaN without a noise model */
  readonly error: number;
}

/** Of each row of the slab, (ny). */
export function summariseWindow(
  slab: ConditionedSlab,
  outside: ReferenceRecording,
  range: ChannelRange,
): readonly WindowSums[] {
  const { ny, nx } = slab.shape;
  const taken = takenAt(outside, slab);
  return Array.from({ length: ny }, (_, y) => {
    let sums = noSums;
    for (let x = 0; x < nx; x++) {
      sums = addSums(sums, pixelSums(slab, taken, y * nx + x, range));
    }
    return sums;
  });
}

/**
 * The scale of the whole scan: counts in the window over the recording's there, which for Poisson counts is
 * the most likely one; never below 0.
 *
 * @param rows - of all rows, in their order
 * @throws RimlightError 'recipe' - when the recording has nothing in the window
 */
export function fitScale(rows: readonly WindowSums[], place: StepPlace): FarFieldScale {
  const sums = rows.reduce(addSums, noSums);
  if (sums.outside > 0) return scaleOf(sums);
  throw stepError(
    place,
    'the far field has no counts in the window its scale is fitted in',
    'Choose a window where the tip-out recording has signal, or give the scale as a number.',
  );
}

/** The slab less the recording times one scale for all. */
export function subtractFarField(
  slab: ConditionedSlab,
  outside: ReferenceRecording,
  scale: FarFieldScale,
): ConditionedSlab {
  const { values, variances } = takenAt(outside, slab);
  const times = (array: ConditionedArray): ConditionedArray =>
    array.map((value) => scale.scale * value);
  const error2 = scale.error * scale.error;
  const added =
    slab.variances === null
      ? null
      : values.values.map((value, i) => {
          const noise = variances === null ? 0 : scale.scale * scale.scale * variances[i];
          return noise + (Number.isNaN(error2) ? 0 : error2 * value * value);
        });
  const taken: Subtrahend =
    values.kind === 'channel'
      ? { kind: 'channel', values: values.values.map((value) => scale.scale * value) }
      : { kind: 'pixel', values: times(values.values) };
  return subtracted(slab, taken, added);
}

export interface FarFieldByPixel {
  readonly slab: ConditionedSlab;
  /** (ny × nx) scale of each pixel; NaN where the window has no data, and nothing is left */
  readonly scales: Float64Array;
}

/** The same with a scale fitted at each pixel, whose error is added to the variance. */
export function subtractFarFieldByPixel(
  slab: ConditionedSlab,
  outside: ReferenceRecording,
  range: ChannelRange,
): FarFieldByPixel {
  const { nk } = slab.shape;
  const taken = takenAt(outside, slab);
  const step = taken.values.kind === 'channel' ? 0 : nk;
  const values = zerosLike(slab.counts, slab.counts.length);
  const added = slab.variances === null ? null : zerosLike(slab.counts, slab.counts.length);
  const scales = new Float64Array(slab.counts.length / nk);
  for (let pixel = 0; pixel < scales.length; pixel++) {
    const { scale, error } = scaleOf(pixelSums(slab, taken, pixel, range));
    scales[pixel] = scale;
    for (let k = 0; k < nk; k++) {
      const value = taken.values.values[pixel * step + k];
      values[pixel * nk + k] = scale * value;
      if (added === null) continue;
      const noise = taken.variances === null ? 0 : taken.variances[pixel * step + k];
      added[pixel * nk + k] = scale * scale * noise + error * error * value * value;
    }
  }
  return { slab: subtracted(slab, { kind: 'pixel', values }, added), scales };
}

export interface ContrastMap {
  /** (ny × nx) (in − out)/out, dimensionless; NaN where out has no counts */
  readonly values: Float64Array;
  /** one sigma; null without a noise model */
  readonly errors: Float64Array | null;
}

/** Near-field contrast (in − out)/out of the counts in a window, before the far field is subtracted. */
export function nearFieldContrast(
  slab: ConditionedSlab,
  outside: ReferenceRecording,
  range: ChannelRange,
): ContrastMap {
  const pixels = slab.shape.ny * slab.shape.nx;
  const taken = takenAt(outside, slab);
  const values = new Float64Array(pixels);
  const errors = slab.variances === null ? null : new Float64Array(pixels);
  for (let pixel = 0; pixel < pixels; pixel++) {
    const sums = pixelSums(slab, taken, pixel, range);
    const quotient = sums.outside > 0 ? sums.inside / sums.outside : Number.NaN;
    values[pixel] = quotient - 1;
    if (errors !== null) errors[pixel] = quotientError(sums, quotient);
  }
  return { values, errors };
}

/** @throws RimlightError 'recipe' - for a scale below 0 or that is no number */
export function assertScale(scale: number, place: StepPlace): void {
  if (scale >= 0 && Number.isFinite(scale)) return;
  throw stepError(
    place,
    `the far field cannot be scaled by ${scale}`,
    'Give a number of at least 0, or "fit".',
  );
}

const noSums: WindowSums = { inside: 0, outside: 0, insideVariance: 0, outsideVariance: 0 };

function addSums(a: WindowSums, b: WindowSums): WindowSums {
  return {
    inside: a.inside + b.inside,
    outside: a.outside + b.outside,
    insideVariance: a.insideVariance + b.insideVariance,
    outsideVariance: a.outsideVariance + b.outsideVariance,
  };
}

function pixelSums(
  slab: ConditionedSlab,
  taken: ReturnType<typeof takenAt>,
  pixel: number,
  range: ChannelRange,
): WindowSums {
  const { nk } = slab.shape;
  const step = taken.values.kind === 'channel' ? 0 : nk;
  let { inside, outside, insideVariance, outsideVariance } = noSums;
  for (let k = range.first; k < range.end; k++) {
    const here = slab.counts[pixel * nk + k];
    const there = taken.values.values[pixel * step + k];
    if (Number.isNaN(here - there)) continue;
    inside += here;
    outside += there;
    insideVariance += slab.variances === null ? Number.NaN : slab.variances[pixel * nk + k];
    if (taken.variances !== null) outsideVariance += taken.variances[pixel * step + k];
  }
  return { inside, outside, insideVariance, outsideVariance };
}

function scaleOf(sums: WindowSums): FarFieldScale {
  if (!(sums.outside > 0)) return { scale: Number.NaN, error: Number.NaN };
  const scale = Math.max(0, sums.inside / sums.outside);
  return { scale, error: quotientError(sums, scale) };
}

function quotientError(sums: WindowSums, quotient: number): number {
  const variance = sums.insideVariance + quotient * quotient * sums.outsideVariance;
  return Math.sqrt(variance) / sums.outside;
}
