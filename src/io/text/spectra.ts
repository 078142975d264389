/** Spectra in rows, one value per channel, after columns of positions or other labels; and plain matrices. */
import type { ElementType, ReadOptions } from '../container';
import { type Content, distinctNames, heldArray, heldColumn, type StoredEntry } from './content';
import { findGrid, findRepeat, type Grid, notesOnGrid } from './grid';
import { attributesOf } from './heading';
import type { HeaderAxis, Layout, PositionColumns } from './layout';
import { inPixels, onGrid } from './on-grid';
import { nothingHeld, secondRowAt, withoutPlace } from './row-errors';
import { heldBytes, type PixelStretch, StreamedCube } from './streamed-cube';
import { nameOfColumn, type Table } from './table';
import { numberAt, rowsOf } from './table-rows';
import { columnOf, GrowingColumn, inType, ValueRange } from './value-range';

/** What one pass over the rows leaves. */
interface RowsRead {
  readonly labels: readonly GrowingColumn[];
  readonly range: ValueRange;
  /** (rows, nk) in the order of the file; null when it is too much to hold */
  readonly held: Float64Array | null;
  readonly lines: GrowingColumn;
  /** pixel numbers are row numbers here */
  readonly stretches: readonly PixelStretch[];
  readonly rows: number;
}

/** @throws RimlightError 'scan' - for rows at one place, without a place, or without any value */
export async function readSpectra(
  table: Table,
  layout: Extract<Layout, { readonly kind: 'spectra' }>,
  options: ReadOptions,
): Promise<Content> {
  const { labels, position, values, axis } = layout;
  const read = await readRows(table, labels, values, options);
  const places = position === null ? null : placesOf(table, layout.labels, position, read);
  const grid = places === null ? null : findGrid(places.x, places.y);
  const space = grid === null ? [1, read.rows] : [grid.y.length, grid.x.length];
  const cube = cubeOf('counts', [...space, values.length], table, values, read, grid, axis.word);
  const names = distinctNames(
    labels.map((column) => labelName(table, column, position)),
    ['counts', 'axis'],
  );
  const arrays = labels.map((column, i) =>
    labelArray(table, column, names[i], read.labels[i], grid, position),
  );
  const isNameless = position !== null && table.headings?.[position.x].text === '';
  return {
    arrays: [cube, axisArray(axis), ...arrays],
    notes: [
      ...(isNameless ? ['The two columns without a name were taken for x and y.'] : []),
      ...(places === null ? [] : notesOnGrid(grid, read.rows)),
    ],
  };
}

/** A table of numbers without names: (rows, columns). */
export async function readMatrix(
  table: Table,
  columns: readonly number[],
  options: ReadOptions,
): Promise<Content> {
  const read = await readRows(table, [], columns, options);
  const shape = [read.rows, columns.length];
  return { arrays: [cubeOf('', shape, table, columns, read, null, '')], notes: [] };
}

/** A row per channel: (channels, spectra), with the axis beside it. */
export async function readTurned(
  table: Table,
  { axis, values, spectra }: Extract<Layout, { readonly kind: 'turned' }>,
  options: ReadOptions,
): Promise<Content> {
  const read = await readRows(table, [axis], values, options);
  const shape = [read.rows, values.length];
  const [name, number] = distinctNames(
    [nameOfColumn(table.headings, axis), spectra?.word || 'number'],
    ['counts'],
  );
  return {
    arrays: [
      cubeOf('counts', shape, table, values, read, null, ''),
      heldColumn(name, read.labels[0], attributesOf(table.headings?.[axis] ?? null, name)),
      ...(spectra === null ? [] : [heldColumn(number, columnOf(spectra.values))]),
    ],
    notes: [`The ${values.length} columns after ${name} were taken for one spectrum each.`],
  };
}

