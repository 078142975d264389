/** The spectra of the pixels around one, channel by channel: their median and how far they spread. */

import type { ConditionedSlab } from './conditioned';
import { widestSpikeChannels } from './spike-finder';

/**
 * Means of the second greatest of n normal numbers, in σ (the greatest for n < 4): the spread between it and
 * the second least, over twice this, is σ.
 *
 * @see D. Teichroew, Ann. Math. Stat. 27, 410 (1956), tables of expected values of order statistics; from memory
 */
const secondGreatest = [0, 0, 0.5642, 0.8463, 0.297, 0.495, 0.6418, 0.7574, 0.8522];

export class NeighbourSpectra {
  /** (nk) median of the neighbours that have data; NaN where none has */
  readonly median: Float64Array;
  /**
   * (nk) variance among them of how far a channel stands out from those 3 to its left and right, without
   * the highest and lowest where there are four or more: of narrow lines, not of brightness
   */
  readonly spread: Float64Array;
  readonly #slab: ConditionedSlab;
  readonly #sorted = new Float64Array(8);
  readonly #offsets = new Int32Array(8);

  constructor(slab: ConditionedSlab) {
    this.#slab = slab;
    this.median = new Float64Array(slab.shape.nk);
    this.spread = new Float64Array(slab.shape.nk);
  }

  /** Of row y of the slab (from 0), column x. False for a pixel without neighbours. */
  read(y: number, x: number): boolean {
    const { nk } = this.#slab.shape;
    const count = this.#gather(y, x);
    if (count === 0) return false;
    for (let k = 0; k < nk; k++) {
      this.median[k] = middleOf(this.#sorted, this.#sort(count, k));
      this.spread[k] = spreadOf(this.#sorted, this.#sortContrasts(count, k));
    }
    return true;
  }

  #gather(y: number, x: number): number {
    const { ny, nx, nk } = this.#slab.shape;
    let count = 0;
    for (let ownY = Math.max(0, y - 1); ownY <= Math.min(ny - 1, y + 1); ownY++) {
      for (let ownX = Math.max(0, x - 1); ownX <= Math.min(nx - 1, x + 1); ownX++) {
        if (ownY !== y || ownX !== x) this.#offsets[count++] = (ownY * nx + ownX) * nk;
      }
    }
    return count;
  }

  /** Channel k of the neighbours in ascending order; how many have data. */
  #sort(count: number, k: number): number {
    let found = 0;
    for (let n = 0; n < count; n++) {
      found = this.#insert(this.#slab.counts[this.#offsets[n] + k], found);
    }
    return found;
  }

  /** The same of how far channel k stands out. */
  #sortContrasts(count: number, k: number): number {
    const { counts, shape } = this.#slab;
    const left = Math.max(0, k - widestSpikeChannels);
    const right = Math.min(shape.nk - 1, k + widestSpikeChannels);
    let found = 0;
    for (let n = 0; n < count; n++) {
      const at = this.#offsets[n];
      found = this.#insert(counts[at + k] - (counts[at + left] + counts[at + right]) / 2, found);
    }
    return found;
  }

  /** Puts a value in its place among those found so far; no data is passed over. */
  #insert(value: number, found: number): number {
    if (Number.isNaN(value)) return found;
    const sorted = this.#sorted;
    let at = found;
    for (; at > 0 && sorted[at - 1] > value; at--) sorted[at] = sorted[at - 1];
    sorted[at] = value;
    return found + 1;
  }
}

function middleOf(sorted: Float64Array, found: number): number {
  if (found === 0) return Number.NaN;
  const half = found >> 1;
  return found % 2 === 1 ? sorted[half] : (sorted[half - 1] + sorted[half]) / 2;
}

function spreadOf(sorted: Float64Array, found: number): number {
  if (found < 2) return 0;
  const cut = found < 4 ? 0 : 1;
  const sigma = (sorted[found - 1 - cut] - sorted[cut]) / (2 * secondGreatest[found]);
  return sigma * sigma;
}
