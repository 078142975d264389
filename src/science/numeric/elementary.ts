/**
 * Elementary functions with the same bits in every engine; one long file because they share their tables and pair arithmetic.
 *
 * ECMAScript leaves the last bits of Math.exp and its kin to the engine (ECMA-262, "Function
 * Properties of the Math Object"), and Node and Chromium differ in them. Here only + − × ÷, Math.sqrt and bit
 * access are used, all exact by IEEE 754. NaN gives NaN; other edge cases are those of Math.
 *
 * An ulp is the spacing of doubles at the true result. "Measured" errors: the greatest of a million
 * arguments per function against mpmath at 160 bits; test/fixtures/numeric/make-elementary.py makes the sample the tests check.
 *
 * Pairs: an unevaluated sum high + low of two doubles, about 106 bits (T. J. Dekker, Numer. Math. 18,
 * 224 (1971); D. E. Knuth, The Art of Computer Programming 2, 4.2.2).
 */

type Pair = readonly [high: number, low: number];

const isLittleEndian = new Uint8Array(new Uint32Array([1]).buffer)[0] === 1;
const HIGH_WORD = isLittleEndian ? 1 : 0;
const LOW_WORD = 1 - HIGH_WORD;
const double = new Float64Array(1);
const words = new Uint32Array(double.buffer);

/** Second results of the kernels; an array, since engines box a changing module variable. */
const out = new Float64Array(2);

/** 2²⁷ + 1 splits a double in two halves whose products are exact (Veltkamp; Dekker 1971). */
const SPLITTER = 134217729;
/** Adding and taking away 1.5 × 2⁵² rounds to the nearest whole number. */
const ROUNDER = 6755399441055744;

// ---------------------------------------------------------------- pair arithmetic

/** a × b − p, exactly, where p is a × b as rounded. */
function productError(a: number, b: number, p: number): number {
  const ta = a * SPLITTER;
  const ah = ta - (ta - a);
  const al = a - ah;
  const tb = b * SPLITTER;
  const bh = tb - (tb - b);
  const bl = b - bh;
  return ah * bh - p + ah * bl + al * bh + al * bl;
}

/** a + b − s, exactly, where s is a + b as rounded. */
function sumError(a: number, b: number, s: number): number {
  const part = s - a;
  return a - (s - part) + (b - part);
}

function addPairs([ah, al]: Pair, [bh, bl]: Pair): Pair {
  const s = ah + bh;
  const low = sumError(ah, bh, s) + (al + bl);
  const high = s + low;
  return [high, s - high + low];
}

function multiplyPairs([ah, al]: Pair, [bh, bl]: Pair): Pair {
  const p = ah * bh;
  const low = productError(ah, bh, p) + (ah * bl + al * bh);
  const high = p + low;
  return [high, p - high + low];
}

function dividePair([ah, al]: Pair, d: number): Pair {
  const q = ah / d;
  const p = q * d;
  const low = (ah - p - productError(q, d, p) + al) / d;
  const high = q + low;
  return [high, q - high + low];
}

function squareRootOfPair([ah, al]: Pair): Pair {
  const root = Math.sqrt(ah);
  const p = root * root;
  const low = (ah - p - productError(root, root, p) + al) / (2 * root);
  const high = root + low;
  return [high, root - high + low];
}

/** Σ sign^k z^(2k+1)/(2k+1) for z = n/d ≤ 1/32: atanh with sign 1, atan with sign −1. */
function oddSeries(n: number, d: number, sign: number): Pair {
  const z = dividePair([n, 0], d);
  const step = multiplyPairs(z, [z[0] * sign, z[1] * sign]);
  let sum: Pair = [0, 0];
  let power = z;
  for (let k = 1; k <= 25; k += 2) {
    sum = addPairs(sum, dividePair(power, k));
    power = multiplyPairs(power, step);
  }
  return sum;
}

// ---------------------------------------------------------------- tables, made once in pair arithmetic

/** 2^k at index k + 1074 for every power of two that is a double. */
const POWERS_OF_TWO = new Float64Array(2098);
for (let k = -1074, value = 5e-324; k <= 1023; k++, value *= 2) POWERS_OF_TWO[k + 1074] = value;

/** 2^(j/128), high and low at 2j and 2j + 1. */
const EXP_TABLE = makeExpTable();

