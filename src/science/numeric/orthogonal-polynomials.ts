/** Polynomial least squares without the ill-conditioned powers: polynomials orthogonal on the points themselves. */

/** A polynomial of some degree through points, and what the fit knows of itself. */
export interface PolynomialFit {
  readonly at: (x: number) => number;
  /** its first derivative */
  readonly slopeAt: (x: number) => number;
  /** y less the polynomial, one for each point */
  readonly residuals: Float64Array;
  /** how much each point pulls the curve its own way, 0 to 1; they add up to degree + 1 */
  readonly leverages: Float64Array;
}

/**
 * Least squares with the polynomials that are orthonormal on the points, made by a three-term recurrence.
 *
 * @param x - distinct where weights are above 0; more of them than the degree
 * @param weights - one for each point, 0 leaves it out; null for all alike
 * @see G. E. Forsythe, J. Soc. Indust. Appl. Math. 5, 74 (1957)
 */
export class PolynomialBasis {
  readonly #weights: Float64Array;
  /** recurrence: γ[j+1] p[j+1] = (x − α[j]) p[j] − γ[j] p[j−1] */
  readonly #alpha: number[] = [];
  readonly #gamma: number[] = [];
  /** values on the points, one array for each degree */
  readonly #values: Float64Array[] = [];
  readonly #centre: number;
  readonly #half: number;

  constructor(x: ArrayLike<number>, degree: number, weights: ArrayLike<number> | null = null) {
    const xs = Float64Array.from(x);
    this.#weights =
      weights === null ? new Float64Array(xs.length).fill(1) : Float64Array.from(weights);
    const low = xs.reduce((least, value) => Math.min(least, value), Number.POSITIVE_INFINITY);
    const high = xs.reduce((most, value) => Math.max(most, value), Number.NEGATIVE_INFINITY);
    this.#centre = (low + high) / 2;
    this.#half = high > low ? (high - low) / 2 : 1;
    const scaled = xs.map((value) => this.#scale(value));
    let previous: Float64Array = new Float64Array(xs.length);
    let current: Float64Array = new Float64Array(xs.length).fill(1);
    for (let j = 0; j <= degree; j++) {
      const norm = Math.sqrt(this.#dot(current, current));
      current = current.map((value) => value / norm);
      this.#gamma.push(norm);
      this.#values.push(current);
      const times = current.map((value, i) => scaled[i] * value);
      const alpha = this.#dot(times, current);
      this.#alpha.push(alpha);
      const before = previous;
      const here = current;
      previous = here;
      current = times.map((value, i) => value - alpha * here[i] - norm * before[i]);
    }
  }

  fit(y: ArrayLike<number>): PolynomialFit {
    const ys = Float64Array.from(y);
    const coefficients = this.coefficients(ys);
    const fitted = this.fitted(coefficients, new Float64Array(ys.length));
    const leverages = ys.map((_, i) => {
      const sum = this.#values.reduce((total, values) => total + values[i] * values[i], 0);
      return this.#weights[i] * sum;
    });
    return {
      at: (x) => this.#at(x, coefficients).value,
      slopeAt: (x) => this.#at(x, coefficients).slope,
      residuals: ys.map((value, i) => value - fitted[i]),
      leverages,
    };
  }

  /** Of the orthonormal polynomials; a point of weight 0 may be NaN. */
  coefficients(y: Float64Array): Float64Array {
    return Float64Array.from(this.#values, (values) => {
      let sum = 0;
      for (let i = 0; i < y.length; i++) {
        if (this.#weights[i] !== 0) sum += this.#weights[i] * values[i] * y[i];
      }
      return sum;
    });
  }

  /**
   * Least squares over some of the points: coefficients in the same polynomials, which are no longer
   * orthogonal there, by Cholesky's way.
   *
   * @param taken - one for each point, 1 takes it and 0 leaves it out (then y may be NaN)
   * @returns null where the points taken do not fix the polynomial
   */
  partOf(y: Float64Array, taken: Float64Array): Float64Array | null {
    const size = this.#values.length;
    const matrix = new Float64Array(size * size);
    const right = new Float64Array(size);
    for (let j = 0; j < size; j++) {
      const own = this.#values[j];
      for (let i = 0; i <= j; i++) {
        const other = this.#values[i];
        let sum = 0;
        for (let p = 0; p < own.length; p++) sum += taken[p] * own[p] * other[p];
        matrix[j * size + i] = sum;
      }
      let sum = 0;
      for (let p = 0; p < own.length; p++) if (taken[p] !== 0) sum += taken[p] * own[p] * y[p];
      right[j] = sum;
    }
    return solvePositive(matrix, right);
  }

  /** The polynomial on the points. */
  fitted(coefficients: Float64Array, out: Float64Array): Float64Array {
    out.fill(0);
    for (let j = 0; j < coefficients.length; j++) {
      const values = this.#values[j];
      const coefficient = coefficients[j];
      for (let i = 0; i < out.length; i++) out[i] += coefficient * values[i];
    }
    return out;
  }

  #at(x: number, coefficients: Float64Array): { readonly value: number; readonly slope: number } {
    const scaled = this.#scale(x);
    let before = 0;
    let here = 1 / this.#gamma[0];
    let slopeBefore = 0;
    let slopeHere = 0;
    let value = coefficients[0] * here;
    let slope = 0;
    for (let j = 1; j < coefficients.length; j++) {
      const from = scaled - this.#alpha[j - 1];
      const next = (from * here - this.#gamma[j - 1] * before) / this.#gamma[j];
      const slopeNext =
        (here + from * slopeHere - this.#gamma[j - 1] * slopeBefore) / this.#gamma[j];
      before = here;
      here = next;
      slopeBefore = slopeHere;
      slopeHere = slopeNext;
      value += coefficients[j] * here;
      slope += coefficients[j] * slopeHere;
    }
    return { value, slope: slope / this.#half };
  }

  #scale(x: number): number {
    return (x - this.#centre) / this.#half;
  }

  #dot(a: Float64Array, b: Float64Array): number {
    let sum = 0;
    for (let i = 0; i < a.length; i++) sum += this.#weights[i] * a[i] * b[i];
    return sum;
  }
}

/** Pivots below this are rounding: the matrix has 1 at most on its diagonal. */
const leastPivot = 1e-13;

/** A x = b for a symmetric positive A, lower half given; both overwritten. Null where A is singular. */
function solvePositive(a: Float64Array, b: Float64Array): Float64Array | null {
  const n = b.length;
  for (let j = 0; j < n; j++) {
    for (let i = j; i < n; i++) {
      let sum = a[i * n + j];
      for (let k = 0; k < j; k++) sum -= a[i * n + k] * a[j * n + k];
      if (i > j) a[i * n + j] = sum / a[j * n + j];
      else if (!(sum > leastPivot)) return null;
      else a[j * n + j] = Math.sqrt(sum);
    }
  }
  for (let i = 0; i < n; i++) {
    for (let k = 0; k < i; k++) b[i] -= a[i * n + k] * b[k];
    b[i] /= a[i * n + i];
  }
  for (let i = n - 1; i >= 0; i--) {
    for (let k = i + 1; k < n; k++) b[i] -= a[k * n + i] * b[k];
    b[i] /= a[i * n + i];
  }
  return b;
}
