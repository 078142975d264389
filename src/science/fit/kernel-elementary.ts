/**
 * e^x, ln x and angles as the fit's kernels have them: fewer operations than `numeric/elementary`, in an
 * order two of them can be done at once, and so with the same bits in WebAssembly vectors. Greatest relative
 * errors (measured against `numeric/elementary` on 10⁵ arguments): 4e-16, 3e-16, and 5e-14 where the angle's series ends.
 */

const isLittleEndian = new Uint8Array(new Uint32Array([1]).buffer)[0] === 1;
const highWord = isLittleEndian ? 1 : 0;
const double = new Float64Array(1);
const words = new Int32Array(double.buffer);

/** Adding and taking away 1.5 × 2⁵² rounds to the nearest whole number, halves to even. */
const rounder = 6755399441055744;
const log2E = Math.LOG2E;
/** ln 2 in two parts, the first with zeros at its end, so that k times it is exact. */
const ln2High = 0.6931471803691238;
const ln2Low = 1.9082149292705877e-10;
/** Above this tangent an angle is halved before its series is used. */
const seriesLimit = 0.25;

/** e^x for −700 < x < 700: 2^k times Taylor's series of x − k ln 2. */
export function exponential(x: number): number {
  const k = x * log2E + rounder - rounder;
  const r = x - k * ln2High - k * ln2Low;
  let p = 2.08767569878681e-9;
  p = p * r + 2.505210838544172e-8;
  p = p * r + 2.755731922398589e-7;
  p = p * r + 2.7557319223985893e-6;
  p = p * r + 2.48015873015873e-5;
  p = p * r + 1.984126984126984e-4;
  p = p * r + 1.388888888888889e-3;
  p = p * r + 8.333333333333333e-3;
  p = p * r + 4.1666666666666664e-2;
  p = p * r + 0.16666666666666666;
  p = p * r + 0.5;
  p = p * r + 1;
  p = p * r + 1;
  words[1 - highWord] = 0;
  words[highWord] = (k + 1023) << 20;
  return p * double[0];
}

/** ln x for normal x > 0: k ln 2 and the series of the area tangent of (m − 1)/(m + 1), √½ ≤ m < √2. */
export function logarithm(x: number): number {
  double[0] = x;
  const k = (words[highWord] - 0x3fe6a09e) >> 20;
  words[highWord] -= k << 20;
  const m = double[0];
  const s = (m - 1) / (m + 1);
  const z = s * s;
  let p = 0.05263157894736842;
  p = p * z + 0.058823529411764705;
  p = p * z + 0.06666666666666667;
  p = p * z + 0.07692307692307693;
  p = p * z + 0.09090909090909091;
  p = p * z + 0.1111111111111111;
  p = p * z + 0.14285714285714285;
  p = p * z + 0.2;
  p = p * z + 0.3333333333333333;
  const twice = s + s;
  return k * ln2High + (twice + (twice * z * p + k * ln2Low));
}

/** atan t less t, over t³, where t² = z ≤ 1/16. */
function arcTangentRest(z: number): number {
  let p = 0.05263157894736842;
  p = 0.058823529411764705 - p * z;
  p = 0.06666666666666667 - p * z;
  p = 0.07692307692307693 - p * z;
  p = 0.09090909090909091 - p * z;
  p = 0.1111111111111111 - p * z;
  p = 0.14285714285714285 - p * z;
  p = 0.2 - p * z;
  return p * z - 0.3333333333333333;
}

/** The angle of the point (x, y), y > 0: halved until its tangent is small, then by its series. */
export function angle(y: number, x: number): number {
  let t = y / x;
  let times = 1;
  if (!(x > 0 && t <= seriesLimit)) {
    const r = Math.sqrt(x * x + y * y);
    t = x > 0 ? y / (x + r) : (r - x) / y;
    times = 2;
    while (t > seriesLimit) {
      t = t / (1 + Math.sqrt(1 + t * t));
      times *= 2;
    }
  }
  const z = t * t;
  return times * (t + t * z * arcTangentRest(z));
}
