/**
 * What a zip archive holds, from its central directory. Names are only names here: nothing is ever
 * written to disk, so a path that climbs out of its folder can do no harm.
 *
 * @see PKWARE, .ZIP File Format Specification (APPNOTE), 6.3: sections 4.3.7, 4.3.12 to 4.3.16, 4.5.3
 */
import { readExactly } from '../byte-source';
import type { ByteSource } from '../container';
import { scanError } from '../scan-error';

export interface ZipMember {
  readonly name: string;
  /** 0 stored, 8 deflated; others cannot be read */
  readonly method: number;
  readonly isEncrypted: boolean;
  readonly crc32: number;
  readonly packedBytes: number;
  readonly bytes: number;
  readonly headerAt: number;
}

const endBytes = 22;
const mostComment = 0xffff;
const mostMembers = 10_000;
const mostDirectoryBytes = 64 << 20;

/** @throws RimlightError 'scan' - when the archive is damaged, in several parts, or has two members of one name */
export async function readZipDirectory(source: ByteSource): Promise<readonly ZipMember[]> {
  const { at, bytes, count } = await findDirectory(source);
  if (count > mostMembers || bytes > mostDirectoryBytes) {
    throw scanError(`the archive claims to hold ${count} members`, source.name);
  }
  const directory = await readExactly(source, at, at + bytes);
  const members: ZipMember[] = [];
  const names = new Set<string>();
  let from = 0;
  for (let i = 0; i < count; i++) {
    const { member, end } = parseEntry(directory, from, `${source.name}, byte ${at + from}`);
    if (names.has(member.name)) throw twice(member.name, source.name);
    names.add(member.name);
    members.push(member);
    from = end;
  }
  return members;
}

interface DirectorySpan {
  readonly at: number;
  readonly bytes: number;
  readonly count: number;
}

async function findDirectory(source: ByteSource): Promise<DirectorySpan> {
  const { size, name } = source;
  const tailAt = Math.max(0, size - endBytes - mostComment);
  const view = viewOf(await readExactly(source, tailAt, size));
  for (let at = view.byteLength - endBytes; at >= 0; at--) {
    if (view.getUint32(at, true) !== 0x06054b50) continue;
    if (at + endBytes + view.getUint16(at + 20, true) > view.byteLength) continue;
    const span = {
      count: view.getUint16(at + 10, true),
      bytes: view.getUint32(at + 12, true),
      at: view.getUint32(at + 16, true),
    };
    const parts = view.getUint16(at + 4, true);
    const isZip64 = span.count === 0xffff || span.bytes === 0xffffffff || span.at === 0xffffffff;
    if (isZip64) return readZip64End(source, tailAt + at);
    if (parts !== 0) throw severalParts(name);
    return checkedSpan(span, tailAt + at, name);
  }
  throw scanError(
    'the archive’s directory is missing at its end',
    name,
    'It was cut off: copy it again, or repeat the export.',
  );
}

async function readZip64End(source: ByteSource, endAt: number): Promise<DirectorySpan> {
  const { name } = source;
  const locator = viewOf(await readExactly(source, Math.max(0, endAt - 20), endAt));
  if (locator.byteLength < 20 || locator.getUint32(0, true) !== 0x07064b50) {
    throw damaged(`${name}, byte ${endAt - 20}`);
  }
  const at = uint64(locator, 8, name);
  if (at + 56 > endAt) throw damaged(`${name}, byte ${endAt - 20}`);
  const end = viewOf(await readExactly(source, at, at + 56));
  if (end.getUint32(0, true) !== 0x06064b50) throw damaged(`${name}, byte ${at}`);
  if (end.getUint32(16, true) !== 0) throw severalParts(name);
  const span = {
    count: uint64(end, 32, name),
    bytes: uint64(end, 40, name),
    at: uint64(end, 48, name),
  };
  return checkedSpan(span, at, name);
}

function checkedSpan(span: DirectorySpan, endAt: number, name: string): DirectorySpan {
  if (span.at + span.bytes > endAt) throw damaged(`${name}, byte ${endAt}`);
  return span;
}

function parseEntry(
  directory: Uint8Array,
  from: number,
  where: string,
): { readonly member: ZipMember; readonly end: number } {
  const view = viewOf(directory);
  if (from + 46 > directory.length || view.getUint32(from, true) !== 0x02014b50) {
    throw damaged(where);
  }
  const flags = view.getUint16(from + 8, true);
  const nameAt = from + 46;
  const extraAt = nameAt + view.getUint16(from + 28, true);
  const commentAt = extraAt + view.getUint16(from + 30, true);
  const end = commentAt + view.getUint16(from + 32, true);
  if (end > directory.length) throw damaged(where);
  const sizes = {
    bytes: view.getUint32(from + 24, true),
    packedBytes: view.getUint32(from + 20, true),
    headerAt: view.getUint32(from + 42, true),
  };
  const name = new TextDecoder().decode(directory.subarray(nameAt, extraAt));
  const member = {
    name,
    method: view.getUint16(from + 10, true),
    // Bit 0: encrypted; bit 13: the directory's values are masked.
    isEncrypted: (flags & 0x2001) !== 0,
    crc32: view.getUint32(from + 16, true),
    ...widened(sizes, viewOf(directory.subarray(extraAt, commentAt)), where),
  };
  return { member, end };
}

interface Sizes {
  readonly bytes: number;
  readonly packedBytes: number;
  readonly headerAt: number;
}

/** Values of all ones stand, in this order, in the zip64 field (id 1). */
function widened(sizes: Sizes, extra: DataView, where: string): Sizes {
  const all = 0xffffffff;
  if (sizes.bytes !== all && sizes.packedBytes !== all && sizes.headerAt !== all) return sizes;
  for (let at = 0; at + 4 <= extra.byteLength; at += 4 + extra.getUint16(at + 2, true)) {
    if (extra.getUint16(at, true) !== 1) continue;
    const end = at + 4 + extra.getUint16(at + 2, true);
    let next = at + 4;
    const take = (value: number): number => {
      if (value !== all) return value;
      if (next + 8 > end || end > extra.byteLength) throw damaged(where);
      next += 8;
      return uint64(extra, next - 8, where);
    };
    const bytes = take(sizes.bytes);
    const packedBytes = take(sizes.packedBytes);
    return { bytes, packedBytes, headerAt: take(sizes.headerAt) };
  }
  throw damaged(where);
}

function viewOf(bytes: Uint8Array): DataView {
  return new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
}

function uint64(view: DataView, at: number, where: string): number {
  const value = Number(view.getBigUint64(at, true));
  if (!Number.isSafeInteger(value)) throw damaged(where);
  return value;
}

function damaged(where: string) {
  return scanError('the archive’s directory is damaged', where);
}

function severalParts(name: string) {
  return scanError('the archive is split into several files', name, 'Join its parts first.');
}

function twice(member: string, name: string) {
  return scanError(
    `two members are called ${JSON.stringify(member)}`,
    name,
    'It is not clear which one is meant: write the archive again with each name once.',
  );
}
