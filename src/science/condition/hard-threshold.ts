/** Which singular values stand above the noise: the optimal place to cut a noisy matrix' spectrum. */
import { medianInPlace } from '../numeric/select';

/**
 * Threshold of singular values over √n σ, for a matrix of m × n (m ≤ n, β = m/n) with noise σ.
 *
 * √(2 (β + 1) + 8β/((β + 1) + √(β² + 14β + 1))): 4/√3 for a square one.
 *
 * @see M. Gavish and D. L. Donoho, IEEE Trans. Inf. Theory 60, 5040 (2014), eq. 11
 */
export function knownNoiseThreshold(beta: number): number {
  const sum = beta + 1;
  return Math.sqrt(2 * sum + (8 * beta) / (sum + Math.sqrt(beta * beta + 14 * beta + 1)));
}

/** The same over the median singular value, where the noise is not known: 2.858 for a square matrix. */
export function unknownNoiseThreshold(beta: number): number {
  return knownNoiseThreshold(beta) / Math.sqrt(medianOfNoise(beta));
}

/** Steps of the integral below. */
const steps = 20000;

/**
 * Median of the Marčenko–Pastur distribution of squared singular values of pure noise, over n σ².
 *
 * Density √((t − a)(b − t))/(2π β t) from a = (1 − √β)² to b = (1 + √β)². Integrated by midpoints with
 * t = a + (b − a) s² (3 − 2s), which takes the roots out of its ends; good to 1e-8.
 */
export function medianOfNoise(beta: number): number {
  const root = Math.sqrt(beta);
  const lowest = (1 - root) * (1 - root);
  const width = 4 * root;
  const placeAt = (s: number): number => lowest + width * s * s * (3 - 2 * s);
  let sum = 0;
  for (let i = 0; i < steps; i++) {
    const s = (i + 0.5) / steps;
    const t = placeAt(s);
    const density = Math.sqrt((t - lowest) * (lowest + width - t)) / (2 * Math.PI * beta * t);
    const share = (density * width * 6 * s * (1 - s)) / steps;
    if (sum + share >= 0.5) return placeAt((i + (0.5 - sum) / share) / steps);
    sum += share;
  }
  return 1 + beta;
}

/**
 * How many singular values to keep.
 *
 * @param singular - (min(m, n)) descending
 * @param sizes - rows and columns of the matrix
 * @param sigma - of its noise; null where unknown
 */
export function optimalRank(
  singular: Float64Array,
  sizes: readonly [number, number],
  sigma: number | null,
): { readonly rank: number; readonly threshold: number } {
  const n = Math.max(...sizes);
  const beta = Math.min(...sizes) / n;
  const threshold =
    sigma === null
      ? unknownNoiseThreshold(beta) * medianInPlace(singular.slice())
      : knownNoiseThreshold(beta) * Math.sqrt(n) * sigma;
  return { rank: singular.filter((value) => value > threshold).length, threshold };
}
