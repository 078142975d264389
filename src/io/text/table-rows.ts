/** The rows of a table, one piece of the file after the other, each checked for its number of cells. */
import type { ReadOptions } from '../container';
import { scanError } from '../scan-error';
import { cellNumber } from './cell';
import { piecesOf } from './pieces';
import { notANumber, otherSeparator, raggedRow } from './row-errors';
import { nameOfColumn, type Table } from './table';
import { tokenise } from './tokenise';

/** Rows of one piece of the file. */
export interface RowBatch {
  readonly from: number;
  readonly to: number;
  /** line it begins at, counted from 1 */
  readonly line: number;
  readonly rows: readonly (readonly string[])[];
  /** line of each row, counted from 1 */
  readonly lines: readonly number[];
}

/** A part of the file that begins and ends with whole lines. */
export interface Stretch {
  readonly from: number;
  readonly to: number;
  /** line it begins at, counted from 1 */
  readonly line: number;
}

/**
 * The rows of a stretch of the file, or of the whole table; blank and comment lines left out.
 *
 * @throws RimlightError 'scan' - for a row with too few or too many cells, naming its line
 */
export async function* rowsOf(
  table: Table,
  stretch: Stretch | null,
  options: ReadOptions,
): AsyncGenerator<RowBatch> {
  const { file, dialect } = table;
  const { name, size } = file.source;
  const { from, to, line } = stretch ?? { from: table.rowsFrom, to: size, line: table.firstLine };
  let first = line;
  for await (const piece of piecesOf(file, from, to, options)) {
    const { rows, lines, unclosed } = tokenise(piece.text, dialect.delimiter);
    const lineOf = (row: number): number => first + (lines === null ? row : lines[row]);
    if (unclosed >= 0) {
      throw scanError(
        'a quotation mark opens a cell that is never closed',
        `${name}: line ${lineOf(Math.min(unclosed, rows.length - 1))}`,
        'Close it or take it out.',
      );
    }
    yield {
      from: piece.from,
      to: piece.to,
      line: first,
      ...filled(rows, lineOf, table, piece.to === size),
    };
    first += lineEndsIn(piece.text);
  }
}

function lineEndsIn(text: string): number {
  let count = 0;
  for (let at = text.indexOf('\n'); at >= 0; at = text.indexOf('\n', at + 1)) count++;
  return count;
}

function filled(
  rows: readonly string[][],
  lineOf: (row: number) => number,
  { columns, file }: Table,
  isEnd: boolean,
): Pick<RowBatch, 'rows' | 'lines'> {
  const kept: string[][] = [];
  const lines: number[] = [];
  rows.forEach((cells, i) => {
    if (cells[0] === '' && cells.every((cell) => cell.trim() === '')) return;
    if (cells.length !== columns) {
      const isFull =
        cells.length > columns && cells.slice(columns).every((cell) => cell.trim() === '');
      if (!isFull) throw raggedAt(cells, lineOf(i), i, rows, columns, file.source.name, isEnd);
    }
    kept.push(cells);
    lines.push(lineOf(i));
  });
  return { rows: kept, lines };
}

function raggedAt(
  cells: readonly string[],
  line: number,
  index: number,
  rows: readonly (readonly string[])[],
  columns: number,
  name: string,
  isEnd: boolean,
) {
  const where = `${name}: line ${line}`;
  // A file that ends in the middle of a line has no line end after it, hence no empty row.
  if (isEnd && index === rows.length - 1 && cells.length < columns) {
    return scanError(
      `the last row has ${cells.length} of ${columns} cells and no end of line, so the file was probably cut off`,
      where,
      'Copy it again, or take the last line out.',
    );
  }
  const parts = cells.length === 1 ? cells[0].trim().split(/[\t;, ]+/) : [];
  if (parts.length > 1 && parts.every((part) => cellNumber(part, '.') !== undefined)) {
    return otherSeparator(cells[0], where);
  }
  return raggedRow(cells.length, columns, where);
}

/** The number in a cell of a row; NaN for no data. */
export function numberAt(
  cells: readonly string[],
  column: number,
  { dialect, headings, file }: Table,
  line: number,
): number {
  const value = cellNumber(cells[column], dialect.mark);
  if (value !== undefined) return value;
  throw notANumber(
    cells[column],
    dialect.mark,
    `${file.source.name}: line ${line}, ${nameOfColumn(headings, column)}`,
  );
}
