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

/** Pixels multiplied at a time: their values of four channels stay close at hand. */
const blockPixels = 256;

/** Collects pixels into the upper half of their products, (n × n), in steps². */
export class ExactGram {
  readonly sums: Float64Array;
  /** pixels taken in */
  pixels = 0;
  readonly #n: number;
  readonly #stepsPerUnit: number;
  /** (n × blockPixels) a block of pixels, channel by channel */
  readonly #block: Float64Array;
  #filled = 0;

  constructor(n: number, { stepsPerUnit }: ExactStep) {
    this.#n = n;
    this.#stepsPerUnit = stepsPerUnit;
    this.sums = new Float64Array(n * n);
    this.#block = new Float64Array(n * blockPixels);
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
    const count = this.#filled;
    if (count === 0) return;
    const n = this.#n;
    for (let i = 0; i < n; i += 2) {
      for (let j = i; j < n; j += 2) this.#addPairs(i, j, count);
    }
    this.#filled = 0;
  }

  /** Four products at once, of channels i, i + 1 with j, j + 1: each value read serves twice. */
  #addPairs(i: number, j: number, count: number): void {
    const n = this.#n;
    const block = this.#block;
    const a = i * blockPixels;
    const b = (i + 1 < n ? i + 1 : i) * blockPixels;
    const c = j * blockPixels;
    const d = (j + 1 < n ? j + 1 : j) * blockPixels;
    let ac = 0;
    let ad = 0;
    let bc = 0;
    let bd = 0;
    for (let p = 0; p < count; p++) {
      const va = block[a + p];
      const vb = block[b + p];
      const vc = block[c + p];
      const vd = block[d + p];
      ac += va * vc;
      ad += va * vd;
      bc += vb * vc;
      bd += vb * vd;
    }
    const { sums } = this;
    sums[i * n + j] += ac;
    if (j + 1 < n) sums[i * n + j + 1] += ad;
    if (i + 1 < n && j > i) sums[(i + 1) * n + j] += bc;
    if (i + 1 < n && j + 1 < n) sums[(i + 1) * n + j + 1] += bd;
  }
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
