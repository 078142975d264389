/** The counts axis: limits that hold while the cursor moves, so that lines rise and fall and not the axis. */

export interface CountsLimits {
  readonly low: number;
  readonly high: number;
}

/**
 * Limits that take in all finite values of the spectra in channels from … to, widened to round
 * numbers, so that small changes leave them alone.
 *
 * @param spectra - each (nk)
 * @param isLog - the axis is logarithmic: the low limit stays positive
 */
export function countsLimits(
  spectra: readonly Float64Array[],
  channels: { readonly from: number; readonly to: number },
  isLog: boolean,
): CountsLimits {
  let low = 0;
  let high = 0;
  let lowestPositive = Number.POSITIVE_INFINITY;
  for (const counts of spectra) {
    for (let k = channels.from; k < channels.to; k++) {
      const value = counts[k] ?? Number.NaN;
      if (!Number.isFinite(value)) continue;
      if (value < low) low = value;
      if (value > high) high = value;
      if (value > 0 && value < lowestPositive) lowestPositive = value;
    }
  }
  const top = high > 0 ? roundUp(high * 1.04) : low < 0 ? 0 : 1;
  if (isLog) return { low: Math.min(lowestPositive, top / 10), high: top };
  return { low: low < 0 ? -roundUp(-low * 1.04) : 0, high: top };
}

/** Beyond it there is no rounder number; no detector counts so far. */
const largestRounded = 1e300;

const mantissas = [1, 1.25, 1.5, 2, 2.5, 3, 4, 5, 6, 8, 10] as const;

/** The next of 1, 1.25, 1.5, 2, … 10 times a power of ten, at or above a positive value that is finite. */
export function roundUp(value: number): number {
  if (value > largestRounded) return largestRounded;
  let decade = 1;
  while (decade * 10 <= value) decade *= 10;
  while (decade > value) decade /= 10;
  const mantissa = mantissas.find((candidate) => candidate * decade >= value) ?? 10;
  return mantissa * decade;
}
