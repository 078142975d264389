/** Fortran order into C order: a block whose axes come in the opposite order. */
import type { CountsArray } from '../science/scan';
import { emptyLike } from './count-types';

/** Both sides of a square of this many values fit in the processor's first cache. */
const tile = 32;

/**
 * @param values - block with axis 0 fastest
 * @param count - lengths of axes 0, 1, …
 * @returns the same block with the last axis fastest
 */
export function reverseAxes(values: CountsArray, count: readonly number[]): CountsArray {
  const axes = count.filter((length) => length !== 1);
  if (axes.length < 2 || values.length === 0) return values;
  const out = emptyLike(values, values.length);
  const first = axes[0];
  const last = axes[axes.length - 1];
  const middle = axes.slice(1, -1);
  const middles = values.length / first / last;
  const lastStride = values.length / last;
  for (let m = 0; m < middles; m++) {
    // The middle axes are turned round as well: index m counted with the first of them fastest.
    let rest = m;
    let reversed = 0;
    for (const length of middle) {
      reversed = reversed * length + (rest % length);
      rest = Math.floor(rest / length);
    }
    for (let a0 = 0; a0 < first; a0 += tile) {
      for (let b0 = 0; b0 < last; b0 += tile) {
        const a1 = Math.min(a0 + tile, first);
        const b1 = Math.min(b0 + tile, last);
        for (let a = a0; a < a1; a++) {
          const to = (a * middles + reversed) * last;
          const from = a + m * first;
          for (let b = b0; b < b1; b++) out[to + b] = values[from + b * lastStride];
        }
      }
    }
  }
  return out;
}
