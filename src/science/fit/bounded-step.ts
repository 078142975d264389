/** The step to the lowest point of a parabola within bounds: clip what crosses its bound, solve for the rest. */
import { ScaledCholesky } from './scaled-cholesky';

/** One step's problem: the parabola D(x + δ) = D − 2 gᵀδ + δᵀHδ and how far each parameter may go. */
export interface StepProblem {
  /** (size, size), symmetric, whole */
  readonly matrix: Float64Array;
  /** (size), minus half the slope of D */
  readonly gradient: Float64Array;
  /** (size) */
  readonly values: Float64Array;
  readonly least: Float64Array;
  readonly most: Float64Array;
}

export class BoundedStep {
  readonly #size: number;
  readonly #isHeld: Uint8Array;
  readonly #right: Float64Array;
  readonly #trial: Float64Array;
  readonly cholesky: ScaledCholesky;
  /** (size) the step found */
  readonly step: Float64Array;
  /** how much the parabola falls along `step` */
  gain = 0;

  constructor(size: number) {
    this.#size = size;
    this.#isHeld = new Uint8Array(size);
    this.#right = new Float64Array(size);
    this.#trial = new Float64Array(size);
    this.cholesky = new ScaledCholesky(size);
    this.step = new Float64Array(size);
  }

  /** Finds `step` and `gain`; a parameter at a bound with the slope against it stays there. */
  find(problem: StepProblem, damping: number): void {
    const { gradient, values, least, most } = problem;
    const size = this.#size;
    const { step } = this;
    const isHeld = this.#isHeld;
    const trial = this.#trial;
    for (let i = 0; i < size; i++) {
      isHeld[i] = isOutward(gradient[i], values[i], least[i], most[i]) ? 1 : 0;
      step[i] = 0;
    }
    for (let turn = 0; turn <= size; turn++) {
      this.#solve(problem, damping);
      let hasCrossed = false;
      for (let i = 0; i < size; i++) {
        if (isHeld[i] === 1) continue;
        const to = values[i] + trial[i];
        if (to >= least[i] && to <= most[i]) continue;
        step[i] = (to < least[i] ? least[i] : most[i]) - values[i];
        isHeld[i] = 1;
        hasCrossed = true;
      }
      if (!hasCrossed) break;
    }
    for (let i = 0; i < size; i++) if (isHeld[i] === 0) step[i] = trial[i];
    this.gain = parabolaFall(problem, step, size);
  }

  /** Of the parameters that are not held, with those that are moved by what `step` says. */
  #solve({ matrix, gradient }: StepProblem, damping: number): void {
    const size = this.#size;
    const right = this.#right;
    const isHeld = this.#isHeld;
    for (let i = 0; i < size; i++) {
      let sum = gradient[i];
      for (let j = 0; j < size; j++) {
        if (isHeld[j] === 1) sum -= matrix[i * size + j] * this.step[j];
      }
      right[i] = sum;
    }
    this.cholesky.factor(matrix, isHeld, damping);
    this.cholesky.solve(right, this.#trial);
  }
}

function isOutward(gradient: number, value: number, least: number, most: number): boolean {
  return (value <= least && gradient <= 0) || (value >= most && gradient >= 0);
}

/** 2 gᵀδ − δᵀHδ. */
export function parabolaFall(
  { matrix, gradient }: StepProblem,
  step: Float64Array,
  size: number,
): number {
  let fall = 0;
  for (let i = 0; i < size; i++) {
    let curve = 0;
    for (let j = 0; j < size; j++) curve += matrix[i * size + j] * step[j];
    fall += step[i] * (2 * gradient[i] - curve);
  }
  return fall;
}

/** The same along a share of the step: the slope counts in full, the curve by the square. */
export function partOfFall(
  { gradient }: StepProblem,
  { step, gain }: BoundedStep,
  share: number,
): number {
  if (share === 1) return gain;
  let slope = 0;
  for (let i = 0; i < step.length; i++) slope += 2 * gradient[i] * step[i];
  return share * slope - share * share * (slope - gain);
}
