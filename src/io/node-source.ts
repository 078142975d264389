/** Files on disk for the command line and Node's workers. The only file of src/io that needs Node: no browser bundle may import it. */
import { readSync as readFileSync } from 'node:fs';
import { type FileHandle, open, stat } from 'node:fs/promises';
import { basename } from 'node:path';
import type { RimlightError } from '../errors';
import type { ByteSource } from './container';
import { scanError } from './scan-error';

/**
 * A file by its path, opened at once and kept open until `close`.
 *
 * @throws RimlightError 'scan' - when there is no such file, it is a folder or a device, or may not be read
 */
export async function pathSource(path: string): Promise<ByteSource> {
  const { handle, size } = await openFile(path);
  const readSync = (from: number, to: number): Uint8Array => {
    const bytes = new Uint8Array(lengthOf(from, to, size));
    let done = 0;
    while (done < bytes.length) {
      const got = readFileSync(handle.fd, bytes, done, bytes.length - done, from + done);
      if (got === 0) break;
      done += got;
    }
    return done === bytes.length ? bytes : bytes.subarray(0, done);
  };
  const read = async (from: number, to: number): Promise<Uint8Array> => {
    const bytes = new Uint8Array(lengthOf(from, to, size));
    let done = 0;
    while (done < bytes.length) {
      const { bytesRead } = await handle.read(bytes, done, bytes.length - done, from + done);
      if (bytesRead === 0) break;
      done += bytesRead;
    }
    return done === bytes.length ? bytes : bytes.subarray(0, done);
  };
  let isClosed = false;
  const close = (): void => {
    if (isClosed) return;
    isClosed = true;
    // Nothing was written, so a failing close loses nothing.
    handle.close().catch(() => undefined);
  };
  return { name: basename(path), size, read, readSync, close, origin: { kind: 'path', path } };
}

async function openFile(path: string): Promise<{ handle: FileHandle; size: number }> {
  try {
    // Asked before opening: opening a pipe would wait for its other end.
    const { size, isFile } = await kindOf(path);
    if (!isFile) throw notAFile(path);
    return { handle: await open(path, 'r'), size };
  } catch (error) {
    throw codeOf(error) === null ? error : unopened(path, error);
  }
}

async function kindOf(path: string): Promise<{ size: number; isFile: boolean }> {
  const found = await stat(path);
  return { size: found.size, isFile: found.isFile() };
}

function lengthOf(from: number, to: number, size: number): number {
  return Math.max(0, Math.min(to, size) - from);
}

function notAFile(path: string): RimlightError {
  return scanError(
    'this is not a file but a folder or a device',
    path,
    'Give the path of a scan file.',
  );
}

function unopened(path: string, cause: unknown): RimlightError {
  const code = codeOf(cause);
  const [what, hint] =
    code === 'ENOENT' || code === 'ENOTDIR'
      ? ['there is no such file', 'Check the path, and the folder it is relative to.']
      : code === 'EACCES' || code === 'EPERM'
        ? ['the file may not be read', 'Give yourself permission to read it, or copy it.']
        : [`the file could not be opened (${code})`, 'Check that it is complete and readable.'];
  return scanError(what, path, hint, cause);
}

function codeOf(error: unknown): string | null {
  if (!(error instanceof Error) || !('code' in error)) return null;
  return typeof error.code === 'string' ? error.code : null;
}
