/**
 * Delimited text: .csv, .tsv, .txt, .dat and whatever else is text. Spectra in rows (one row per pixel
 * with leading x and y and a header of axis values), long rows (x, y, axis, counts), one spectrum in
 * columns, values at points, and plain matrices are all presented as named arrays; the meaning of the
 * arrays is found out elsewhere, as for every format.
 *
 * A file is read once when it is opened, which settles its shape and types; a cube beyond 64 MB is then
 * read again by blocks, not kept.
 */
import { RimlightError } from '../../errors';
import type { ByteSource, Container, Reader, ReadOptions } from '../container';
import { asScanError } from '../scan-error';
import { checkBlock } from '../shape';
import { readColumns, readPoints } from './columns';
import type { Content, StoredEntry } from './content';
import { decodeText, encodingOf, isBinary } from './encoding';
import { findLayout } from './layout';
import { readLong } from './long';
import { readMatrix, readSpectra, readTurned } from './spectra';
import { openTable, type Table } from './table';

export const textReader: Reader = {
  format: 'text',
  extensions: ['.csv', '.tsv', '.txt', '.dat', '.asc'],
  sniff(head) {
    const { encoding, markBytes } = encodingOf(head);
    const text = decodeText(head.subarray(markBytes), encoding);
    return text.trim() !== '' && !isBinary(text);
  },
  async open(source, options = {}) {
    try {
      const table = await openTable(source, options);
      return containerOf(source, table, await contentOf(table, options));
    } catch (error) {
      source.close?.();
      throw asScanError(error, 'the text could not be read', source.name);
    }
  },
};

function contentOf(table: Table, options: ReadOptions): Promise<Content> {
  const layout = findLayout(table);
  switch (layout.kind) {
    case 'spectra':
      return readSpectra(table, layout, options);
    case 'long':
      return readLong(table, layout, options);
    case 'points':
      return readPoints(table, layout, options);
    case 'turned':
      return readTurned(table, layout, options);
    case 'columns':
      return readColumns(table, layout, options);
    case 'matrix':
      return readMatrix(table, layout.columns, options);
  }
}

function containerOf(source: ByteSource, table: Table, content: Content): Container {
  const { arrays, notes } = content;
  return {
    format: 'text',
    entries: arrays.map(({ entry }) => entry),
    groups: [],
    facts: table.facts,
    notes: [...table.notes, ...notes],
    async read(path, start, count, options = {}) {
      const stored = storedAt(arrays, path, source.name);
      checkBlock(stored.entry, start, count, whereOf(source.name, path));
      try {
        return await stored.read(start, count, options);
      } catch (error) {
        throw asScanError(error, 'the text could not be read', whereOf(source.name, path));
      }
    },
    close: () => source.close?.(),
  };
}

function storedAt(arrays: readonly StoredEntry[], path: string, fileName: string): StoredEntry {
  const stored = arrays.find(({ entry }) => entry.path === path);
  if (stored !== undefined) return stored;
  throw new RimlightError('fault', {
    what: `there is no array called “${path}”`,
    where: fileName,
    hint: 'Please report this.',
  });
}

function whereOf(fileName: string, path: string): string {
  return path === '' ? fileName : `${fileName}: ${path}`;
}
