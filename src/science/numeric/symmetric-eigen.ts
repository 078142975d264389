/** Eigenvalues of a symmetric matrix, all of them, and the eigenvectors of the greatest. */
import { RimlightError } from '../../errors';
import { createRandom } from './random';

/** A square matrix, (n × n), row by row. */
export interface SquareMatrix {
  readonly n: number;
  readonly values: Float64Array;
}

/** Diagonal (n) and the entries beside it (n, the first unused). */
interface Tridiagonal {
  readonly main: Float64Array;
  readonly beside: Float64Array;
  /** rows of the Householder vectors that led to it, (n × n), and their factors 2/v′v (n) */
  readonly reflectors: Float64Array;
  readonly factors: Float64Array;
}

/**
 * Reduction to three diagonals by reflections; eigenvalues there by bisection on the number of negative
 * pivots; eigenvectors by inverse iteration, each kept orthogonal to those before. Every sum in a fixed
 * order, so equal bits for equal matrices.
 *
 * @see G. H. Golub and C. F. Van Loan, Matrix Computations, 3rd ed. (1996), sections 8.3.1, 8.4.1, 8.2.2, from memory
 */
export class SymmetricEigen {
  /** (n) descending; good to about n × 1e-16 of the greatest */
  readonly values: Float64Array;
  readonly #tridiagonal: Tridiagonal;

