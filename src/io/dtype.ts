/** Element types as stored: their sizes, the typed arrays they are read into, and raw bytes into numbers. */
import type { CountsArray } from '../science/scan';
import type { ElementType } from './container';

export const bytesOfType: Readonly<Record<ElementType, number>> = {
  uint8: 1,
  int8: 1,
  bool: 1,
  uint16: 2,
  int16: 2,
  float16: 2,
  uint32: 4,
  int32: 4,
  float32: 4,
  uint64: 8,
  int64: 8,
  float64: 8,
};

/** All that one call may ask for; more is a mistake in a file or a program. */
export const mostBytesPerRead = 16 * 2 ** 30;

interface CountsConstructor {
  new (length: number): CountsArray;
  new (buffer: ArrayBufferLike, byteOffset: number, length: number): CountsArray;
}

/** The array each type is read into, before 64-bit integers are narrowed. */
export const arrayOfType: Readonly<Record<ElementType, CountsConstructor>> = {
  uint8: Uint8Array,
  int8: Int8Array,
  bool: Uint8Array,
  uint16: Uint16Array,
  int16: Int16Array,
  float16: Float32Array,
  uint32: Uint32Array,
  int32: Int32Array,
  float32: Float32Array,
  uint64: Float64Array,
  int64: Float64Array,
  float64: Float64Array,
};

/**
 * Raw elements as numbers.
 *
 * 64-bit integers come in the smallest array that holds them all exactly, or as Float64Array: exact up
 * to ±2^53, the nearest double beyond. Half floats come as Float32Array (exact), bool as 0 and 1.
 *
 * @param bytes - whole elements; taken over: may be swapped in place and become the result
 */
export function decodeElements(
  bytes: Uint8Array,
  type: ElementType,
  isLittleEndian: boolean,
): CountsArray {
  const size = bytesOfType[type];
  const aligned = bytes.byteOffset % 8 === 0 ? bytes : bytes.slice();
  if (!isLittleEndian) swapBytes(aligned, size);
  const count = aligned.length / size;
  const { buffer, byteOffset } = aligned;
  if (type === 'bool') return aligned.map((byte) => (byte === 0 ? 0 : 1));
  if (type === 'float16') return fromHalf(new Uint16Array(buffer, byteOffset, count));
  if (type === 'uint64' || type === 'int64') {
    return narrowed(fromInt64(new Uint32Array(buffer, byteOffset, 2 * count), type === 'int64'));
  }
  return new arrayOfType[type](buffer, byteOffset, count);
}

/** Turns the byte order of each element of `size` bytes, in place. */
export function swapBytes(bytes: Uint8Array, size: number): void {
  for (let at = 0; at + size <= bytes.length; at += size) {
    for (let low = at, high = at + size - 1; low < high; low++, high--) {
      const byte = bytes[low];
      bytes[low] = bytes[high];
      bytes[high] = byte;
    }
  }
}

/** IEEE 754 binary16 to binary32, by moving the bits. */
function fromHalf(halves: Uint16Array): Float32Array {
  const bits = new Uint32Array(halves.length);
  for (let i = 0; i < halves.length; i++) {
    const sign = (halves[i] & 0x8000) << 16;
    let exponent = (halves[i] >> 10) & 0x1f;
    let mantissa = halves[i] & 0x3ff;
    if (exponent === 31) exponent = 255;
    else if (exponent > 0) exponent += 112;
    else if (mantissa > 0) {
      // Subnormal: shift until the leading one falls off.
      exponent = 113;
      while ((mantissa & 0x400) === 0) {
        mantissa <<= 1;
        exponent--;
      }
      mantissa &= 0x3ff;
    }
    bits[i] = sign | (exponent << 23) | (mantissa << 13);
  }
  return new Float32Array(bits.buffer);
}

function fromInt64(words: Uint32Array, isSigned: boolean): Float64Array {
  const values = new Float64Array(words.length / 2);
  for (let i = 0; i < values.length; i++) {
    const high = isSigned ? words[2 * i + 1] | 0 : words[2 * i + 1];
    // high · 2^32 is exact, so the sum is rounded once.
    values[i] = high * 4294967296 + words[2 * i];
  }
  return values;
}

function narrowed(values: Float64Array): CountsArray {
  let low = 0;
  let high = 0;
  for (const value of values) {
    if (value < low) low = value;
    else if (value > high) high = value;
  }
  if (low >= 0) {
    if (high <= 0xff) return Uint8Array.from(values);
    if (high <= 0xffff) return Uint16Array.from(values);
    return high <= 0xffffffff ? Uint32Array.from(values) : values;
  }
  if (low >= -0x80 && high <= 0x7f) return Int8Array.from(values);
  if (low >= -0x8000 && high <= 0x7fff) return Int16Array.from(values);
  return low >= -0x80000000 && high <= 0x7fffffff ? Int32Array.from(values) : values;
}
