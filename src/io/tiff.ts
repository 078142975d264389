/**
 * TIFF stacks: one page per channel, or several samples a pixel. Our own reader, because a library that
 * believes every length and offset a damaged file states can fill the memory or never come back.
 */
import { throwIfAborted } from '../errors';
import type { CountsArray } from '../science/scan';
import type { ArrayEntry, ByteSource, Container, Reader, ReadOptions } from './container';
import { bytesOfType, decodeElements } from './dtype';
import { asScanError, scanError } from './scan-error';
import { checkBlock, shapeText, valuesOf } from './shape';
import { mostUnpacked } from './tiff/compression';
import { readDirectories, type TiffPages } from './tiff/directory';
import { readFacts } from './tiff/facts';
import { type Page, readPage } from './tiff/page';
import { PageReader } from './tiff/page-reader';

/**
 * Strips and tiles; integers of 8 to 64 bits, floats of 16 to 64 bits; not packed, or by Deflate, LZW or
 * PackBits, with or without predictor; classic and BigTIFF; either byte order. The array's axes are page,
 * row, column (page first, as one page per channel), or sample, row, column for a single page of several samples.
 */
export const tiffReader: Reader = {
  format: 'TIFF',
  extensions: ['.tif', '.tiff'],
  sniff: ([a, b, c, d]) =>
    (a === 0x49 && b === 0x49 && (c === 42 || c === 43) && d === 0) ||
    (a === 0x4d && b === 0x4d && c === 0 && (d === 42 || d === 43)),
  async open(source, options = {}) {
    try {
      return await openTiff(source, options);
    } catch (error) {
      source.close?.();
      throw asScanError(error, 'the TIFF file is damaged', source.name);
    }
  },
};

async function openTiff(source: ByteSource, options: ReadOptions): Promise<Container> {
  const stack = await readDirectories(source, options);
  const { pages, readers, notes } = await readPages(stack, options);
  const [first] = pages;
  const shape = [
    ...(pages.length > 1 ? [pages.length] : []),
    ...(first.samples > 1 ? [first.samples] : []),
    first.height,
    first.width,
  ];
  const bytes = valuesOf(shape, source.name) * bytesOfType[first.type];
  if (bytes > mostUnpacked(first.compression, source.size)) {
    throw scanError(
      `it claims ${shapeText(shape)} values of ${first.type}, which a file of ${source.size} bytes cannot hold`,
      source.name,
    );
  }
  const entry: ArrayEntry = { path: '', shape, type: first.type, attributes: {} };
  return {
    format: 'TIFF',
    entries: [entry],
    groups: [],
    facts: await readFacts(stack.bytes, stack.directories[0]),
    notes,
    read: (_path, start, count, readOptions) =>
      readBlock(
        { entry, readers, samples: first.samples, name: source.name },
        start,
        count,
        readOptions,
      ),
    close: () => source.close?.(),
  };
}

interface ReadPages {
  readonly pages: readonly Page[];
  readonly readers: readonly PageReader[];
  readonly notes: readonly string[];
}

/** Pages that are smaller copies or masks of others are left out; the rest must be alike. */
async function readPages(
  { bytes, directories }: TiffPages,
  { signal }: ReadOptions,
): Promise<ReadPages> {
  const found: { readonly page: Page; readonly where: string }[] = [];
  for (const [index, directory] of directories.entries()) {
    throwIfAborted(signal, `opening ${bytes.name}`);
    const where = `${bytes.name}: page ${index + 1}`;
    found.push({ page: await readPage(bytes, directory, where), where });
  }
  const kept = found.filter(({ page }) => !page.isAside);
  const used = kept.length === 0 ? found : kept;
  const first = used[0].page;
  for (const { page, where } of used) assertAlike(page, first, where);
  const notes: string[] = [];
  const aside = found.length - used.length;
  if (aside > 0) notes.push(`${aside} pages that are reduced copies or masks were left out.`);
  if (first.isInverted) notes.push('The file says that zero is white; values are read as stored.');
  return {
    pages: used.map(({ page }) => page),
    readers: used.map(({ page, where }) => new PageReader(bytes, page, where)),
    notes,
  };
}

function assertAlike(page: Page, first: Page, where: string): void {
  const size = ({ width, height, samples }: Page): string =>
    `${width} × ${height} pixels of ${samples} ${samples === 1 ? 'sample' : 'samples'}`;
  if (size(page) !== size(first)) {
    throw scanError(
      `it has ${size(page)}, but the first page has ${size(first)}`,
      where,
      'Export the scan alone, one page per channel, all of one size.',
    );
  }
  if (page.type === first.type) return;
  throw scanError(
    `its samples are ${page.type}, but the first page’s are ${first.type}`,
    where,
    'Export all channels in one type.',
  );
}

interface Stack {
  readonly entry: ArrayEntry;
  readonly readers: readonly PageReader[];
  readonly samples: number;
  readonly name: string;
}

async function readBlock(
  { entry, readers, samples, name }: Stack,
  start: readonly number[],
  count: readonly number[],
  { signal, onProgress }: ReadOptions = {},
): Promise<CountsArray> {
  const size = bytesOfType[entry.type];
  const total = checkBlock(entry, start, count, name);
  try {
    const out = new Uint8Array(total * size);
    const from = start.slice();
    const many = count.slice();
    // Missing axes have one index: page, sample, row, column.
    if (samples === 1) {
      from.splice(-2, 0, 0);
      many.splice(-2, 0, 1);
    }
    if (readers.length === 1) {
      from.unshift(0);
      many.unshift(1);
    }
    const range = (axis: number) => [from[axis], from[axis] + many[axis]] as const;
    const window = { samples: range(1), rows: range(2), columns: range(3) };
    const pageBytes = Math.floor(out.length / many[0]);
    for (let i = 0; i < many[0] && total > 0; i++) {
      throwIfAborted(signal, `reading ${name}`);
      const reader = readers[from[0] + i];
      await reader.readWindow(window, out.subarray(i * pageBytes, (i + 1) * pageBytes));
      // Keeping an unpacked block of every page would be keeping the file.
      if (readers.length > 1) reader.forget();
      onProgress?.((i + 1) / many[0]);
    }
    return decodeElements(out, entry.type, true);
  } catch (error) {
    throw asScanError(error, 'the pixels could not be read', name);
  }
}
