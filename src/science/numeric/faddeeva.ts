/**
 * The Faddeeva function w(z) = exp(−z²) erfc(−iz) in the upper half plane, and its derivatives.
 *
 * The rational series of Weideman, SIAM J. Numer. Anal. 31, 1497 (1994), of 40 terms; from |z| = 7 the
 * asymptotic series, which keeps the derivatives from cancelling; close to the real axis, where the
 * real part is far smaller than the imaginary one, a Taylor series from the axis. Greatest measured
 * error of real and imaginary part, each relative to itself: 3e-12; of w relative to |w|: 2e-15.
 */
import { cos, exp, tan } from './elementary';

const twoOverSqrtPi = 1.1283791670955126;
const oneOverSqrtPi = 0.5641895835477563;

/** Real and imaginary part, written into `out`; no allocation. */
export type ComplexPair = Float64Array;

/** |z|² from which the asymptotic series is used. */
const farSquare = 49;
/** Closer to the real axis than this, the real part is taken from the axis. */
const nearAxis = 1e-3;
/** Closer still, exp(−z²) may be all there is of the real part far out. */
const onAxis = 1e-6;

/**
 * w(x + iy) for y ≥ 0.
 *
 * @param out - receives real and imaginary part
 */
export function faddeeva(x: number, y: number, out: ComplexPair): void {
  const size = Math.abs(x);
  if (size * size + y * y >= farSquare) bySeriesFarOut(size, y, out, false);
  else nearby(size, y, out);
  if (x < 0) out[1] = -out[1];
}

/**
 * w, w′ and w″ at x + iy for y ≥ 0: w′ = −2zw + 2i/√π and w″ = −2(w + zw′), without the cancellation
 * of these forms for large |z|. Greatest measured error relative to the modulus: 1e-13 and 4e-12.
 *
 * @param out - (6) receives real and imaginary parts of w, w′, w″
 */
export function faddeevaJet(x: number, y: number, out: Float64Array): void {
  const size = Math.abs(x);
  if (size * size + y * y >= farSquare) bySeriesFarOut(size, y, out, true);
  else {
    nearby(size, y, out);
    const [real, imaginary] = [out[0], out[1]];
    const firstReal = -2 * (size * real - y * imaginary);
    const firstImaginary = twoOverSqrtPi - 2 * (size * imaginary + y * real);
    out[2] = firstReal;
    out[3] = firstImaginary;
    out[4] = -2 * (real + size * firstReal - y * firstImaginary);
    out[5] = -2 * (imaginary + size * firstImaginary + y * firstReal);
  }
  if (x >= 0) return;
  // w(−x + iy) is the complex conjugate of w(x + iy).
  out[1] = -out[1];
  out[2] = -out[2];
  out[5] = -out[5];
}

function nearby(x: number, y: number, out: ComplexPair): void {
  if (y < nearAxis) fromAxis(x, y, out);
  else byRationalSeries(x, y, out);
}

const rationalTerms = 40;
/** Weideman's L: the best one for so many terms. */
const rationalScale = Math.sqrt(rationalTerms / Math.SQRT2);
const rationalCoefficients = weidemanCoefficients();

/** Fourier coefficients of (L² + t²) exp(−t²) with t = L tan(θ/2), by the trapezoidal rule. */
function weidemanCoefficients(): Float64Array {
  const half = 2 * rationalTerms;
  const cosines = Float64Array.from({ length: 2 * half }, (_, j) => cos((j * Math.PI) / half));
  const heights = Float64Array.from({ length: half }, (_, k) => {
    const t = rationalScale * tan((k * Math.PI) / (2 * half));
    return (rationalScale * rationalScale + t * t) * exp(-t * t);
  });
  return Float64Array.from({ length: rationalTerms }, (_, n) => {
    let sum = heights[0];
    for (let k = 1; k < half; k++) sum += 2 * heights[k] * cosines[(k * (n + 1)) % (2 * half)];
    return sum / (2 * half);
  });
}

/**
 * w = 2 Σ aₙ Zⁿ/(L − iz)² + 1/(√π (L − iz)), Z = (L + iz)/(L − iz); the sum by the rule for real
 * coefficients (D. E. Knuth, The Art of Computer Programming 2, 4.6.4), half the products of Horner's.
 */
function byRationalSeries(x: number, y: number, out: ComplexPair): void {
  const below = rationalScale + y;
  const above = rationalScale - y;
  const perSquare = 1 / (below * below + x * x);
  const realZ = (above * below - x * x) * perSquare;
  const imaginaryZ = 2 * rationalScale * x * perSquare;
  const twice = 2 * realZ;
  const square = realZ * realZ + imaginaryZ * imaginaryZ;
  let first = rationalCoefficients[rationalTerms - 1];
  let second = rationalCoefficients[rationalTerms - 2];
  for (let n = rationalTerms - 3; n >= 0; n--) {
    const next = second + twice * first;
    second = rationalCoefficients[n] - square * first;
    first = next;
  }
  const sumReal = first * realZ + second;
  const sumImaginary = first * imaginaryZ;
  const inverseReal = below * perSquare;
  const inverseImaginary = x * perSquare;
  const squareReal = inverseReal * inverseReal - inverseImaginary * inverseImaginary;
  const squareImaginary = 2 * inverseReal * inverseImaginary;
  out[0] =
    2 * (sumReal * squareReal - sumImaginary * squareImaginary) + oneOverSqrtPi * inverseReal;
  out[1] =
    2 * (sumReal * squareImaginary + sumImaginary * squareReal) + oneOverSqrtPi * inverseImaginary;
}

