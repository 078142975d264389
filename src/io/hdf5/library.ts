/**
 * The HDF5 library, fetched when the first HDF5 file is met (4 MB). The browser's build is used in Node
 * too: its file system is in memory, so nothing in a file (external links, external storage, virtual
 * datasets) can lead it to other files, and it reads through the byte source, never the whole file.
 */
import { RimlightError } from '../../errors';
import type { ByteSource } from '../container';
import { CachedReader } from './cached-reader';

type H5Module = Awaited<typeof import('h5wasm')['ready']>;

export type { H5Module };

export interface MountedFile {
  /** where the library finds it */
  readonly path: string;
  /** What went wrong when reading the source since the last call; null when nothing did. */
  takeFailure(): unknown;
  unmount(): void;
}

export interface Hdf5Library {
  readonly module: H5Module;
  mount(source: ByteSource): Promise<MountedFile>;
  /** What the library complained of since the last call, innermost reason last. */
  takeComplaints(): readonly string[];
}

let loading: Promise<Hdf5Library> | null = null;

/** @throws RimlightError 'fault' - when the library cannot be fetched or started */
export function loadHdf5(): Promise<Hdf5Library> {
  loading ??= startLibrary().catch((error: unknown) => {
    loading = null;
    throw new RimlightError(
      'fault',
      {
        what: `the HDF5 library could not be started: ${String(error)}`,
        where: '',
        hint: 'Reload the page; if it stays so, open the scan as .npy or .npz.',
      },
      { cause: error },
    );
  });
  return loading;
}

/** A whole file held in memory where it cannot be read in part without waiting (a Blob outside a worker). */
const mostBytesInMemory = 2 ** 30;

async function startLibrary(): Promise<Hdf5Library> {
  const { ready } = await import('h5wasm');
  const module = await ready;
  const complaints = captureStandardError(module);
  let mounted = 0;
  return {
    module,
    async mount(source) {
      const reader = new CachedReader(await syncReaderOf(source), source.size);
      mounted++;
      return mountReader(module, `/scan-${mounted}.h5`, reader);
    },
    takeComplaints: () => complaints.splice(0),
  };
}

type ReadSync = (from: number, to: number) => Uint8Array;

async function syncReaderOf(source: ByteSource): Promise<ReadSync> {
  if (source.readSync !== undefined) return source.readSync;
  if (source.size > mostBytesInMemory) {
    throw new RimlightError('fault', {
      what: 'a large HDF5 file can be read in a worker only',
      where: source.name,
      hint: 'Please report this.',
    });
  }
  const whole = await source.read(0, source.size);
  return (from, to) => whole.subarray(from, to);
}

/** Emscripten's number for an input/output error. */
const inputOutputError = 29;

/** An empty file of the library's own file system whose size and bytes are the source's. */
function mountReader(module: H5Module, path: string, reader: CachedReader): MountedFile {
  let failure: unknown = null;
  const { FS } = module;
  FS.writeFile(path, new Uint8Array(0));
  const { node } = FS.lookupPath(path, {});
  const read = (
    _stream: unknown,
    heap: Int8Array,
    offset: number,
    length: number,
    position: number,
  ): number => {
    try {
      return reader.readInto(
        new Uint8Array(heap.buffer, heap.byteOffset + offset, length),
        position,
      );
    } catch (error) {
      failure = error;
      throw Object.assign(new Error('the source failed'), {
        name: 'ErrnoError',
        errno: inputOutputError,
      });
    }
  };
  const ops: object = Reflect.get(node, 'stream_ops');
  Object.assign(node, { usedBytes: reader.size, stream_ops: { ...ops, read } });
  return {
    path,
    takeFailure() {
      const taken = failure;
      failure = null;
      return taken;
    },
    unmount: () => FS.unlink(path),
  };
}

/** The library writes its reasons to standard error; here they are kept for our own messages. */
function captureStandardError(module: H5Module): string[] {
  const lines: string[] = [];
  let line = '';
  const write = (_stream: unknown, heap: Int8Array, offset: number, length: number): number => {
    for (const code of heap.subarray(offset, offset + length)) {
      if (code !== 10) line += String.fromCharCode(code & 0xff);
      else {
        if (lines.length < 1000) lines.push(line);
        line = '';
      }
    }
    return length;
  };
  const streams: readonly object[] = Reflect.get(module.FS, 'streams');
  const stream = streams[2];
  const ops: object = Reflect.get(stream, 'stream_ops');
  Object.assign(stream, { stream_ops: { ...ops, write } });
  return lines;
}
