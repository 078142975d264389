/**
 * Spikes in a series of numbers: what jumps up and back down within few channels, farther than the rest
 * of the series jumps and than its noise explains.
 */
import { medianInPlace } from '../numeric/select';

/** A median absolute deviation times this is a standard deviation's share of a normal distribution. */
const madShare = 0.6745;
/** Mean absolute deviation of a normal distribution, to its standard deviation: √(π/2). */
const meanDeviationToSigma = 1.2533141373155003;
/** What is wider comes from the sample: a cosmic ray seldom lights more channels in a row. */
export const widestSpikeChannels = 3;
/** Fewer channels have no rest to stand out from. */
const fewestChannels = 8;

/** What else is known of a series' noise; arrays are (nk). */
export interface SeriesNoise {
  /** variance of each channel without a spike; null where unknown */
  readonly variances: Float64Array | null;
  /** least variance to reckon with, (nk): of a single count, where none was counted nearby */
  readonly least: Float64Array;
  /** variance that what the series is compared with has of its own, (nk); null for none */
  readonly spread: Float64Array | null;
}

/**
 * Finds spikes by the modified z-score of the detrended difference, and keeps what is no cosmic ray's.
 *
 * With differences d = s[k+1] − s[k], M their median and MAD their median absolute deviation, z = 0.6745
 * (d − M)/MAD (mean absolute deviation where MAD is 0, as where most counts are 0). A spike begins
 * behind z > threshold and ends before z < −threshold, at most 3 channels on; at an end of the series one
 * of the two is enough. It must rise above the higher of the channels beside it by more than those
 * differ, and by more than threshold × √(2 v), with v their larger variance (and by the spread at the
 * spike itself): tops of bright lines are noisier than the series is on the whole. Longer runs of
 * jumps are lines, and left.
 *
 * No data is skipped: the channels beside a gap are neighbours.
 *
 * @see D. A. Whitaker and K. Hayes, Chemom. Intell. Lab. Syst. 179, 82 (2018); mean deviation for MAD = 0:
 * B. Iglewicz and D. C. Hoaglin, How to Detect and Handle Outliers, ASQC (1993), from memory
 */
export class SpikeFinder {
  readonly #threshold: number;
  readonly #channels: Int32Array;
  readonly #jumps: Float64Array;
  readonly #scratch: Float64Array;

  /** @param threshold - of the modified z-score, above 0 */
  constructor(nk: number, threshold: number) {
    this.#threshold = threshold;
    this.#channels = new Int32Array(nk);
    this.#jumps = new Float64Array(nk);
    this.#scratch = new Float64Array(nk);
  }

