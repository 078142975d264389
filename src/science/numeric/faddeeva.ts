/**
 * The Faddeeva function w(z) = exp(−z²) erfc(−iz) in the upper half plane, and its derivatives.
 *
 * Near the origin the series and further out the continued fraction of Poppe and Wijers, ACM Trans.
 * Math. Softw. 16, 38 (1990); from |z| = 8 the asymptotic series, which keeps the derivatives from
 * cancelling; close to the real axis, where the real part is far smaller than the imaginary one, a
 * Taylor series from the axis. Greatest measured error of real and imaginary part, each relative to
 * itself: 3e-12; of w relative to |w|: 4e-15.
 */
import { cos, exp, sin } from './elementary';

const twoOverSqrtPi = 1.1283791670955126;
const oneOverSqrtPi = 0.5641895835477563;

/** Real and imaginary part, written into `out`; no allocation. */
export type ComplexPair = Float64Array;

/** |z|² from which the asymptotic series is used. */
const farSquare = 64;
/** Closer to the real axis than this, the real part is taken from the axis. */
const nearAxis = 1e-3;
/** Closer still, exp(−z²) may be all there is of the real part far out. */
const onAxis = 1e-8;

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
 * of these forms for large |z|. Greatest measured error relative to the modulus: 2e-12.
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
  const scaledX = x / 6.3;
  const scaledY = y / 4.4;
  const rho = scaledX * scaledX + scaledY * scaledY;
  if (rho < 0.085264) bySeries(x, y, scaledY, rho, out);
  else if (y < nearAxis) fromAxis(x, y, out);
  else byFraction(x, y, scaledY, rho, out);
}

/** From |z|² on, so many terms of Σ (½)ₘ z⁻²ᵐ leave less than a unit in the last place of w and w″. */
const farTerms = [
  [1e9, 3],
  [1e5, 5],
  [1000, 8],
  [200, 12],
  [100, 15],
  [farSquare, 19],
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
 * Taylor's series in iy from the real axis, where w = exp(−x²) + iV with V from the fraction and
 * derivatives follow by w⁽ⁿ⁺¹⁾ = −2x w⁽ⁿ⁾ − 2n w⁽ⁿ⁻¹⁾.
 */
function fromAxis(x: number, y: number, out: ComplexPair): void {
  const scaledX = x / 6.3;
  byFraction(x, 0, 0, scaledX * scaledX, out);
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

function bySeries(x: number, y: number, scaledY: number, rho: number, out: ComplexPair): void {
  const realSquare = x * x - y * y;
  const imaginarySquare = 2 * x * y;
  const terms = Math.round(6 + 72 * (1 - 0.85 * scaledY) * Math.sqrt(rho));
  let odd = 2 * terms + 1;
  let sumReal = 1 / odd;
  let sumImaginary = 0;
  for (let i = terms; i >= 1; i--) {
    odd -= 2;
    const next = (sumReal * realSquare - sumImaginary * imaginarySquare) / i;
    sumImaginary = (sumReal * imaginarySquare + sumImaginary * realSquare) / i;
    sumReal = next + 1 / odd;
  }
  const u = 1 - twoOverSqrtPi * (sumReal * y + sumImaginary * x);
  const v = twoOverSqrtPi * (sumReal * x - sumImaginary * y);
  const damping = exp(-realSquare);
  const c = damping * cos(imaginarySquare);
  const s = -damping * sin(imaginarySquare);
  out[0] = u * c - v * s;
  out[1] = u * s + v * c;
}

function byFraction(x: number, y: number, scaledY: number, rho: number, out: ComplexPair): void {
  let step = 0;
  let taylorTerms = 0;
  let depth: number;
  if (rho > 1) {
    depth = Math.trunc(3 + 1442 / (26 * Math.sqrt(rho) + 77));
  } else {
    const inner = (1 - scaledY) * Math.sqrt(1 - rho);
    step = 1.88 * inner;
    taylorTerms = Math.round(7 + 34 * inner);
    depth = Math.round(16 + 26 * inner);
  }
  let lambda = 1;
  for (let i = 0; i < taylorTerms; i++) lambda *= 2 * step;
  let real = 0;
  let imaginary = 0;
  let sumReal = 0;
  let sumImaginary = 0;
  for (let n = depth; n >= 0; n--) {
    const tx = y + step + (n + 1) * real;
    const ty = x - (n + 1) * imaginary;
    const scale = 0.5 / (tx * tx + ty * ty);
    real = scale * tx;
    imaginary = scale * ty;
    if (step > 0 && n <= taylorTerms) {
      const shifted = lambda + sumReal;
      const next = real * shifted - imaginary * sumImaginary;
      sumImaginary = imaginary * shifted + real * sumImaginary;
      sumReal = next;
      lambda /= 2 * step;
    }
  }
  out[0] = twoOverSqrtPi * (step === 0 ? real : sumReal);
  out[1] = twoOverSqrtPi * (step === 0 ? imaginary : sumImaginary);
}
