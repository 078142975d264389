/**
 * How a text file separates its columns and writes its decimals, told by which reading makes the most
 * lines into rows of numbers with equally many cells.
 */
import { cellNumber, type DecimalMark, kindOfCell } from './cell';
import { type Delimiter, type Dialect, isComment, splitCells } from './tokenise';

export interface DialectFound {
  readonly dialect: Dialect;
  /** cells of most rows */
  readonly columns: number;
  /** columns that hold words, not numbers */
  readonly isText: readonly boolean[];
  /** rows of numbers among the lines looked at */
  readonly rows: number;
  /** cells that are numbers, those of a header of axis values too: they may alone tell the decimal mark */
  readonly numbers: number;
}

/** In order of preference where several read the file equally well. */
const delimiters: readonly Delimiter[] = ['\t', ';', ',', ' '];

/**
 * @param lines - of the head of the file, without blank ones
 * @returns null when no reading gives a row of numbers
 */
export function findDialect(lines: readonly string[]): DialectFound | null {
  const strict = best(candidates(lines).map((dialect) => evaluated(lines, dialect, false)));
  // Columns of words are looked for only where there is no table of numbers alone.
  if (strict !== null && strict.rows > lines.length / 2) return strict;
  const relaxed = best(candidates(lines).map((dialect) => evaluated(lines, dialect, true)));
  if (relaxed === null || relaxed.rows < 2) return strict;
  return strict === null || relaxed.rows > 4 * strict.rows ? relaxed : strict;
}

function candidates(lines: readonly string[]): readonly Dialect[] {
  const has = (sign: string): boolean => lines.some((line) => line.includes(sign));
  const marks: readonly DecimalMark[] = has(',') ? ['.', ','] : ['.'];
  const used = delimiters.filter((delimiter) => has(delimiter) || (delimiter === ' ' && has('\t')));
  return (
    (used.length === 0 ? [delimiters[0]] : [...used, delimiters[0]])
      .filter((delimiter, i, all) => all.indexOf(delimiter) === i)
      .flatMap((delimiter) => marks.map((mark) => ({ delimiter, mark })))
      // Between quotes a cell may hold a comma of its own: "599,778","0,284".
      .filter(({ delimiter, mark }) => delimiter !== ',' || mark !== ',' || has('"'))
  );
}

function best(found: readonly DialectFound[]): DialectFound | null {
  const order = (one: DialectFound): readonly number[] => [one.rows, one.columns, one.numbers];
  let top: DialectFound | null = null;
  for (const one of found) {
    if (one.rows === 0) continue;
    if (top === null || isGreater(order(one), order(top))) top = one;
  }
  return top;
}

/** The first place in which two lists differ decides. */
function isGreater(a: readonly number[], b: readonly number[]): boolean {
  const at = a.findIndex((value, i) => value !== b[i]);
  return at >= 0 && a[at] > b[at];
}

function evaluated(lines: readonly string[], dialect: Dialect, mayHaveText: boolean): DialectFound {
  const rows = lines
    .filter((line) => !isComment(line, dialect.delimiter))
    .map((line) => splitCells(line, dialect.delimiter));
  const isCandidate = (cells: readonly string[]): boolean => {
    const kinds = cells.map((cell) => kindOfCell(cell, dialect.mark));
    const numbers = kinds.filter((kind) => kind === 'number').length;
    return mayHaveText ? numbers >= 2 : numbers >= 1 && !kinds.includes('text');
  };
  const columns = commonest(rows.filter(isCandidate).map(({ length }) => length));
  const like = rows.filter(({ length }) => length === columns);
  const isText = Array.from(
    { length: columns },
    (_, i) =>
      mayHaveText &&
      2 * like.filter((cells) => cellNumber(cells[i], dialect.mark) === undefined).length >
        like.length,
  );
  const found = like.filter((cells) => isRowOfNumbers(cells, isText, dialect.mark));
  const isUsable =
    isText.filter((one) => !one).length >= (mayHaveText ? 2 : 1) &&
    isText.every(
      (one, i) => !one || 2 * like.filter((cells) => isWord(cells[i])).length > like.length,
    );
  const numbers = like.flat().filter((cell) => kindOfCell(cell, dialect.mark) === 'number').length;
  return { dialect, columns, isText, rows: isUsable ? found.length : 0, numbers };
}

/** A word, a date or a time; "600;1.5" is two numbers that another separator would part. */
function isWord(cell: string): boolean {
  return /\p{L}/u.test(cell) || /^\s*\d{1,4}([-/:.])\d{1,2}\1\d{1,4}\b/.test(cell);
}

/** Whether all columns but those of words hold a number or no data, and at least one a number. */
export function isRowOfNumbers(
  cells: readonly string[],
  isText: readonly boolean[],
  mark: DecimalMark,
): boolean {
  let numbers = 0;
  for (let i = 0; i < cells.length; i++) {
    if (isText[i] === true) continue;
    const value = cellNumber(cells[i], mark);
    if (value === undefined) return false;
    if (!Number.isNaN(value)) numbers++;
  }
  return numbers > 0;
}

/** The commonest number; of equally common ones the largest. */
function commonest(numbers: readonly number[]): number {
  const counts = new Map<number, number>();
  for (const number of numbers) counts.set(number, (counts.get(number) ?? 0) + 1);
  let top = 0;
  for (const [number, count] of counts) {
    const most = counts.get(top) ?? 0;
    if (count > most || (count === most && number > top)) top = number;
  }
  return top;
}

/**
 * Whether commas seem to separate columns and mark decimals at once: "599,778,0,284". Whole numbers
 * throughout, and either the names above are fewer than the cells, or every second cell reads like
 * the digits after a comma, or what would be the first column goes nowhere.
 *
 * @param names - cells of the line of words above the rows; null without one
 */
export function isDoubtfulComma(
  dialect: Dialect,
  rows: readonly (readonly string[])[],
  names: readonly string[] | null,
): boolean {
  if (dialect.delimiter !== ',' || dialect.mark === ',') return false;
  const [first] = rows;
  const columns = first.length;
  if (columns < 2 || rows.some((cells) => cells.some((cell) => cell.includes('.')))) return false;
  if (names !== null) return names.length < columns && 2 * names.length >= columns;
  if (columns % 2 === 1) return false;
  const isFraction = (cell: string): boolean => /^\d+$/.test(cell.trim());
  const pairs = rows.every((cells) => cells.every((cell, i) => i % 2 === 0 || isFraction(cell)));
  if (!pairs) return false;
  const hasLeadingZero = rows.some((cells) =>
    cells.some((cell, i) => i % 2 === 1 && /^0\d/.test(cell.trim())),
  );
  return hasLeadingZero || (columns === 2 && !runsOneWay(rows.map((cells) => Number(cells[0]))));
}

export function runsOneWay(values: readonly number[]): boolean {
  if (values.length < 2) return true;
  const isUp = values[1] > values[0];
  return values.every(
    (value, i) => i === 0 || (isUp ? value > values[i - 1] : value < values[i - 1]),
  );
}
