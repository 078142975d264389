/** Areas and levels that have no start: solved from the spectrum itself, where widths and centres are given. */
import { isPeak } from '../peaks/shape-by-name';
import { type FitModel, followTies } from './fit-model';
import { ScaledCholesky } from './scaled-cholesky';

export class LinearStarts {
  readonly #model: FitModel;
  /** parameters to be solved for */
  readonly #wanted: readonly number[];
  readonly #counts: Float64Array;
  readonly #columns: readonly Float64Array[];
  readonly #combined: readonly Float64Array[];
  readonly #cholesky: ScaledCholesky;

  constructor(model: FitModel) {
    const { plan, shapes, grid } = model;
    const { length } = grid.centresEv;
    this.#model = model;
    this.#wanted = plan.components.flatMap(({ first, count }, c) =>
      Array.from({ length: count }, (_, i) => first + i).filter((index) => {
        const { start, tie } = plan.parameters[index];
        return start === null && tie === null && shapes[c].parameters[index - first].isLinear;
      }),
    );
    this.#counts = new Float64Array(length);
    this.#columns = plan.parameters.map(() => new Float64Array(length));
    this.#combined = this.#wanted.map(() => new Float64Array(length));
    this.#cholesky = new ScaledCholesky(this.#wanted.length);
  }

  /**
   * Fills in what has no start, by least squares weighted by the counts. A peak that would be negative
   * begins at its own uncertainty.
   *
   * @param counts - (n), NaN where there is no data
   * @param values - (parameters) with starts; those without one are overwritten
   */
  fill(counts: Float64Array, values: Float64Array): void {
    const size = this.#wanted.length;
    if (size === 0) return;
    this.#evaluate(values);
    const matrix = new Float64Array(size * size);
    const right = new Float64Array(size);
    const combined = this.#combined;
    for (let k = 0; k < counts.length; k++) {
      if (Number.isNaN(counts[k])) continue;
      const weight = 1 / Math.max(1, Math.abs(counts[k]));
      for (let i = 0; i < size; i++) {
        const part = weight * combined[i][k];
        right[i] += part * (counts[k] - this.#counts[k]);
        for (let j = 0; j <= i; j++) matrix[i * size + j] += part * combined[j][k];
      }
    }
    const solution = new Float64Array(size);
    this.#cholesky.factor(matrix, new Uint8Array(size), 1e-9);
    this.#cholesky.solve(right, solution);
    this.#put(solution, matrix, values);
  }

  /** Counts without what is wanted, and the derivative by each of it, tied ones included. */
  #evaluate(values: Float64Array): void {
    const { plan, shapes, grid } = this.#model;
    for (const index of this.#wanted) values[index] = 0;
    followTies(plan, values);
    this.#counts.fill(0);
    for (const column of this.#columns) column.fill(0);
    for (const column of this.#combined) column.fill(0);
    for (const [c, { first, count }] of plan.components.entries()) {
      const own = values.slice(first, first + count);
      const columns = this.#columns.slice(first, first + count);
      shapes[c].evaluate(grid, own, this.#counts, columns);
      for (let i = first; i < first + count; i++) {
        if (shapes[c].parameters[i - first].isLinear) this.#add(i);
      }
    }
  }

  #add(index: number): void {
    const { tie } = this.#model.plan.parameters[index];
    const at = this.#wanted.indexOf(tie?.to ?? index);
    if (at < 0) return;
    const times = tie?.times ?? 1;
    const column = this.#columns[index];
    const combined = this.#combined[at];
    for (let k = 0; k < column.length; k++) combined[k] += times * column[k];
  }

  #put(solution: Float64Array, matrix: Float64Array, values: Float64Array): void {
    const { plan, shapes, least, most } = this.#model;
    const size = this.#wanted.length;
    for (const [i, index] of this.#wanted.entries()) {
      const owner = plan.components.findIndex(({ first }) => first === index);
      const isArea = owner >= 0 && isPeak(shapes[owner]);
      const spread = matrix[i * size + i] > 0 ? 1 / Math.sqrt(matrix[i * size + i]) : 1;
      const value = isArea && solution[i] <= 0 ? spread : solution[i];
      values[index] = Math.min(Math.max(value, least[index]), most[index]);
    }
    followTies(plan, values);
  }
}
