/** The Fisher information of a fit's free parameters, from that of its columns; errors and covariance from it. */
import type { StepProblem } from './bounded-step';
import type { FitLayout, FitModel } from './fit-model';
import { ScaledCholesky } from './scaled-cholesky';

export class Information implements StepProblem {
  /** (used, used) and (used): what the kernel sums, at the values last tried */
  readonly usedMatrix: Float64Array;
  readonly usedGradient: Float64Array;
  /** (free, free) and (free): the same where the fit stands, of the free parameters, ties followed */
  readonly matrix: Float64Array;
  readonly gradient: Float64Array;
  readonly values: Float64Array;
  readonly least: Float64Array;
  readonly most: Float64Array;
  /** (parameters) values to be tried */
  readonly next: Float64Array;
  /** free parameters at a bound they press against, and the others */
  heldCount = 0;
  freeCount = 0;
  readonly #layout: FitLayout;
  readonly #cholesky: ScaledCholesky;
  readonly #isHeld: Uint8Array;
  readonly #inverse: Float64Array;
  #isFresh = true;

  constructor(layout: FitLayout, { plan, least, most }: FitModel) {
    const used = layout.used.length;
    const free = layout.free.length;
    this.#layout = layout;
    this.usedMatrix = new Float64Array(used * used);
    this.usedGradient = new Float64Array(used);
    this.matrix = new Float64Array(free * free);
    this.gradient = new Float64Array(free);
    this.values = new Float64Array(free);
    this.least = Float64Array.from(layout.free, (index) => least[index]);
    this.most = Float64Array.from(layout.free, (index) => most[index]);
    this.next = new Float64Array(plan.parameters.length);
    this.#cholesky = new ScaledCholesky(free);
    this.#isHeld = new Uint8Array(free);
    this.#inverse = new Float64Array(free * free);
  }

  /** The values tried are where the fit stands now. */
  accept(): void {
    this.#isFresh = true;
  }

  /** Begins a fit. */
  begin(): void {
    this.#isFresh = true;
  }

  /** From columns to free parameters, when the values tried were taken. */
  gather(values: Float64Array): void {
    if (!this.#isFresh) return;
    this.#isFresh = false;
    const { free, used, owner, slope } = this.#layout;
    const { usedMatrix, usedGradient, matrix, gradient } = this;
    const size = free.length;
    matrix.fill(0);
    gradient.fill(0);
    for (let i = 0; i < size; i++) this.values[i] = values[free[i]];
    for (let i = 0; i < used.length; i++) {
      gradient[owner[i]] += slope[i] * usedGradient[i];
      for (let j = 0; j <= i; j++) {
        const part = slope[i] * slope[j] * usedMatrix[i * used.length + j];
        matrix[owner[i] * size + owner[j]] += part;
        if (i !== j) matrix[owner[j] * size + owner[i]] += part;
      }
    }
  }

  /**
   * Inverts the information, without the parameters at a bound.
   *
   * @param values - (parameters) where the fit ended
   * @returns whether every other parameter is determined
   */
  finish(values: Float64Array): boolean {
    const { free } = this.#layout;
    const { gradient, least, most } = this;
    this.gather(values);
    this.heldCount = 0;
    for (let i = 0; i < free.length; i++) {
      const value = values[free[i]];
      const isHeld =
        (value <= least[i] && gradient[i] <= 0) || (value >= most[i] && gradient[i] >= 0);
      this.#isHeld[i] = isHeld ? 1 : 0;
      if (isHeld) this.heldCount++;
    }
    this.freeCount = free.length - this.heldCount;
    const isWhole = this.#cholesky.factor(this.matrix, this.#isHeld, 0);
    this.#cholesky.invert(this.#inverse);
    return isWhole;
  }

  /** @param scale - of every error */
  writeErrors(errors: Float64Array, scale: number, { plan }: FitModel): void {
    errors.fill(Number.NaN);
    for (let i = 0; i < errors.length; i++) if (plan.parameters[i].isFixed) errors[i] = 0;
    const { used, owner, slope } = this.#layout;
    const size = this.#layout.free.length;
    for (let i = 0; i < used.length; i++) {
      const variance = this.#inverse[owner[i] * size + owner[i]];
      errors[used[i]] = Math.abs(slope[i]) * Math.sqrt(variance) * scale;
    }
  }

  /** @param out - (parameters, parameters) */
  writeCovariance(out: Float64Array, scale: number, { plan }: FitModel): void {
    const count = plan.parameters.length;
    out.fill(Number.NaN);
    const { used, owner, slope } = this.#layout;
    const size = this.#layout.free.length;
    for (let i = 0; i < count; i++) {
      for (let j = 0; j < count; j++) {
        const isFixed = plan.parameters[i].isFixed || plan.parameters[j].isFixed;
        if (isFixed) out[i * count + j] = 0;
      }
    }
    for (let i = 0; i < used.length; i++) {
      for (let j = 0; j < used.length; j++) {
        const one = this.#inverse[owner[i] * size + owner[j]];
        out[used[i] * count + used[j]] = slope[i] * slope[j] * one * scale * scale;
      }
    }
  }
}
