/** Asymmetric least squares: a smooth curve that hardly minds what is above it. */
import { PenalisedSmoother } from '../numeric/penalised-smoother';
import type { BaselineFinder } from './baseline';

export interface AslsOptions {
  readonly smoothness: number;
  readonly asymmetry: number;
  readonly iterations: number;
}

/**
 * Minimum of Σ w (y − z)² + λ Σ (Δ²z)², with w = p above z and 1 − p below, repeated until no channel
 * changes sides.
 *
 * @see P. H. C. Eilers and H. F. M. Boelens, Baseline correction with asymmetric least squares smoothing,
 * report, Leiden University Medical Centre (2005)
 */
export class AslsBaseline implements BaselineFinder {
  readonly #smoother: PenalisedSmoother;
  readonly #weights: Float64Array;
  readonly #options: AslsOptions;

  constructor(nk: number, options: AslsOptions) {
    this.#smoother = new PenalisedSmoother(nk, options.smoothness);
    this.#weights = new Float64Array(nk);
    this.#options = options;
  }

  find(spectrum: Float64Array, out: Float64Array): boolean {
    const { asymmetry, iterations } = this.#options;
    const weights = this.#weights;
    if (!weighKnown(spectrum, weights)) {
      out.fill(Number.NaN);
      return true;
    }
    for (let round = 0; round < iterations; round++) {
      this.#smoother.solve(spectrum, weights, out);
      let changed = 0;
      for (let k = 0; k < out.length; k++) {
        if (weights[k] === 0) continue;
        const weight = spectrum[k] > out[k] ? asymmetry : 1 - asymmetry;
        if (weight !== weights[k]) changed++;
        weights[k] = weight;
      }
      if (changed === 0) return true;
    }
    return false;
  }
}

/** Weights 1 where there is data, else 0; false where a line through it would not be fixed. */
export function weighKnown(spectrum: Float64Array, weights: Float64Array): boolean {
  let known = 0;
  for (let k = 0; k < spectrum.length; k++) {
    weights[k] = Number.isNaN(spectrum[k]) ? 0 : 1;
    known += weights[k];
  }
  return known >= 3;
}
