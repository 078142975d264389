/**
 * The header of a NumPy .npy file.
 *
 * @see NumPy Enhancement Proposal 1, "A Simple File Format for NumPy Arrays"; format versions 1.0, 2.0, 3.0
 */
import type { RimlightError } from '../errors';
import type { ElementType } from './container';
import { type PythonLiteral, parsePythonLiteral } from './python-literal';
import { scanError } from './scan-error';
import { valuesOf } from './shape';
import type { ArrayLayout } from './stored-array';

/** Magic, version and the longer length field. */
export const npyPrefixBytes = 12;

const magic = [0x93, 0x4e, 0x55, 0x4d, 0x50, 0x59] as const;
/** NumPy itself refuses headers above 10 000 bytes unless told otherwise. */
const mostHeaderBytes = 1 << 20;

export function isNpy(head: Uint8Array): boolean {
  return magic.every((byte, i) => head[i] === byte);
}

/**
 * Where the header's text lies.
 *
 * @param prefix - the file's first 12 bytes (or all of a shorter file)
 * @throws RimlightError 'scan' - when these are not a .npy file's
 */
export function npyHeaderSpan(
  prefix: Uint8Array,
  where: string,
): { readonly from: number; readonly to: number } {
  if (!isNpy(prefix)) throw scanError('it does not begin as a .npy file does', `${where}, byte 0`);
  if (prefix.length < npyPrefixBytes) {
    throw scanError(`the file ends at byte ${prefix.length}, inside its header`, where);
  }
  const version = prefix[6];
  if (version < 1 || version > 3) {
    throw scanError(
      `.npy format version ${version}.${prefix[7]} is not known (1.0 to 3.0 are)`,
      `${where}, byte 6`,
      'Save the array again with numpy.save.',
    );
  }
  const view = new DataView(prefix.buffer, prefix.byteOffset, prefix.byteLength);
  const length = version === 1 ? view.getUint16(8, true) : view.getUint32(8, true);
  const from = version === 1 ? 10 : 12;
  if (length > mostHeaderBytes) {
    throw scanError(`its header claims to be ${length} bytes long`, `${where}, byte 8`);
  }
  return { from, to: from + length };
}

/**
 * @param bytes - the header's text, without the prefix
 * @param offset - byte where the text ends and the data begin
 * @throws RimlightError 'scan' - when it is damaged, or the elements are not plain numbers
 */
export function parseNpyHeader(bytes: Uint8Array, offset: number, where: string): ArrayLayout {
  const header = parsePythonLiteral(new TextDecoder().decode(bytes))?.value;
  if (!(header instanceof Map)) throw damagedHeader(where);
  const order = header.get('fortran_order');
  const shape = header.get('shape');
  const descr = header.get('descr');
  if (typeof order !== 'boolean' || !isNumbers(shape) || descr === undefined) {
    throw damagedHeader(where);
  }
  valuesOf(shape, where);
  return { ...elementOf(descr, where), shape, isFortran: order, offset };
}

function isNumbers(value: PythonLiteral | undefined): value is readonly number[] {
  return Array.isArray(value) && value.every((one) => typeof one === 'number');
}

const numericTypes: Readonly<Record<string, ElementType>> = {
  b1: 'bool',
  u1: 'uint8',
  u2: 'uint16',
  u4: 'uint32',
  u8: 'uint64',
  i1: 'int8',
  i2: 'int16',
  i4: 'int32',
  i8: 'int64',
  f2: 'float16',
  f4: 'float32',
  f8: 'float64',
};

/** What NumPy's other kinds of elements are called, and what to do about them. */
const otherKinds: Readonly<Record<string, readonly [name: string, hint: string]>> = {
  O: [
    'pickled Python objects, which are never loaded because they could run a program',
    'Save the numbers alone: numpy.save(name, array.astype(float)).',
  ],
  c: ['complex numbers', 'Save their absolute values or their real parts.'],
  f: ['extended floating-point numbers', 'Save them as float64.'],
  S: ['texts', 'Save the numbers alone.'],
  a: ['texts', 'Save the numbers alone.'],
  U: ['texts', 'Save the numbers alone.'],
  M: ['dates', 'Save the numbers alone.'],
  m: ['time spans', 'Save them as float64, in seconds.'],
  V: ['raw bytes', 'Save the numbers alone.'],
};

function elementOf(
  descr: PythonLiteral,
  where: string,
): { readonly type: ElementType; readonly isLittleEndian: boolean } {
  if (typeof descr !== 'string') {
    throw notNumbers(
      'records of several fields',
      'Save one field: numpy.save(name, a["field"]).',
      where,
    );
  }
  const match = /^([<>|=]?)(([a-zA-Z?])(\d*))(\[.*\])?$/.exec(descr);
  if (match === null) throw damagedHeader(where);
  const [, order, element, kind] = match;
  const type = numericTypes[element === '?' ? 'b1' : element];
  if (type !== undefined && match[5] === undefined) {
    return { type, isLittleEndian: order !== '>' };
  }
  const other = otherKinds[kind];
  if (other === undefined) throw damagedHeader(where);
  throw notNumbers(other[0], other[1], where);
}

function notNumbers(kind: string, hint: string, where: string): RimlightError {
  return scanError(`its elements are ${kind}`, where, hint);
}

function damagedHeader(where: string): RimlightError {
  return scanError('its .npy header is damaged', where);
}