function makeExpTable(): Float64Array {
  const table = new Float64Array(256);
  table[0] = 1;
  let root: Pair = [2, 0];
  for (let span = 64; span >= 1; span /= 2) {
    root = squareRootOfPair(root);
    for (let j = 0; j < 128; j += 2 * span) {
      const [high, low] = multiplyPairs([table[2 * j], table[2 * j + 1]], root);
      table[2 * (j + span)] = high;
      table[2 * (j + span) + 1] = low;
    }
  }
  return table;
}

const { LN2, LOG10E } = Math;
/** ln 2 − LN2 */
const LN2_REST = 2.3190468138462996e-17;
const TWO_42 = 4398046511104;
/** The leading 42 and 35 bits, so that a small whole number times them is exact. */
const LN2_HIGH = Math.floor(LN2 * TWO_42) / TWO_42;
const LN2_LOW = LN2 - LN2_HIGH + LN2_REST;
const LN2_128_HIGH = Math.floor(LN2 * 34359738368) / TWO_42;
const LN2_128_LOW = LN2 / 128 - LN2_128_HIGH + LN2_REST / 128;

/**
 * Intervals j/128 ≤ y − 1 < (j + 1)/128 of a significand y: at 3j a reciprocal c of at most 9 bits, at 3j + 1 and
 * 3j + 2 −ln c (or −ln 2c from FOLD on, where y is taken as y/2) in two parts, the first a multiple of 2⁻⁴².
 */
const LOG_TABLE = new Float64Array(384);
const FOLD = 53;
for (let j = 0, down: Pair = [0, 0], at = 256; j < FOLD; j++) {
  const target = j === 0 ? 256 : Math.round(65536 / (257 + 2 * j));
  for (; at > target; at--) down = addPairs(down, doublePair(oddSeries(1, 2 * at - 1, 1)));
  setLogEntry(j, target, down);
}
for (let j = 127, up: Pair = [0, 0], at = 128; j >= FOLD; j--) {
  const target = j === 127 ? 128 : Math.round(65536 / (257 + 2 * j));
  for (; at < target; at++) up = addPairs(up, doublePair(oddSeries(-1, 2 * at + 1, 1)));
  setLogEntry(j, target, up);
}

function doublePair([high, low]: Pair): Pair {
  return [2 * high, 2 * low];
}

function setLogEntry(j: number, reciprocal: number, [high, low]: Pair): void {
  const first = Math.round(high * TWO_42) / TWO_42;
  LOG_TABLE[3 * j] = reciprocal / 256;
  LOG_TABLE[3 * j + 1] = first;
  LOG_TABLE[3 * j + 2] = high - first + low;
}

/** atan(j/32), high and low at 2j and 2j + 1; each from the one before by the addition theorem. */
const ATAN_TABLE = new Float64Array(66);
for (let j = 1, angle: Pair = [0, 0]; j <= 32; j++) {
  angle = addPairs(angle, oddSeries(32, 1024 + j * (j - 1), -1));
  ATAN_TABLE[2 * j] = angle[0];
  ATAN_TABLE[2 * j + 1] = angle[1];
}

// ---------------------------------------------------------------- exponential

/**
 * e^x. Greatest measured error 0.512 ulp (0.75 where the result is subnormal).
 *
 * @see P. T. P. Tang, ACM Trans. Math. Softw. 15, 144 (1989); here with 128 table entries and a Taylor polynomial
 */
export function exp(x: number): number {
  if (!(x >= -708 && x <= 709)) return expFar(x);
  const n = x * (128 / LN2) + ROUNDER - ROUNDER;
  const r = x - n * LN2_128_HIGH - n * LN2_128_LOW;
  const p = r + r * r * (1 / 2 + r * (1 / 6 + r * (1 / 24 + r * (1 / 120))));
  const i = n | 0;
  const j = (i & 127) << 1;
  const t = EXP_TABLE[j];
  return (t + (EXP_TABLE[j + 1] + t * p)) * POWERS_OF_TWO[(i >> 7) + 1074];
}

function expFar(x: number): number {
  if (x > 709.782712893384) return Infinity;
  if (x < -745.1332191019412) return 0;
  return expOfPair(x, 0, 0);
}

