/**
 * Writes files so that each is complete or absent: under a temporary name in the same folder, brought
 * to the disk, then renamed. What a killed run left behind is put away by the next one.
 */
import { type FileHandle, mkdir, open, readdir, rename, rm } from 'node:fs/promises';
import { basename, dirname, join } from 'node:path';
import { RimlightError, throwIfAborted } from '../errors';
import { reasonOf } from './recipe-file';

/** A text, bytes, or texts made one after the other, so that a large table never stands in memory whole. */
export type FileContent = string | Uint8Array | Iterable<string>;

/** Texts are gathered to about this many characters before they are written. */
const charactersAtOnce = 1 << 20;
const bytesAtOnce = 8 << 20;

/**
 * Writes a file, or leaves what was there before.
 *
 * @throws RimlightError 'cancelled' - when stopped; 'usage' - when the place cannot be written to
 */
export async function writeAtomically(
  path: string,
  content: FileContent,
  signal?: AbortSignal,
): Promise<void> {
  const temporary = join(dirname(path), temporaryName(basename(path)));
  try {
    const handle = await open(temporary, 'wx');
    try {
      for (const part of partsOf(content)) {
        throwIfAborted(signal, `writing ${basename(path)}`);
        await writeWhole(handle, part);
      }
      await handle.sync();
    } finally {
      await handle.close();
    }
    throwIfAborted(signal, `writing ${basename(path)}`);
    await rename(temporary, path);
  } catch (error) {
    await rm(temporary, { force: true });
    throw asWriteError(error, path);
  }
}

/**
 * Makes a folder where it is missing, and puts away what a killed run left in it.
 *
 * @throws RimlightError 'usage' - when it cannot be made
 */
export async function ensureFolder(path: string): Promise<void> {
  try {
    await mkdir(path, { recursive: true });
    for (const name of await readdir(path)) {
      if (isLeftover(name)) await rm(join(path, name), { force: true });
    }
  } catch (error) {
    throw asWriteError(error, path);
  }
}

/** Errors of the system become sentences; ours stay as they are. */
export function asWriteError(error: unknown, path: string): unknown {
  if (!(error instanceof Error) || !('code' in error)) return error;
  return new RimlightError(
    'usage',
    {
      what: `it cannot be written: ${reasonOf(error)}`,
      where: path,
      hint: 'Choose another place with --out, or make room there.',
    },
    { cause: error },
  );
}

function temporaryName(name: string): string {
  return `.${name}.${process.pid}.tmp`;
}

/** Ours, of a process that runs no more. */
function isLeftover(name: string): boolean {
  const pid = /^\..+\.(\d{1,10})\.tmp$/.exec(name)?.[1];
  return pid !== undefined && !isRunning(Number(pid));
}

function isRunning(pid: number): boolean {
  try {
    process.kill(pid, 0);
    return true;
  } catch (error) {
    // Not permitted means that it is there.
    return (error as NodeJS.ErrnoException).code === 'EPERM';
  }
}

function* partsOf(content: FileContent): Generator<Uint8Array> {
  if (content instanceof Uint8Array) {
    for (let at = 0; at < content.length; at += bytesAtOnce) {
      yield content.subarray(at, at + bytesAtOnce);
    }
    return;
  }
  let gathered = '';
  for (const text of typeof content === 'string' ? [content] : content) {
    gathered += text;
    if (gathered.length < charactersAtOnce) continue;
    yield Buffer.from(gathered);
    gathered = '';
  }
  if (gathered !== '') yield Buffer.from(gathered);
}

/** A single write may take less than it is given. */
async function writeWhole(handle: FileHandle, bytes: Uint8Array): Promise<void> {
  for (let at = 0; at < bytes.length; ) {
    at += (await handle.write(bytes, at)).bytesWritten;
  }
}
