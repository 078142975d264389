/** Asymmetrically reweighted penalised least squares: the noise below the baseline says what lies above it. */
import { fallingStep } from '../numeric/logistic';
import { PenalisedSmoother } from '../numeric/penalised-smoother';
import { weighKnown } from './asls';
import type { BaselineFinder } from './baseline';

/** Weights have settled when they change by less than this, ‖w′ − w‖/‖w‖. */
const settled = 1e-3;
/** Residuals of this share of the counts are rounding: the curve then is the spectrum. */
const rounding = 1e-9;

/**
 * As asymmetric least squares, with weights w = 1/(1 + exp(2 (d − (2σ − m))/σ)) of the residuals d = y − z,
 * where m and σ are mean and standard deviation of those below 0.
 *
 * @see S.-J. Baek, A. Park, Y.-J. Ahn and J. Choo, Analyst 140, 250 (2015)
 */
export class ArplsBaseline implements BaselineFinder {
  readonly #smoother: PenalisedSmoother;
  readonly #weights: Float64Array;
  readonly #iterations: number;

  constructor(nk: number, smoothness: number, iterations: number) {
    this.#smoother = new PenalisedSmoother(nk, smoothness);
    this.#weights = new Float64Array(nk);
    this.#iterations = iterations;
  }

  find(spectrum: Float64Array, out: Float64Array): boolean {
    const weights = this.#weights;
    if (!weighKnown(spectrum, weights)) {
      out.fill(Number.NaN);
      return true;
    }
    for (let round = 0; round < this.#iterations; round++) {
      this.#smoother.solve(spectrum, weights, out);
      if (this.#reweigh(spectrum, out)) return true;
    }
    return false;
  }

  /** True when the weights have settled. */
  #reweigh(spectrum: Float64Array, curve: Float64Array): boolean {
    const weights = this.#weights;
    let below = 0;
    let sum = 0;
    let squares = 0;
    let size = 0;
    for (let k = 0; k < curve.length; k++) {
      const rest = spectrum[k] - curve[k];
      if (Math.abs(spectrum[k]) > size) size = Math.abs(spectrum[k]);
      if (!(rest < 0)) continue;
      below++;
      sum += rest;
      squares += rest * rest;
    }
    const mean = sum / below;
    const sigma = Math.sqrt((squares - sum * mean) / (below - 1));
    // The curve touches the spectrum everywhere: there is nothing above it.
    if (!(sigma > rounding * size)) return true;
    const centre = 2 * sigma - mean;
    let change = 0;
    let norm = 0;
    for (let k = 0; k < curve.length; k++) {
      const before = weights[k];
      const rest = spectrum[k] - curve[k];
      if (Number.isNaN(rest)) continue;
      const weight = fallingStep((2 * (rest - centre)) / sigma);
      change += (weight - before) * (weight - before);
      norm += before * before;
      weights[k] = weight;
    }
    return Math.sqrt(change) < settled * Math.sqrt(norm);
  }
}
