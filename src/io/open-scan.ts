/**
 * The only place that knows all formats: looks at a file's first bytes, then at its name, and opens
 * it with the reader of that format. Readers are loaded when their format is met, so that a browser
 * opening a text file does not fetch the HDF5 library.
 */
import { RimlightError } from '../errors';
import type { ByteSource, Container, FormatName, Reader, ReadOptions } from './container';

interface Door {
  readonly format: FormatName;
  /** lower case, with the dot */
  readonly extensions: readonly string[];
  /** Whether the first bytes are this format's own; text formats have no such bytes. */
  readonly hasSignature: (head: Uint8Array) => boolean;
  readonly load: () => Promise<Reader>;
}

const headBytes = 4096;

/** In this order: text comes last, because almost anything could be text. */
const doors: readonly Door[] = [
  {
    format: 'HDF5',
    extensions: ['.h5', '.hdf5', '.hdf', '.nxs', '.nx', '.he5'],
    // A user block of 512 · 2^n bytes may come first (HDF5 file format specification, III.A).
    hasSignature: (head) =>
      [0, 512, 1024, 2048].some((at) =>
        startsWith(head, [0x89, 0x48, 0x44, 0x46, 0x0d, 0x0a, 0x1a, 0x0a], at),
      ),
    load: async () => (await import('./hdf5')).hdf5Reader,
  },
  {
    format: 'npy',
    extensions: ['.npy'],
    hasSignature: (head) => startsWith(head, [0x93, 0x4e, 0x55, 0x4d, 0x50, 0x59]),
    load: async () => (await import('./npy')).npyReader,
  },
  {
    format: 'npz',
    extensions: ['.npz'],
    hasSignature: (head) =>
      startsWith(head, [0x50, 0x4b, 0x03, 0x04]) || startsWith(head, [0x50, 0x4b, 0x05, 0x06]),
    load: async () => (await import('./npz')).npzReader,
  },
  {
    format: 'TIFF',
    extensions: ['.tif', '.tiff'],
    // II or MM, then 42 (classic) or 43 (BigTIFF) in that byte order.
    hasSignature: (head) =>
      [42, 43].some(
        (version) =>
          startsWith(head, [0x49, 0x49, version, 0]) || startsWith(head, [0x4d, 0x4d, 0, version]),
      ),
    load: async () => (await import('./tiff')).tiffReader,
  },
  {
    format: 'JCAMP-DX',
    extensions: ['.jdx', '.dx', '.jcamp', '.jcm'],
    hasSignature: (head) =>
      /^\uFEFF?\s*##\s*TITLE\s*=/i.test(new TextDecoder().decode(head.subarray(0, 256))),
    load: async () => (await import('./jcamp/jcamp-reader')).jcampReader,
  },
  {
    format: 'text',
    extensions: ['.csv', '.tsv', '.txt', '.dat', '.asc'],
    hasSignature: () => false,
    load: async () => (await import('./text/text-reader')).textReader,
  },
];

/** Endings of all files that can be opened, for file pickers and messages. */
export const openExtensions: readonly string[] = doors.flatMap(({ extensions }) => extensions);

/**
 * Opens a file as a container of arrays, whatever it is called.
 *
 * @throws RimlightError 'scan' - when it is of no format that can be opened, empty, damaged or unsafe
 */
export async function openContainer(
  source: ByteSource,
  options: ReadOptions = {},
): Promise<Container> {
  const reader = await readerOf(source);
  if (reader !== null) return reader.open(source, options);
  source.close?.();
  throw source.size === 0 ? emptyFile(source.name) : notOpenable(source.name);
}

/** The reader of the file's format; null when there is none. */
async function readerOf(source: ByteSource): Promise<Reader | null> {
  if (source.size === 0) return null;
  const head = await source.read(0, Math.min(headBytes, source.size));
  const signed = doors.find(({ hasSignature }) => hasSignature(head));
  if (signed !== undefined) return signed.load();
  const text = doors.find(({ format }) => format === 'text');
  if (text === undefined || hasZeroBytes(head)) return null;
  const reader = await text.load();
  return reader.sniff(head, source.name) ? reader : null;
}

function startsWith(head: Uint8Array, bytes: readonly number[], at = 0): boolean {
  return head.length >= at + bytes.length && bytes.every((byte, i) => head[at + i] === byte);
}

/** UTF-16 text has zero bytes too, but begins with a byte order mark. */
function hasZeroBytes(head: Uint8Array): boolean {
  const isUtf16 = startsWith(head, [0xff, 0xfe]) || startsWith(head, [0xfe, 0xff]);
  return !isUtf16 && head.includes(0);
}

function extensionOf(name: string): string {
  const dot = name.lastIndexOf('.');
  return dot < 0 ? '' : name.slice(dot).toLowerCase();
}

function emptyFile(name: string): RimlightError {
  return new RimlightError('scan', {
    what: 'the file is empty',
    where: name,
    hint: 'Check that it was copied or saved completely.',
  });
}

function notOpenable(name: string): RimlightError {
  const claimed = doors.find(({ extensions }) => extensions.includes(extensionOf(name)));
  return new RimlightError('scan', {
    what:
      claimed === undefined
        ? 'the file is of no format that can be opened'
        : `the file is called ${extensionOf(name)} but is not ${claimed.format === 'text' ? 'a table of numbers' : claimed.format}`,
    where: name,
    hint: 'Open an HDF5 (.h5, .nxs), NumPy (.npy, .npz), TIFF (.tif), delimited text (.csv, .tsv, .txt, .dat) or JCAMP-DX (.jdx, .dx) file.',
  });
}
