/** Finds lines of known place in a spectrum, for calibration: its peaks, and which known line each is. */
import { log } from '../numeric/elementary';
import { medianInPlace } from '../numeric/select';

export interface FoundLine {
  /** where the spectrum has it, in the unit of its axis */
  readonly measured: number;
  /** where it should be */
  readonly truth: number;
  /** counts above the spectrum's median */
  readonly height: number;
}

interface Peak {
  readonly at: number;
  readonly height: number;
}

/** A peak stands this many times the median difference between channels above its surroundings. */
const leastHeight = 8;
/** Channels on either side that a peak is the highest of. */
const peakReach = 2;

/**
 * Pairs a spectrum's peaks with known lines.
 *
 * The whole spectrum may be displaced by up to `tolerance`; of the displacements that bring a peak
 * onto a line, that one is taken under which most lines (of these: the highest peaks) have a peak within
 * a quarter of it. Lines without such a peak are left out, and no peak is used twice.
 *
 * @param axis - (nk), strictly ascending or descending, nm or cm⁻¹
 * @param counts - (nk); no data is passed over
 * @param lines - in the axis' unit, any order
 * @param tolerance - in the axis' unit, above 0
 * @returns in order of the true places; empty where nothing fits
 */
export function findLines(
  axis: ArrayLike<number>,
  counts: ArrayLike<number>,
  lines: readonly number[],
  tolerance: number,
): readonly FoundLine[] {
  const peaks = findPeaks(axis, counts);
  const near = tolerance / 4;
  let best: readonly FoundLine[] = [];
  let bestScore = 0;
  for (const line of lines) {
    for (const { at } of peaks) {
      if (Math.abs(line - at) > tolerance) continue;
      const found = pairUp(peaks, lines, line - at, near);
      const score = scoreOf(found, line - at);
      if (score > bestScore) {
        best = found;
        bestScore = score;
      }
    }
  }
  return best;
}

/** More lines first; of as many, the smaller misfit. */
function scoreOf(found: readonly FoundLine[], displacement: number): number {
  if (found.length === 0) return 0;
  const misfit = found.reduce(
    (sum, { measured, truth }) => sum + Math.abs(truth - measured - displacement),
    0,
  );
  return found.length + 1 / (1 + misfit / found.length) / 2 + heightShare(found) / 1e3;
}

function heightShare(found: readonly FoundLine[]): number {
  const total = found.reduce((sum, { height }) => sum + height, 0);
  return total / (total + 1);
}

/** Each line with its nearest peak, in turn from the best pair on. */
function pairUp(
  peaks: readonly Peak[],
  lines: readonly number[],
  displacement: number,
  near: number,
): readonly FoundLine[] {
  const pairs = lines.flatMap((truth) =>
    peaks.flatMap(({ at, height }) => {
      const distance = Math.abs(at + displacement - truth);
      return distance <= near ? [{ measured: at, truth, height, distance }] : [];
    }),
  );
  pairs.sort((a, b) => a.distance - b.distance || a.truth - b.truth);
  const takenLines = new Set<number>();
  const takenPeaks = new Set<number>();
  const found: FoundLine[] = [];
  for (const { measured, truth, height } of pairs) {
    if (takenLines.has(truth) || takenPeaks.has(measured)) continue;
    takenLines.add(truth);
    takenPeaks.add(measured);
    found.push({ measured, truth, height });
  }
  return found.sort((a, b) => a.truth - b.truth);
}

/** Local maxima that stand out, with their centre between channels. */
function findPeaks(axis: ArrayLike<number>, counts: ArrayLike<number>): readonly Peak[] {
  const values = Float64Array.from(counts);
  const known = values.filter((value) => !Number.isNaN(value));
  const jumps = Float64Array.from({ length: Math.max(0, known.length - 1) }, (_, i) =>
    Math.abs(known[i + 1] - known[i]),
  );
  const median = medianInPlace(known);
  const least = leastHeight * medianInPlace(jumps);
  const peaks: Peak[] = [];
  for (let k = 1; k + 1 < values.length; k++) {
    if (!isHighest(values, k) || !(values[k] - median > least)) continue;
    peaks.push({ at: peakCentre(axis, values, k, median), height: values[k] - median });
  }
  return peaks;
}

function isHighest(values: Float64Array, k: number): boolean {
  for (let near = k - peakReach; near <= k + peakReach; near++) {
    if (near < 0 || near >= values.length || near === k) continue;
    if (values[near] > values[k] || (values[near] === values[k] && near < k)) return false;
  }
  return values[k] > values[k - 1] || values[k] > values[k + 1];
}

/** Vertex of the parabola through the logarithms of three channels, which a Gaussian's are; of the counts themselves where one is not above the median. */
function peakCentre(
  axis: ArrayLike<number>,
  values: Float64Array,
  k: number,
  median: number,
): number {
  const heights = [values[k - 1] - median, values[k] - median, values[k + 1] - median];
  const isPositive = heights.every((height) => height > 0);
  const [left, top, right] = isPositive ? heights.map((height) => log(height)) : heights;
  const curvature = left - 2 * top + right;
  const shift = curvature < 0 ? (left - right) / (2 * curvature) : 0;
  if (Number.isNaN(shift)) return axis[k];
  return shift < 0
    ? axis[k] + shift * (axis[k] - axis[k - 1])
    : axis[k] + shift * (axis[k + 1] - axis[k]);
}
