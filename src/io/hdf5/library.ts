/**
 * The HDF5 library, fetched when the first HDF5 file is met (4 MB). The browser's build is used in Node
 * too: its file system is in memory, so nothing in a file (external links, external storage, virtual
 * datasets) can lead it to other files, and it reads through the byte source, never the whole file.
 */
import { RimlightError } from '../../errors';
import type { ByteSource } from '../container';
import { CachedReader } from './cached-reader';
import { StructureGuard } from './guard';

export type H5Module = Awaited<ReturnType<typeof import('h5wasm/factory')['default']>>;

export interface MountedFile {
  /** where the library finds it */
  readonly path: string;
  /** What went wrong when reading the source since the last call; null when nothing did. */
  takeFailure(): unknown;
  unmount(): void;
}

/** One instance of the library. */
export interface Hdf5Library {
  readonly module: H5Module;
  /** files it has been given so far */
  readonly filesSeen: number;
  /** A damaged file has led it outside its memory: nothing it says can be believed any more. */
  readonly isBroken: boolean;
  mount(source: ByteSource): Promise<MountedFile>;
  /** What the library complained of since the last call, innermost reason last. */
  takeComplaints(): readonly string[];
  /** Tells that a file is done with: an instance whose memory has grown large is not used again. */
  noteClose(): void;
  /** Tells that a call threw: each such throw costs some of the instance's stack. */
  noteThrow(error: unknown): void;
}

/** Far fewer than would use up the stack of 2 MB. */
const mostThrows = 500;

/** Its memory never shrinks. */
const mostHeapBytes = 256 << 20;

let current: Promise<Hdf5Library> | null = null;
/** Compiled code is the same for every instance, but its loader is fetched once only. */
let factory: Promise<typeof import('h5wasm/factory')> | null = null;

/**
 * An instance that can be trusted: the one used before, or a fresh one where that is broken or worn.
 *
 * @throws RimlightError 'fault' - when the library cannot be fetched or started
 */
export async function loadHdf5(): Promise<Hdf5Library> {
  current ??= startLibrary(() => {
    current = null;
  });
  try {
    return await current;
  } catch (error) {
    current = null;
    factory = null;
    throw new RimlightError(
      'fault',
      {
        what: `the HDF5 library could not be started: ${String(error)}`,
        where: '',
        hint: 'Reload the page; if it stays so, open the scan as .npy or .npz.',
      },
      { cause: error },
    );
  }
}

/** A whole file held in memory where it cannot be read in part without waiting (a Blob outside a worker). */
const mostBytesInMemory = 2 ** 30;

/** @param retire - called when no further file may be given to this instance */
async function startLibrary(retire: () => void): Promise<Hdf5Library> {
  factory ??= import('h5wasm/factory');
  const { default: makeModule } = await factory;
  const module = await makeModule({ noInitialRun: true });
  const complaints = captureStandardError(module);
  const state = { filesSeen: 0, isBroken: false, throws: 0 };
  return {
    module,
    get filesSeen() {
      return state.filesSeen;
    },
    get isBroken() {
      return state.isBroken;
    },
    async mount(source) {
      const reader = new CachedReader(await syncReaderOf(source), source.size);
      state.filesSeen++;
      return mountReader(module, `/scan-${state.filesSeen}.h5`, reader, source.name);
    },
    takeComplaints: () => complaints.splice(0),
    noteClose() {
      if (module.HEAPU8.length > mostHeapBytes) retire();
    },
    noteThrow(error) {
      state.throws++;
      // A trap inside the library, or its stack run out.
      if (error instanceof WebAssembly.RuntimeError || error instanceof RangeError) {
        state.isBroken = true;
      }
      if (state.isBroken || state.throws > mostThrows) retire();
    },
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
function mountReader(
  module: H5Module,
  path: string,
  reader: CachedReader,
  name: string,
): MountedFile {
  const guard = new StructureGuard(reader, name);
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
      const out = new Uint8Array(heap.buffer, heap.byteOffset + offset, length);
      const done = reader.readInto(out, position);
      guard.check(out.subarray(0, done), position);
      return done;
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
