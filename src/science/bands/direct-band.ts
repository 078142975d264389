/**
 * The quantities of a band on one spectrum, written as they are defined (contract §4): what the fast
 * path is held against, and what it falls back to for single pixels.
 */
import { countVariance } from '../noise';
import type { EnergyAxis, NoiseModel } from '../scan';
import { type BandQuantity, bandQuantities, type EnergyBand } from './band';
import { type BandChannels, bandChannels, shareOf } from './band-channels';
import { endChannels, type LineEnd, leastLeft, lineWeights, nothingOf } from './floor-line';

export interface BandValue {
  readonly value: number;
  /** one sigma; NaN without a noise model, and where no error is defined */
  readonly error: number;
}

export type BandValues = Readonly<Record<BandQuantity, BandValue>>;

/**
 * All quantities of a band.
 *
 * With shares f of the channels, counts c less the floor, variances v, centres E: integral N = Σ f c;
 * centroid m = Σ f c E/N; spread s = √(Σ f c (E − m)²/N); median where the running sum reaches N/2,
 * linear inside the covered part of its channel; peak the highest channel's counts (any channel of
 * which a part is covered; the lowest in energy of those equal but for rounding) and `peak_at` its centre.
 * Errors are propagated from v to first order, through the floor's line too: σ² = Σ h² v, where h is
 * the derivative by each channel's counts. For floor "none" they are the contract's formulas. The
 * median's is σ_N/2 over the counts per eV of the five channels around it (fewer at the axis' ends);
 * the peak's is its channel's own; `peak_at` has none.
 *
 * No data (NaN) is left out. A band without any channel with data, or with no data at an end its floor
 * needs, is NaN; so are centroid, median and spread where N ≤ 0, or no
 * more than rounding leaves of a floor's subtraction.
 *
 * @param counts - (nk), counts per channel
 */
export function directBand(
  counts: ArrayLike<number>,
  axis: EnergyAxis,
  band: EnergyBand,
  noise: NoiseModel,
): BandValues {
  const channels = bandChannels(axis, band);
  const covered = channels === null ? null : coveredPart(counts, axis, channels, noise);
  if (channels === null || covered === null) return noValues();
  const line = band.floor === 'none' ? noLine : lineUnder(covered, channels);
  if (line === null) return noValues();
  const integral = integralOf(covered, line);
  const peak = peakOf(covered, line);
  const gross = grossOf(covered, line);
  const least = line === noLine ? 0 : leastLeft(gross);
  if (!(integral.value > least)) return { ...noValues(), integral, ...peak };
  const centroid = centroidOf(covered, line, integral.value);
  return {
    integral,
    centroid,
    median: medianOf(covered, line, integral, { counts, axis, channels, gross }),
    spread: spreadOf(covered, line, { integral: integral.value, centroid: centroid.value, gross }),
    ...peak,
  };
}

const nothing: BandValue = { value: Number.NaN, error: Number.NaN };

function noValues(): BandValues {
  return Object.fromEntries(bandQuantities.map((name) => [name, nothing])) as BandValues;
}

/** One channel of the band that has data. */
interface Channel {
  readonly k: number;
  readonly share: number;
  readonly counts: number;
  readonly variance: number;
  readonly energyEv: number;
}

function coveredPart(
  counts: ArrayLike<number>,
  axis: EnergyAxis,
  channels: BandChannels,
  noise: NoiseModel,
): readonly Channel[] | null {
  const covered: Channel[] = [];
  for (let k = channels.first; k <= channels.last; k++) {
    if (Number.isNaN(counts[k])) continue;
    covered.push({
      k,
      share: shareOf(channels, k),
      counts: counts[k],
      variance: countVariance(counts[k], noise),
      energyEv: axis.centresEv[k],
    });
  }
  return covered.length === 0 ? null : covered;
}

/** The line as a weighted sum of channels' counts. */
interface Line {
  /** counts of its end channels together */
  readonly endCounts: number;
  readonly at: (energyEv: number) => number;
  /** whether the line depends on channel k at all */
  readonly leansOn: (k: number) => boolean;
  /** derivative of the line at an energy by the counts of channel k */
  readonly weight: (k: number, energyEv: number) => number;
}

const noLine: Line = { endCounts: 0, at: () => 0, leansOn: () => false, weight: () => 0 };

function lineUnder(covered: readonly Channel[], { first, last }: BandChannels): Line | null {
  const count = endChannels({ first, last });
  const isLeft = (k: number): boolean => k < first + count;
  const isRight = (k: number): boolean => k > last - count;
  const leftChannels = covered.filter(({ k }) => isLeft(k));
  const rightChannels = covered.filter(({ k }) => isRight(k));
  if (leftChannels.length === 0 || rightChannels.length === 0) return null;
  const left = endOf(leftChannels);
  const right = endOf(rightChannels);
  const leftCounts = leftChannels.reduce((sum, { counts }) => sum + counts, 0);
  const rightCounts = rightChannels.reduce((sum, { counts }) => sum + counts, 0);
  return {
    endCounts: Math.abs(leftCounts) + Math.abs(rightCounts),
    at: (energyEv) => {
      const weights = lineWeights(left, right, energyEv);
      return weights.left * leftCounts + weights.right * rightCounts;
    },
    leansOn: (k) => isLeft(k) || isRight(k),
    weight: (k, energyEv) => {
      const weights = lineWeights(left, right, energyEv);
      return (isLeft(k) ? weights.left : 0) + (isRight(k) ? weights.right : 0);
    },
  };
}

function endOf(channels: readonly Channel[]): LineEnd {
  const sum = channels.reduce((total, { energyEv }) => total + energyEv, 0);
  return { energy: sum / channels.length, channels: channels.length };
}

