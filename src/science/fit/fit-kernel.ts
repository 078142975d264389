/**
 * The part of a fit that touches every channel: shapes, weights, likelihood and normal equations. Here
 * the plain kernel; the one in WebAssembly (`workers/kernel`) has the same bits. Sums over channels run
 * in chains, even and odd channels apart, as vectors add.
 */
import { log } from '../numeric/elementary';
import type { ChannelSpan, FitGrid } from '../peaks/shape';
import type { FitNoise } from './fit-plan';
import { logarithm } from './kernel-elementary';
import type { ShapeHost, ShapeLoops } from './kernel-evaluate';
import {
  addDecay,
  addGaussian,
  addLorentzian,
  addPolynomial,
  type KernelGrid,
  kernelGrid,
} from './kernel-shapes';

/** Expected counts below this many (in units of the variance's slope) weigh as if they were so many. */
export const leastExpected = 1e-4;

/**
 * Counts n and expected counts c as those of a Poisson process: n′ = scale · n + shift, μ′ = scale · c + shift.
 *
 * A variance s (c − o) + f, a line of the expected counts, is that of a Poisson process of mean
 * (c − o + f/s)/s, so its quasi-likelihood is the Poisson likelihood of shifted and scaled counts.
 * Below `least`, where the variance is flat, the likelihood goes on as the parabola of that variance.
 *
 * @see R. W. M. Wedderburn, Biometrika 61, 439 (1974), quasi-likelihood
 */
export interface PoissonScale {
  readonly scale: number;
  readonly shift: number;
  readonly least: number;
}

/** Null for uniform noise, which is fitted by least squares. */
export function poissonScale(noise: FitNoise): PoissonScale | null {
  if (noise.kind === 'uniform') return null;
  const { slope, offset, floor } = noise.line;
  return {
    scale: 1 / slope,
    shift: (floor / slope - offset) / slope,
    least: Math.max(leastExpected, floor / (slope * slope)),
  };
}

/** What the last call of `weigh` found. */
export interface KernelSums {
  /** −2 ln L less that of a perfect fit, without the part that only depends on the data; Σ r² for uniform noise */
  deviance: number;
  /** Σ (n′ − μ′)²/variance */
  pearson: number;
}

/** Owner of the arrays of one fit at a time. */
export interface FitKernel extends ShapeHost {
  readonly kind: 'plain' | 'vectors';
  /** (n) counts as given, NaN where there is no data */
  readonly counts: Float64Array;
  /** (n) expected counts, to be filled before `weigh` */
  readonly model: Float64Array;
  /** one (n) array of derivatives for each parameter */
  readonly columns: readonly Float64Array[];
  readonly sums: KernelSums;
  /** The deviance's part that only depends on the data: with it, a perfect fit has none; 0 for uniform noise. */
  dataPart(): number;
  /** Readies the counts; to be called after filling them. */
  prepare(scale: PoissonScale | null): void;
  /** From the model to weights, weighted residuals and `sums`. Channels without data weigh nothing. */
  weigh(): void;
  /**
   * Σ weight · column · column over the channels both touch, and Σ residual · column.
   *
   * @param used - columns that count, u of them
   * @param spans - channels each column touches, by column
   * @param matrix - (u, u), the lower triangle is overwritten
   * @param gradient - (u), overwritten
   */
  normal(
    used: Int32Array,
    spans: readonly ChannelSpan[],
    matrix: Float64Array,
    gradient: Float64Array,
  ): void;
}

/**
 * @param grid - channels of the fit's window
 * @param parameters - columns there is room for
 */
export type CreateFitKernel = (grid: FitGrid, parameters: number) => FitKernel;

export const createPlainFitKernel: CreateFitKernel = (grid, parameters) =>
  new PlainFitKernel(grid, parameters);

class PlainFitKernel implements FitKernel {
  readonly kind = 'plain';
  readonly grid: KernelGrid;
  readonly loops: ShapeLoops;
  readonly counts: Float64Array;
  readonly model: Float64Array;
  readonly columns: readonly Float64Array[];
  readonly sums = { deviance: 0, pearson: 0 };
  readonly #data: Float64Array;
  readonly #weights: Float64Array;
  readonly #residuals: Float64Array;
  readonly #product: Float64Array;
  #scale: PoissonScale | null = null;

  constructor(grid: FitGrid, parameters: number) {
    const array = (): Float64Array => new Float64Array(grid.centresEv.length);
    this.grid = kernelGrid(grid);
    this.counts = array();
    this.model = array();
    this.columns = Array.from({ length: parameters }, array);
    this.#data = array();
    this.#weights = array();
    this.#residuals = array();
    this.#product = array();
    this.loops = plainLoops(this.grid, this.model, this.columns);
  }

  prepare(scale: PoissonScale | null): void {
    this.#scale = scale;
    const { counts } = this;
    const data = this.#data;
    if (scale === null) data.set(counts);
    else for (let k = 0; k < counts.length; k++) data[k] = counts[k] * scale.scale + scale.shift;
  }

