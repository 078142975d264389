/** Which line above the rows names the columns. */
import { cellNumber, kindOfCell } from './cell';
import { type DialectFound, runsOneWay } from './dialect';
import { contentOf, factOf, type HeadLine, withoutEmptyEnd } from './facts';
import { isLineOfUnits, readHeading } from './heading';
import { splitCells } from './tokenise';

export interface Header {
  /** one for each column of the rows; "" for one without a name */
  readonly names: readonly string[];
  /** a second line of units under the names, one for each column; null without one */
  readonly units: readonly string[] | null;
  /** index of its first line */
  readonly from: number;
  /** index after its last line */
  readonly until: number;
  /** the first column has no name because the header is one short */
  readonly isOneShort: boolean;
}

/** Lines looked at above the rows. */
const headerReach = 6;

/**
 * @param above - lines above the rows, without blank ones
 * @param used - cells of a row that hold anything
 */
export function findHeader(
  above: readonly HeadLine[],
  found: DialectFound,
  used: number,
): Header | null {
  for (let at = above.length - 1; at >= Math.max(0, above.length - headerReach); at--) {
    const lower = headerCells(above[at], found, used);
    if (lower === null) continue;
    const upper =
      at === 0 || !isLineOfUnits(lower.names) ? null : headerCells(above[at - 1], found, used);
    return upper !== null
      ? { ...upper, units: lower.names, from: at - 1, until: at + 1 }
      : { ...lower, units: null, from: at, until: at + 1 };
  }
  return null;
}

/** The names a line gives when it can be the header; null for any other line. */
function headerCells(
  line: HeadLine,
  { dialect, columns }: DialectFound,
  used: number,
): Pick<Header, 'names' | 'isOneShort'> | null {
  const { delimiter, mark } = dialect;
  const text = contentOf(line, delimiter);
  if (columns === 1 && factOf(text, delimiter) !== null) return null;
  const others = (['\t', ';', ','] as const).filter((other) => other !== delimiter);
  const ways = [
    ...(delimiter === ' ' ? [text.trim().split(/\t|\s{2,}/)] : []),
    splitCells(text, delimiter),
    // "Wavelength, Counts" over columns between spaces.
    ...others.filter((other) => text.includes(other)).map((other) => splitCells(text, other)),
  ];
  for (const way of ways) {
    const cells = withoutEmptyEnd(way.map((cell) => cell.trim().replace(/[,;:]$/, '')));
    if (!isHeader(cells, mark)) continue;
    const isWhole = cells.length >= used && cells.length <= columns;
    if (isWhole || isLastUnnamed(way, cells, columns)) {
      return { names: padded(cells, columns), isOneShort: false };
    }
    const isQuotedOrTabbed = delimiter === '\t' || (delimiter === ' ' && text.includes('"'));
    if (cells.length === used - 1 && used > 2 && isQuotedOrTabbed) {
      return { names: padded(['', ...cells], columns), isOneShort: true };
    }
  }
  return null;
}

function isLastUnnamed(way: readonly string[], cells: readonly string[], columns: number): boolean {
  return way.length === columns && columns >= 3 && cells.length === columns - 1;
}

function padded(cells: readonly string[], columns: number): readonly string[] {
  return Array.from({ length: columns }, (_, i) => cells[i] ?? '');
}

/** At least one name with a letter in it, few gaps, and numbers only where there are several (axis values). */
function isHeader(cells: readonly string[], mark: '.' | ','): boolean {
  const gaps = cells.filter((cell) => cell === '').length;
  if (gaps > 2) return false;
  const hasName = cells.some((cell) => kindOfCell(cell, mark) === 'text' && /\p{L}/u.test(cell));
  return hasName && cells.filter((cell) => readHeading(cell, mark).value !== null).length !== 1;
}

/**
 * Whether the first row is a header although it looks like a row of the table: axis values running one
 * way under an empty corner; or beside a word, where every row begins with a word and none of them
 * runs one way.
 *
 * @param rows - the first rows of the table
 */
export function isRowOfAxisValues(
  rows: readonly (readonly string[])[],
  { isText, dialect }: DialectFound,
): boolean {
  const [first, ...rest] = rows;
  if (first === undefined || rest.length === 0) return false;
  const labels = first.findIndex((cell, i) => isText[i] !== true && cell.trim() !== '');
  if (labels < 1 || labels > 2) return false;
  const numbers = (cells: readonly string[]): number[] =>
    withoutEmptyEnd(cells)
      .slice(labels)
      .map((cell) => cellNumber(cell, dialect.mark) ?? Number.NaN);
  const isRamp = (values: readonly number[]): boolean =>
    !values.some(Number.isNaN) && runsOneWay(values);
  const values = numbers(first);
  if (values.length < 3 || !isRamp(values)) return false;
  if (isText.slice(0, labels).every((one) => one)) {
    return !rest.some((cells) => isRamp(numbers(cells)));
  }
  return rest.every((cells) => cells.slice(0, labels).every((cell) => cell.trim() !== ''));
}