/** 2^shift e^(x + low), for |x| < 760; NaN for NaN. */
function expOfPair(x: number, low: number, shift: number): number {
  const n = x * (128 / LN2) + ROUNDER - ROUNDER;
  const r = x - n * LN2_128_HIGH - n * LN2_128_LOW + low;
  const p = r + r * r * (1 / 2 + r * (1 / 6 + r * (1 / 24 + r * (1 / 120))));
  const i = n | 0;
  const j = (i & 127) << 1;
  const t = EXP_TABLE[j];
  const significand = t + (EXP_TABLE[j + 1] + t * p);
  const k = (i >> 7) + shift;
  if (k > 1023) return significand * 2 * POWERS_OF_TWO[Math.min(k - 1, 1023) + 1074];
  if (k >= -1074) return significand * POWERS_OF_TWO[k + 1074];
  return k === -1075 ? significand * 0.5 * POWERS_OF_TWO[0] : 0;
}

/**
 * e^x − 1, accurate for small x too. Greatest measured error 0.531 ulp.
 *
 * Near 0 a Taylor polynomial whose square term is a pair; elsewhere as `exp`, the 1 taken from the table's part.
 */
export function expm1(x: number): number {
  if (x >= -0.25 && x <= 0.25) return x * x < 1e-33 ? x : expm1Near(x);
  if (x > 709 || Number.isNaN(x)) return exp(x);
  if (x < -40) return -1;
  const n = x * (128 / LN2) + ROUNDER - ROUNDER;
  const r = x - n * LN2_128_HIGH - n * LN2_128_LOW;
  const p = r + r * r * (1 / 2 + r * (1 / 6 + r * (1 / 24 + r * (1 / 120))));
  const i = n | 0;
  const j = (i & 127) << 1;
  const scale = POWERS_OF_TWO[(i >> 7) + 1074];
  const t = EXP_TABLE[j];
  const main = t * scale;
  const s = main - 1;
  return s + (sumError(main, -1, s) + (EXP_TABLE[j + 1] + t * p) * scale);
}

function expm1Near(x: number): number {
  const p = 1 / 39916800 + x * (1 / 479001600 + x * (1 / 6227020800 + x * (1 / 87178291200)));
  const q = 1 / 40320 + x * (1 / 362880 + x * (1 / 3628800 + x * p));
  const cubic =
    x * x * x * (1 / 6 + x * (1 / 24 + x * (1 / 120 + x * (1 / 720 + x * (1 / 5040 + x * q)))));
  const half = 0.5 * x;
  const square = half * x;
  const s = x + square;
  return s + (x - s + square + (productError(half, x, square) + cubic));
}

// ---------------------------------------------------------------- logarithm

/**
 * ln(y + yLow) for a positive normal y: high part returned, low part in out[0]; relative error below 2⁻⁶⁶.
 *
 * @see P. T. P. Tang, ACM Trans. Math. Softw. 16, 378 (1990); here with short reciprocals, so that the reduced
 * argument is exact, and its square as a pair
 */
function logOfPair(y: number, yLow: number): number {
  double[0] = y;
  const word = words[HIGH_WORD];
  const j = (word >>> 13) & 127;
  const exponent = (word >>> 20) - 1023;
  const scale = POWERS_OF_TWO[1074 - exponent];
  const c = LOG_TABLE[3 * j];
  const m = j >= FOLD ? exponent + 1 : exponent;

  const s = y * scale;
  const ts = s * SPLITTER;
  const sh = ts - (ts - s);
  const a = sh * c - 1;
  const b = (s - sh) * c;
  const ab = a + b;
  const abLow = sumError(a, b, ab);
  const d = yLow * scale * c;
  const r = ab + d;
  const rLow = ab - r + d + abLow;

  const tr = r * SPLITTER;
  const rh = tr - (tr - r);
  const rl = r - rh;
  const square = r * r;
  const squareLow = rh * rh - square + 2 * rh * rl + rl * rl + 2 * r * rLow;
  const quartic =
    1 / 4 - r * (1 / 5 - r * (1 / 6 - r * (1 / 7 - r * (1 / 8 - r * (1 / 9 - r * (1 / 10))))));
  const cubic = r * square * (1 / 3 - r * quartic);

  const base = m * LN2_HIGH + LOG_TABLE[3 * j + 1];
  const first = base + r;
  const second = first - 0.5 * square;
  const tail = m * LN2_LOW + LOG_TABLE[3 * j + 2] + rLow - 0.5 * squareLow;
  const low = base - first + r + (first - second - 0.5 * square) + tail + cubic;
  const high = second + low;
  out[0] = second - high + low;
  return high;
}

