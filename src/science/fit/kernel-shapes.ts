/**
 * The shapes most models are made of, in loops that vectors can follow bit by bit; values agree with
 * `peaks/` to twelve digits, which is tested. The other shapes are taken from there.
 */

import { normalShare, reachSigmas } from '../peaks/gaussian';
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
  if (!(grid.widestEv <= (narrowChannel * fwhmEv) / fwhmPerSigma)) return null;
  return reachOfGaussian(grid, middle, fwhmEv);
}

/** The channels of a Gaussian whatever their width. */
export function reachOfGaussian(grid: FitGrid, middle: number, fwhmEv: number): ChannelSpan {
  const reach = (reachSigmas * fwhmEv) / fwhmPerSigma;
  return spanWithin(grid, middle - reach, middle + reach);
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

/** Gauss and Legendre's six places in −1 … 1 come in pairs; weights are halved. */
const places = [0.2386191860831969, 0.6612093864662645, 0.9324695142031521];
const shares = [0.2339569672863455, 0.180380786524069, 0.0856622461895855];
/** Six places hold the integral over so many σ to 1e-11. */
const widestForPlaces = 1.2;

/** Density of the normal distribution, z in σ. */
function bellAt(z: number): number {
  return exponential(Math.max(-0.5 * z * z, -700)) / sqrtTwoPi;
}

/**
 * A Gaussian of few channels, of unit area: integrated by six places a channel, by the error function where channels are wide.
 *
 * @param out - by channel: share, and its derivatives by centre and fwhm; overwritten within the span
 */
export function integrateGaussian(
  { edgesEv }: FitGrid,
  { first, end }: ChannelSpan,
  middle: number,
  fwhmEv: number,
  [share, byCentre, byWidth]: readonly Float64Array[],
): void {
  const sigma = fwhmEv / fwhmPerSigma;
  let low = (edgesEv[first] - middle) / sigma;
  let atLow = bellAt(low);
  for (let k = first; k < end; k++) {
    const high = (edgesEv[k + 1] - middle) / sigma;
    const atHigh = bellAt(high);
    byCentre[k] = (atLow - atHigh) / sigma;
    byWidth[k] = (low * atLow - high * atHigh) / (sigma * fwhmPerSigma);
    share[k] = high - low <= widestForPlaces ? shareByPlaces(low, high) : normalShare(low, high);
    low = high;
    atLow = atHigh;
  }
}

function shareByPlaces(low: number, high: number): number {
  const half = 0.5 * (high - low);
  const middle = 0.5 * (high + low);
  let sum = 0;
  for (let i = 0; i < places.length; i++) {
    const away = half * places[i];
    sum += shares[i] * (bellAt(middle - away) + bellAt(middle + away));
  }
  return 2 * half * sum;
}
