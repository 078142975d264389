/** Small symmetric systems, scaled to a unit diagonal; what the data do not determine is left alone. */

/** A pivot below this share of its diagonal is rounding: the parameter is a mixture of the others. */
const leastPivot = 1e-11;

/** Factor of a symmetric positive matrix of which only some rows count. */
export class ScaledCholesky {
  readonly #size: number;
  readonly #factor: Float64Array;
  readonly #scale: Float64Array;
  readonly #solution: Float64Array;
  readonly #unit: Float64Array;
  readonly #column: Float64Array;
  /** by row, 1 where it counts and is determined */
  readonly isSolved: Uint8Array;

  constructor(size: number) {
    this.#size = size;
    this.#factor = new Float64Array(size * size);
    this.#scale = new Float64Array(size);
    this.#solution = new Float64Array(size);
    this.#unit = new Float64Array(size);
    this.#column = new Float64Array(size);
    this.isSolved = new Uint8Array(size);
  }

  /**
   * Factors A + damping · diagonal of A.
   *
   * @param matrix - (size, size), lower triangle read
   * @param isHeld - by row, 1 to leave it out
   * @returns whether every row that counts is determined
   */
  factor(matrix: Float64Array, isHeld: Uint8Array, damping: number): boolean {
    const size = this.#size;
    const factor = this.#factor;
    const scale = this.#scale;
    const { isSolved } = this;
    let isWhole = true;
    for (let i = 0; i < size; i++) {
      const diagonal = matrix[i * size + i];
      const counts = isHeld[i] === 0;
      isSolved[i] = counts && diagonal > 0 && diagonal < Number.POSITIVE_INFINITY ? 1 : 0;
      scale[i] = isSolved[i] === 1 ? 1 / Math.sqrt(diagonal) : 0;
      if (counts && isSolved[i] === 0) isWhole = false;
    }
    for (let i = 0; i < size; i++) {
      if (isSolved[i] === 0) continue;
      for (let j = 0; j <= i; j++) {
        if (isSolved[j] === 0) continue;
        let sum = matrix[i * size + j] * scale[i] * scale[j];
        if (i === j) sum += damping;
        for (let k = 0; k < j; k++) {
          if (isSolved[k] === 1) sum -= factor[i * size + k] * factor[j * size + k];
        }
        if (j < i) factor[i * size + j] = sum / factor[j * size + j];
        else if (sum > leastPivot) factor[i * size + i] = Math.sqrt(sum);
        else {
          isSolved[i] = 0;
          isWhole = false;
        }
      }
    }
    return isWhole;
  }

  /** Solves for one right side; 0 in rows that are left out or not determined. */
  solve(right: Float64Array, out: Float64Array): void {
    const size = this.#size;
    const factor = this.#factor;
    const scale = this.#scale;
    const { isSolved } = this;
    const y = this.#solution;
    for (let i = 0; i < size; i++) {
      y[i] = 0;
      if (isSolved[i] === 0) continue;
      let sum = right[i] * scale[i];
      for (let k = 0; k < i; k++) if (isSolved[k] === 1) sum -= factor[i * size + k] * y[k];
      y[i] = sum / factor[i * size + i];
    }
    for (let i = size - 1; i >= 0; i--) {
      out[i] = 0;
      if (isSolved[i] === 0) continue;
      let sum = y[i];
      for (let k = i + 1; k < size; k++) {
        if (isSolved[k] === 1) sum -= factor[k * size + i] * y[k];
      }
      y[i] = sum / factor[i * size + i];
      out[i] = y[i] * scale[i];
    }
  }

  /**
   * The inverse: NaN in rows and columns that are left out or not determined.
   *
   * @param out - (size, size), overwritten
   */
  invert(out: Float64Array): void {
    const size = this.#size;
    const unit = this.#unit;
    const column = this.#column;
    for (let j = 0; j < size; j++) {
      unit.fill(0);
      unit[j] = 1;
      this.solve(unit, column);
      for (let i = 0; i < size; i++) {
        const isKnown = this.isSolved[i] === 1 && this.isSolved[j] === 1;
        out[i * size + j] = isKnown ? column[i] : Number.NaN;
      }
    }
  }
}
