/**
 * Seeded random numbers with the same bits in every engine: uniform, normal, Poisson.
 * A stream is chosen by seed and index, so that a pixel's numbers do not depend on the order of pixels.
 */
import { exp, log } from './elementary';
import { logPoissonProbability } from './poisson';

export interface Random {
  /** A whole number from 0 to 2³² − 1, each as likely. */
  uint32(): number;
  /** Uniform in [0, 1), a multiple of 2⁻⁵³. */
  uniform(): number;
  /** Normal with mean 0 and variance 1. */
  normal(): number;
  /** A count where `mean` is expected; 0 for a mean of 0 or below, NaN for NaN. */
  poisson(mean: number): number;
}

/**
 * A generator for a seed and a stream, both whole numbers below 2⁵³.
 *
 * Different pairs (seed, stream) always give different states, mixed so that neighbours are unlike; give each pixel
 * its index as stream.
 *
 * @see D. Blackman and S. Vigna, Scrambled Linear Pseudorandom Number Generators, ACM Trans. Math. Softw. 47, 36
 * (2021): xoshiro128**, period 2¹²⁸ − 1
 */
export function createRandom(seed: number, stream = 0): Random {
  return new Xoshiro128(mixedState(seed, stream));
}

/** The generator from its bare state of four words, not all 0, as published test sequences give it. */
export function createRandomFromState(state: readonly [number, number, number, number]): Random {
  return new Xoshiro128(new Int32Array(state));
}

/** The finaliser of MurmurHash3 (A. Appleby, public domain): every input bit reaches every output bit. */
function mix(word: number): number {
  let h = word;
  h = Math.imul(h ^ (h >>> 16), 0x85ebca6b);
  h = Math.imul(h ^ (h >>> 13), 0xc2b2ae35);
  return h ^ (h >>> 16);
}

/** Four words from two numbers by Feistel rounds, which lose nothing: no two inputs share a state. */
function mixedState(seed: number, stream: number): Int32Array {
  const state = new Int32Array([
    seed | 0,
    Math.floor(seed / 4294967296) | 0,
    stream | 0,
    Math.floor(stream / 4294967296) | 0,
  ]);
  for (let round = 1; round <= 16; round++) {
    const target = round & 3;
    state[target] ^= mix(state[(target + 3) & 3] + Math.imul(round, 0x9e3779b9));
  }
  // the one state the generator cannot leave
  if ((state[0] | state[1] | state[2] | state[3]) === 0) state[0] = 1;
  return state;
}

class Xoshiro128 implements Random {
  readonly #state: Int32Array;
  readonly #spare = new Float64Array(1);
  #hasSpare = false;

  constructor(state: Int32Array) {
    this.#state = state;
  }

  uint32(): number {
    const s = this.#state;
    const s1 = s[1];
    const by5 = Math.imul(s1, 5);
    const result = Math.imul((by5 << 7) | (by5 >>> 25), 9);
    s[2] ^= s[0];
    s[3] ^= s1;
    s[1] = s1 ^ s[2];
    s[0] ^= s[3];
    s[2] ^= s1 << 9;
    s[3] = (s[3] << 11) | (s[3] >>> 21);
    return result >>> 0;
  }

  uniform(): number {
    const high = this.uint32() >>> 5;
    return (high * 67108864 + (this.uint32() >>> 6)) / 9007199254740992;
  }

  /** The polar method: G. Marsaglia and T. A. Bray, SIAM Rev. 6, 260 (1964). */
  normal(): number {
    if (this.#hasSpare) {
      this.#hasSpare = false;
      return this.#spare[0];
    }
    for (;;) {
      const u = 2 * this.uniform() - 1;
      const v = 2 * this.uniform() - 1;
      const square = u * u + v * v;
      if (square >= 1 || square === 0) continue;
      const scale = Math.sqrt((-2 * log(square)) / square);
      this.#spare[0] = v * scale;
      this.#hasSpare = true;
      return u * scale;
    }
  }

  poisson(mean: number): number {
    if (mean >= 10) return poissonByRejection(this, mean);
    return mean > 0 ? poissonByInversion(this, mean) : mean <= 0 ? 0 : NaN;
  }
}

/** Walks the cumulative distribution from 0 until it passes a uniform number; exact to rounding. */
function poissonByInversion(random: Random, mean: number): number {
  const u = random.uniform();
  let probability = exp(-mean);
  let sum = probability;
  let k = 0;
  // far beyond any mean below 10, terms no longer move the sum
  while (u >= sum && k < 200) {
    k++;
    probability *= mean / k;
    sum += probability;
  }
  return k;
}

/**
 * Transformed rejection with a squeeze, for means of 10 and above; exact to rounding.
 *
 * @see W. Hörmann, The transformed rejection method for generating Poisson random variables, Insurance: Mathematics
 * and Economics 12, 39 (1993), algorithm PTRS
 */
function poissonByRejection(random: Random, mean: number): number {
  const b = 0.931 + 2.53 * Math.sqrt(mean);
  const a = -0.059 + 0.02483 * b;
  const inverseAlpha = 1.1239 + 1.1328 / (b - 3.4);
  const quickLimit = 0.9277 - 3.6224 / (b - 2);
  for (;;) {
    const u = random.uniform() - 0.5;
    const v = random.uniform();
    const distance = 0.5 - Math.abs(u);
    const k = Math.floor(((2 * a) / distance + b) * u + mean + 0.43);
    if (distance >= 0.07 && v <= quickLimit) return k;
    if (k < 0 || (distance < 0.013 && v > distance)) continue;
    const ratio = (v * inverseAlpha) / (a / (distance * distance) + b);
    if (log(ratio) <= logPoissonProbability(k, mean)) return k;
  }
}
