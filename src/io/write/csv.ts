/** Writes a table as comma-separated text. */
import { RimlightError } from '../../errors';

export interface CsvColumn {
  readonly name: string;
  readonly values: ArrayLike<number | string>;
}

/** Rows put together at once. */
const rowsPerPiece = 1000;

/**
 * One line of names, then one line per row, in pieces that follow one another.
 *
 * Numbers are written with as many digits as are needed to read back the same double; NaN (no value) as an
 * empty field, infinities as inf and -inf.
 *
 * @throws RimlightError 'fault' - when the columns differ in length
 * @see RFC 4180 (quoting); lines end with a line feed alone
 */
export function* csvPieces(columns: readonly CsvColumn[]): Generator<string> {
  const rows = columns[0]?.values.length ?? 0;
  for (const { name, values } of columns) {
    if (values.length !== rows) throw unequal(name, values.length, rows);
  }
  yield `${columns.map(({ name }) => quoted(name)).join(',')}\n`;
  for (let from = 0; from < rows; from += rowsPerPiece) {
    const to = Math.min(from + rowsPerPiece, rows);
    let piece = '';
    for (let row = from; row < to; row++) {
      piece += `${columns.map(({ values }) => field(values[row])).join(',')}\n`;
    }
    yield piece;
  }
}

/** The whole table. */
export function encodeCsv(columns: readonly CsvColumn[]): string {
  return [...csvPieces(columns)].join('');
}

function field(value: number | string): string {
  if (typeof value === 'string') return quoted(value);
  if (Number.isNaN(value)) return '';
  if (!Number.isFinite(value)) return value > 0 ? 'inf' : '-inf';
  return Object.is(value, -0) ? '-0' : String(value);
}

function quoted(text: string): string {
  return /[",\r\n]|^\s|\s$/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}

function unequal(name: string, length: number, rows: number): RimlightError {
  return new RimlightError('fault', {
    what: `column ${name} has ${length} rows where the first has ${rows}`,
    where: 'writing CSV',
    hint: 'Please report this.',
  });
}
