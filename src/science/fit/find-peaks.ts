/**
 * Peaks of a spectrum, each with its place, width and area, found without being told how many there
 * are: maxima, over place and scale, of the smoothed second derivative (scale selection after
 * Lindeberg, Int. J. Comput. Vis. 30, 79 (1998)).
 *
 * Smoothed by a Gaussian of scale s, a Gaussian peak of area A and deviation σ has the curvature
 * −A/(√2π (σ² + s²)^{3/2}) at its centre; times s^{3/2} it is greatest where s = σ.
 */
import { exp } from '../numeric/elementary';
import type { FitGrid } from '../peaks/shape';
import { fwhmPerSigma } from '../peaks/widths';

export interface FoundPeak {
  readonly centreEv: number;
  readonly fwhmEv: number;
  /** counts */
  readonly area: number;
  /** curvature over its own uncertainty from the noise */
  readonly significance: number;
}

/** Scales that are tried grow by this factor. */
const scaleStep = 1.25;
/** The finest scale, channels: two channels are no peak but a spike. */
const finestChannels = 1.5;
/** The coarsest scale as a part of the window. */
const coarsestPart = 0.2;
/** Curvatures below this many standard deviations may be noise. */
const leastSignificance = 6;
const sqrtTwoPi = 2.5066282746310002;

/**
 * Peaks of one spectrum, most significant first; of two that lie within half a width of each other
 * the more significant one.
 *
 * @param counts - (n) counts per channel; no data (NaN) counts as the mean of what is beside it
 * @param variances - (n) of the counts
 */
export function findPeaks(
  grid: FitGrid,
  counts: Float64Array,
  variances: Float64Array,
): readonly FoundPeak[] {
  const filled = withoutGaps(counts);
  const found: FoundPeak[] = [];
  const levels = scalesFor(grid).map((scale) => responseAt(filled, variances, scale));
  for (let level = 1; level < levels.length - 1; level++) {
    const { scale, values, errors } = levels[level];
    for (let k = 1; k < values.length - 1; k++) {
      const value = values[k];
      if (!(value > leastSignificance * errors[k])) continue;
      if (value <= values[k - 1] || value < values[k + 1]) continue;
      if (value < levels[level - 1].values[k] || value < levels[level + 1].values[k]) continue;
      found.push(peakAt(grid, k, scale, value, value / errors[k]));
    }
  }
  return withoutDoubles(found);
}

/** The more significant of peaks that are one and the same. */
export function withoutDoubles(peaks: readonly FoundPeak[]): readonly FoundPeak[] {
  const kept: FoundPeak[] = [];
  for (const peak of [...peaks].sort((a, b) => b.significance - a.significance)) {
    const isDouble = kept.some(
      (other) =>
        Math.abs(other.centreEv - peak.centreEv) < 0.5 * Math.max(other.fwhmEv, peak.fwhmEv) &&
        // A narrow line riding on a wide peak is its own.
        Math.max(other.fwhmEv, peak.fwhmEv) < 4 * Math.min(other.fwhmEv, peak.fwhmEv),
    );
    if (!isDouble) kept.push(peak);
  }
  return kept;
}

interface Level {
  /** channels */
  readonly scale: number;
  /** s^{3/2} × −curvature of the smoothed counts, counts per channel */
  readonly values: Float64Array;
  readonly errors: Float64Array;
}

function scalesFor({ centresEv }: FitGrid): readonly number[] {
  const scales: number[] = [];
  const coarsest = Math.max(coarsestPart * centresEv.length, 4 * finestChannels);
  for (let scale = finestChannels / scaleStep; scale < coarsest; scale *= scaleStep) {
    scales.push(scale);
  }
  return scales;
}

function responseAt(counts: Float64Array, variances: Float64Array, scale: number): Level {
  const reach = Math.ceil(4 * scale);
  const kernel = curvatureKernel(scale, reach);
  const n = counts.length;
  const values = new Float64Array(n);
  const errors = new Float64Array(n);
  for (let k = 0; k < n; k++) {
    let sum = 0;
    let variance = 0;
    for (let j = -reach; j <= reach; j++) {
      // Beyond the window the spectrum is taken to go on as a mirror shows it.
      const at = mirrored(k + j, n);
      const weight = kernel[j + reach];
      sum += weight * counts[at];
      variance += weight * weight * variances[at];
    }
    values[k] = sum;
    errors[k] = Math.sqrt(variance);
  }
  return { scale, values, errors };
}

/** s^{3/2} × minus the second derivative of a Gaussian, its sum made exactly zero: a background gives nothing. */
function curvatureKernel(scale: number, reach: number): Float64Array {
  const kernel = new Float64Array(2 * reach + 1);
  const norm = (scale * Math.sqrt(scale)) / (sqrtTwoPi * scale * scale * scale);
  let sum = 0;
  for (let j = -reach; j <= reach; j++) {
    const square = (j / scale) * (j / scale);
    kernel[j + reach] = norm * (1 - square) * exp(-0.5 * square);
    sum += kernel[j + reach];
  }
  for (let j = 0; j < kernel.length; j++) kernel[j] -= sum / kernel.length;
  return kernel;
}

function peakAt(
  { centresEv, widthsEv }: FitGrid,
  k: number,
  scale: number,
  value: number,
  significance: number,
): FoundPeak {
  // s^{3/2} A/(√2π (2 s²)^{3/2}) at s = σ, solved for A.
  const area = value * sqrtTwoPi * 2 * Math.SQRT2 * scale * Math.sqrt(scale);
  return {
    centreEv: centresEv[k],
    fwhmEv: fwhmPerSigma * scale * widthsEv[k],
    area,
    significance,
  };
}

function mirrored(index: number, n: number): number {
  if (index < 0) return Math.min(-index - 1, n - 1);
  return index >= n ? Math.max(2 * n - 1 - index, 0) : index;
}

function withoutGaps(counts: Float64Array): Float64Array {
  const filled = counts.slice();
  let last = Number.NaN;
  for (let k = 0; k < filled.length; k++) {
    if (Number.isNaN(filled[k])) filled[k] = last;
    else last = filled[k];
  }
  for (let k = filled.length - 1; k >= 0; k--) {
    if (Number.isNaN(filled[k])) filled[k] = last;
    else last = filled[k];
  }
  return Number.isNaN(last) ? filled.fill(0) : filled;
}
