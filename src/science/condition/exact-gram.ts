/**
 * Products of channels summed over pixels, to the same bits however the pixels are shared out: values are
 * rounded to a step of 2⁻ᵠ so coarse that every product and every sum of them is a whole number below 2⁵³,
 * which doubles add without rounding. The rounding is far below the noise, which is 1 here, and touches
 * only the choice of components, never the counts.
 */

/** How finely values can be kept: by their greatest size and number. */
export interface ExactStep {
  /** 2ᵠ */
  readonly stepsPerUnit: number;
}

/** Bits a double adds exactly, and the finest step worth having. */
const exactBits = 53;
const mostFractionBits = 16;

/** @param greatest - of all values, in size; pixels - how many are summed */
export function exactStep(greatest: number, pixels: number): ExactStep {
  let stepsPerUnit = 1;
  const limit = powerOfTwo(exactBits);
  const sumOfSquares = (steps: number): number => {
    const value = Math.ceil(greatest * steps) + 1;
    return value * value * Math.max(1, pixels);
  };
  for (let bit = 0; bit < mostFractionBits; bit++) {
    if (sumOfSquares(stepsPerUnit * 2) >= limit) break;
    stepsPerUnit *= 2;
  }
  while (sumOfSquares(stepsPerUnit) >= limit) stepsPerUnit /= 2;
  return { stepsPerUnit };
}

function powerOfTwo(bits: number): number {
  let value = 1;
  for (let i = 0; i < bits; i++) value *= 2;
  return value;
}

/** Pixels multiplied at a time: their values of eight channels stay close at hand. */
const blockPixels = 256;
/** Channels of which products are made at a time, four with four: each value read serves four times. */
const group = 4;

/** Collects pixels into the upper half of their products, (n × n), in steps². */
export class ExactGram {
  readonly sums: Float64Array;
  /** pixels taken in */
  pixels = 0;
  readonly #n: number;
  readonly #stepsPerUnit: number;
  /** (n, up to the next whole group, × blockPixels) a block of pixels, channel by channel */
  readonly #block: Float64Array;
  readonly #products = new Float64Array(group * group);
  #filled = 0;

  constructor(n: number, { stepsPerUnit }: ExactStep) {
    this.#n = n;
    this.#stepsPerUnit = stepsPerUnit;
    this.sums = new Float64Array(n * n);
    this.#block = new Float64Array(Math.ceil(n / group) * group * blockPixels);
  }

  /** @param values - (n) of one pixel */
  add(values: Float64Array): void {
    for (let i = 0; i < this.#n; i++) {
      this.#block[i * blockPixels + this.#filled] = Math.round(values[i] * this.#stepsPerUnit);
    }
    this.#filled++;
    this.pixels++;
    if (this.#filled === blockPixels) this.flush();
  }

  /** Adds what waits in the block; to be called at the end. */
  flush(): void {
    const n = this.#n;
    const products = this.#products;
    for (let i = 0; i < n && this.#filled > 0; i += group) {
      for (let j = i; j < n; j += group) {
        multiplyGroups(this.#block, i * blockPixels, j * blockPixels, this.#filled, products);
        for (let at = 0; at < products.length; at++) {
          const row = i + (at >> 2);
          const column = j + (at & 3);
          if (row < n && column < n) this.sums[row * n + column] += products[at];
        }
      }
    }
    this.#filled = 0;
  }
}

/** Sixteen sums of products, of the channels from `a` on with those from `b` on. */
function multiplyGroups(
  block: Float64Array,
  a: number,
  b: number,
  count: number,
  out: Float64Array,
): void {
  let s00 = 0;
  let s01 = 0;
  let s02 = 0;
  let s03 = 0;
  let s10 = 0;
  let s11 = 0;
  let s12 = 0;
  let s13 = 0;
  let s20 = 0;
  let s21 = 0;
  let s22 = 0;
  let s23 = 0;
  let s30 = 0;
  let s31 = 0;
  let s32 = 0;
  let s33 = 0;
  for (let p = 0; p < count; p++) {
    const b0 = block[b + p];
    const b1 = block[b + p + blockPixels];
    const b2 = block[b + p + 2 * blockPixels];
    const b3 = block[b + p + 3 * blockPixels];
    const a0 = block[a + p];
    s00 += a0 * b0;
    s01 += a0 * b1;
    s02 += a0 * b2;
    s03 += a0 * b3;
    const a1 = block[a + p + blockPixels];
    s10 += a1 * b0;
    s11 += a1 * b1;
    s12 += a1 * b2;
    s13 += a1 * b3;
    const a2 = block[a + p + 2 * blockPixels];
    s20 += a2 * b0;
    s21 += a2 * b1;
    s22 += a2 * b2;
    s23 += a2 * b3;
    const a3 = block[a + p + 3 * blockPixels];
    s30 += a3 * b0;
    s31 += a3 * b1;
    s32 += a3 * b2;
    s33 += a3 * b3;
  }
  out.set([s00, s01, s02, s03, s10, s11, s12, s13, s20, s21, s22, s23, s30, s31, s32, s33]);
}

/** Both halves of the sum of several, in units² again. */
export function joinGrams(
  grams: readonly Float64Array[],
  n: number,
  { stepsPerUnit }: ExactStep,
): Float64Array {
  const out = new Float64Array(n * n);
  const unit = stepsPerUnit * stepsPerUnit;
  for (let i = 0; i < n; i++) {
    for (let j = i; j < n; j++) {
      let sum = 0;
      for (const gram of grams) sum += gram[i * n + j];
      out[i * n + j] = sum / unit;
      out[j * n + i] = sum / unit;
    }
  }
  return out;
}
