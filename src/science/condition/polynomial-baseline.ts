/** A polynomial through what is no peak: in chosen windows, or found by clipping. */
import { PolynomialBasis } from '../numeric/orthogonal-polynomials';
import { medianInPlace } from '../numeric/select';
import type { EnergyAxis } from '../scan';
import type { BaselineFinder } from './baseline';
import { type StepPlace, stepError } from './step-errors';

/** Rounds of clipping at most; it mostly ends by itself within ten. */
const mostRounds = 50;
/** Channels farther than this many standard deviations from the polynomial are left out of the next one. */
const clipSigmas = 2.5;
const madToSigma = 1 / 0.6745;
/** Deviations of this share of the spectrum's range are rounding. */
const rounding = 1e-12;

/**
 * Least squares over photon energy. With windows, through the channels whose centre lies in one of
 * them. Without, through all channels first, then again and again through those within 2.5 σ of the last
 * polynomial (σ from their median deviation; both sides alike, so that noise does not press it down),
 * until they stay the same. Repeated clipping is common practice, no source.
 */
export class PolynomialBaseline implements BaselineFinder {
  readonly #axis: EnergyAxis;
  readonly #degree: number;
  readonly #inWindows: Float64Array | null;
  readonly #weights: Float64Array;
  readonly #deviations: Float64Array;
  readonly #full: PolynomialBasis;

  /** @throws RimlightError 'recipe' - when the windows hold no more channels than the degree */
  constructor(
    axis: EnergyAxis,
    degree: number,
    windows: readonly (readonly [number, number])[] | null,
    place: StepPlace,
  ) {
    const nk = axis.centresEv.length;
    this.#axis = axis;
    this.#degree = degree;
    this.#inWindows = windows === null ? null : insideOf(axis, windows);
    this.#weights = new Float64Array(nk);
    this.#deviations = new Float64Array(nk);
    const channels = this.#inWindows?.reduce((sum, weight) => sum + weight, 0) ?? nk;
    if (channels <= degree) {
      throw stepError(
        place,
        `a polynomial of degree ${degree} cannot be drawn through ${channels} channels`,
        'Widen the windows (in eV, on the axis of the scan), or lower the degree.',
      );
    }
    this.#full = new PolynomialBasis(axis.centresEv, degree, this.#inWindows);
  }

  find(spectrum: Float64Array, out: Float64Array): boolean {
    const basis = this.#basisFor(spectrum);
    if (basis === null) {
      out.fill(Number.NaN);
      return true;
    }
    if (this.#inWindows !== null) {
      basis.fitted(basis.coefficients(spectrum), out);
      return true;
    }
    return this.#clip(basis, spectrum, out);
  }

  #clip(basis: PolynomialBasis, spectrum: Float64Array, out: Float64Array): boolean {
    const weights = this.#weights;
    for (let k = 0; k < out.length; k++) weights[k] = Number.isNaN(spectrum[k]) ? 0 : 1;
    const least = rounding * rangeOf(spectrum);
    let coefficients = basis.coefficients(spectrum);
    for (let round = 0; round < mostRounds; round++) {
      basis.fitted(coefficients, out);
      const limit = Math.max(least, clipSigmas * madToSigma * this.#medianDeviation(spectrum, out));
      const { changed, kept } = this.#reweigh(spectrum, out, limit);
      if (changed === 0) return true;
      if (kept <= this.#degree + 1) return false;
      const next = basis.partOf(spectrum, weights);
      if (next === null) return false;
      coefficients = next;
    }
    return false;
  }

  #medianDeviation(spectrum: Float64Array, curve: Float64Array): number {
    const deviations = this.#deviations;
    let count = 0;
    for (let k = 0; k < curve.length; k++) {
      if (this.#weights[k] !== 0) deviations[count++] = Math.abs(spectrum[k] - curve[k]);
    }
    return medianInPlace(deviations, count);
  }

  #reweigh(
    spectrum: Float64Array,
    curve: Float64Array,
    limit: number,
  ): { readonly changed: number; readonly kept: number } {
    let changed = 0;
    let kept = 0;
    for (let k = 0; k < curve.length; k++) {
      const weight = Math.abs(spectrum[k] - curve[k]) <= limit ? 1 : 0;
      if (weight !== this.#weights[k]) changed++;
      this.#weights[k] = weight;
      kept += weight;
    }
    return { changed, kept };
  }

  /** A basis of its own for a spectrum with gaps; null where too few channels are left. */
  #basisFor(spectrum: Float64Array): PolynomialBasis | null {
    if (!spectrum.some((value) => Number.isNaN(value))) return this.#full;
    const inside = this.#inWindows;
    const weights = spectrum.map((value, k) =>
      Number.isNaN(value) ? 0 : inside === null ? 1 : inside[k],
    );
    const channels = weights.reduce((sum, weight) => sum + weight, 0);
    if (channels <= this.#degree) return null;
    return new PolynomialBasis(this.#axis.centresEv, this.#degree, weights);
  }
}

function insideOf(
  { centresEv }: EnergyAxis,
  windows: readonly (readonly [number, number])[],
): Float64Array {
  return centresEv.map((centre) =>
    windows.some(([a, b]) => centre >= Math.min(a, b) && centre <= Math.max(a, b)) ? 1 : 0,
  );
}

function rangeOf(spectrum: Float64Array): number {
  let low = Number.POSITIVE_INFINITY;
  let high = Number.NEGATIVE_INFINITY;
  for (const value of spectrum) {
    if (value < low) low = value;
    if (value > high) high = value;
  }
  return high - low;
}
