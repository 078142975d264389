/** Which typed array holds the counts when blocks of one array come in different types. */
import type { CountsArray } from '../science/scan';

type CountsConstructor = new (length: number) => CountsArray;

/** Whole-number range of each integer array; floats hold all of them but for 32 bits in Float32Array. */
const integerRanges: readonly (readonly [CountsConstructor, number, number])[] = [
  [Uint8Array, 0, 0xff],
  [Int8Array, -0x80, 0x7f],
  [Uint16Array, 0, 0xffff],
  [Int16Array, -0x8000, 0x7fff],
  [Uint32Array, 0, 0xffffffff],
  [Int32Array, -0x80000000, 0x7fffffff],
];

/** An empty array of the same type as `like`. */
export function emptyLike(like: CountsArray, length: number): CountsArray {
  return new (like.constructor as CountsConstructor)(length);
}

/**
 * `held` itself where it can hold every value of `next`'s type, otherwise its values in the smallest
 * type that holds both. Readers give 64-bit integers in the smallest type each block fits.
 */
export function widened(held: CountsArray, next: CountsArray): CountsArray {
  if (held.constructor === next.constructor || held instanceof Float64Array) return held;
  const a = rangeOf(held);
  const b = rangeOf(next);
  if (a === null || b === null) return Float64Array.from(held);
  const low = Math.min(a[1], b[1]);
  const high = Math.max(a[2], b[2]);
  const fit = integerRanges.find(([, from, to]) => from <= low && to >= high);
  if (fit === undefined) return Float64Array.from(held);
  if (fit[0] === held.constructor) return held;
  const wide = new fit[0](held.length);
  wide.set(held);
  return wide;
}

function rangeOf(array: CountsArray): (typeof integerRanges)[number] | null {
  return integerRanges.find(([type]) => type === array.constructor) ?? null;
}
