/** When a spectrum holds too few counts to be asked for so many numbers. */
import type { FitNoise } from './fit-plan';

/**
 * Whether fewer counts were detected in the window than the model has free parameters: the rule of
 * status "too dim", under which nothing is fitted.
 *
 * Detected counts are those above the detector's offset, in units of the variance's slope (electrons).
 * Never so for uniform noise, whose values need not be counts.
 *
 * @param counts - NaN, no data, is left out
 */
export function isTooDim(counts: Float64Array, noise: FitNoise, freeParameters: number): boolean {
  if (noise.kind === 'uniform') return false;
  const { slope, offset } = noise.line;
  let detected = 0;
  for (const count of counts) if (!Number.isNaN(count)) detected += (count - offset) / slope;
  return detected < freeParameters;
}
