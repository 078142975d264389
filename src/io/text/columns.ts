/** One spectrum as columns of numbers; and tables of single values at points (x, y, height). */
import type { ReadOptions } from '../container';
import { scanError } from '../scan-error';
import { type Content, distinctNames, heldArray, heldColumn } from './content';
import { runsOneWay } from './dialect';
import { findGrid, findRepeat, type Grid, notesOnGrid } from './grid';
import { attributesOf } from './heading';
import type { Layout } from './layout';
import { onGrid } from './on-grid';
import { nothingHeld, secondRowAt, withoutPlace } from './row-errors';
import { nameOfColumn, type Table } from './table';
import { numberAt, rowsOf } from './table-rows';
import { columnOf, GrowingColumn } from './value-range';

/** Far more channels than any spectrum has. */
const mostRows = 4 << 20;
/** 256 MB of doubles. */
const mostValues = 32 << 20;

interface ColumnsRead {
  readonly columns: readonly GrowingColumn[];
  readonly lines: GrowingColumn;
}

/** Every column an array; columns without names that are no spectrum, one matrix. */
export async function readColumns(
  table: Table,
  layout: Extract<Layout, { readonly kind: 'columns' }>,
  options: ReadOptions,
): Promise<Content> {
  const { columns } = await columnsOf(table, layout.columns, options);
  return layout.mayBeMatrix && !isSpectrum(columns)
    ? matrixOf(columns)
    : spectrumOf(table, layout.columns, columns);
}

/** Single values at points: maps where the points form a grid. */
export async function readPoints(
  table: Table,
  { position, values, isSure }: Extract<Layout, { readonly kind: 'points' }>,
  options: ReadOptions,
): Promise<Content> {
  const numbers = [position.x, position.y, ...values];
  const { columns, lines } = await columnsOf(table, numbers, options);
  const [x, y, ...measured] = columns;
  const { name } = table.file.source;
  const isPlaced = x.range.missing === 0 && y.range.missing === 0;
  const repeat = isPlaced ? findRepeat(x.values, y.values) : null;
  const grid = isPlaced && repeat === null ? findGrid(x.values, y.values) : null;
  const isMap = grid !== null && Math.min(grid.x.length, grid.y.length) > 1;
  // Columns called x and y may as well be a spectrum with its error.
  if (!isMap && (!isSure || runsOneWay([...x.values]))) return spectrumOf(table, numbers, columns);
  if (!isPlaced) {
    const lost = x.values.findIndex((value, i) => Number.isNaN(value + y.values[i]));
    throw withoutPlace(`${name}: line ${lines.at(lost)}`);
  }
  if (repeat !== null) {
    throw secondRowAt(x.at(repeat), y.at(repeat), `${name}: line ${lines.at(repeat)}`);
  }
  return mapsOf(table, numbers, grid, [x, y], measured);
}

async function columnsOf(
  table: Table,
  numbers: readonly number[],
  options: ReadOptions,
): Promise<ColumnsRead> {
  const columns = numbers.map(() => new GrowingColumn());
  const lines = new GrowingColumn();
  for await (const { rows, lines: batchLines } of rowsOf(table, null, options)) {
    rows.forEach((cells, i) => {
      for (let j = 0; j < numbers.length; j++) {
        columns[j].push(numberAt(cells, numbers[j], table, batchLines[i]));
      }
      lines.push(batchLines[i]);
    });
    const most = Math.min(mostRows, Math.floor(mostValues / numbers.length));
    if (lines.length > most) {
      throw scanError(
        `the table has more than ${most} rows of ${numbers.length} columns, which is no spectrum`,
        table.file.source.name,
        'Name the columns if it is a map (x, y, axis, counts), or save it as HDF5 or npy.',
      );
    }
  }
  if (columns.every(({ range }) => range.finite === 0)) throw nothingHeld(table.file.source.name);
  return { columns, lines };
}

/**
 * Columns without names are a spectrum when the first runs one way (of three, the second may) and some
 * other does not; a tilted surface may run one way in all of them.
 */
function isSpectrum(columns: readonly GrowingColumn[]): boolean {
  const isRamp = ({ values }: GrowingColumn): boolean =>
    runsOneWay([...values.filter((value) => !Number.isNaN(value))]);
  const axes = columns.slice(0, columns.length === 3 ? 2 : 1);
  return axes.some(isRamp) && !columns.every(isRamp);
}

function spectrumOf(
  table: Table,
  numbers: readonly number[],
  columns: readonly GrowingColumn[],
): Content {
  const { headings } = table;
  if (columns.length > 1 && columns.filter(({ range }) => range.finite > 0).length < 2) {
    throw nothingHeld(table.file.source.name);
  }
  // One column without a name is an array without a name, as in npy.
  const isNameless = columns.length === 1 && headings === null;
  const names = distinctNames(
    numbers.map((number) => (isNameless ? '' : nameOfColumn(headings, number))),
  );
  return {
    arrays: columns.map((column, i) =>
      heldColumn(names[i], column, attributesOf(headings?.[numbers[i]] ?? null, names[i])),
    ),
    notes: [],
  };
}

function matrixOf(columns: readonly GrowingColumn[]): Content {
  const rows = columns[0].length;
  const whole = new GrowingColumn();
  for (let row = 0; row < rows; row++) for (const { values } of columns) whole.push(values[row]);
  const shape = [rows, columns.length];
  return { arrays: [heldArray('', shape, whole.range.type, whole.narrowed())], notes: [] };
}

function mapsOf(
  table: Table,
  numbers: readonly number[],
  grid: Grid | null,
  [x, y]: readonly GrowingColumn[],
  measured: readonly GrowingColumn[],
): Content {
  const headingOf = (i: number) => table.headings?.[numbers[i]] ?? null;
  const names = distinctNames(
    measured.map((_, i) => nameOfColumn(table.headings, numbers[i + 2])),
    ['x', 'y'],
  );
  const maps = measured.map((column, i) => {
    const attributes = attributesOf(headingOf(i + 2), names[i]);
    if (grid === null) return heldColumn(names[i], column, attributes);
    const type = grid.missing > 0 ? 'float64' : column.range.type;
    const shape = [grid.y.length, grid.x.length];
    return heldArray(names[i], shape, type, onGrid(column.values, 1, grid, type), attributes);
  });
  return {
    arrays: [
      ...maps,
      heldColumn('x', grid === null ? x : columnOf(grid.x), attributesOf(headingOf(0), 'x')),
      heldColumn('y', grid === null ? y : columnOf(grid.y), attributesOf(headingOf(1), 'y')),
    ],
    notes: notesOnGrid(grid, x.length),
  };
}