/** Σ f (c − floor) q over the band. */
function weightedSum(
  covered: readonly Channel[],
  line: Line,
  quantity: (energyEv: number) => number,
): number {
  let sum = 0;
  for (const { share, counts, energyEv } of covered) {
    sum += share * (counts - line.at(energyEv)) * quantity(energyEv);
  }
  return sum;
}

/** Counts of the band and of its floor, before one is taken from the other: what rounding is measured by. */
function grossOf(covered: readonly Channel[], line: Line): number {
  const gross = covered.reduce((sum, { share, counts }) => sum + share * counts, 0);
  const taken = covered.reduce((sum, { share, energyEv }) => sum + share * line.at(energyEv), 0);
  return Math.abs(gross) + Math.abs(taken);
}

/** The error of such a sum whose q does not move with the counts (or does so to second order only). */
function weightedSumError(
  covered: readonly Channel[],
  line: Line,
  quantity: (energyEv: number) => number,
): number {
  let variance = 0;
  for (const channel of covered) {
    let derivative = channel.share * quantity(channel.energyEv);
    if (line.leansOn(channel.k)) {
      for (const { share, energyEv } of covered) {
        derivative -= share * line.weight(channel.k, energyEv) * quantity(energyEv);
      }
    }
    variance += derivative * derivative * channel.variance;
  }
  return Math.sqrt(variance);
}

function integralOf(covered: readonly Channel[], line: Line): BandValue {
  const one = (): number => 1;
  return { value: weightedSum(covered, line, one), error: weightedSumError(covered, line, one) };
}

/** ∂m/∂c = f (E − m)/N, so that the error is the sum's with q = E − m, over N. */
function centroidOf(covered: readonly Channel[], line: Line, integral: number): BandValue {
  const origin = covered[covered.length >> 1].energyEv;
  const value = origin + weightedSum(covered, line, (energyEv) => energyEv - origin) / integral;
  const error = weightedSumError(covered, line, (energyEv) => energyEv - value) / integral;
  return { value, error };
}

/**
 * ∂s²/∂c = f ((E − m)² − s²)/N: moving m does not change s² to first order. Of a spread of 0 there is no
 * first order, so it has no error.
 */
function spreadOf(
  covered: readonly Channel[],
  line: Line,
  known: { readonly integral: number; readonly centroid: number; readonly gross: number },
): BandValue {
  const { integral, centroid, gross } = known;
  const square = (energyEv: number): number => (energyEv - centroid) * (energyEv - centroid);
  const moment = weightedSum(covered, line, square);
  const halfWidth = (covered[covered.length - 1].energyEv - covered[0].energyEv) / 2;
  const isNothing = Math.abs(moment) <= nothingOf(gross * halfWidth * halfWidth);
  const squared = isNothing ? 0 : moment / integral;
  const value = Math.sqrt(squared);
  if (value === 0) return { value, error: Number.NaN };
  const error = weightedSumError(covered, line, (energyEv) => square(energyEv) - squared);
  return { value, error: error / (2 * value * integral) };
}

function medianOf(
  covered: readonly Channel[],
  line: Line,
  integral: BandValue,
  spectrum: {
    readonly counts: ArrayLike<number>;
    readonly axis: EnergyAxis;
    readonly channels: BandChannels;
    readonly gross: number;
  },
): BandValue {
  const { edgesEv } = spectrum.axis;
  const half = integral.value / 2;
  // Where the running sum only touches N/2, rounding must not decide whether it does.
  const reached = half - leastLeft(spectrum.gross);
  let below = 0;
  for (const { k, share, counts, energyEv } of covered) {
    const here = share * (counts - line.at(energyEv));
    // Reached for certain: added up in this order, the whole is N > N/2.
    if (below + here >= reached) {
      const fromEv = Math.max(edgesEv[k], spectrum.channels.fromEv);
      const toEv = Math.min(edgesEv[k + 1], spectrum.channels.toEv);
      const share = Math.min(1, (half - below) / here);
      const value = fromEv + share * (toEv - fromEv);
      return { value, error: (0.5 * integral.error) / densityAround(k, line, spectrum) };
    }
    below += here;
  }
  return nothing;
}

/** Counts per eV from the five channels around k; NaN where they hold none. */
function densityAround(
  k: number,
  line: Line,
  { counts, axis }: { readonly counts: ArrayLike<number>; readonly axis: EnergyAxis },
): number {
  const { centresEv, edgesEv } = axis;
  let sum = 0;
  let widthEv = 0;
  for (let near = Math.max(0, k - 2); near <= Math.min(centresEv.length - 1, k + 2); near++) {
    if (Number.isNaN(counts[near])) continue;
    sum += counts[near] - line.at(centresEv[near]);
    widthEv += edgesEv[near + 1] - edgesEv[near];
  }
  return sum > leastLeft(line.endCounts) ? sum / widthEv : Number.NaN;
}

function peakOf(
  covered: readonly Channel[],
  line: Line,
): { readonly peak: BandValue; readonly peak_at: BandValue } {
  let highest = covered[0];
  let value = Number.NEGATIVE_INFINITY;
  for (const channel of covered) {
    const net = channel.counts - line.at(channel.energyEv);
    if (net - value > leastLeft(line.endCounts)) {
      value = net;
      highest = channel;
    }
  }
  let variance = 0;
  for (const { k, variance: own } of covered) {
    const derivative = (k === highest.k ? 1 : 0) - line.weight(k, highest.energyEv);
    variance += derivative * derivative * own;
  }
  return {
    peak: { value, error: Math.sqrt(variance) },
    peak_at: { value: highest.energyEv, error: Number.NaN },
  };
}
