/** What can be wrong with a row or a cell of a table, each with what to do about it. */
import { scanError } from '../scan-error';
import { cellNumber, type DecimalMark, hasThousandsSeparators, quoted } from './cell';

/** For a row with more or fewer cells than the others. */
export function raggedRow(cells: number, columns: number, where: string) {
  return scanError(
    `a row has ${cells === 1 ? '1 cell' : `${cells} cells`} where the others have ${columns}`,
    where,
    'Complete the row or take it out; mark lines that are no data with #.',
  );
}

export function thousands(cell: string, where: string) {
  return scanError(
    `the number ${quoted(cell)} has thousands separators`,
    where,
    'Save the numbers without them: 1234.5, not 1,234.5.',
  );
}

/** For a cell that is neither a number nor a mark of no data. */
export function notANumber(cell: string, mark: DecimalMark, where: string) {
  if (hasThousandsSeparators(cell)) return thousands(cell, where);
  const isOther = cellNumber(cell, mark === '.' ? ',' : '.') !== undefined;
  if (isOther) {
    const [here, there] = mark === '.' ? ['comma', 'points'] : ['point', 'commas'];
    return scanError(
      `${quoted(cell)} has a decimal ${here} where the other numbers have ${there}`,
      where,
      'Save the table with one decimal mark.',
    );
  }
  if (cell.split(/[\t;,]/).every((part) => cellNumber(part, mark) !== undefined)) {
    return otherSeparator(cell, where);
  }
  return scanError(
    `${quoted(cell)} is not a number`,
    where,
    'Leave the cell empty or write NaN for no data; mark lines that are no data with #.',
  );
}

/** For a line that holds its cells in one. */
export function otherSeparator(cell: string, where: string) {
  return scanError(
    `${quoted(cell)} separates its columns in another way than the other lines`,
    where,
    'Use one separator throughout the table.',
  );
}

/** For a table none of whose channels holds a number. */
export function nothingHeld(where: string) {
  return scanError(
    'every value is missing: no channel of any row holds a number',
    where,
    'Check that the scan was saved with its values.',
  );
}

export function withoutPlace(where: string) {
  return scanError(
    'a row has no position: its x or y is missing',
    where,
    'Give both, or take the row out.',
  );
}

export function secondRowAt(x: number, y: number, where: string) {
  return scanError(`a second row is at x = ${x}, y = ${y}`, where, 'Keep one row for each pixel.');
}
