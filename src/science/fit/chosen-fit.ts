/**
 * Which optional components a spectrum needs: backward elimination by the Bayesian information
 * criterion. All components are fitted; the optional one that is needed least goes, as long as the
 * criterion falls by it.
 *
 * @see G. Schwarz, Ann. Stat. 6, 461 (1978)
 */
import { log } from '../numeric/elementary';
import { type FitStatus, fitStatus } from './fit-plan';
import { closeTolerance, mapTolerance, type SpectrumFitter } from './fit-spectrum';

/**
 * Where components are only weighed against each other, the deviance needs to be known to this many
 * units. A component that is not there has no place to be: a search for it to the end takes long and
 * finds nothing.
 */
const weighingTolerance = 0.05;

export interface ChosenFit {
  /** (parameters) as `SpectrumFit` has them */
  readonly values: Float64Array;
  readonly errors: Float64Array;
  /** (parameters, parameters), NaN where there is no error */
  readonly covariance: Float64Array;
  /** by component, whether it was kept */
  readonly isIn: boolean[];
  /** by component: BIC of the model chosen without it less BIC with it; NaN for one that is not optional */
  readonly needed: Float64Array;
  deviance: number;
  chi2r: number;
  status: FitStatus;
  iterations: number;
  freeCount: number;
}

/**
 * Error of something that follows from parameters `first` … of a fit. A parameter at its bound counts
 * as known.
 *
 * @param gradient - derivative by each of the parameters
 * @returns NaN where none of the parameters has an error, or one that matters is not determined
 */
export function propagatedError(
  { covariance, errors, status }: ChosenFit,
  first: number,
  count: number,
  gradient: Float64Array,
): number {
  const size = errors.length;
  let sum = 0;
  let known = 0;
  for (let i = 0; i < count; i++) {
    if (gradient[i] === 0) continue;
    if (Number.isNaN(errors[first + i])) {
      if (status === fitStatus.tooDim) return Number.NaN;
      continue;
    }
    known++;
    for (let j = 0; j < count; j++) {
      const one = covariance[(first + i) * size + first + j];
      if (!Number.isNaN(one)) sum += gradient[i] * gradient[j] * one;
    }
  }
  return known === 0 ? Number.NaN : Math.sqrt(Math.max(0, sum));
}

/** Fits one spectrum after the other into the same `ChosenFit`. */
export class ComponentChooser {
  readonly found: ChosenFit;
  readonly #fitter: SpectrumFitter;
  readonly #optional: readonly number[];
  readonly #trialIn: boolean[];
  readonly #seed: Float64Array;

  constructor(fitter: SpectrumFitter) {
    const { components, parameters } = fitter.model.plan;
    this.#fitter = fitter;
    this.#optional = components.flatMap(({ isOptional }, index) => (isOptional ? [index] : []));
    this.#trialIn = components.map(() => true);
    this.#seed = new Float64Array(parameters.length);
    this.found = {
      values: new Float64Array(parameters.length),
      errors: new Float64Array(parameters.length),
      covariance: new Float64Array(parameters.length * parameters.length),
      isIn: components.map(() => true),
      needed: new Float64Array(components.length),
      deviance: Number.NaN,
      chi2r: Number.NaN,
      status: fitStatus.notFitted,
      iterations: 0,
      freeCount: 0,
    };
  }

  /** Fits the spectrum that the fitter has loaded; the iterations of every trial are counted. */
  fit(start: Float64Array, tolerance = mapTolerance): ChosenFit {
    const { found } = this;
    found.isIn.fill(true);
    found.needed.fill(Number.NaN);
    found.iterations = 0;
    if (this.#optional.length > 0) this.#choose(start, tolerance);
    else this.#take(start, tolerance);
    return found;
  }

  #choose(start: Float64Array, tolerance: number): void {
    const { found } = this;
    const weighing = tolerance <= closeTolerance ? mapTolerance : weighingTolerance;
    this.#take(start, weighing);
    let dropped = 0;
    while (dropped < this.#optional.length) {
      const least = this.#leastNeeded(weighing);
      if (least < 0) break;
      found.isIn[least] = false;
      this.#takeOn(weighing);
      dropped++;
    }
    this.#takeOn(tolerance);
    if (dropped > 0) this.#askAgain(start, weighing);
  }

  /** Goes on from where it is. */
  #takeOn(tolerance: number): void {
    this.#seed.set(this.found.values);
    this.#take(this.#seed, tolerance);
  }

  /** The optional component whose loss lowers the criterion most; −1 where each is needed. Notes how much each is. */
  #leastNeeded(tolerance: number): number {
    const { found } = this;
    const here = this.#criterion(found.deviance, found.isIn);
    let least = -1;
    for (const index of this.#optional) {
      if (!found.isIn[index]) continue;
      found.needed[index] = this.#criterionOf(found.values, index, false, tolerance) - here;
      const isLess = found.needed[index] < (least < 0 ? 0 : found.needed[least]);
      if (isLess) least = index;
    }
    return least;
  }

  /** What was lost early is judged beside the model that was chosen in the end. */
  #askAgain(start: Float64Array, tolerance: number): void {
    const { found } = this;
    const { plan } = this.#fitter.model;
    const here = this.#criterion(found.deviance, found.isIn);
    for (const index of this.#optional) {
      if (found.isIn[index]) continue;
      this.#seed.set(found.values);
      const { first, count } = plan.components[index];
      for (let i = first; i < first + count; i++) this.#seed[i] = start[i];
      found.needed[index] = here - this.#criterionOf(this.#seed, index, true, tolerance);
    }
  }

  /** BIC with one component more or less than chosen. */
  #criterionOf(start: Float64Array, index: number, isIn: boolean, tolerance: number): number {
    for (const [c, is] of this.found.isIn.entries()) this.#trialIn[c] = c === index ? isIn : is;
    const { deviance, iterations } = this.#fitter.fit(start, this.#trialIn, tolerance);
    this.found.iterations += iterations;
    return this.#criterion(deviance, this.#trialIn);
  }

  /** −2 ln L + p ln n, up to a part that only depends on the data. */
  #criterion(deviance: number, isIn: readonly boolean[]): number {
    const { channels } = this.#fitter.found;
    const { noise } = this.#fitter.model.plan;
    const { length: free } = this.#fitter.layoutOf(isIn).free;
    const misfit = noise.kind === 'uniform' ? channels * log(deviance / channels) : deviance;
    return misfit + free * log(channels);
  }

  #take(start: Float64Array, tolerance: number): void {
    const { found } = this;
    const one = this.#fitter.fit(start, found.isIn, tolerance);
    found.values.set(one.values);
    found.errors.set(one.errors);
    this.#fitter.writeCovariance(found.covariance);
    found.deviance = one.deviance;
    found.chi2r = one.chi2r;
    found.status = one.status;
    found.freeCount = one.freeCount;
    found.iterations += one.iterations;
  }
}
