/** One pixel: from seeds, in a fixed order, to the row of numbers that is kept of it. */
import { log } from '../numeric/elementary';
import { type ChosenFit, ComponentChooser, propagatedError } from './chosen-fit';
import { DerivedValues } from './derived-values';
import { plannedStart } from './estimate-starts';
import type { CreateFitKernel } from './fit-kernel';
import type { FitModel } from './fit-model';
import { fitStatus } from './fit-plan';
import { qualityAt, type RecordLayout, recordLayout, startFromRecord } from './fit-record';
import { SpectrumFitter } from './fit-spectrum';
import { LinearStarts } from './linear-starts';
import { isTooDim } from './too-dim';

/** What the fit of other pixels says of this one. */
export interface Seeds {
  /** rows of fitted pixels nearby, the most likely first; null or a row without a fit is passed over */
  readonly rows: readonly (Float64Array | null)[];
  /** reduced χ² that is usual on this scan; NaN when not known */
  readonly usualChi2r: number;
}

export const noSeeds: Seeds = { rows: [], usualChi2r: Number.NaN };

/** More than so many standard deviations of χ² above the usual, a fit is tried again from elsewhere. */
const suspiciousSigmas = 6;
/** Starts of the short multi-start: widths times the first, centres moved by the second times the width. */
const multiStart = [
  [0.6, 0],
  [1.6, 0],
  [1, 0.6],
  [1, -0.6],
] as const;

const widthNames: readonly string[] = ['fwhm', 'fwhm_g', 'fwhm_l', 'tail'];

export class PixelFitter {
  readonly layout: RecordLayout;
  readonly fitter: SpectrumFitter;
  readonly chooser: ComponentChooser;
  /** (parameters) and (parameters, parameters) of the row returned last, NaN where there is no error */
  readonly bestErrors: Float64Array;
  readonly bestCovariance: Float64Array;
  readonly #linear: LinearStarts;
  readonly #derived: DerivedValues;
  readonly #planned: Float64Array;
  readonly #start: Float64Array;
  readonly #best: Float64Array;
  readonly #trial: Float64Array;
  /** of one component */
  readonly #ownValues: Float64Array;
  readonly #chi2rAt: number;
  readonly #statusAt: number;
  readonly #devianceAt: number;
  readonly #freeCountAt: number;

