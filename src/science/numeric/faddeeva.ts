/**
 * The Faddeeva function w(z) = exp(−z²) erfc(−iz) in the first quadrant and, by symmetry, the upper
 * half plane, by the algorithm of Poppe and Wijers, ACM Trans. Math. Softw. 16, 38 (1990):
 * relative error of |w| about 1e-14.
 */
import { cos, exp, sin } from './elementary';

const twoOverSqrtPi = 1.1283791670955126;

/** Real and imaginary part, written into `out`; no allocation. */
export type ComplexPair = Float64Array;

/**
 * w(x + iy) for y ≥ 0.
 *
 * @param out - receives real and imaginary part
 */
export function faddeeva(x: number, y: number, out: ComplexPair): void {
  const size = Math.abs(x);
  const scaledX = size / 6.3;
  const scaledY = y / 4.4;
  const rho = scaledX * scaledX + scaledY * scaledY;
  if (rho < 0.085264) bySeries(size, y, scaledY, rho, out);
  else byFraction(size, y, scaledY, rho, out);
  if (x < 0) out[1] = -out[1];
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
  out[0] = y === 0 ? exp(-x * x) : twoOverSqrtPi * (step === 0 ? real : sumReal);
  out[1] = twoOverSqrtPi * (step === 0 ? imaginary : sumImaginary);
}
