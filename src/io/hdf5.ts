/** HDF5 files of any layout: every array of numbers with its attributes, groups with theirs, single values as facts. */
import { throwIfAborted } from '../errors';
import type { CountsArray } from '../science/scan';
import type { ArrayEntry, ByteSource, Container, Reader, ReadOptions } from './container';
import { bytesOfType, decodeElements } from './dtype';
import { Hdf5File } from './hdf5/file';
import { assertFilters } from './hdf5/filters';
import { type Hdf5Contents, walkHdf5 } from './hdf5/walk';
import { blocksOf } from './load-slab';
import { asScanError, scanError } from './scan-error';
import { checkBlock } from './shape';

const signature = [0x89, 0x48, 0x44, 0x46, 0x0d, 0x0a, 0x1a, 0x0a] as const;

/**
 * Contiguous, compact and chunked storage; deflate, shuffle, Fletcher-32, n-bit and scale-offset filters;
 * integers, floats (16 to 64 bits), enumerations and bool of either byte order. Records, references and
 * lists of variable length are no arrays and are left out.
 */
export const hdf5Reader: Reader = {
  format: 'HDF5',
  extensions: ['.h5', '.hdf5', '.hdf', '.nxs', '.nx', '.he5'],
  // A user block of 512 · 2^n bytes may come first (HDF5 file format specification, II.A).
  sniff: (head) =>
    [0, 512, 1024, 2048].some((at) => signature.every((byte, i) => head[at + i] === byte)),
  async open(source) {
    try {
      return await openHdf5(source);
    } catch (error) {
      source.close?.();
      throw error;
    }
  },
};

async function openHdf5(source: ByteSource): Promise<Container> {
  const { file, contents } = await openAndWalk(source);
  const { entries, groups, facts, notes } = contents;
  let isOpen = true;
  const close = (): void => {
    if (!isOpen) return;
    isOpen = false;
    file.close();
    source.close?.();
  };
  if (entries.length === 0) {
    close();
    throw noArrays(source.name, notes);
  }
  return {
    format: 'HDF5',
    entries,
    groups,
    facts,
    notes,
    read(path, start, count, options) {
      const entry = entries.find((one) => one.path === path);
      if (entry === undefined) {
        return Promise.reject(scanError(`there is no array ${path}`, source.name));
      }
      return readEntry(file, entry, start, count, options);
    },
    close,
  };
}

async function openAndWalk(
  source: ByteSource,
): Promise<{ readonly file: Hdf5File; readonly contents: Hdf5Contents }> {
  const file = await Hdf5File.open(source);
  try {
    const contents = await twiceIfBroken(file, () => walkHdf5(file, source.size));
    return { file, contents };
  } catch (error) {
    file.close();
    throw error;
  }
}

/** When the library breaks down, an earlier damaged file may be to blame: once more in a fresh instance. */
async function twiceIfBroken<T>(file: Hdf5File, run: () => T): Promise<T> {
  await file.revive();
  try {
    return run();
  } catch (error) {
    if (!file.isBroken || file.isAlone) throw error;
    await file.revive();
    return run();
  }
}

/** Between pieces of this size other work, such as a request to stop, is let in. */
const pieceBytes = 32 << 20;

async function readEntry(
  file: Hdf5File,
  entry: ArrayEntry,
  start: readonly number[],
  count: readonly number[],
  { signal, onProgress }: ReadOptions = {},
): Promise<CountsArray> {
  const where = `${file.name}: ${entry.path}`;
  const size = bytesOfType[entry.type];
  const total = checkBlock(entry, start, count, where) * size;
  try {
    await twiceIfBroken(file, () => assertFilters(file, entry.path));
    const out = new Uint8Array(total);
    let done = 0;
    const pieces = total === 0 ? [] : blocksOf(start, count, pieceBytes / size);
    for (const piece of pieces) {
      if (signal !== undefined) await pause();
      throwIfAborted(signal, `reading ${file.name}`);
      const bytes = piece.count.reduce((product, length) => product * length, size);
      const block = await twiceIfBroken(file, () =>
        file.readBlock(entry.path, piece.start, piece.count, bytes),
      );
      out.set(block, done);
      done += bytes;
      onProgress?.(done / total);
    }
    return decodeElements(out, entry.type, true);
  } catch (error) {
    throw asScanError(error, 'the data could not be read', where);
  }
}

function pause(): Promise<void> {
  return new Promise((resolve) => {
    setTimeout(resolve);
  });
}

function noArrays(name: string, notes: readonly string[]) {
  const reason = notes.length === 0 ? '' : ` (${notes[0].replace(/\.$/, '')})`;
  return scanError(
    `the file holds no array of numbers${reason}`,
    name,
    'Give a file with the counts as a dataset.',
  );
}