async function readRows(
  table: Table,
  labelColumns: readonly number[],
  valueColumns: readonly number[],
  options: ReadOptions,
): Promise<RowsRead> {
  const nk = valueColumns.length;
  const labels = labelColumns.map(() => new GrowingColumn());
  const lines = new GrowingColumn();
  const range = new ValueRange();
  const stretches: PixelStretch[] = [];
  let held: Float64Array | null = new Float64Array(8 * nk);
  let rows = 0;
  for await (const { from, to, line, ...batch } of rowsOf(table, null, options)) {
    const first = rows;
    for (let i = 0; i < batch.rows.length; i++) {
      const cells = batch.rows[i];
      labelColumns.forEach((column, j) => {
        labels[j].push(numberAt(cells, column, table, batch.lines[i]));
      });
      if (held !== null && (rows + 1) * nk > held.length) held = grown(held);
      for (let k = 0; k < nk; k++) {
        const value = numberAt(cells, valueColumns[k], table, batch.lines[i]);
        range.add(value);
        if (held !== null) held[rows * nk + k] = value;
      }
      lines.push(batch.lines[i]);
      rows++;
    }
    if (rows > first) {
      stretches.push({ from, to, line, row: first, lowest: first, highest: rows - 1 });
    }
  }
  if (range.finite === 0) throw nothingHeld(table.file.source.name);
  return { labels, range, held: held?.subarray(0, rows * nk) ?? null, lines, stretches, rows };
}

/** Twice as long; null when that would be more than is held. */
function grown(held: Float64Array): Float64Array | null {
  if (2 * held.byteLength > heldBytes) return null;
  const longer = new Float64Array(2 * held.length);
  longer.set(held);
  return longer;
}

function placesOf(
  table: Table,
  labels: readonly number[],
  { x, y }: PositionColumns,
  read: RowsRead,
): { readonly x: Float64Array; readonly y: Float64Array } {
  const places = {
    x: read.labels[labels.indexOf(x)].values,
    y: read.labels[labels.indexOf(y)].values,
  };
  const { name } = table.file.source;
  const lost = places.x.findIndex((value, i) => Number.isNaN(value + places.y[i]));
  if (lost >= 0) throw withoutPlace(`${name}: line ${read.lines.at(lost)}`);
  const repeat = findRepeat(places.x, places.y);
  if (repeat === null) return places;
  throw secondRowAt(places.x[repeat], places.y[repeat], `${name}: line ${read.lines.at(repeat)}`);
}

function cubeOf(
  path: string,
  shape: readonly number[],
  table: Table,
  columns: readonly number[],
  read: RowsRead,
  grid: Grid | null,
  word: string,
): StoredEntry {
  const type: ElementType = grid !== null && grid.missing > 0 ? 'float64' : read.range.type;
  const attributes = word === '' ? {} : { long_name: word };
  const { held } = read;
  const nk = columns.length;
  if (held !== null) {
    const values = grid === null ? inType(held, type) : onGrid(held, nk, grid, type);
    return heldArray(path, shape, type, values, attributes);
  }
  const stretches = read.stretches.map((stretch) => inPixels(stretch, grid));
  const entry = { path, shape, type, attributes };
  return new StreamedCube(entry, stretches, async (stretch, { from, to, values }, options) => {
    let row = stretch.row;
    for await (const batch of rowsOf(table, stretch, options)) {
      batch.rows.forEach((cells, i) => {
        const pixel = grid === null ? row : grid.pixelOf[row];
        row++;
        if (pixel < from || pixel >= to) return;
        const at = (pixel - from) * nk;
        for (let k = 0; k < nk; k++) {
          values[at + k] = numberAt(cells, columns[k], table, batch.lines[i]);
        }
      });
    }
  });
}

function axisArray({ values, unit }: HeaderAxis): StoredEntry {
  return heldColumn('axis', columnOf(values), unit === null ? {} : { units: unit });
}

function labelName(table: Table, column: number, position: PositionColumns | null): string {
  if (column === position?.x) return 'x';
  return column === position?.y ? 'y' : nameOfColumn(table.headings, column);
}

/** Positions along their axis of the grid; any other label, and every label without a grid, by pixel. */
function labelArray(
  table: Table,
  column: number,
  name: string,
  values: GrowingColumn,
  grid: Grid | null,
  position: PositionColumns | null,
): StoredEntry {
  const heading = table.headings?.[column] ?? null;
  const attributes = attributesOf(heading, name);
  if (grid === null) {
    return heldColumn(name, values, attributes);
  }
  if (column === position?.x || column === position?.y) {
    return heldColumn(name, columnOf(column === position.x ? grid.x : grid.y), attributes);
  }
  const type = grid.missing > 0 ? 'float64' : values.range.type;
  const shape = [grid.y.length, grid.x.length];
  return heldArray(name, shape, type, onGrid(values.values, 1, grid, type), attributes);
}