  dataPart(): number {
    return this.#scale === null ? 0 : dataPartOf(this.#data);
  }

  weigh(): void {
    if (this.#scale === null) this.#weighAlike();
    else this.#weighCounts(this.#scale);
  }

  #weighCounts({ scale, shift, least }: PoissonScale): void {
    const { model, sums } = this;
    const data = this.#data;
    const weights = this.#weights;
    const residuals = this.#residuals;
    const square = scale * scale;
    const perTwice = 1 / (2 * least);
    const deviance = [0, 0];
    const pearson = [0, 0];
    for (let k = 0; k < model.length; k++) {
      const n = data[k];
      if (Number.isNaN(n)) {
        weights[k] = 0;
        residuals[k] = 0;
        continue;
      }
      const mu = model[k] * scale + shift;
      const clamped = mu > least ? mu : least;
      const inverse = 1 / clamped;
      const difference = n - mu;
      const pull = difference * inverse;
      weights[k] = square * inverse;
      residuals[k] = scale * pull;
      pearson[k & 1] += difference * pull;
      const straight = clamped - n * logarithm(clamped);
      const atLeast = n - least;
      const bend = (difference * difference - atLeast * atLeast) * perTwice;
      deviance[k & 1] += mu > least ? straight : straight + bend;
    }
    sums.deviance = 2 * (deviance[0] + deviance[1]);
    sums.pearson = pearson[0] + pearson[1];
  }

  #weighAlike(): void {
    const { model, sums } = this;
    const data = this.#data;
    const weights = this.#weights;
    const residuals = this.#residuals;
    const sum = [0, 0];
    for (let k = 0; k < model.length; k++) {
      const difference = data[k] - model[k];
      const isThere = !Number.isNaN(difference);
      weights[k] = isThere ? 1 : 0;
      residuals[k] = isThere ? difference : 0;
      if (isThere) sum[k & 1] += difference * difference;
    }
    sums.deviance = sum[0] + sum[1];
    sums.pearson = sums.deviance;
  }

  normal(
    used: Int32Array,
    spans: readonly ChannelSpan[],
    matrix: Float64Array,
    gradient: Float64Array,
  ): void {
    const size = used.length;
    const { columns } = this;
    const weights = this.#weights;
    const residuals = this.#residuals;
    const product = this.#product;
    for (let i = 0; i < size; i++) {
      const column = columns[used[i]];
      const { first, end } = spans[used[i]];
      for (let k = first; k < end; k++) product[k] = column[k] * weights[k];
      gradient[i] = dot(residuals, column, first, end);
      for (let j = 0; j <= i; j++) {
        const other = spans[used[j]];
        const from = Math.max(first, other.first);
        matrix[i * size + j] = dot(product, columns[used[j]], from, Math.min(end, other.end));
      }
    }
  }
}

function plainLoops(
  grid: KernelGrid,
  model: Float64Array,
  columns: readonly Float64Array[],
): ShapeLoops {
  const target = (first: number, count: number, withColumns: boolean) => ({
    model,
    columns: withColumns ? columns.slice(first, first + count) : null,
  });
  return {
    polynomial: (a, b, c) => addPolynomial(grid, model, a, b, c),
    decay: (first, withColumns, level, length) =>
      addDecay(grid, target(first, 2, withColumns), level, length),
    gaussian: (first, span, withColumns, total, middle, fwhmEv) =>
      addGaussian(grid, span, target(first, 3, withColumns), total, middle, fwhmEv),
    lorentzian: (first, withColumns, total, middle, fwhmEv, weight, hasShare) =>
      addLorentzian(
        grid,
        target(first, hasShare ? 4 : 3, withColumns),
        total,
        middle,
        fwhmEv,
        weight,
      ),
  };
}

/** n ln n of small whole numbers, which counts mostly are. */
const knownProducts = Float64Array.from({ length: 4096 }, (_, n) => (n === 0 ? 0 : n * log(n)));

/** 2 Σ (n ln n − n) of scaled counts; no data and what lies below 0 left out. */
export function dataPartOf(data: Float64Array): number {
  let part = 0;
  for (let k = 0; k < data.length; k++) {
    const n = data[k];
    if (!(n > 0)) continue;
    const isKnown = n < knownProducts.length && Number.isInteger(n);
    part += (isKnown ? knownProducts[n] : n * log(n)) - n;
  }
  return 2 * part;
}

/** Four chains, so that additions need not wait for each other. */
function dot(a: Float64Array, b: Float64Array, from: number, end: number): number {
  let s0 = 0;
  let s1 = 0;
  let s2 = 0;
  let s3 = 0;
  let k = from;
  for (const last = end - 3; k < last; k += 4) {
    s0 += a[k] * b[k];
    s1 += a[k + 1] * b[k + 1];
    s2 += a[k + 2] * b[k + 2];
    s3 += a[k + 3] * b[k + 3];
  }
  for (; k < end; k++) s0 += a[k] * b[k];
  return s0 + s2 + (s1 + s3);
}
