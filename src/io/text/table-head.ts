/** The lines above a table and its first rows: header, facts, where the rows begin. */
import { scanError } from '../scan-error';
import { cellNumber, kindOfCell, quoted } from './cell';
import { type DialectFound, isDoubtfulComma, isRowOfNumbers } from './dialect';
import { contentOf, type Facts, factOf, factsOf, type HeadLine, withoutEmptyEnd } from './facts';
import { findHeader, type Header, isRowOfAxisValues } from './header';
import { raggedRow } from './row-errors';
import { isComment, splitCells } from './tokenise';

export interface TableHead {
  /** one for each column, "" for one without a name; null where columns have no names */
  readonly names: readonly string[] | null;
  /** cells of a line of units under the names */
  readonly units: readonly string[] | null;
  /** cells of a row that count; any beyond are empty */
  readonly columns: number;
  /** first line of numbers */
  readonly first: HeadLine;
  /** cells of the first rows */
  readonly sample: readonly (readonly string[])[];
  readonly facts: Facts;
  readonly notes: readonly string[];
}

type Split = (line: HeadLine) => readonly string[];

/**
 * @param lines - of the head, without blank ones; at least one a row of numbers by `found`
 * @throws RimlightError 'scan' - when rows at the top are ragged, or commas mean two things
 */
export function findTableHead(
  lines: readonly HeadLine[],
  found: DialectFound,
  fileName: string,
): TableHead {
  const { dialect, isText } = found;
  const split: Split = (line) => splitCells(contentOf(line, dialect.delimiter), dialect.delimiter);
  const isPlain = (line: HeadLine): boolean => !isComment(line.text, dialect.delimiter);
  const isRow = (line: HeadLine): boolean => {
    const cells = isPlain(line) ? split(line) : [];
    return cells.length === found.columns && isRowOfNumbers(cells, isText, dialect.mark);
  };
  const rowAt = lines.findIndex(isRow);
  const rowLines = lines.slice(rowAt).filter(isPlain);
  const like = rowLines.map(split).filter(({ length }) => length === found.columns);
  const isAxisRow = isRowOfAxisValues(like, found);
  const sample = isAxisRow ? like.slice(1) : like;
  const used = sample.reduce((most, cells) => Math.max(most, withoutEmptyEnd(cells).length), 1);
  const above = lines.slice(0, rowAt);
  const header: Header | null = isAxisRow
    ? { names: like[0], units: null, from: rowAt, until: rowAt + 1, isOneShort: false }
    : findHeader(above, found, used);
  refuseRaggedTop(above.slice(header?.until ?? 0).filter(isPlain), found, split, fileName);
  const last = above.filter(isPlain).at(-1);
  if (header === null) refuseDoubtfulComma(lines[rowAt], found, sample, last, split, fileName);
  const named = header === null ? 0 : withoutEmptyEnd(header.names).length;
  const columns = Math.max(used, named);
  return {
    names: header === null ? null : header.names.slice(0, columns),
    units: header?.units?.slice(0, columns) ?? null,
    columns,
    first: isAxisRow ? rowLines[1] : rowLines[0],
    sample,
    facts: factsOf(above.slice(0, header?.from ?? above.length), dialect.delimiter),
    notes: notesOn(header, last, found, split),
  };
}

/** Rows of numbers between the header and the first row that has as many cells as most. */
function refuseRaggedTop(
  between: readonly HeadLine[],
  { columns, isText, dialect }: DialectFound,
  split: Split,
  fileName: string,
): void {
  if (isText.includes(true)) return;
  for (const line of between) {
    const cells = split(line);
    const values = cells.map((cell) => cellNumber(cell, dialect.mark));
    const isRow =
      cells.length >= 2 &&
      cells.length !== columns &&
      !values.includes(undefined) &&
      !values.every(Number.isNaN);
    if (isRow) throw raggedRow(cells.length, columns, `${fileName}: line ${line.number}`);
  }
}

function refuseDoubtfulComma(
  line: HeadLine,
  found: DialectFound,
  rows: readonly (readonly string[])[],
  last: HeadLine | undefined,
  split: Split,
  fileName: string,
): void {
  const words =
    last === undefined || isStatement(last, found) ? null : withoutEmptyEnd(split(last));
  const names = words?.every((cell) => kindOfCell(cell, '.') === 'text') ? words : null;
  if (rows.length === 0 || !isDoubtfulComma(found.dialect, rows, names)) return;
  throw scanError(
    `commas seem to separate the columns and to mark the decimals, so ${quoted(line.text)} can be read in more than one way`,
    `${fileName}: line ${line.number}`,
    'Save the table with semicolons or tabs between columns, or with decimal points.',
  );
}

function isStatement({ text }: HeadLine, { dialect }: DialectFound): boolean {
  return factOf(text, dialect.delimiter)?.isStatement === true;
}

function notesOn(
  header: Header | null,
  last: HeadLine | undefined,
  found: DialectFound,
  split: Split,
): readonly string[] {
  const { dialect, columns } = found;
  const notes: string[] = [];
  if (dialect.mark === ',') notes.push('Commas were read as decimal marks.');
  if (header?.isOneShort === true) {
    notes.push(
      'The header has one name fewer than the rows have cells: the first column is taken to be without a name.',
    );
  }
  if (header === null && last !== undefined && !isStatement(last, found)) {
    const cells = split(last).length;
    if (cells > 1 && cells !== columns && dialect.delimiter !== ' ') {
      notes.push(
        `Line ${last.number} above the numbers has ${cells} cells where the rows have ${columns}, so it was not taken for their header.`,
      );
    }
  }
  return notes;
}
