/** A block of an array that is held in memory. */
import type { CountsArray } from '../../science/scan';
import { emptyLike } from '../count-types';

/**
 * @param values - C order of `shape`
 * @param start - first index on each axis; checked by the caller, as `count` is
 * @returns product(count) values of the same type; always a copy
 */
export function cutBlock(
  values: CountsArray,
  shape: readonly number[],
  start: readonly number[],
  count: readonly number[],
): CountsArray {
  const total = count.reduce((product, length) => product * length, 1);
  const out = emptyLike(values, total);
  if (total === 0) return out;
  const strides = shape.map((_, axis) =>
    shape.slice(axis + 1).reduce((product, length) => product * length, 1),
  );
  const last = shape.length - 1;
  const run = last < 0 ? 1 : count[last];
  const index = start.map(() => 0);
  for (let done = 0; done < total; done += run) {
    let from = 0;
    for (let axis = 0; axis <= last; axis++) from += (start[axis] + index[axis]) * strides[axis];
    out.set(values.subarray(from, from + run), done);
    for (let axis = last - 1; axis >= 0; axis--) {
      if (++index[axis] < count[axis]) break;
      index[axis] = 0;
    }
  }
  return out;
}