  /** @param matrix - both halves filled in; overwritten */
  constructor(matrix: SquareMatrix) {
    this.#tridiagonal = tridiagonalise(matrix);
    this.values = eigenvaluesOf(this.#tridiagonal);
  }

  /**
   * Eigenvectors of the `count` greatest eigenvalues, orthonormal; the component of greatest size is
   * positive.
   */
  vectors(count: number): readonly Float64Array[] {
    const n = this.values.length;
    if (count > n) {
      throw new RimlightError('fault', {
        what: `a matrix of ${n} rows has no ${count} eigenvectors`,
        where: '',
        hint: 'Please report this.',
      });
    }
    const found: Float64Array[] = [];
    for (let i = 0; i < count; i++) {
      found.push(inverseIteration(this.#tridiagonal, this.values[i], found, i));
    }
    return found.map((vector) => turnedUp(reflectedBack(vector, this.#tridiagonal)));
  }
}

function tridiagonalise({ n, values: a }: SquareMatrix): Tridiagonal {
  const reflectors = new Float64Array(n * n);
  const factors = new Float64Array(n);
  const beside = new Float64Array(n);
  const p = new Float64Array(n);
  for (let k = 0; k + 2 < n; k++) {
    const v = reflectors.subarray(k * n, (k + 1) * n);
    let rest = 0;
    for (let i = k + 2; i < n; i++) rest += a[k * n + i] * a[k * n + i];
    const lead = a[k * n + k + 1];
    beside[k + 1] = lead;
    if (rest === 0) continue;
    const length = Math.sqrt(lead * lead + rest);
    const image = lead > 0 ? -length : length;
    for (let i = k + 1; i < n; i++) v[i] = a[k * n + i];
    v[k + 1] = lead - image;
    beside[k + 1] = image;
    const factor = 2 / (v[k + 1] * v[k + 1] + rest);
    factors[k] = factor;
    reflect(a, v, p, factor, n, k + 1);
  }
  if (n > 1) beside[n - 1] = a[(n - 2) * n + n - 1];
  const main = Float64Array.from({ length: n }, (_, i) => a[i * n + i]);
  return { main, beside, reflectors, factors };
}

/** A ← H A H on rows and columns from `from` on, H = 1 − factor v v′. */
function reflect(
  a: Float64Array,
  v: Float64Array,
  p: Float64Array,
  factor: number,
  n: number,
  from: number,
): void {
  let pv = 0;
  for (let i = from; i < n; i++) {
    const row = i * n;
    let sum = 0;
    for (let j = from; j < n; j++) sum += a[row + j] * v[j];
    p[i] = factor * sum;
    pv += p[i] * v[i];
  }
  const half = (factor * pv) / 2;
  for (let i = from; i < n; i++) p[i] -= half * v[i];
  for (let i = from; i < n; i++) {
    const row = i * n;
    const vi = v[i];
    const pi = p[i];
    for (let j = from; j < n; j++) a[row + j] -= vi * p[j] + pi * v[j];
  }
}

function eigenvaluesOf({ main, beside }: Tridiagonal): Float64Array {
  const n = main.length;
  let low = Number.POSITIVE_INFINITY;
  let high = Number.NEGATIVE_INFINITY;
  for (let i = 0; i < n; i++) {
    const reach = Math.abs(beside[i]) * (i > 0 ? 1 : 0) + (i + 1 < n ? Math.abs(beside[i + 1]) : 0);
    low = Math.min(low, main[i] - reach);
    high = Math.max(high, main[i] + reach);
  }
  const values = new Float64Array(n);
  const tiniest = 1e-16 * Math.max(Math.abs(low), Math.abs(high));
  let above = high;
  for (let i = 0; i < n; i++) {
    // The i-th greatest: n − 1 − i eigenvalues are less.
    let a = low;
    let b = above;
    for (let turn = 0; turn < 120; turn++) {
      const middle = a + (b - a) / 2;
      if (b - a <= tiniest || middle <= a || middle >= b) break;
      if (countBelow(main, beside, middle, tiniest) <= n - 1 - i) a = middle;
      else b = middle;
    }
    values[i] = a + (b - a) / 2;
    above = b;
  }
  return values;
}

/** How many eigenvalues lie below x: the negative pivots of T − x. */
function countBelow(main: Float64Array, beside: Float64Array, x: number, tiniest: number): number {
  let count = 0;
  let pivot = 1;
  for (let i = 0; i < main.length; i++) {
    pivot = main[i] - x - (i === 0 ? 0 : (beside[i] * beside[i]) / pivot);
    if (Math.abs(pivot) < tiniest * 1e-3) pivot = -tiniest * 1e-3 - Number.MIN_VALUE;
    if (pivot < 0) count++;
  }
  return count;
}

/** Rounds that an eigenvector needs at most from a random start. */
const rounds = 4;

function inverseIteration(
  { main, beside }: Tridiagonal,
  value: number,
  before: readonly Float64Array[],
  stream: number,
): Float64Array {
  const n = main.length;
  const random = createRandom(1, stream);
  const vector = Float64Array.from({ length: n }, () => random.uniform() - 0.5);
  const solver = new ShiftedSolver(main, beside, value);
  for (let round = 0; round < rounds; round++) {
    normalise(vector);
    solver.solve(vector);
    for (const earlier of before) {
      let overlap = 0;
      let size = 0;
      for (let i = 0; i < n; i++) {
        overlap += earlier[i] * vector[i];
        size = Math.max(size, Math.abs(vector[i]));
      }
      if (size === 0) continue;
      for (let i = 0; i < n; i++) vector[i] -= overlap * earlier[i];
    }
  }
  normalise(vector);
  return vector;
}

/** (T − x) z = y by elimination with exchanged rows. */
class ShiftedSolver {
  readonly #pivots: Float64Array;
  readonly #next: Float64Array;
  readonly #afterNext: Float64Array;
  readonly #times: Float64Array;
  readonly #isExchanged: Uint8Array;

  constructor(main: Float64Array, beside: Float64Array, x: number) {
    const n = main.length;
    this.#pivots = new Float64Array(n);
    this.#next = new Float64Array(n);
    this.#afterNext = new Float64Array(n);
    this.#times = new Float64Array(n);
    this.#isExchanged = new Uint8Array(n);
    let scale = 0;
    for (let i = 0; i < n; i++) scale = Math.max(scale, Math.abs(main[i]), Math.abs(beside[i]));
    const tiny = 2.2e-16 * (scale > 0 ? scale : 1);
    let pivot = main[0] - x;
    let right = n > 1 ? beside[1] : 0;
    for (let i = 0; i + 1 < n; i++) {
      const under = beside[i + 1];
      const own = main[i + 1] - x;
      const ownRight = i + 2 < n ? beside[i + 2] : 0;
      if (Math.abs(under) > Math.abs(pivot)) {
        this.#isExchanged[i] = 1;
        const times = pivot / under;
        this.#set(i, under, own, ownRight, times);
        pivot = right - times * own;
        right = -times * ownRight;
      } else {
        const safe = Math.abs(pivot) < tiny ? tiny : pivot;
        const times = under / safe;
        this.#set(i, safe, right, 0, times);
        pivot = own - times * right;
        right = ownRight;
      }
    }
    this.#set(n - 1, Math.abs(pivot) < tiny ? tiny : pivot, 0, 0, 0);
  }

  #set(i: number, pivot: number, next: number, afterNext: number, times: number): void {
    this.#pivots[i] = pivot;
    this.#next[i] = next;
    this.#afterNext[i] = afterNext;
    this.#times[i] = times;
  }

  solve(y: Float64Array): void {
    const n = y.length;
    for (let i = 0; i + 1 < n; i++) {
      if (this.#isExchanged[i] === 1) {
        const upper = y[i];
        y[i] = y[i + 1];
        y[i + 1] = upper;
      }
      y[i + 1] -= this.#times[i] * y[i];
    }
    for (let i = n - 1; i >= 0; i--) {
      const one = i + 1 < n ? this.#next[i] * y[i + 1] : 0;
      const two = i + 2 < n ? this.#afterNext[i] * y[i + 2] : 0;
      y[i] = (y[i] - one - two) / this.#pivots[i];
    }
  }
}

function normalise(vector: Float64Array): void {
  let most = 0;
  for (const value of vector) most = Math.max(most, Math.abs(value));
  if (most === 0) return;
  let squares = 0;
  for (const value of vector) squares += (value / most) * (value / most);
  const length = most * Math.sqrt(squares);
  for (let i = 0; i < vector.length; i++) vector[i] /= length;
}

/** From the basis of the three diagonals to the matrix' own. */
function reflectedBack(vector: Float64Array, { reflectors, factors }: Tridiagonal): Float64Array {
  const n = vector.length;
  for (let k = n - 3; k >= 0; k--) {
    if (factors[k] === 0) continue;
    const row = k * n;
    let sum = 0;
    for (let i = k + 1; i < n; i++) sum += reflectors[row + i] * vector[i];
    sum *= factors[k];
    for (let i = k + 1; i < n; i++) vector[i] -= sum * reflectors[row + i];
  }
  return vector;
}

function turnedUp(vector: Float64Array): Float64Array {
  let greatest = 0;
  for (let i = 1; i < vector.length; i++) {
    if (Math.abs(vector[i]) > Math.abs(vector[greatest])) greatest = i;
  }
  return vector[greatest] < 0 ? vector.map((value) => -value) : vector;
}
