/**
 * The curve z that is close to y and smooth: minimum of Σ w (y − z)² + λ Σ (Δ²z)². A banded system of five
 * diagonals, solved in a time proportional to the number of channels.
 */

/**
 * Whittaker's smoother of second differences, weighted.
 *
 * (W + λ D′D) z = W y by Cholesky's L D L′ without filling the band. Needs at least two weights above 0
 * (with fewer, the system has no one solution: the curve is then not a number). One instance serves many
 * spectra of the same length.
 *
 * @see P. H. C. Eilers, Anal. Chem. 75, 3631 (2003); band Cholesky: G. H. Golub and C. F. Van Loan, Matrix
 * Computations, section 4.3 (from memory)
 */
export class PenalisedSmoother {
  readonly #penalty: readonly [Float64Array, Float64Array, Float64Array];
  readonly #inverse: Float64Array;
  readonly #first: Float64Array;
  readonly #second: Float64Array;

  /**
   * @param n - channels, at least 3
   * @param smoothness - λ, above 0
   */
  constructor(n: number, smoothness: number) {
    this.#penalty = secondDifferencePenalty(n, smoothness);
    this.#inverse = new Float64Array(n);
    this.#first = new Float64Array(n);
    this.#second = new Float64Array(n);
  }

  /**
   * @param y - (n); not read where the weight is 0
   * @param weights - (n), 0 or more
   * @param out - (n) the curve; must not be y
   */
  solve(y: Float64Array, weights: Float64Array, out: Float64Array): void {
    const n = out.length;
    const [main, next, last] = this.#penalty;
    const inverse = this.#inverse;
    const first = this.#first;
    const second = this.#second;
    // L has rows (… second, first, 1); d is kept as its inverse. Forward substitution on the way.
    let d1 = 0;
    let d2 = 0;
    let z1 = 0;
    let z2 = 0;
    for (let i = 0; i < n; i++) {
      const w = weights[i];
      const l2 = i < 2 ? 0 : last[i - 2] * inverse[i - 2];
      const l1 = i < 1 ? 0 : (next[i - 1] - (i < 2 ? 0 : l2 * d2 * first[i - 1])) * inverse[i - 1];
      const d = w + main[i] - l1 * l1 * d1 - l2 * l2 * d2;
      const z = (w === 0 ? 0 : w * y[i]) - l1 * z1 - l2 * z2;
      inverse[i] = 1 / d;
      first[i] = l1;
      second[i] = l2;
      out[i] = z;
      d2 = d1;
      d1 = d;
      z2 = z1;
      z1 = z;
    }
    let after1 = 0;
    let after2 = 0;
    for (let i = n - 1; i >= 0; i--) {
      const l1 = i + 1 < n ? first[i + 1] : 0;
      const l2 = i + 2 < n ? second[i + 2] : 0;
      const value = out[i] * inverse[i] - l1 * after1 - l2 * after2;
      out[i] = value;
      after2 = after1;
      after1 = value;
    }
  }
}

/** λ D′D of second differences: its diagonal, and the two beside it. */
function secondDifferencePenalty(
  n: number,
  smoothness: number,
): readonly [Float64Array, Float64Array, Float64Array] {
  const main = new Float64Array(n);
  const next = new Float64Array(n);
  const last = new Float64Array(n);
  for (let i = 0; i + 2 < n; i++) {
    main[i] += smoothness;
    main[i + 1] += 4 * smoothness;
    main[i + 2] += smoothness;
    next[i] -= 2 * smoothness;
    next[i + 1] -= 2 * smoothness;
    last[i] += smoothness;
  }
  return [main, next, last];
}