  constructor(model: FitModel, createKernel?: CreateFitKernel) {
    this.fitter = new SpectrumFitter(model, createKernel);
    this.layout = recordLayout(model);
    this.chooser = new ComponentChooser(this.fitter);
    this.#linear = new LinearStarts(model);
    this.#derived = new DerivedValues(model);
    this.#planned = plannedStart(model.plan);
    this.#start = this.#planned.slice();
    this.#best = new Float64Array(this.layout.length);
    this.#trial = new Float64Array(this.layout.length);
    this.bestErrors = this.chooser.found.errors.slice();
    this.bestCovariance = this.chooser.found.covariance.slice();
    this.#ownValues = new Float64Array(
      Math.max(...model.plan.components.map(({ count }) => count)),
    );
    this.#chi2rAt = qualityAt(this.layout, 'chi2r');
    this.#statusAt = qualityAt(this.layout, 'status');
    this.#devianceAt = qualityAt(this.layout, 'deviance');
    this.#freeCountAt = qualityAt(this.layout, 'freeCount');
  }

  /**
   * Fits a spectrum: from the pixels nearby, then, where that is not convincing, from the plan's own
   * start, then from a few places around it; the best likelihood is kept.
   *
   * @param counts - (n) of the fit's channels, NaN where there is no data
   * @returns the pixel's row, the same array at every call
   */
  fit(
    counts: Float64Array,
    { rows, usualChi2r }: Seeds = noSeeds,
    tolerance?: number,
  ): Float64Array {
    const best = this.#best;
    const trial = this.#trial;
    const channels = this.fitter.load(counts);
    this.bestErrors.fill(Number.NaN);
    this.bestCovariance.fill(Number.NaN);
    const refused = this.#refusal(counts, channels);
    if (refused !== null) return this.#writeEmpty(best, refused);
    let isFirst = true;
    const isGood = (): boolean => !isFirst && this.#isGood(best, channels, usualChi2r);
    const attempt = (start: Float64Array): void => {
      const found = this.chooser.fit(start, tolerance);
      this.#write(trial, found);
      if (isFirst || this.#isBetter(trial, best)) {
        best.set(trial);
        this.bestErrors.set(found.errors);
        this.bestCovariance.set(found.covariance);
      }
      isFirst = false;
    };
    for (const row of rows) {
      if (isGood()) break;
      if (row === null || !this.#isFit(row)) continue;
      startFromRecord(this.layout, row, this.#fallback(row, counts), this.#start);
      attempt(this.#start);
    }
    // At a bound it may have come to rest on the way, and neighbours after it: it is tried from the plan's start too.
    const isAtBound = best[this.#statusAt] === fitStatus.atBound;
    if (isGood() && !isAtBound) return best;
    attempt(this.#ownStart(counts));
    for (const [widening, shift] of multiStart) {
      if (isGood()) return best;
      attempt(this.#movedStart(counts, widening, shift));
    }
    return best;
  }

  /** What a row leaves out: nothing where every component was kept. */
  #fallback(row: Float64Array, counts: Float64Array): Float64Array {
    const { quantities } = this.layout;
    for (let i = 0; i < quantities.length; i++) {
      if (quantities[i].parameter >= 0 && Number.isNaN(row[i])) return this.#ownStart(counts);
    }
    return this.#planned;
  }

  /** The plan's start, with areas and levels solved for. */
  #ownStart(counts: Float64Array): Float64Array {
    const start = this.#planned.slice();
    this.#linear.fill(counts, start);
    return start;
  }

  #movedStart(counts: Float64Array, widening: number, shift: number): Float64Array {
    const { plan, least, most } = this.fitter.model;
    const start = this.#planned.slice();
    for (const { first, count } of plan.components) {
      const own = Array.from({ length: count }, (_, i) => first + i);
      const isWidth = (index: number): boolean => widthNames.includes(plan.parameters[index].name);
      const whole = own.filter(isWidth).reduce((sum, index) => sum + start[index], 0);
      for (const index of own) {
        const { name, isFixed, tie } = plan.parameters[index];
        if (isFixed || tie !== null) continue;
        if (isWidth(index)) start[index] *= widening;
        if (name === 'centre') start[index] += shift * whole;
        start[index] = Math.min(Math.max(start[index], least[index]), most[index]);
      }
    }
    this.#linear.fill(counts, start);
    return start;
  }

  /** The status of a spectrum that cannot be fitted at all; null for one that can. */
  #refusal(counts: Float64Array, channels: number): number | null {
    const { plan, everything } = this.fitter.model;
    const { length: free } = this.fitter.layoutOf(everything).free;
    if (channels <= free) return fitStatus.notFitted;
    return isTooDim(counts, plan.noise, free) ? fitStatus.tooDim : null;
  }

  #isFit(row: Float64Array): boolean {
    const status = row[this.#statusAt];
    return status === fitStatus.converged || status === fitStatus.atBound;
  }

  #isGood(row: Float64Array, channels: number, usualChi2r: number): boolean {
    return this.#isFit(row) && this.#isUsual(row, channels, usualChi2r);
  }

  #isUsual(row: Float64Array, channels: number, usualChi2r: number): boolean {
    const isUniform = this.fitter.model.plan.noise.kind === 'uniform';
    if (Number.isNaN(usualChi2r)) return isUniform || row[this.#chi2rAt] < 2;
    const spread = 1 + suspiciousSigmas * Math.sqrt(2 / channels);
    const usual = isUniform ? 2 * usualChi2r : Math.max(1, usualChi2r);
    return row[this.#chi2rAt] <= usual * spread;
  }

  /** A fit that converged beats one that did not; otherwise the lower criterion wins, by more than rounding. */
  #isBetter(one: Float64Array, other: Float64Array): boolean {
    const isOne = this.#isFit(one);
    if (isOne !== this.#isFit(other)) return isOne;
    return this.#criterion(one) < this.#criterion(other) - 1e-9;
  }

  /** The Bayesian information criterion: two tries may have kept other components. */
  #criterion(row: Float64Array): number {
    const { found, model } = this.fitter;
    const deviance = row[this.#devianceAt];
    const isUniform = model.plan.noise.kind === 'uniform';
    const misfit = isUniform ? found.channels * log(deviance / found.channels) : deviance;
    return misfit + row[this.#freeCountAt] * log(found.channels);
  }

  #writeEmpty(row: Float64Array, status: number): Float64Array {
    row.fill(Number.NaN);
    row[this.#statusAt] = status;
    row[qualityAt(this.layout, 'iterations')] = 0;
    row[this.#freeCountAt] = 0;
    return row;
  }

  #own(values: Float64Array, first: number, count: number): Float64Array {
    const own = this.#ownValues;
    for (let i = 0; i < count; i++) own[i] = values[first + i];
    return own;
  }

  #write(row: Float64Array, found: ChosenFit): void {
    const { quantities } = this.layout;
    const { components } = this.fitter.model.plan;
    const count = quantities.length;
    row.fill(Number.NaN);
    for (let i = 0; i < count; i++) {
      const quantity = quantities[i];
      if (quantity.kind === 'needed') row[i] = found.needed[quantity.component];
      if (!found.isIn[quantity.component] || quantity.kind === 'needed') continue;
      if (quantity.kind === 'parameter') {
        row[i] = found.values[quantity.parameter];
        row[count + i] = found.errors[quantity.parameter];
        continue;
      }
      const { first, count: own } = components[quantity.component];
      const derived = this.#derived.of(quantity, this.#own(found.values, first, own));
      row[i] = derived.value;
      row[count + i] = propagatedError(found, first, own, derived.gradient);
    }
    row[this.#chi2rAt] = found.chi2r;
    row[this.#statusAt] = found.status;
    row[qualityAt(this.layout, 'iterations')] = found.iterations;
    row[this.#devianceAt] = found.deviance + this.fitter.kernel.dataPart();
    row[this.#freeCountAt] = found.freeCount;
  }
}
