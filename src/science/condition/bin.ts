/** Neighbours summed into one: columns, rows, channels. Counts and variances add. */
import type { EnergyAxis, NoiseModel, PositionAxis } from '../scan';
import { type Background, type ConditionedSlab, type Grid, zerosLike } from './conditioned';
import { type StepPlace, stepError } from './step-errors';

export interface BinOptions {
  readonly x: number;
  readonly y: number;
  readonly k: number;
}

/** @throws RimlightError 'recipe' - for numbers that are not whole, or larger than the scan */
export function assertBin(options: BinOptions, { shape }: Grid, place: StepPlace): void {
  const check = (name: string, take: number, length: number): void => {
    if (Number.isInteger(take) && take >= 1 && take <= length) return;
    throw stepError(
      place,
      `${take} ${name} cannot be summed into one in a scan of ${length}`,
      `Give a whole number from 1 to ${length}.`,
    );
  };
  check('columns', options.x, shape.nx);
  check('rows', options.y, shape.ny);
  check('channels', options.k, shape.nk);
  if (Math.floor(shape.nk / options.k) < 2) {
    throw stepError(
      place,
      `of ${shape.nk} channels, sums of ${options.k} leave a single one, and a spectrum needs two at least`,
      'Sum fewer channels into one.',
    );
  }
}

/** Columns, rows and channels at the far edge that fill no bin and are dropped. */
export function binRemainder({ shape }: Grid, { x, y, k }: BinOptions): BinOptions {
  return { x: shape.nx % x, y: shape.ny % y, k: shape.nk % k };
}

/** The grid afterwards: positions are the middles of what was summed, channel edges the outer ones. */
export function binnedGrid(grid: Grid, options: BinOptions): Grid {
  const { x, y, k } = options;
  return {
    ...grid,
    shape: {
      ny: Math.floor(grid.shape.ny / y),
      nx: Math.floor(grid.shape.nx / x),
      nk: Math.floor(grid.shape.nk / k),
    },
    axis: binnedAxis(grid.axis, k),
    noise: summedNoise(grid.noise, x * y * k),
    x: binnedPositions(grid.x, x, grid.shape.nx),
    y: binnedPositions(grid.y, y, grid.shape.ny),
  };
}

/** A bin's centre is the middle of its edges; its edges are its channels' outer ones. */
function binnedAxis(axis: EnergyAxis, k: number): EnergyAxis {
  if (k === 1) return axis;
  const nk = Math.floor(axis.centresEv.length / k);
  const edgesEv = Float64Array.from({ length: nk + 1 }, (_, bin) => axis.edgesEv[bin * k]);
  const centresEv = Float64Array.from(
    { length: nk },
    (_, bin) => (edgesEv[bin] + edgesEv[bin + 1]) / 2,
  );
  return { centresEv, edgesEv };
}

function binnedPositions(axis: PositionAxis, take: number, length: number): PositionAxis {
  if (take === 1) return axis;
  const at = (index: number): number => axis.values?.[index] ?? index * axis.pitch;
  const values = Float64Array.from({ length: Math.floor(length / take) }, (_, bin) => {
    let sum = 0;
    for (let i = 0; i < take; i++) sum += at(bin * take + i);
    return sum / take;
  });
  return { ...axis, pitch: axis.pitch * take, values };
}

/** Of `summed` channels together: offsets add, read noise adds in squares, shot noise follows the counts. */
export function summedNoise(noise: NoiseModel, summed: number): NoiseModel {
  if (noise.kind !== 'detector') return noise;
  const { detector } = noise;
  return {
    kind: 'detector',
    detector: {
      ...detector,
      offsetCounts: detector.offsetCounts * summed,
      readNoiseE: detector.readNoiseE * Math.sqrt(summed),
    },
  };
}

/**
 * Bins of a slab's rows. A bin with a channel without data has none; one with a guess is a guess.
 *
 * The factor of a bin is the mean of its channels'. Where they differ, counts × factor + background has
 * the right mean for light spread evenly over the bin, and is not to the last count what was detected.
 *
 * @param slab - rows that begin with a bin's first; what fills no bin is dropped
 */
export function binSlab(slab: ConditionedSlab, options: BinOptions): ConditionedSlab {
  const { ny, nx, nk } = slab.shape;
  const { x, y, k } = options;
  const shape = { ny: Math.floor(ny / y), nx: Math.floor(nx / x), nk: Math.floor(nk / k) };
  const length = shape.ny * shape.nx * shape.nk;
  const sum = <T extends { [index: number]: number }>(array: T, out: T): T => {
    for (let row = 0; row < shape.ny * y; row++) {
      for (let column = 0; column < shape.nx * x; column++) {
        const from = (row * nx + column) * nk;
        const to = (Math.floor(row / y) * shape.nx + Math.floor(column / x)) * shape.nk;
        for (let bin = 0, at = from; bin < shape.nk; bin++) {
          for (let i = 0; i < k; i++) out[to + bin] += array[at++];
        }
      }
    }
    return out;
  };
  const replaced =
    slab.replaced === null
      ? null
      : sum<Uint32Array | Uint8Array>(slab.replaced, new Uint32Array(length));
  return {
    ...slab,
    y0: slab.y0 / y,
    shape,
    axis: binnedAxis(slab.axis, k),
    noise: summedNoise(slab.noise, x * y * k),
    counts: sum(slab.counts, zerosLike(slab.counts, length)),
    variances: slab.variances === null ? null : sum(slab.variances, zerosLike(slab.counts, length)),
    factor: channelSums(slab.factor, k, 1 / k),
    background: binnedBackground(slab.background, options, (values) =>
      sum(values, zerosLike(values, length)),
    ),
    replaced: replaced === null ? null : Uint8Array.from(replaced, (marks) => (marks > 0 ? 1 : 0)),
  };
}

/** A spectrum that stands for every pixel: sums of pixels have that many times its counts, all with the same noise. */
export function binSpectrum(spectrum: ConditionedSlab, { x, y, k }: BinOptions): ConditionedSlab {
  const binned = binSlab(spectrum, { x: 1, y: 1, k });
  const times = x * y;
  const { background } = binned;
  return {
    ...binned,
    noise: summedNoise(spectrum.noise, x * y * k),
    counts: binned.counts.map((value) => value * times),
    variances: binned.variances?.map((value) => value * times * times) ?? null,
    background:
      background.kind === 'channel'
        ? { kind: 'channel', values: background.values.map((value) => value * times) }
        : { kind: 'pixel', values: background.values.map((value) => value * times) },
  };
}

function binnedBackground(
  background: Background,
  { x, y, k }: BinOptions,
  sumPixels: (
    values: Extract<Background, { kind: 'pixel' }>['values'],
  ) => Extract<Background, { kind: 'pixel' }>['values'],
): Background {
  if (background.kind === 'pixel') return { kind: 'pixel', values: sumPixels(background.values) };
  return { kind: 'channel', values: channelSums(background.values, k, x * y) };
}

function channelSums(values: Float64Array, k: number, times: number): Float64Array {
  return Float64Array.from({ length: Math.floor(values.length / k) }, (_, bin) => {
    let sum = 0;
    for (let i = 0; i < k; i++) sum += values[bin * k + i];
    return sum * times;
  });
}
