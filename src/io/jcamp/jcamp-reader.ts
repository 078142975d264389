/**
 * JCAMP-DX 4.24 and 5: single spectra, in one block or several. Written from the published standard.
 *
 * @see R. S. McDonald, P. A. Wilks, Appl. Spectrosc. 42, 151 (1988), JCAMP-DX 4.24
 * @see P. Lampen, H. Hillig, A. N. Davies, M. Linscheid, Appl. Spectrosc. 48, 1545 (1994), JCAMP-DX for mass spectrometry (from memory), for version 5
 */
import { RimlightError, throwIfAborted } from '../../errors';
import { readExactly } from '../byte-source';
import type { ByteSource, Container, Reader, ReadOptions } from '../container';
import { asScanError, scanError } from '../scan-error';
import { checkBlock } from '../shape';
import { heldColumn, type StoredEntry } from '../text/content';
import { decodeText, encodingOf, isBinary } from '../text/encoding';
import { withPlainLineEnds } from '../text/pieces';
import { columnOf } from '../text/value-range';
import { factsOf, xAttributes, yAttributes } from './labels';
import { type JcampBlock, type JcampRecord, readBlocks, recordOf, textOf } from './records';
import { readXyData, type SpectrumRead } from './xy-data';
import { readXyPoints } from './xy-points';

/** A spectrum takes kilobytes. */
const mostBytes = 256 << 20;

export const jcampReader: Reader = {
  format: 'JCAMP-DX',
  extensions: ['.jdx', '.dx', '.jcamp', '.jcm'],
  sniff(head) {
    const { encoding, markBytes } = encodingOf(head);
    return /^\s*##\s*TITLE\s*=/i.test(decodeText(head.subarray(markBytes), encoding));
  },
  async open(source, options = {}) {
    try {
      return await openJcamp(source, options);
    } catch (error) {
      source.close?.();
      throw asScanError(error, 'the spectrum could not be read', source.name);
    }
  },
};

async function openJcamp(source: ByteSource, options: ReadOptions): Promise<Container> {
  const blocks = readBlocks(await textOfFile(source, options));
  const spectra = blocks.filter((block) => tableOf(block) !== undefined);
  if (spectra.length === 0) throw noSpectrum(blocks, source.name);
  const arrays: StoredEntry[] = [];
  const notes: string[] = [];
  spectra.forEach((block, i) => {
    const read = readSpectrum(block, source.name);
    arrays.push(...arraysOf(block, read, i));
    const which = spectra.length > 1 ? `Spectrum ${i + 1}: ` : '';
    notes.push(...read.notes.map((note) => which + note));
    if (!block.isEnded) notes.push(`${which}##END= is missing.`);
  });
  if (spectra.length > 1) notes.unshift(noteOnLinks(spectra));
  return {
    format: 'JCAMP-DX',
    entries: arrays.map(({ entry }) => entry),
    groups: [],
    facts: factsOf(blocks, spectra[0]),
    notes,
    async read(path, start, count, readOptions = {}) {
      const stored = arrays.find(({ entry }) => entry.path === path);
      if (stored === undefined) throw noArray(path, source.name);
      checkBlock(stored.entry, start, count, `${source.name}: ${path}`);
      return stored.read(start, count, readOptions);
    },
    close: () => source.close?.(),
  };
}

async function textOfFile(
  source: ByteSource,
  { signal, onProgress }: ReadOptions,
): Promise<string> {
  const { name, size } = source;
  throwIfAborted(signal, `reading ${name}`);
  if (size === 0) {
    throw scanError('the file is empty', name, 'Check that it was copied or saved completely.');
  }
  if (size > mostBytes) {
    throw scanError(`the file has ${size} bytes, far more than a spectrum takes`, name);
  }
  const bytes = await readExactly(source, 0, size);
  const { encoding, markBytes } = encodingOf(bytes);
  const text = decodeText(bytes.subarray(markBytes), encoding);
  if (isBinary(text)) throw scanError('the file holds bytes that no text has', name);
  onProgress?.(1);
  return withPlainLineEnds(text);
}

function tableOf(block: JcampBlock): JcampRecord | undefined {
  return recordOf(block, 'XYDATA') ?? recordOf(block, 'XYPOINTS');
}

function readSpectrum(block: JcampBlock, fileName: string): SpectrumRead {
  const table = tableOf(block);
  const form = table?.value.toUpperCase().replace(/\s/g, '') ?? '';
  if (table !== undefined && form.startsWith('(X++(Y..Y))')) {
    return readXyData(block, table, fileName);
  }
  if (table !== undefined && form.startsWith('(XY..XY)')) {
    return readXyPoints(block, table, fileName);
  }
  throw scanError(
    `a table of the form ${form === '' ? '“”' : form.slice(0, 40)} is not read, only (X++(Y..Y)) and (XY..XY)`,
    `${fileName}: line ${table?.number ?? 1}`,
    'Export the spectrum as ##XYDATA= (X++(Y..Y)) or as text in two columns.',
  );
}

function arraysOf(block: JcampBlock, { x, y }: SpectrumRead, i: number): readonly StoredEntry[] {
  const ending = i === 0 ? '' : ` ${i + 1}`;
  return [
    heldColumn(`y${ending}`, columnOf(y), yAttributes(block)),
    heldColumn(`x${ending}`, columnOf(x), xAttributes(block)),
  ];
}

function noteOnLinks(spectra: readonly JcampBlock[]): string {
  const titles = spectra.map((block, i) => `${i + 1} “${textOf(block, 'TITLE').slice(0, 60)}”`);
  const shown = titles.slice(0, 6).join(', ');
  return `The file holds ${spectra.length} spectra (${shown}${titles.length > 6 ? ', …' : ''}): x and y are the first, x 2 and y 2 the second, and so on.`;
}

/** Tables of other kinds, with why they are no spectrum. */
const otherTables: readonly (readonly [string, string])[] = [
  ['PEAKTABLE', 'a table of peaks'],
  ['PEAKASSIGNMENTS', 'a table of peaks'],
  ['NTUPLES', 'a table of several variables'],
  ['DATATABLE', 'a table of several variables'],
  ['RADATA', 'an interferogram in steps of the mirror'],
  ['ATOMLIST', 'a chemical structure'],
];

function noSpectrum(blocks: readonly JcampBlock[], name: string) {
  const other = otherTables.find(([label]) =>
    blocks.some((block) => recordOf(block, label) !== undefined),
  );
  return scanError(
    other === undefined
      ? 'the file holds no table of a spectrum (##XYDATA= or ##XYPOINTS=)'
      : `the file holds ${other[1]}, not a spectrum: heights between the listed points are not in it`,
    name,
    'Export the spectrum itself as ##XYDATA= (X++(Y..Y)), or as text in two columns.',
  );
}

function noArray(path: string, name: string): RimlightError {
  return new RimlightError('fault', {
    what: `there is no array called “${path}”`,
    where: name,
    hint: 'Please report this.',
  });
}