  /**
   * @param series - (nk)
   * @param marks - (nk), overwritten: 1 where a spike is
   * @returns channels marked
   */
  find(series: Float64Array, noise: SeriesNoise, marks: Uint8Array): number {
    marks.fill(0);
    const count = this.#gather(series);
    if (count < fewestChannels || !this.#score(series, count)) return 0;
    let marked = 0;
    // Jump j leads from the j-th channel with data to the next.
    for (let j = 0; j < count - 1; j++) {
      const first = this.#beginsAt(j);
      if (first < 0) continue;
      const last = this.#endOf(first, count);
      if (last < 0 || !this.#isSpike(series, noise, first, last, count)) continue;
      for (let i = first; i <= last; i++) marks[this.#channels[i]] = 1;
      marked += last - first + 1;
      j = Math.max(j, last - 1);
    }
    return marked;
  }

  #gather(series: Float64Array): number {
    let count = 0;
    for (let k = 0; k < series.length; k++) {
      if (!Number.isNaN(series[k])) this.#channels[count++] = k;
    }
    return count;
  }

  /** Jumps as modified z-scores; false where the series does not vary. */
  #score(series: Float64Array, count: number): boolean {
    const jumps = this.#jumps;
    const scratch = this.#scratch;
    const length = count - 1;
    for (let j = 0; j < length; j++) {
      jumps[j] = series[this.#channels[j + 1]] - series[this.#channels[j]];
      scratch[j] = jumps[j];
    }
    const median = medianInPlace(scratch, length);
    let deviations = 0;
    for (let j = 0; j < length; j++) {
      scratch[j] = Math.abs(jumps[j] - median);
      deviations += scratch[j];
    }
    const mad = medianInPlace(scratch, length);
    const sigma = mad > 0 ? mad / madShare : (meanDeviationToSigma * deviations) / length;
    if (!(sigma > 0)) return false;
    for (let j = 0; j < length; j++) jumps[j] = (jumps[j] - median) / sigma;
    return true;
  }

  /** Where a spike may begin by jump j: behind the first of a run of jumps up, or at the series' start; else −1. */
  #beginsAt(j: number): number {
    const jumps = this.#jumps;
    if (jumps[j] > this.#threshold) {
      return j === 0 || !(jumps[j - 1] > this.#threshold) ? j + 1 : -1;
    }
    return j === 0 && this.#endOf(0, this.#channels.length) >= 0 ? 0 : -1;
  }

  /** Its last channel, before the last of a run of jumps down, or the series' end; −1 where it is too long. */
  #endOf(first: number, count: number): number {
    const jumps = this.#jumps;
    const jumpCount = count - 1;
    for (let last = first; last < first + widestSpikeChannels; last++) {
      if (last >= jumpCount) return jumpCount;
      if (!(jumps[last] < -this.#threshold)) continue;
      while (last + 1 < jumpCount && jumps[last + 1] < -this.#threshold) last++;
      return last < first + widestSpikeChannels ? last : -1;
    }
    return -1;
  }

  #isSpike(
    series: Float64Array,
    { variances, least, spread }: SeriesNoise,
    first: number,
    last: number,
    count: number,
  ): boolean {
    const before = this.#channels[first > 0 ? first - 1 : last + 1];
    const after = this.#channels[last < count - 1 ? last + 1 : first - 1];
    let highest = Number.NEGATIVE_INFINITY;
    let widest = 0;
    for (let i = first; i <= last; i++) {
      highest = Math.max(highest, series[this.#channels[i]]);
      if (spread !== null) widest = Math.max(widest, spread[this.#channels[i]]);
    }
    const height = highest - Math.max(series[before], series[after]);
    if (!(height > Math.abs(series[before] - series[after]))) return false;
    const known = variances === null ? 0 : Math.max(variances[before], variances[after]);
    const variance = variances === null ? 0 : Math.max(known, least[before], least[after]);
    return height > this.#threshold * Math.sqrt(2 * variance + widest);
  }
}

/**
 * Straight lines over marked channels, between the nearest unmarked ones with data; level beyond the last.
 *
 * @param guesses - variance of each guess, (nk), written where marked: that of a channel there, and
 * of the line through its ends, and the square of half what the ends differ by; null leaves it out
 */
export function bridgeMarked(
  series: Float64Array,
  marks: Uint8Array,
  variances: Float64Array | null,
  guesses: Float64Array | null,
): void {
  const isGood = (k: number): boolean => marks[k] === 0 && !Number.isNaN(series[k]);
  for (let k = 0; k < series.length; k++) {
    if (marks[k] === 0) continue;
    let left = k - 1;
    while (left >= 0 && !isGood(left)) left--;
    let right = k + 1;
    while (right < series.length && !isGood(right)) right++;
    if (left < 0) left = right;
    if (right >= series.length) right = left;
    if (left < 0) continue;
    const share = left === right ? 0 : (k - left) / (right - left);
    series[k] = (1 - share) * series[left] + share * series[right];
    if (variances === null || guesses === null) continue;
    const own = (1 - share) * variances[left] + share * variances[right];
    const line = (1 - share) * (1 - share) * variances[left] + share * share * variances[right];
    const half = (series[right] - series[left]) / 2;
    guesses[k] = own + line + half * half;
  }
}
