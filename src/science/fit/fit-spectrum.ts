/**
 * One spectrum's fit: Fisher scoring with Levenberg and Marquardt's damping, within bounds. Owns its
 * buffers; nothing is made anew from spectrum to spectrum.
 *
 * @see T. A. Laurence and B. A. Chromy, Nat. Methods 7, 338 (2010), for the Poisson likelihood;
 * D. W. Marquardt, J. Soc. Ind. Appl. Math. 11, 431 (1963)
 */
import type { ChannelSpan } from '../peaks/shape';
import { BoundedStep, partOfFall } from './bounded-step';
import {
  type CreateFitKernel,
  createPlainFitKernel,
  type FitKernel,
  poissonScale,
} from './fit-kernel';
import { createLayout, type FitLayout, type FitModel, followTies } from './fit-model';
import { clip, move, stride } from './fit-move';
import { type FitStatus, fitStatus } from './fit-plan';
import { Information } from './information';
import { type EvaluateShape, shapeEvaluator } from './kernel-evaluate';

/** How near to the minimum a fit ends: it stops when a step would lower the deviance by less than this many units (of σ²). */
export const mapTolerance = 1e-3;
/** For a single spectrum looked at closely, and for reference values. */
export const closeTolerance = 1e-12;

const mostIterations = 200;
const firstDamping = 1e-3;
const leastDamping = 1e-7;
const greatestDamping = 1e12;
/** Steps that fall by less than this share of the deviance are lost in its rounding. */
const roundingShare = 4e-15;

/** What a fit found; the arrays belong to the fitter and hold until its next fit. */
export interface SpectrumFit {
  /** (parameters) every value; tied ones follow, those of components left out keep their start */
  readonly values: Float64Array;
  /** (parameters) 1 σ; NaN for a parameter at its bound, undetermined or left out, 0 for a fixed one */
  readonly errors: Float64Array;
  /** −2 ln L, or Σ r² for uniform noise, less the kernel's `dataPart` */
  deviance: number;
  /** reduced χ² of Pearson, the residual variance for uniform noise; NaN without degrees of freedom */
  chi2r: number;
  status: FitStatus;
  iterations: number;
  /** parameters that were free and not at a bound */
  freeCount: number;
  /** channels with data */
  channels: number;
}

export class SpectrumFitter {
  readonly model: FitModel;
  readonly kernel: FitKernel;
  readonly found: SpectrumFit;
  readonly #layouts = new Map<string, FitLayout>();
  readonly #evaluators: readonly EvaluateShape[];
  readonly #componentValues: readonly Float64Array[];
  readonly #spans: ChannelSpan[];
  readonly #trial: Float64Array;
  #information: Information | null = null;
  readonly #informations = new Map<FitLayout, Information>();
  readonly #steps = new Map<number, BoundedStep>();

