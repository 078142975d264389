/** A digest of the bits of every elementary function, for the test in Node and the same test in the browser. */
import * as elementary from '../../../src/science/numeric/elementary';

const COUNT = 20_000;

type Maker = (random: () => number) => number[];

/** ±10^(low…high), made of exact operations only: powers of two and a uniform significand. */
function scaled(random: () => number, low: number, high: number): number {
  let value = 1 + random();
  const exponent = low + Math.floor(random() * (high - low));
  for (let i = 0; i < exponent; i++) value *= 2;
  for (let i = 0; i > exponent; i--) value /= 2;
  return random() < 0.5 ? -value : value;
}

const wide: Maker = (random) => [scaled(random, -40, 12)];
const positive: Maker = (random) => [Math.abs(scaled(random, -1060, 1020))];
const angle: Maker = (random) => [scaled(random, -30, random() < 0.05 ? 1000 : 24)];
const point: Maker = (random) => [scaled(random, -20, 20), scaled(random, -20, 20)];

const functions: readonly (readonly [string, (...x: number[]) => number, Maker])[] = [
  ['exp', elementary.exp, (random) => [random() * 1460 - 748]],
  ['expm1', elementary.expm1, wide],
  ['log', elementary.log, positive],
  ['log1p', elementary.log1p, wide],
  ['log10', elementary.log10, positive],
  ['pow', elementary.pow, (random) => [random() * 10, random() * 200 - 100]],
  ['sin', elementary.sin, angle],
  ['cos', elementary.cos, angle],
  ['tan', elementary.tan, angle],
  ['sinh', elementary.sinh, wide],
  ['cosh', elementary.cosh, wide],
  ['tanh', elementary.tanh, wide],
  ['atan', elementary.atan, wide],
  ['atan2', elementary.atan2, point],
  ['cbrt', elementary.cbrt, positive],
  ['hypot', elementary.hypot, point],
];

/** Uniform in [0, 1) with 32 bits: xorshift of G. Marsaglia, J. Stat. Softw. 8, 14 (2003). */
function createFixedRandom(): () => number {
  let state = 0x2545f491;
  return () => {
    state ^= state << 13;
    state ^= state >>> 17;
    state ^= state << 5;
    return (state >>> 0) / 4294967296;
  };
}

/** FNV-1a of the bits of `call` at 20 000 fixed arguments; every NaN counts as the same one. */
function digestOf(call: (...x: number[]) => number, make: Maker): string {
  const random = createFixedRandom();
  const value = new Float64Array(1);
  const words = new Uint32Array(value.buffer);
  let a = 0x811c9dc5;
  let b = 0x1000193;
  for (let i = 0; i < COUNT; i++) {
    const result = call(...make(random));
    value[0] = Number.isNaN(result) ? 1e300 : result;
    a = Math.imul(a ^ words[0]!, 0x01000193);
    b = Math.imul(b ^ words[1]!, 0x01000193);
    a ^= b >>> 15;
    b ^= a >>> 13;
  }
  return [a, b].map((word) => (word >>> 0).toString(16).padStart(8, '0')).join('');
}

/** `name digest` of each function, one a line, so that a failing comparison names the function. */
export function elementaryBitsDigest(): string {
  return functions.map(([name, call, make]) => `${name} ${digestOf(call, make)}`).join('\n');
}

/** What `elementaryBitsDigest` gives where the arithmetic is that of IEEE 754. */
export const pinnedElementaryBits = [
  'exp eafd9a5dcc1c075c',
  'expm1 34d9982251208a47',
  'log 507a09ae55a58e3d',
  'log1p cd2b0de8add8a61d',
  'log10 5c62a8d8e542ca9a',
  'pow 87463bdf76610939',
  'sin 97af2cb630101953',
  'cos 6fb2984a0fb719fb',
  'tan 0072aab4894a4495',
  'sinh b77949db14077932',
  'cosh 9bba61dd59b22f2e',
  'tanh f75215ba13f022e0',
  'atan e87e2836996a84a7',
  'atan2 e81c5c28c85fe99d',
  'cbrt f2f9be6d590ada12',
  'hypot 037774e35d30100c',
].join('\n');
