/**
 * The pages of a TIFF file: their directories, read one after another, and the fields in them. Classic
 * (32-bit offsets) and BigTIFF (64-bit), either byte order.
 *
 * @see Adobe, TIFF Revision 6.0 (1992), section 2; BigTIFF as fixed by its authors (2007): version 43, 8-byte offsets
 */
import { throwIfAborted } from '../../errors';
import type { ByteSource, ReadOptions } from '../container';
import { scanError } from '../scan-error';
import { type Field, fieldBytes, TiffBytes } from './fields';

export interface Directory {
  readonly at: number;
  readonly fields: ReadonlyMap<number, Field>;
}

const mostPages = 65_536;
const mostFields = 4096;

export interface TiffPages {
  readonly bytes: TiffBytes;
  readonly directories: readonly Directory[];
}

/** @throws RimlightError 'scan' - when it is no TIFF, damaged, or its pages refer back to each other */
export async function readDirectories(
  source: ByteSource,
  { signal }: ReadOptions,
): Promise<TiffPages> {
  const { bytes, first } = await readHeader(source);
  const directories: Directory[] = [];
  const seen = new Set<number>();
  for (let at = first; at !== 0; ) {
    throwIfAborted(signal, `opening ${source.name}`);
    if (seen.has(at)) {
      throw scanError('its pages refer back to one another', `${source.name}, byte ${at}`);
    }
    if (directories.length === mostPages) {
      throw scanError(`it has more than ${mostPages} pages`, source.name);
    }
    seen.add(at);
    const { directory, next } = await readDirectory(bytes, at);
    directories.push(directory);
    at = next;
  }
  if (directories.length === 0) throw scanError('it has no page', source.name);
  return { bytes, directories };
}

async function readHeader(source: ByteSource): Promise<{ bytes: TiffBytes; first: number }> {
  const probe = new TiffBytes(source, true, false);
  const [a, b] = await probe.read(0, 2);
  const isLittleEndian = a === 0x49 && b === 0x49;
  if (!isLittleEndian && !(a === 0x4d && b === 0x4d)) throw notTiff(source.name);
  const classic = new TiffBytes(source, isLittleEndian, false);
  const version = await classic.uint16(2);
  if (version === 42) return { bytes: classic, first: await classic.uint32(4) };
  if (version !== 43) throw notTiff(source.name);
  const big = new TiffBytes(source, isLittleEndian, true);
  if ((await big.uint16(4)) !== 8 || (await big.uint16(6)) !== 0) throw notTiff(source.name);
  return { bytes: big, first: await big.uint64(8) };
}

async function readDirectory(
  bytes: TiffBytes,
  at: number,
): Promise<{ directory: Directory; next: number }> {
  const { isBig } = bytes;
  const count = isBig ? await bytes.uint64(at) : await bytes.uint16(at);
  if (count === 0 || count > mostFields) {
    throw scanError(`a page claims to have ${count} fields`, `${bytes.name}, byte ${at}`);
  }
  const fields = new Map<number, Field>();
  const entryBytes = isBig ? 20 : 12;
  let entry = at + (isBig ? 8 : 2);
  for (let i = 0; i < count; i++, entry += entryBytes) {
    const tag = await bytes.uint16(entry);
    const type = await bytes.uint16(entry + 2);
    const values = isBig ? await bytes.uint64(entry + 4) : await bytes.uint32(entry + 4);
    const valueAt = entry + (isBig ? 12 : 8);
    const size = fieldBytes(type) * values;
    // Readers skip fields of types they do not know (TIFF 6.0, section 2).
    if (size === 0 || fields.has(tag)) continue;
    const isInside = size <= (isBig ? 8 : 4);
    fields.set(tag, { type, count: values, at: isInside ? valueAt : await bytes.offset(valueAt) });
  }
  return { directory: { at, fields }, next: await bytes.offset(entry) };
}

function notTiff(name: string) {
  return scanError('it does not begin as a TIFF file does', `${name}, byte 0`);
}