  constructor(model: FitModel, createKernel: CreateFitKernel = createPlainFitKernel) {
    const { plan, grid } = model;
    const size = plan.parameters.length;
    this.model = model;
    this.kernel = createKernel(grid, size);
    this.#evaluators = plan.components.map(({ first }, c) =>
      shapeEvaluator(model.shapes[c], first, this.kernel),
    );
    this.#trial = new Float64Array(size);
    this.#componentValues = plan.components.map(({ first, count }) =>
      this.#trial.subarray(first, first + count),
    );
    this.#spans = plan.parameters.map(() => ({ first: 0, end: 0 }));
    this.found = {
      values: new Float64Array(size),
      errors: new Float64Array(size),
      deviance: Number.NaN,
      chi2r: Number.NaN,
      status: fitStatus.notFitted,
      iterations: 0,
      freeCount: 0,
      channels: 0,
    };
  }

  layoutOf(isIn: readonly boolean[]): FitLayout {
    const key = isIn.map((is) => (is ? '1' : '0')).join('');
    let layout = this.#layouts.get(key);
    if (layout === undefined) {
      layout = createLayout(this.model, isIn);
      this.#layouts.set(key, layout);
    }
    return layout;
  }

  /**
   * Takes a spectrum.
   *
   * @param counts - (n) of the fit's channels, NaN where there is no data
   * @returns channels with data
   */
  load(counts: Float64Array): number {
    const { kernel, model } = this;
    kernel.counts.set(counts);
    kernel.prepare(poissonScale(model.plan.noise));
    let channels = 0;
    for (let k = 0; k < counts.length; k++) if (!Number.isNaN(counts[k])) channels++;
    this.found.channels = channels;
    return channels;
  }

  /**
   * Fits the loaded spectrum.
   *
   * @param start - (parameters); those outside their bounds begin at them
   * @param isIn - by component, whether it is in
   * @returns `found`
   */
  fit(
    start: Float64Array,
    isIn: readonly boolean[] = this.model.everything,
    tolerance = mapTolerance,
  ): SpectrumFit {
    const layout = this.layoutOf(isIn);
    const { found, model } = this;
    const { free } = layout;
    found.values.set(start);
    for (let i = 0; i < free.length; i++) {
      const index = free[i];
      found.values[index] = clip(start[index], model.least[index], model.most[index]);
    }
    followTies(model.plan, found.values);
    found.iterations = 0;
    const information = this.#informationOf(layout);
    this.#information = information;
    information.begin();
    if (free.length === 0) this.evaluate(found.values, isIn, false);
    const hasConverged = free.length === 0 || this.#descend(layout, information, tolerance);
    this.#judge(information, hasConverged);
    return found;
  }

  /**
   * The covariance of the last fit; NaN where there is no error, 0 for fixed parameters.
   *
   * @param out - (parameters, parameters), overwritten
   */
  writeCovariance(out: Float64Array): void {
    this.#information?.writeCovariance(out, this.#errorScale(), this.model);
  }

  /** Expected counts of the components that are in, at the values found: in the kernel's `model`. */
  evaluate(values: Float64Array, isIn: readonly boolean[], withColumns: boolean): void {
    const { model, kernel } = this;
    const { components } = model.plan;
    this.#trial.set(values);
    kernel.model.fill(0);
    for (let c = 0; c < components.length; c++) {
      if (!isIn[c]) continue;
      const span = this.#evaluators[c](this.#componentValues[c], withColumns);
      const { first, count } = components[c];
      if (withColumns) for (let i = first; i < first + count; i++) this.#spans[i] = span;
    }
    kernel.weigh();
  }

  /** Steps downhill until a step is worth nothing. */
  #descend(layout: FitLayout, information: Information, tolerance: number): boolean {
    const { found, kernel } = this;
    const { values } = found;
    const next = information.next;
    let damping = 0;
    let growth = 10;
    let gainBefore = Number.NaN;
    this.#linearise(layout, information, values);
    let { deviance } = kernel.sums;
    const step = this.#stepOf(layout.free.length);
    while (found.iterations < mostIterations) {
      found.iterations++;
      information.gather(values);
      step.find(information, 0);
      const limit = Math.max(tolerance * this.#unit(deviance), roundingShare * Math.abs(deviance));
      const isNear = damping === 0 && isSteadilyNearing(step.gain, gainBefore, limit);
      gainBefore = step.gain;
      if ((step.gain >= 0 && step.gain < limit) || isNear) {
        this.#finish(layout, step, deviance, tolerance);
        return true;
      }
      if (damping > 0) step.find(information, damping);
      const share = stride(this.model, layout, values, step.step);
      const predicted = partOfFall(information, step, share);
      move(this.model, layout, values, step.step, share, next);
      this.#linearise(layout, information, next);
      const gain = deviance - kernel.sums.deviance;
      if (predicted > 0 && gain > 0) {
        values.set(next);
        deviance = kernel.sums.deviance;
        information.accept();
        const ratio = gain / predicted;
        if (ratio > 0.75) damping = damping > leastDamping ? damping * 0.1 : 0;
        else if (ratio < 0.25) damping = Math.max(firstDamping, damping * 2);
        growth = 10;
        continue;
      }
      damping = Math.max(firstDamping, damping * growth);
      growth *= 2;
      if (damping > greatestDamping || Number.isNaN(step.gain)) break;
    }
    this.evaluate(values, layout.isIn, false);
    return false;
  }

  /** Model, derivatives, weights and normal equations at some values. */
  #linearise(layout: FitLayout, information: Information, values: Float64Array): void {
    this.evaluate(values, layout.isIn, true);
    this.kernel.normal(layout.used, this.#spans, information.usedMatrix, information.usedGradient);
  }

  /**
   * Takes the last step: for maps at once, since the parabola holds so near the minimum; for a close fit
   * where it does not climb.
   */
  #finish(
    layout: FitLayout,
    { step, gain }: BoundedStep,
    deviance: number,
    tolerance: number,
  ): void {
    const { values } = this.found;
    const { next } = this.#informationOf(layout);
    move(this.model, layout, values, step, 1, next);
    if (tolerance >= mapTolerance) {
      values.set(next);
      this.kernel.sums.deviance -= gain;
      return;
    }
    this.evaluate(next, layout.isIn, false);
    if (this.kernel.sums.deviance <= deviance) values.set(next);
    else this.evaluate(values, layout.isIn, false);
  }

  /** One σ² in units of the deviance: for uniform noise the residual's own. */
  #unit(deviance: number): number {
    if (this.model.plan.noise.kind !== 'uniform') return 1;
    return deviance / Math.max(1, this.found.channels - this.model.plan.parameters.length);
  }

  /** Errors, χ² and status at the values found. */
  #judge(information: Information, hasConverged: boolean): void {
    const { found, kernel, model } = this;
    const { pearson, deviance } = kernel.sums;
    const isDetermined = information.finish(found.values);
    found.deviance = deviance;
    found.freeCount = information.freeCount;
    const freedom = found.channels - found.freeCount;
    found.chi2r = freedom > 0 ? pearson / freedom : Number.NaN;
    const scale = this.#errorScale();
    information.writeErrors(found.errors, scale, model);
    if (!hasConverged) found.status = fitStatus.notConverged;
    else if (!isDetermined || Number.isNaN(scale)) found.status = fitStatus.tooDim;
    else found.status = information.heldCount > 0 ? fitStatus.atBound : fitStatus.converged;
  }

  /** Errors of uniform noise are scaled by the residual. */
  #errorScale(): number {
    return this.model.plan.noise.kind === 'uniform' ? Math.sqrt(this.found.chi2r) : 1;
  }

  #informationOf(layout: FitLayout): Information {
    let information = this.#informations.get(layout);
    if (information === undefined) {
      information = new Information(layout, this.model);
      this.#informations.set(layout, information);
    }
    return information;
  }

  #stepOf(size: number): BoundedStep {
    let step = this.#steps.get(size);
    if (step === undefined) {
      step = new BoundedStep(size);
      this.#steps.set(size, step);
    }
    return step;
  }
}

/**
 * Whether the step at hand, small already, will be followed by one that is worth a tenth of the tolerance
 * at most, 0.01 σ for maps: gains fall by the same factor from step to step.
 */
function isSteadilyNearing(gain: number, gainBefore: number, tolerance: number): boolean {
  if (!(gain >= 0 && gain < 10 * tolerance && gain < gainBefore)) return false;
  return (gain * gain) / gainBefore < 0.1 * tolerance;
}
