/** Bytes by range from memory and from a Blob (a file dropped on the page). Files in Node: node-source.ts. */
import type { ByteSource } from './container';
import { asScanError, scanError } from './scan-error';

/** @param name - file name without folder */
export function memorySource(name: string, bytes: Uint8Array): ByteSource {
  // A copy, so that a decoder may swap bytes in place.
  const readSync = (from: number, to: number): Uint8Array =>
    bytes.slice(clamp(from, bytes.length), clamp(to, bytes.length));
  return {
    name,
    size: bytes.length,
    read: (from, to) => Promise.resolve(readSync(from, to)),
    readSync,
    origin: { kind: 'memory', bytes },
  };
}

/**
 * Reads only the ranges asked for. Inside a worker it can also read without waiting.
 *
 * @param name - file name without folder
 */
export function blobSource(name: string, blob: Blob): ByteSource {
  const { size } = blob;
  const partOf = (from: number, to: number): Blob => blob.slice(clamp(from, size), clamp(to, size));
  const read = async (from: number, to: number): Promise<Uint8Array> => {
    try {
      return new Uint8Array(await partOf(from, to).arrayBuffer());
    } catch (error) {
      throw unreadable(name, error);
    }
  };
  const source: ByteSource = { name, size, read, origin: { kind: 'blob', blob } };
  const reader = syncReader();
  if (reader === null) return source;
  const readSync = (from: number, to: number): Uint8Array => {
    try {
      return new Uint8Array(reader.readAsArrayBuffer(partOf(from, to)));
    } catch (error) {
      throw unreadable(name, error);
    }
  };
  return { ...source, readSync };
}

interface SyncReader {
  readAsArrayBuffer(blob: Blob): ArrayBuffer;
}

/** Workers have a FileReaderSync; pages and Node have none. */
function syncReader(): SyncReader | null {
  const made: unknown = Reflect.get(globalThis, 'FileReaderSync');
  return typeof made === 'function' ? new (made as new () => SyncReader)() : null;
}

/**
 * Exactly the bytes from ≤ i < to.
 *
 * @throws RimlightError 'scan' - when the file ends before
 */
export async function readExactly(
  source: ByteSource,
  from: number,
  to: number,
  where = source.name,
): Promise<Uint8Array> {
  if (to > source.size) throw truncated(where, to, source.size);
  let bytes: Uint8Array;
  try {
    bytes = await source.read(from, to);
  } catch (error) {
    throw asScanError(error, 'the file could not be read', where);
  }
  if (bytes.length < to - from) throw truncated(where, to, from + bytes.length);
  return bytes;
}

function truncated(where: string, needed: number, there: number) {
  return scanError(
    `the file ends at byte ${there} where at least ${needed} bytes are needed`,
    where,
    'It was cut off: copy it again, or repeat the export.',
  );
}

function unreadable(name: string, cause: unknown) {
  return scanError(
    'the file could not be read from disk',
    name,
    'It may have been changed, moved or removed since it was chosen: open it again.',
    cause,
  );
}

function clamp(at: number, size: number): number {
  return Math.min(Math.max(0, Math.floor(at)), size);
}