/** As `logOfPair` for any positive finite x. */
function logOf(x: number): number {
  if (x >= 2.2250738585072014e-308) return logOfPair(x, 0);
  const high = logOfPair(x * 18014398509481984, 0);
  const lowBefore = out[0];
  const s = high - 54 * LN2_HIGH;
  const low = sumError(high, -54 * LN2_HIGH, s) + (lowBefore - 54 * LN2_LOW);
  const total = s + low;
  out[0] = s - total + low;
  return total;
}

/** Natural logarithm; −Infinity at 0, NaN below. Greatest measured error 0.5001 ulp. */
export function log(x: number): number {
  if (x > 0 && x < Infinity) return logOf(x);
  return x === 0 ? -Infinity : x > 0 ? x : NaN;
}

/** ln(1 + x), accurate for small x too; −Infinity at −1, NaN below. Greatest measured error 0.5001 ulp. */
export function log1p(x: number): number {
  if (x > -1 && x < Infinity) {
    if (x > -1e-17 && x < 1e-17) return x;
    const s = 1 + x;
    return logOfPair(s, sumError(1, x, s));
  }
  return x === -1 ? -Infinity : x > 0 ? x : NaN;
}

/** log10 e − LOG10E */
const LOG10E_REST = 1.098319650216765e-17;

/** Logarithm to base 10, exact at powers of ten; −Infinity at 0, NaN below. Greatest measured error 0.5001 ulp. */
export function log10(x: number): number {
  if (!(x > 0 && x < Infinity)) return log(x);
  const high = logOf(x);
  const p = high * LOG10E;
  return p + (productError(high, LOG10E, p) + (high * LOG10E_REST + out[0] * LOG10E));
}

/**
 * x to the power y. Greatest measured error 0.508 ulp (0.75 where the result is subnormal).
 *
 * e^(y ln x) with the logarithm and the product as pairs. As Math.pow, so unlike IEEE 754 `pow`: 1 or −1 to an
 * infinite power is NaN.
 */
export function pow(x: number, y: number): number {
  if (y === 0) return 1;
  if (Number.isNaN(x) || Number.isNaN(y)) return NaN;
  const magnitude = Math.abs(x);
  if (y === Infinity || y === -Infinity) {
    if (magnitude === 1) return NaN;
    return magnitude > 1 === y > 0 ? Infinity : 0;
  }
  const isOdd = Math.abs(y) < 9007199254740992 && y % 2 !== 0 && Math.trunc(y) === y;
  const isNegative = x < 0 || (x === 0 && 1 / x < 0);
  const sign = isNegative && isOdd ? -1 : 1;
  if (magnitude === 0) return sign * (y > 0 ? 0 : Infinity);
  if (magnitude === Infinity) return sign * (y > 0 ? Infinity : 0);
  if (isNegative && Math.trunc(y) !== y) return NaN;
  return sign * powPositive(magnitude, y);
}

function powPositive(x: number, y: number): number {
  const high = logOf(x);
  const low = out[0];
  const p = high * y;
  if (p > 710) return Infinity;
  if (p < -746) return 0;
  if (p > -1e-18 && p < 1e-18) return 1;
  return expOfPair(p, productError(high, y, p) + low * y, 0);
}

// ---------------------------------------------------------------- hyperbolic

/** Hyperbolic sine. Greatest measured error 1.59 ulp. Taylor series for |x| < 1, else from `exp`. */
export function sinh(x: number): number {
  const a = Math.abs(x);
  if (a < 1) {
    const z = x * x;
    const p = 1 / 6227020800 + z * (1 / 1307674368000 + z * (1 / 355687428096000));
    const q = 1 / 120 + z * (1 / 5040 + z * (1 / 362880 + z * (1 / 39916800 + z * p)));
    return x + x * z * (1 / 6 + z * q);
  }
  const size = a < 22 ? 0.5 * (exp(a) - 1 / exp(a)) : halfExp(a);
  return x < 0 ? -size : size;
}

/** Hyperbolic cosine. Greatest measured error 1.02 ulp. */
export function cosh(x: number): number {
  const a = Math.abs(x);
  if (a >= 22) return halfExp(a);
  const e = exp(a);
  return 0.5 * e + 0.5 / e;
}

/** ½ e^a for a ≥ 22, without overflow before its time. */
function halfExp(a: number): number {
  return a > 711 ? Infinity : expOfPair(a, 0, -1);
}

