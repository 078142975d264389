/** A text file as a table of cells: how it is written, what its columns are called, where its rows begin. */
import type { ByteSource, ReadOptions } from '../container';
import { scanError } from '../scan-error';
import { cellNumber, hasThousandsSeparators } from './cell';
import { findDialect } from './dialect';
import type { Facts, HeadLine } from './facts';
import { type Head, readHead } from './head';
import { type Heading, readHeading } from './heading';
import type { TextFile } from './pieces';
import { thousands } from './row-errors';
import { findTableHead } from './table-head';
import type { Delimiter, Dialect } from './tokenise';

export interface Table {
  readonly file: TextFile;
  readonly dialect: Dialect;
  readonly columns: number;
  /** one for each column; null where the file names none */
  readonly headings: readonly Heading[] | null;
  /** columns of words: left out */
  readonly isText: readonly boolean[];
  /** cells of the first rows */
  readonly sample: readonly (readonly string[])[];
  /** byte and line at which the rows begin */
  readonly rowsFrom: number;
  readonly firstLine: number;
  readonly facts: Facts;
  readonly notes: readonly string[];
}

/** More is no detector: the table is probably turned on its side. */
const mostColumns = 200_000;

/** @throws RimlightError 'scan' - when the file is no table of numbers */
export async function openTable(source: ByteSource, options: ReadOptions): Promise<Table> {
  const head = await readHead(source, options);
  const { name } = source;
  refuseManyColumns(head.lines, name);
  const found = findDialect(head.lines.map(({ text }) => text));
  if (found === null) throw noNumbers(head, name);
  const { dialect, isText } = found;
  if (dialect.delimiter === ' ') refuseGroupedDigits(head.lines, name);
  const tableHead = findTableHead(head.lines, found, name);
  const { names, units, first, columns, sample, notes } = tableHead;
  const headings =
    names?.map((text, i) => readHeading(text, dialect.mark, units?.[i] ?? '')) ?? null;
  const words = isText.flatMap((one, i) => (one && i < columns ? [nameOfColumn(headings, i)] : []));
  return {
    file: head.file,
    dialect,
    columns,
    headings,
    isText: isText.slice(0, columns),
    sample,
    rowsFrom: head.byteOf(first),
    firstLine: first.number,
    facts: {
      ...tableHead.facts,
      'columns separated by': `${delimiterNames[dialect.delimiter]}, as ${found.rows} of the first ${head.lines.length} lines agree`,
    },
    notes: [
      ...notes,
      ...(words.length === 0
        ? []
        : [`${words.slice(0, 5).join(', ')}: words, not numbers; left out.`]),
    ],
  };
}

const delimiterNames: Readonly<Record<Delimiter, string>> = {
  '\t': 'tabs',
  ';': 'semicolons',
  ',': 'commas',
  ' ': 'spaces',
};

/** The heading of a column, or "column 3". */
export function nameOfColumn(headings: readonly Heading[] | null, column: number): string {
  const text = headings?.[column]?.text ?? '';
  return text === '' ? `column ${column + 1}` : text;
}

/** Between tabs, "12 345" is one number with a thousands separator and not two numbers. */
function refuseGroupedDigits(lines: readonly HeadLine[], name: string): void {
  for (const { text, number } of lines) {
    const grouped = text.includes('\t') ? text.split('\t').find(hasThousandsSeparators) : undefined;
    if (grouped !== undefined) throw thousands(grouped, `${name}: line ${number}`);
  }
}

function refuseManyColumns(lines: readonly HeadLine[], name: string): void {
  for (const { text, number } of lines) {
    if (text.length < mostColumns) continue;
    const cells = 1 + Math.max(...['\t', ';', ','].map((sign) => text.split(sign).length - 1));
    const columns = Math.max(cells, text.split(' ').length);
    if (columns <= mostColumns) continue;
    throw scanError(
      `a line has ${columns} columns (at most ${mostColumns} can be channels of a spectrum)`,
      `${name}: line ${number}`,
      'Turn the table so that channels run along the shorter side, or save the scan as HDF5 or npy.',
    );
  }
}

function noNumbers({ lines }: Head, name: string) {
  const [first] = lines;
  const hint = 'Open a table of numbers: columns separated by commas, semicolons, tabs or spaces.';
  if (/^\s*</.test(first.text)) {
    return scanError('the file is a web page or XML, not a table of numbers', name, hint);
  }
  if (/^\s*[{[]/.test(first.text)) {
    return scanError('the file is JSON, not a table of numbers', name, hint);
  }
  const cells = lines.flatMap(({ text }) => text.split(/[;\t]/).slice(0, 8));
  const grouped = cells.find(hasThousandsSeparators);
  if (grouped !== undefined) return thousands(grouped, name);
  const isMissing = (cell: string): boolean => Number.isNaN(cellNumber(cell, '.') ?? 0);
  if (lines.slice(-1).every(({ text }) => text.split(/[;,\t]/).every(isMissing))) {
    return scanError(
      'no row holds a number: every value is missing',
      name,
      'Check that the scan was saved with its values.',
    );
  }
  const said = lines.length === 1 ? '1 line' : `${lines.length} lines`;
  return scanError(`no row of numbers was found in ${said} of text`, name, hint);
}
