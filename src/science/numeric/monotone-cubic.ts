/** Smooth interpolation that neither overshoots nor invents bumps. */

/**
 * A curve through points: piecewise cubic, with slopes that keep every rise a rise and every fall a fall.
 *
 * Slopes inside are the weighted harmonic mean of those on either side, 0 at a turn; at the ends a
 * three-point formula, limited so that the shape is kept. NaN outside of the points: nothing is
 * extrapolated. A straight line for two points.
 *
 * @param x - strictly ascending, at least two, finite
 * @param y - as many, finite
 * @returns the curve's value at any place; NaN for NaN
 * @see F. N. Fritsch and J. Butland, SIAM J. Sci. Stat. Comput. 5, 300 (1984); ends: C. Moler, Numerical
 * Computing with MATLAB, SIAM (2004), section 3.6, from memory
 */
export function monotoneCubic(
  x: ArrayLike<number>,
  y: ArrayLike<number>,
): (place: number) => number {
  const slopes = monotoneSlopes(x, y);
  const last = x.length - 1;
  return (place) => {
    if (!(place >= x[0] && place <= x[last])) return Number.NaN;
    const i = intervalOf(x, place);
    const width = x[i + 1] - x[i];
    const t = (place - x[i]) / width;
    const u = 1 - t;
    return (
      y[i] * u * u * (1 + 2 * t) +
      y[i + 1] * t * t * (1 + 2 * u) +
      width * t * u * (slopes[i] * u - slopes[i + 1] * t)
    );
  };
}

function intervalOf(x: ArrayLike<number>, place: number): number {
  let low = 0;
  let high = x.length - 2;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if (x[middle] <= place) low = middle;
    else high = middle - 1;
  }
  return low;
}

function monotoneSlopes(x: ArrayLike<number>, y: ArrayLike<number>): Float64Array {
  const n = x.length;
  const widths = Float64Array.from({ length: n - 1 }, (_, i) => x[i + 1] - x[i]);
  const rises = Float64Array.from({ length: n - 1 }, (_, i) => (y[i + 1] - y[i]) / widths[i]);
  const slopes = new Float64Array(n);
  if (n === 2) return slopes.fill(rises[0]);
  for (let i = 1; i < n - 1; i++) {
    const before = rises[i - 1];
    const after = rises[i];
    if (!(before * after > 0)) continue;
    const w1 = 2 * widths[i] + widths[i - 1];
    const w2 = widths[i] + 2 * widths[i - 1];
    slopes[i] = (w1 + w2) / (w1 / before + w2 / after);
  }
  slopes[0] = endSlope(widths[0], widths[1], rises[0], rises[1]);
  slopes[n - 1] = endSlope(widths[n - 2], widths[n - 3], rises[n - 2], rises[n - 3]);
  return slopes;
}

function endSlope(width: number, next: number, rise: number, nextRise: number): number {
  const slope = ((2 * width + next) * rise - width * nextRise) / (width + next);
  if (slope * rise <= 0) return 0;
  return rise * nextRise <= 0 && Math.abs(slope) > 3 * Math.abs(rise) ? 3 * rise : slope;
}
