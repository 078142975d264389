/**
 * Offset and read noise of the detector from channels that see no light: what to suggest for the
 * recipe's detector block and offset step. Summarised row by row, so that rows may be shared out.
 */
import { medianInPlace } from '../numeric/select';
import type { EnergyAxis } from '../scan';
import type { ConditionedSlab } from './conditioned';
import { type StepPlace, stepError } from './step-errors';

/** Channels first ≤ k < end. */
export interface ChannelRange {
  readonly first: number;
  readonly end: number;
}

/** Of each row, (ny). */
export interface DarkRows {
  /** mean counts in the window */
  readonly means: Float64Array;
  /** variance of one channel, from differences between neighbouring pixels: steady patterns cancel */
  readonly variances: Float64Array;
}

export interface DarkEstimate {
  readonly offsetCounts: number;
  /** standard deviation of one channel, counts */
  readonly readNoiseCounts: number;
}

/** Differences beyond this many standard deviations are cosmic rays. */
const clipSigmas = 5;

/**
 * Channels whose centre lies in an interval of photon energy.
 *
 * @throws RimlightError 'recipe' - when there is none
 */
export function channelsWithin(
  { centresEv }: EnergyAxis,
  range: readonly [number, number],
  place: StepPlace,
): ChannelRange {
  const low = Math.min(...range);
  const high = Math.max(...range);
  const first = centresEv.findIndex((centre) => centre >= low);
  let end = centresEv.length;
  while (end > 0 && centresEv[end - 1] > high) end--;
  if (first >= 0 && first < end) return { first, end };
  const from = centresEv[0].toFixed(4);
  const to = centresEv[centresEv.length - 1].toFixed(4);
  throw stepError(
    place,
    `no channel lies between ${low} and ${high} eV`,
    `Choose a window on the axis, ${from} to ${to} eV.`,
  );
}

/** Rows' means and variances in a window without signal; NaN for a row without data. */
export function summariseDark(slab: ConditionedSlab, range: ChannelRange): DarkRows {
  const { ny } = slab.shape;
  const means = new Float64Array(ny);
  const variances = new Float64Array(ny);
  for (let y = 0; y < ny; y++) {
    means[y] = rowMean(slab, y, range);
    variances[y] = rowVariance(slab, y, range);
  }
  return { means, variances };
}

/** Medians over the scan's rows: a row with a cosmic ray or some light does not move them. */
export function estimateDark(rows: DarkRows): DarkEstimate {
  const known = (values: Float64Array): Float64Array => values.filter((v) => !Number.isNaN(v));
  return {
    offsetCounts: medianInPlace(known(rows.means)),
    readNoiseCounts: Math.sqrt(medianInPlace(known(rows.variances))),
  };
}

function rowMean({ counts, shape }: ConditionedSlab, y: number, range: ChannelRange): number {
  const { nx, nk } = shape;
  let sum = 0;
  let found = 0;
  for (let x = 0; x < nx; x++) {
    for (let k = range.first; k < range.end; k++) {
      const value = counts[(y * nx + x) * nk + k];
      if (Number.isNaN(value)) continue;
      sum += value;
      found++;
    }
  }
  return sum / found;
}

/** Half the mean square of differences between pixels side by side, cosmic rays clipped off until none is left. */
function rowVariance(slab: ConditionedSlab, y: number, range: ChannelRange): number {
  let limit = Number.POSITIVE_INFINITY;
  let variance = Number.NaN;
  for (let round = 0; round < 10; round++) {
    const { sum, found, clipped } = squaresBelow(slab, y, range, limit);
    variance = sum / found / 2;
    const next = clipSigmas * clipSigmas * 2 * variance;
    if (round > 0 && (clipped === 0 || next === limit)) break;
    limit = next;
  }
  return variance;
}

function squaresBelow(
  { counts, shape }: ConditionedSlab,
  y: number,
  range: ChannelRange,
  limit: number,
): { readonly sum: number; readonly found: number; readonly clipped: number } {
  const { nx, nk } = shape;
  let sum = 0;
  let found = 0;
  let clipped = 0;
  for (let x = 0; x + 1 < nx; x++) {
    for (let k = range.first; k < range.end; k++) {
      const at = (y * nx + x) * nk + k;
      const difference = counts[at + nk] - counts[at];
      if (Number.isNaN(difference)) continue;
      if (difference * difference > limit) clipped++;
      else {
        sum += difference * difference;
        found++;
      }
    }
  }
  return { sum, found, clipped };
}