/** Hyperbolic tangent. Greatest measured error 1.4 ulp. */
export function tanh(x: number): number {
  const a = Math.abs(x);
  if (a < 1e-9) return x;
  let size = 1;
  if (!(a > 22)) {
    const t = expm1(2 * a);
    const d = t + 2;
    size = pairQuotient(t, 0, d, sumError(t, 2, d));
  }
  return x < 0 ? -size : size;
}

// ---------------------------------------------------------------- trigonometric

/** π/2 in parts of 33, 33, 33 and 53 bits. */
const HALF_PI_1 = 1.5707963267341256;
const HALF_PI_2 = 6.077100506303966e-11;
const HALF_PI_3 = 2.0222662487111665e-21;
const HALF_PI_4 = 8.4784276603689e-32;

/**
 * x − quadrant × π/2 into out, high and low, |high| ≤ π/4; returns the quadrant, 0 to 3.
 *
 * @see W. J. Cody and W. Waite, Software Manual for the Elementary Functions (1980): below 2²⁰, multiples of a π/2
 * in four parts, the first three exact
 */
function reduceAngle(x: number): number {
  if (x > 1048576 || x < -1048576) return reduceHugeAngle(x);
  const n = x * (2 / Math.PI) + ROUNDER - ROUNDER;
  const a = x - n * HALF_PI_1;
  const b = n * HALF_PI_2;
  const c = n * HALF_PI_3;
  const ab = a - b;
  const abc = ab - c;
  const low = sumError(a, -b, ab) + sumError(ab, -c, abc) - n * HALF_PI_4;
  const high = abc + low;
  out[0] = high;
  out[1] = abc - high + low;
  return n & 3;
}

const HUGE_BITS = 1280n;
let hugeConstants: { readonly halfPi: bigint; readonly twoOverPi: bigint } | undefined;

/** π/2 and 2/π times 2¹²⁸⁰, by Machin's formula, when first needed. */
function makeHugeConstants(): { readonly halfPi: bigint; readonly twoOverPi: bigint } {
  const guard = 64n;
  const arctanOfInverse = (n: bigint): bigint => {
    let power = (1n << (HUGE_BITS + guard)) / n;
    let sum = power;
    for (let k = 3n, sign = -1n; power > 0n; k += 2n, sign = -sign) {
      power /= n * n;
      sum += (sign * power) / k;
    }
    return sum;
  };
  const halfPi = 8n * arctanOfInverse(5n) - 2n * arctanOfInverse(239n);
  return { halfPi: halfPi >> guard, twoOverPi: (1n << (2n * HUGE_BITS + guard)) / halfPi };
}

/**
 * As `reduceAngle` for any finite x beyond 2²⁰, exactly in whole numbers; about a microsecond.
 *
 * @see M. H. Payne and R. N. Hanek, SIGNUM Newsletter 18, 19 (1983): enough digits of 2/π for any exponent
 */
function reduceHugeAngle(x: number): number {
  hugeConstants ??= makeHugeConstants();
  double[0] = Math.abs(x);
  const word = words[HIGH_WORD];
  const significand = (BigInt((word & 0xfffff) | 0x100000) << 32n) | BigInt(words[LOW_WORD]);
  const exponent = BigInt((word >>> 20) - 1075);
  const product = significand * hugeConstants.twoOverPi;
  const turns = exponent >= 0n ? product << exponent : product >> -exponent;
  const n = (turns + (1n << (HUGE_BITS - 1n))) >> HUGE_BITS;
  const rest = ((turns - (n << HUGE_BITS)) * hugeConstants.halfPi) >> (2n * HUGE_BITS - 200n);
  const high = Number(rest);
  const low = Number(rest - BigInt(high));
  const sign = x < 0 ? -1 : 1;
  out[0] = sign * high * POWERS_OF_TWO[1074 - 200];
  out[1] = sign * low * POWERS_OF_TWO[1074 - 200];
  return (sign * Number(n & 3n)) & 3;
}

/** sin(y + low) − y for |y| ≤ π/4: Taylor series to y¹⁷. */
function sineTail(y: number, low: number): number {
  const z = y * y;
  const p = 1 / 6227020800 - z * (1 / 1307674368000 - z * (1 / 355687428096000));
  const q = 1 / 120 - z * (1 / 5040 - z * (1 / 362880 - z * (1 / 39916800 - z * p)));
  return low * (1 - 0.5 * z) - y * z * (1 / 6 - z * q);
}

