/** NumPy .npy files: one array of numbers, read by blocks. */
import { readExactly } from './byte-source';
import type { ByteSource, Container, Reader } from './container';
import { bytesOfType } from './dtype';
import { isNpy, npyHeaderSpan, npyPrefixBytes, parseNpyHeader } from './npy-header';
import { scanError } from './scan-error';
import { shapeText, valuesOf } from './shape';
import { type ArrayLayout, StoredArray } from './stored-array';

/** Format 1.0 to 3.0, integers, floats (16 to 64 bits) and bool, either byte order, C or Fortran order. */
export const npyReader: Reader = {
  format: 'npy',
  extensions: ['.npy'],
  sniff: isNpy,
  async open(source) {
    try {
      return await openNpy(source);
    } catch (error) {
      source.close?.();
      throw error;
    }
  },
};

async function openNpy(source: ByteSource): Promise<Container> {
  const { name, size } = source;
  const prefix = await readExactly(source, 0, Math.min(npyPrefixBytes, size));
  const { from, to } = npyHeaderSpan(prefix, name);
  const layout = parseNpyHeader(await readExactly(source, from, to), to, name);
  const needed = to + bytesOfLayout(layout, name);
  if (needed > size) throw truncatedData(layout, needed, size, name);
  const array = new StoredArray(layout, (a, b) => readExactly(source, a, b), name);
  const { shape, type } = layout;
  return {
    format: 'npy',
    entries: [{ path: '', shape, type, attributes: {} }],
    groups: [],
    facts: {},
    notes: needed < size ? [`${size - needed} bytes after the array were not read.`] : [],
    read: (_path, start, count, options) => array.read(start, count, options),
    close: () => source.close?.(),
  };
}

/** Bytes of an array's elements. */
export function bytesOfLayout({ shape, type }: ArrayLayout, where: string): number {
  return valuesOf(shape, where) * bytesOfType[type];
}

function truncatedData(layout: ArrayLayout, needed: number, size: number, name: string) {
  return scanError(
    `the header promises ${shapeText(layout.shape)} values of ${layout.type}, ${needed} bytes in all, but the file ends at byte ${size}`,
    name,
    'It was cut off: copy it again, or repeat the export.',
  );
}
