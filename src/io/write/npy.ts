/** Writes an array as a NumPy .npy file, format 1.0. */
import { RimlightError } from '../../errors';
import type { CountsArray } from '../../science/scan';
import { swapBytes } from '../dtype';
import { reverseAxes } from '../reverse-axes';

export interface NpyOptions {
  /** first axis fastest in the file */
  readonly fortran?: boolean;
  readonly bigEndian?: boolean;
}

/** NumPy aligns the data to this many bytes. */
const alignment = 64;

/**
 * @param array - values in C order (last axis fastest), whatever the file's order will be
 * @throws RimlightError 'fault' - when the shape does not match
 * @see NumPy Enhancement Proposal 1, "A Simple File Format for NumPy Arrays"
 */
export function encodeNpy(
  array: CountsArray,
  shape: readonly number[],
  { fortran = false, bigEndian = false }: NpyOptions = {},
): Uint8Array {
  if (shape.reduce((product, length) => product * length, 1) !== array.length) {
    throw new RimlightError('fault', {
      what: `${array.length} values do not fill the shape (${shape.join(', ')})`,
      where: 'writing .npy',
      hint: 'Please report this.',
    });
  }
  // Read as Fortran order, the same values have their axes in reverse.
  const ordered = fortran ? reverseAxes(array, shape.toReversed()) : array;
  const head = headerOf(array, shape, fortran, bigEndian);
  const file = new Uint8Array(head.length + ordered.byteLength);
  file.set(head);
  file.set(new Uint8Array(ordered.buffer, ordered.byteOffset, ordered.byteLength), head.length);
  if (bigEndian) swapBytes(file.subarray(head.length), array.BYTES_PER_ELEMENT);
  return file;
}

function headerOf(
  array: CountsArray,
  shape: readonly number[],
  fortran: boolean,
  bigEndian: boolean,
): Uint8Array {
  const lengths = shape.length === 1 ? `${shape[0]},` : shape.join(', ');
  const descr = descrOf(array, bigEndian);
  const text = `{'descr': '${descr}', 'fortran_order': ${fortran ? 'True' : 'False'}, 'shape': (${lengths}), }`;
  const length = Math.ceil((10 + text.length + 1) / alignment) * alignment - 10;
  const bytes = new Uint8Array(10 + length);
  bytes.set([0x93, 0x4e, 0x55, 0x4d, 0x50, 0x59, 1, 0, length & 0xff, length >> 8]);
  bytes.set(new TextEncoder().encode(`${text.padEnd(length - 1)}\n`), 10);
  return bytes;
}

function descrOf(array: CountsArray, bigEndian: boolean): string {
  const size = array.BYTES_PER_ELEMENT;
  const isFloat = array instanceof Float32Array || array instanceof Float64Array;
  const isSigned =
    array instanceof Int8Array || array instanceof Int16Array || array instanceof Int32Array;
  const order = size === 1 ? '|' : bigEndian ? '>' : '<';
  return `${order}${isFloat ? 'f' : isSigned ? 'i' : 'u'}${size}`;
}
