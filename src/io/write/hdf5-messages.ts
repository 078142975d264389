/**
 * Object headers of an HDF5 file and the messages in them (file format specification, version 3,
 * section IV.A): datatype, dataspace, layout, filters, attributes, links. Little-endian throughout.
 */
import { RimlightError } from '../../errors';
import type { CountsArray } from '../../science/scan';
import { ByteWriter, undefinedAddress } from './byte-writer';
import { lookup3 } from './lookup3';

export interface Message {
  readonly type: number;
  readonly body: Uint8Array;
}

/** Bytes of one variable-length string's reference: length, heap address, heap index. */
export const stringReferenceBytes = 16;

/** Version 2 object header, no times, so that the same tree gives the same bytes. */
export function objectHeader(messages: readonly Message[], place: string): Uint8Array {
  const body = new ByteWriter();
  for (const { type, body: data } of messages) {
    if (data.length > 0xffff) throw tooLongForHeader(place, data.length);
    body.u8(type).u16(data.length).u8(0).raw(data);
  }
  const header = new ByteWriter().ascii('OHDR').u8(2, 0x02).u32(body.length).raw(body.take());
  return header.u32(lookup3(header.take())).take();
}

/** `null` is a scalar. */
export function dataspace(shape: readonly number[] | null): Uint8Array {
  const space = new ByteWriter();
  if (shape === null) return space.u8(2, 0, 0, 0).take();
  space.u8(2, shape.length, 0, 1);
  for (const length of shape) space.u64(length);
  return space.take();
}

export function datatypeOf(data: CountsArray): Uint8Array {
  if (data instanceof Float32Array) return floatType(4);
  if (data instanceof Float64Array) return floatType(8);
  const isSigned =
    data instanceof Int8Array || data instanceof Int16Array || data instanceof Int32Array;
  return integerType(data.BYTES_PER_ELEMENT, isSigned);
}

/** Variable-length UTF-8. */
export function stringType(): Uint8Array {
  return new ByteWriter()
    .u8(0x19, 0x01, 0x01, 0x00)
    .u32(stringReferenceBytes)
    .raw(integerType(1, false))
    .take();
}

function integerType(size: number, isSigned: boolean): Uint8Array {
  return new ByteWriter()
    .u8(0x10, isSigned ? 0x08 : 0, 0, 0)
    .u32(size)
    .u16(0)
    .u16(8 * size)
    .take();
}

/** IEEE 754: where sign, exponent and mantissa lie, and the exponent's bias. */
function floatType(size: 4 | 8): Uint8Array {
  const [exponentBits, mantissaBits, bias] = size === 4 ? [8, 23, 127] : [11, 52, 1023];
  return new ByteWriter()
    .u8(0x11, 0x20, 8 * size - 1, 0)
    .u32(size)
    .u16(0)
    .u16(8 * size)
    .u8(mantissaBits, exponentBits, 0, mantissaBits)
    .u32(bias)
    .take();
}

/** An element never written reads as zero. */
export function fillValueMessage(isChunked: boolean): Message {
  return { type: 0x05, body: Uint8Array.of(3, isChunked ? 0x0b : 0x0a) };
}

export function contiguousLayout(address: number | bigint, size: number): Message {
  return { type: 0x08, body: new ByteWriter().u8(3, 1).u64(address).u64(size).take() };
}

export function chunkedLayout(
  treeAddress: number | bigint,
  chunk: readonly number[],
  elementBytes: number,
): Message {
  const body = new ByteWriter().u8(3, 2, chunk.length + 1).u64(treeAddress);
  for (const length of chunk) body.u32(length);
  return { type: 0x08, body: body.u32(elementBytes).take() };
}

/** Shuffle (2) before deflate (1), as they are applied when writing. */
export function filterMessage(
  elementBytes: number,
  { shuffle, gzip }: { readonly shuffle: boolean; readonly gzip: number },
): Message {
  const body = new ByteWriter().u8(2, Number(shuffle) + Number(gzip > 0));
  if (shuffle) body.u16(2).u16(0).u16(1).u32(elementBytes);
  if (gzip > 0) body.u16(1).u16(0).u16(1).u32(gzip);
  return { type: 0x0b, body: body.take() };
}

export function attributeMessage(
  name: string,
  value: { readonly datatype: Uint8Array; readonly space: Uint8Array; readonly data: Uint8Array },
): Message {
  const encoded = new TextEncoder().encode(name);
  const body = new ByteWriter()
    .u8(3, 0)
    .u16(encoded.length + 1)
    .u16(value.datatype.length)
    .u16(value.space.length)
    .u8(1)
    .raw(encoded)
    .u8(0)
    .raw(value.datatype)
    .raw(value.space)
    .raw(value.data);
  return { type: 0x0c, body: body.take() };
}

export function linkMessage(name: string, address: number): Message {
  const encoded = new TextEncoder().encode(name);
  const body = new ByteWriter().u8(1, 0x11, 1).u16(encoded.length).raw(encoded).u64(address);
  return { type: 0x06, body: body.take() };
}

/** Links are kept in the object header itself, however many. */
export function groupMessages(): readonly Message[] {
  const info = new ByteWriter().u8(0, 0).u64(undefinedAddress).u64(undefinedAddress).take();
  return [
    { type: 0x02, body: info },
    { type: 0x0a, body: Uint8Array.of(0, 0) },
  ];
}

function tooLongForHeader(place: string, length: number): RimlightError {
  return new RimlightError('fault', {
    what: `an attribute of ${length} bytes does not fit an HDF5 object header (65535)`,
    where: place,
    hint: 'Please report this.',
  });
}
