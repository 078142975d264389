/** The variance of a channel's counts, from what is known of the detector. */
import type { NoiseModel } from './scan';

/**
 * Variance of one channel's counts, counts².
 *
 * `poisson`: the counts themselves. `detector`: v = F² max(c − offset, 0)/g + (read/g)². `none` and no
 * data (NaN): NaN.
 *
 * @see the contract's §4 for whole-number counts; a charge-coupled device's shot and read noise for a
 * detector block (handbook form, J. R. Janesick, Scientific Charge-Coupled Devices, SPIE 2001, from memory)
 */
export function countVariance(counts: number, noise: NoiseModel): number {
  if (noise.kind === 'none') return Number.NaN;
  if (noise.kind === 'poisson') return counts;
  const { slope, offset, floor } = varianceLine(noise);
  const above = counts - offset;
  return above < 0 ? floor : slope * above + floor;
}

/** v = slope · max(c − offset, 0) + floor, in counts² and counts. */
export interface VarianceLine {
  readonly slope: number;
  readonly offset: number;
  readonly floor: number;
}

/** The variance as a line of the counts, bent at the offset. */
export function varianceLine(noise: Exclude<NoiseModel, { kind: 'none' }>): VarianceLine {
  if (noise.kind === 'poisson') return { slope: 1, offset: 0, floor: 0 };
  const { electronsPerCount, offsetCounts, readNoiseE, excessNoise } = noise.detector;
  const read = readNoiseE / electronsPerCount;
  return {
    slope: (excessNoise * excessNoise) / electronsPerCount,
    offset: offsetCounts,
    floor: read * read,
  };
}

/** v = slope · c + constant for every value the counts can take. */
export interface AffineVariance {
  readonly slope: number;
  readonly constant: number;
}

/**
 * The variance as an unbent line, where it is one: sums of counts then are sums of variances too.
 *
 * @param isUnsigned - whether the scan's numbers cannot be negative, by their type in the file
 * @returns null where counts may lie below the detector's offset, and without a noise model
 */
export function affineVariance(noise: NoiseModel, isUnsigned: boolean): AffineVariance | null {
  if (noise.kind === 'none') return null;
  if (noise.kind === 'poisson') return { slope: 1, constant: 0 };
  const { slope, offset, floor } = varianceLine(noise);
  if (!isUnsigned || offset > 0) return null;
  return { slope, constant: floor - slope * offset };
}
