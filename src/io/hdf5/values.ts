/** Small values of an HDF5 file: attributes, scalars and texts, with their bytes checked before they are believed. */
import type { AttributeValue, ElementType } from '../container';
import { decodeElements } from '../dtype';
import { roundedToType } from '../round-to-type';
import type { H5Module } from './library';

export type Metadata = ReturnType<H5Module['get_dataset_metadata']>;

/** Longer attributes are pictures or logs, not settings. */
const mostValueBytes = 256 << 10;
const mostTexts = 4096;
const mostTextBytes = 64 << 10;

/** HDF5's numbers for classes of types. */
const integerClass = 0;
const floatClass = 1;
const stringClass = 3;
const enumClass = 8;

/** The element type of a dataset of numbers; null for texts, records, references and the like. */
export function elementTypeOf({ type, size, signed, enum_type }: Metadata): ElementType | null {
  if (type === floatClass) return floatTypes[size] ?? null;
  if (type === integerClass) return (signed ? signedTypes : unsignedTypes)[size] ?? null;
  if (type !== enumClass || enum_type === undefined || enum_type.type !== integerClass) return null;
  const { members, nmembers } = enum_type;
  const isBool = size === 1 && nmembers === 2 && members.FALSE === 0 && members.TRUE === 1;
  return isBool ? 'bool' : ((signed ? signedTypes : unsignedTypes)[size] ?? null);
}

const floatTypes: Readonly<Record<number, ElementType>> = {
  2: 'float16',
  4: 'float32',
  8: 'float64',
};
const signedTypes: Readonly<Record<number, ElementType>> = {
  1: 'int8',
  2: 'int16',
  4: 'int32',
  8: 'int64',
};
const unsignedTypes: Readonly<Record<number, ElementType>> = {
  1: 'uint8',
  2: 'uint16',
  4: 'uint32',
  8: 'uint64',
};

/** Whether a value is short enough, and of a kind that can be shown. */
export function isSmallValue(metadata: Metadata): boolean {
  const { shape, size, total_size, type } = metadata;
  if (shape === null || !(size > 0) || !(total_size >= 1)) return false;
  if (shape.reduce((product, length) => product * length, 1) !== total_size) return false;
  if (type === stringClass) return total_size <= mostTexts && total_size * size <= mostValueBytes;
  return elementTypeOf(metadata) !== null && total_size * size <= mostValueBytes;
}

export interface ValueReading {
  /** Copies the value to this place in the library's memory; negative when it failed. */
  readonly read: (pointer: bigint) => number;
  /** Gives back texts the library allocated for the value at this place. */
  readonly reclaim: (pointer: bigint) => void;
}

/** A small value as text, number, or list of them; null where it could not be read. */
export function readValue(
  module: H5Module,
  metadata: Metadata,
  { read, reclaim }: ValueReading,
): AttributeValue | null {
  const bytes = metadata.size * metadata.total_size;
  const pointer = module._malloc(bytes);
  if (pointer === 0) return null;
  try {
    // Zeros are no texts: what a failing read leaves unfilled must not be taken for addresses.
    module.HEAPU8.fill(0, pointer, pointer + bytes);
    if (read(BigInt(pointer)) < 0) return null;
    const raw = module.HEAPU8.slice(pointer, pointer + bytes);
    const list =
      metadata.type === stringClass ? textsOf(module, raw, metadata) : numbersOf(raw, metadata);
    if (metadata.vlen) reclaim(BigInt(pointer));
    const isScalar = metadata.shape === null || metadata.shape.length === 0;
    return isScalar ? list[0] : list;
  } finally {
    module._free(pointer);
  }
}

function numbersOf(raw: Uint8Array, metadata: Metadata): readonly number[] {
  const type = elementTypeOf(metadata);
  if (type === null) return [];
  return Array.from(decodeElements(raw, type, true), (value) => roundedToType(value, type));
}

function textsOf(module: H5Module, raw: Uint8Array, metadata: Metadata): readonly string[] {
  if (metadata.vlen) {
    const pointers = new Uint32Array(raw.buffer, raw.byteOffset, raw.length / 4);
    return Array.from(pointers, (pointer) =>
      pointer === 0 ? '' : decodeText(zeroEnded(module.HEAPU8, pointer)),
    );
  }
  const { size, total_size, strpad } = metadata;
  return Array.from({ length: total_size }, (_, i) => {
    const text = decodeText(zeroEnded(raw.subarray(i * size, (i + 1) * size), 0));
    return strpad === 2 ? text.replace(/ +$/, '') : text;
  });
}

function zeroEnded(bytes: Uint8Array, from: number): Uint8Array {
  const most = Math.min(bytes.length, from + mostTextBytes);
  let to = from;
  while (to < most && bytes[to] !== 0) to++;
  return bytes.slice(from, to);
}

/** Texts declared ASCII hold UTF-8 or the Western code page in practice: "µm", "cm⁻¹". */
function decodeText(bytes: Uint8Array): string {
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes);
  } catch {
    return new TextDecoder('windows-1252').decode(bytes);
  }
}