/** From |z|² on, so many terms of Σ (½)ₘ z⁻²ᵐ leave less than a unit in the last place of w and w″. */
const farTerms = [
  [1e9, 3],
  [1e5, 5],
  [1000, 8],
  [200, 12],
  [100, 15],
  [64, 19],
  [farSquare, 23],
] as const;

function farTermsFor(square: number): number {
  for (const [from, terms] of farTerms) if (square >= from) return terms;
  return Number.NaN;
}

/**
 * w = (i/√π z) Σ (½)ₘ z⁻²ᵐ and zw′ + w = −(i/√π z) Σ 2m (½)ₘ z⁻²ᵐ (Abramowitz and Stegun, 7.1.23).
 *
 * Both sums by Horner's rule in u = z⁻².
 */
function bySeriesFarOut(x: number, y: number, out: Float64Array, withDerivatives: boolean): void {
  const square = x * x + y * y;
  const inverseReal = x / square;
  const inverseImaginary = -y / square;
  const uReal = inverseReal * inverseReal - inverseImaginary * inverseImaginary;
  const uImaginary = 2 * inverseReal * inverseImaginary;
  let real = 0;
  let imaginary = 0;
  let byReal = 0;
  let byImaginary = 0;
  // p ← 1 + a u p builds the sum; its derivative by u, times u, is Σ m (½)ₘ uᵐ.
  for (let m = farTermsFor(square); m >= 1; m--) {
    const a = m - 0.5;
    const pReal = 1 + real;
    const sumReal = byReal + pReal;
    const sumImaginary = byImaginary + imaginary;
    byReal = a * (uReal * sumReal - uImaginary * sumImaginary);
    byImaginary = a * (uReal * sumImaginary + uImaginary * sumReal);
    const next = a * (uReal * pReal - uImaginary * imaginary);
    imaginary = a * (uReal * imaginary + uImaginary * pReal);
    real = next;
  }
  real += 1;
  // times i/(√π z)
  const factorReal = -oneOverSqrtPi * inverseImaginary;
  const factorImaginary = oneOverSqrtPi * inverseReal;
  out[0] = factorReal * real - factorImaginary * imaginary;
  out[1] = factorReal * imaginary + factorImaginary * real;
  const rest = y < onAxis ? exp(-x * x) : 0;
  if (withDerivatives) {
    // k = w + zw′
    const kReal = -2 * (factorReal * byReal - factorImaginary * byImaginary);
    const kImaginary = -2 * (factorReal * byImaginary + factorImaginary * byReal);
    const [differenceReal, differenceImaginary] = [kReal - out[0], kImaginary - out[1]];
    out[2] = differenceReal * inverseReal - differenceImaginary * inverseImaginary - 2 * x * rest;
    out[3] = differenceReal * inverseImaginary + differenceImaginary * inverseReal;
    out[4] = -2 * kReal + (4 * x * x - 2) * rest;
    out[5] = -2 * kImaginary;
  }
  out[0] += rest;
}

/**
 * Taylor's series in iy from the real axis, where w = exp(−x²) + iV with V from the rational series and
 * derivatives follow by w⁽ⁿ⁺¹⁾ = −2x w⁽ⁿ⁾ − 2n w⁽ⁿ⁻¹⁾.
 */
function fromAxis(x: number, y: number, out: ComplexPair): void {
  byRationalSeries(x, 0, out);
  // Two derivatives in a row; at odd n the factor iⁿ swaps real and imaginary parts.
  let lastReal = exp(-x * x);
  let lastImaginary = out[1];
  let nextReal = -2 * x * lastReal;
  let nextImaginary = twoOverSqrtPi - 2 * x * lastImaginary;
  let real = lastReal - y * nextImaginary;
  let imaginary = lastImaginary + y * nextReal;
  let factor = y;
  let sign = -1;
  for (let n = 1; n < 7; n++) {
    const afterReal = -2 * (x * nextReal + n * lastReal);
    const afterImaginary = -2 * (x * nextImaginary + n * lastImaginary);
    lastReal = nextReal;
    lastImaginary = nextImaginary;
    nextReal = afterReal;
    nextImaginary = afterImaginary;
    factor *= y / (n + 1);
    if (n % 2 === 1) {
      real += sign * factor * nextReal;
      imaginary += sign * factor * nextImaginary;
    } else {
      real -= sign * factor * nextImaginary;
      imaginary += sign * factor * nextReal;
      sign = -sign;
    }
  }
  out[0] = real;
  out[1] = imaginary;
}
