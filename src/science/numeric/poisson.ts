/** Probability of a Poisson count, accurate for any mean. */
import { log } from './elementary';

const HALF_LOG_TWO_PI = 0.9189385332046728;

/** ln n! less Stirling's formula, n < 16; index 0 is not used. */
const SMALL_STIRLING_ERRORS = makeSmallStirlingErrors();

function makeSmallStirlingErrors(): Float64Array {
  const table = new Float64Array(16);
  for (let n = 1, factorial = 1; n < 16; n++, factorial *= n) {
    table[n] = log(factorial) - ((n + 0.5) * log(n) - n + HALF_LOG_TWO_PI);
  }
  return table;
}

/** ln n! − ((n + ½) ln n − n + ½ ln 2π), for whole n ≥ 1; absolute error below 1e-14. */
function stirlingError(n: number): number {
  if (n < 16) return SMALL_STIRLING_ERRORS[n];
  const s = 1 / (n * n);
  return (1 / 12 - s * (1 / 360 - s * (1 / 1260 - s * (1 / 1680 - s * (1 / 1188))))) / n;
}

/** k ln(k/mean) + mean − k, without cancellation where k is near the mean. */
function devianceHalf(k: number, mean: number): number {
  const difference = k - mean;
  if (Math.abs(difference) >= 0.1 * (k + mean)) return k * log(k / mean) - difference;
  const v = difference / (k + mean);
  let sum = difference * v;
  let term = 2 * k * v;
  for (let j = 3; ; j += 2) {
    term *= v * v;
    const next = sum + term / j;
    if (next === sum) return sum;
    sum = next;
  }
}

/**
 * ln of the probability to count k where `mean` is expected, for whole k ≥ 0 and mean > 0.
 *
 * @returns −Infinity below zero counts; relative error of the probability about 1e-14 near the mean for any mean
 * @see C. Loader, Fast and Accurate Computation of Binomial Probabilities (2000), the saddle-point expansion
 */
export function logPoissonProbability(k: number, mean: number): number {
  if (k < 0) return -Infinity;
  if (k === 0) return -mean;
  return -stirlingError(k) - devianceHalf(k, mean) - HALF_LOG_TWO_PI - 0.5 * log(k);
}