/** cos(y + low) − (1 − y²/2 as rounded) for |y| ≤ π/4: Taylor series to y¹⁸. */
function cosineTail(y: number, low: number): number {
  const z = y * y;
  const p =
    1 / 479001600 - z * (1 / 87178291200 - z * (1 / 20922789888000 - z * (1 / 6402373705728000)));
  const q = 1 / 24 - z * (1 / 720 - z * (1 / 40320 - z * (1 / 3628800 - z * p)));
  const half = 0.5 * z;
  const head = 1 - half;
  return 1 - head - half + (z * z * q - y * low);
}

function sineOfQuadrant(quadrant: number): number {
  const y = out[0];
  const low = out[1];
  let value: number;
  if ((quadrant & 1) === 0) value = y + sineTail(y, low);
  else value = 1 - 0.5 * (y * y) + cosineTail(y, low);
  return (quadrant & 2) === 0 ? value : -value;
}

/** Sine of any finite angle in radians. Greatest measured error 0.78 ulp. */
export function sin(x: number): number {
  if (x > -1e-8 && x < 1e-8) return x;
  if (x - x !== 0) return NaN;
  return sineOfQuadrant(reduceAngle(x));
}

/** Cosine of any finite angle in radians. Greatest measured error 0.77 ulp. */
export function cos(x: number): number {
  if (x - x !== 0) return NaN;
  return sineOfQuadrant(reduceAngle(x) + 1);
}

/** Tangent of any finite angle in radians. Greatest measured error 0.98 ulp. */
export function tan(x: number): number {
  if (x > -1e-8 && x < 1e-8) return x;
  if (x - x !== 0) return NaN;
  const quadrant = reduceAngle(x);
  const y = out[0];
  const low = out[1];
  const sineRest = sineTail(y, low);
  const sine = y + sineRest;
  const sineLow = y - sine + sineRest;
  const head = 1 - 0.5 * (y * y);
  const cosineRest = cosineTail(y, low);
  const cosine = head + cosineRest;
  const cosineLow = head - cosine + cosineRest;
  return (quadrant & 1) === 0
    ? pairQuotient(sine, sineLow, cosine, cosineLow)
    : -pairQuotient(cosine, cosineLow, sine, sineLow);
}

/** (n + nLow)/(d + dLow) as one double; what rounding left is in out[0]. */
function pairQuotient(n: number, nLow: number, d: number, dLow: number): number {
  const q = n / d;
  const p = q * d;
  const rest = (n - p - productError(q, d, p) + (nLow - q * dLow)) / d;
  const high = q + rest;
  out[0] = q - high + rest;
  return high;
}

const PI_REST = 1.2246467991473532e-16;

/** Angle whose tangent is x, −π/2 to π/2. Greatest measured error 0.502 ulp. */
export function atan(x: number): number {
  if (x > -1e-9 && x < 1e-9) return x;
  const a = Math.abs(x);
  let size: number;
  if (a > 1e17) size = Math.PI / 2;
  else size = a <= 1 ? angleOf(a, 1, 0) : angleOf(1, a, 1);
  return x < 0 ? -size : size;
}

/**
 * The angle atan(small/large), 0 ≤ small ≤ large, within 2^±900, plain (`place` 0) or taken from π/2 (1), added to
 * π/2 (2) or taken from π (3).
 *
 * atan c + atan((small − c large)/(large + c small)) with c the nearest multiple of 1/32; the quotient is a pair.
 */
function angleOf(small: number, large: number, place: number): number {
  const j = ((small / large) * 32 + ROUNDER - ROUNDER) | 0;
  const c = j / 32;
  const cLarge = c * large;
  const n = small - cLarge;
  const nLow = sumError(small, -cLarge, n) - productError(c, large, cLarge);
  const cSmall = c * small;
  const d = large + cSmall;
  const dLow = sumError(large, cSmall, d) + productError(c, small, cSmall);
  const t = pairQuotient(n, nLow, d, dLow);
  const tLow = out[0];
  const z = t * t;
  const cubic = t * z * (1 / 3 - z * (1 / 5 - z * (1 / 7 - z * (1 / 9 - z * (1 / 11)))));
  const base = ATAN_TABLE[2 * j];
  const high = base + t;
  const low = base - high + t + (ATAN_TABLE[2 * j + 1] + (tLow - cubic));
  return placeAngle(high, low, place);
}

