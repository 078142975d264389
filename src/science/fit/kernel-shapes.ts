/**
 * The shapes most models are made of, in loops that vectors can follow bit by bit; values agree with
 * `peaks/` to twelve digits, which is tested. The other shapes are taken from there.
 */

import { reachSigmas } from '../peaks/gaussian';
import type { ChannelSpan, FitGrid } from '../peaks/shape';
import { spanWithin } from '../peaks/shape';
import { fwhmPerSigma } from '../peaks/widths';
import { angle, exponential } from './kernel-elementary';

const sqrtTwoPi = 2.5066282746310002;
/** Channels wider than this many σ need the error function. */
const narrowChannel = 0.1;

/** Where a shape of the kernel adds its counts, and puts its derivatives where they are asked for. */
export interface ShapeTarget {
  readonly model: Float64Array;
  readonly columns: readonly Float64Array[] | null;
}

/** The grid as the kernels read it. */
export interface KernelGrid extends FitGrid {
  /** (n) centres from the middle of the window, eV */
  readonly offsetsEv: Float64Array;
  readonly widestEv: number;
}

export function kernelGrid(grid: FitGrid): KernelGrid {
  const { centresEv, widthsEv, edgesEv } = grid;
  const middle = 0.5 * (edgesEv[0] + edgesEv[edgesEv.length - 1]);
  return {
    ...grid,
    offsetsEv: centresEv.map((centre) => centre - middle),
    widestEv: widthsEv.reduce((most, width) => Math.max(most, width), 0),
  };
}

/** The channels of a Gaussian, or null where one is too wide for its series. */
export function gaussianSpan(grid: KernelGrid, middle: number, fwhmEv: number): ChannelSpan | null {
  const sigma = fwhmEv / fwhmPerSigma;
  if (!(grid.widestEv <= narrowChannel * sigma)) return null;
  return spanWithin(grid, middle - reachSigmas * sigma, middle + reachSigmas * sigma);
}

/** model += a + b x + c x² */
export function addPolynomial(
  { offsetsEv }: KernelGrid,
  model: Float64Array,
  a: number,
  b: number,
  c: number,
): void {
  for (let k = 0; k < offsetsEv.length; k++) {
    const x = offsetsEv[k];
    model[k] += a + (b + c * x) * x;
  }
}

/** model += level exp(−x/length) */
export function addDecay(
  { offsetsEv }: KernelGrid,
  { model, columns }: ShapeTarget,
  level: number,
  length: number,
): void {
  const rate = -1 / length;
  const steepness = level / (length * length);
  for (let k = 0; k < offsetsEv.length; k++) {
    const x = offsetsEv[k];
    const falling = exponential(Math.min(Math.max(x * rate, -700), 700));
    model[k] += level * falling;
    if (columns === null) continue;
    columns[0][k] = falling;
    columns[1][k] = steepness * falling * x;
  }
}

/** A Gaussian whose channels are narrow: density times width, with the next term of the integral. */
export function addGaussian(
  { centresEv, widthsEv }: FitGrid,
  { first, end }: ChannelSpan,
  { model, columns }: ShapeTarget,
  total: number,
  middle: number,
  fwhmEv: number,
): void {
  const sigma = fwhmEv / fwhmPerSigma;
  const perSigma = 1 / sigma;
  const height = 1 / sqrtTwoPi;
  const byCentre = total / sigma;
  const byWidth = total / sigma / fwhmPerSigma;
  for (let k = first; k < end; k++) {
    const w = widthsEv[k] * perSigma;
    const z = (centresEv[k] - middle) * perSigma;
    const square = z * z;
    const density = exponential(square * -0.5) * height * w;
    const correction = w * w * (1 / 24);
    const share = density * (1 + correction * (square - 1));
    model[k] += total * share;
    if (columns === null) continue;
    columns[0][k] = share;
    columns[1][k] = byCentre * (density * z * (1 + correction * (square - 3)));
    const fourth = square * (square - 6) + 3;
    columns[2][k] = byWidth * (density * (square - 1 + correction * fourth));
  }
}

/**
 * A Lorentzian integrated over each channel, its wings never cut.
 *
 * @param weight - of the Lorentzian in the peak: 1, or a pseudo-Voigt's share, whose derivative is the fourth column
 */
export function addLorentzian(
  { edgesEv, widthsEv }: FitGrid,
  { model, columns }: ShapeTarget,
  total: number,
  middle: number,
  fwhmEv: number,
  weight: number,
): void {
  const half = fwhmEv / 2;
  const square = half * half;
  const perPi = 1 / Math.PI;
  const amplitude = total * weight;
  const steepness = (total * weight) / Math.PI;
  for (let k = 0; k < widthsEv.length; k++) {
    const low = edgesEv[k] - middle;
    const high = edgesEv[k + 1] - middle;
    const product = low * high;
    const share = angle(half * widthsEv[k], square + product) * perPi;
    model[k] += amplitude * share;
    if (columns === null) continue;
    columns[0][k] = weight * share;
    const atLow = low * low + square;
    const atHigh = high * high + square;
    const scale = (steepness * widthsEv[k]) / (atLow * atHigh);
    columns[1][k] = scale * half * (high + low);
    columns[2][k] = scale * 0.5 * (product - square);
    if (columns.length > 3) columns[3][k] = total * share;
  }
}