function placeAngle(high: number, low: number, place: number): number {
  if (place === 0) return high + low;
  const origin = place === 3 ? Math.PI : Math.PI / 2;
  const rest = place === 3 ? PI_REST : PI_REST / 2;
  const sign = place === 2 ? 1 : -1;
  const s = origin + sign * high;
  return s + (origin - s + sign * high + (rest + sign * low));
}

/** Angle of the point (x, y), −π to π. Greatest measured error 0.502 ulp. */
export function atan2(y: number, x: number): number {
  if (Number.isNaN(x) || Number.isNaN(y)) return NaN;
  const isLeft = x < 0 || (x === 0 && 1 / x < 0);
  const isDown = y < 0 || (y === 0 && 1 / y < 0);
  const size = angleOfSizes(Math.abs(y), Math.abs(x), isLeft);
  return isDown ? -size : size;
}

function angleOfSizes(y: number, x: number, isLeft: boolean): number {
  if (y === 0) return isLeft ? Math.PI : 0;
  if (x === 0) return Math.PI / 2;
  if (y === Infinity && x === Infinity) return isLeft ? 3 * (Math.PI / 4) : Math.PI / 4;
  const isSteep = y > x;
  const small = isSteep ? x : y;
  const large = isSteep ? y : x;
  const place = isSteep ? (isLeft ? 2 : 1) : isLeft ? 3 : 0;
  const ratio = small / large;
  // atan q = q to a double here, and small or large may be out of range for the exact products
  if (ratio < 1e-9) return placeAngle(ratio, 0, place);
  const shift = large > 1e270 ? -332 : large < 1e-270 ? 332 : 0;
  const scale = POWERS_OF_TWO[1074 + shift];
  return angleOf(small * scale, large * scale, place);
}

// ---------------------------------------------------------------- roots

/**
 * Cube root. Greatest measured error 0.5001 ulp.
 *
 * Two Halley steps from a quadratic within 1.6 %, then one Newton step with an exact residual.
 */
export function cbrt(x: number): number {
  if (x === 0 || x - x !== 0) return x;
  const a = Math.abs(x);
  const isTiny = a < 2.2250738585072014e-308;
  double[0] = isTiny ? a * 18014398509481984 : a;
  const exponent = (words[HIGH_WORD] >>> 20) - 1023;
  const third = Math.floor(exponent / 3);
  // in two factors: one alone could be beyond the table
  const y = double[0] * POWERS_OF_TWO[1074 - third] * POWERS_OF_TWO[1074 - 2 * third];
  let r = 0.7625 + y * (0.2681 - 0.01467 * y);
  for (let step = 0; step < 2; step++) {
    const cube = r * r * r;
    r *= (cube + 2 * y) / (2 * cube + y);
  }
  const square = r * r;
  const cube = square * r;
  const cubeLow = productError(square, r, cube) + productError(r, r, square) * r;
  r += (y - cube - cubeLow) / (3 * square);
  const size = r * POWERS_OF_TWO[1074 + third - (isTiny ? 18 : 0)];
  return x < 0 ? -size : size;
}

/**
 * √(x² + y² + z²) without overflow or underflow on the way; Infinity if any is infinite, even beside NaN.
 * Greatest measured error 0.5001 ulp.
 */
export function hypot(x: number, y: number, z = 0): number {
  const a = Math.abs(x);
  const b = Math.abs(y);
  const c = Math.abs(z);
  if (a === Infinity || b === Infinity || c === Infinity) return Infinity;
  const largest = Math.max(a, b, c);
  if (largest === 0 || Number.isNaN(largest)) return largest;
  const scale = largest > 1e150 ? -700 : largest < 1e-140 ? 700 : 0;
  const up = POWERS_OF_TWO[1074 + scale];
  return hypotWithin(a * up, b * up, c * up) * POWERS_OF_TWO[1074 - scale];
}

function hypotWithin(a: number, b: number, c: number): number {
  const aa = a * a;
  const bb = b * b;
  const cc = c * c;
  const ab = aa + bb;
  const s = ab + cc;
  const squaresLow = productError(a, a, aa) + productError(b, b, bb) + productError(c, c, cc);
  const low = squaresLow + sumError(aa, bb, ab) + sumError(ab, cc, s);
  const r = Math.sqrt(s);
  const p = r * r;
  return r + (s - p - productError(r, r, p) + low) / (2 * r);
}
