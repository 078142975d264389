/** Long rows (x, y, axis, counts) as a cube with its axis and positions. */
import type { CountsArray } from '../../science/scan';
import type { ReadOptions } from '../container';
import { arrayOfType } from '../dtype';
import { scanError } from '../scan-error';
import { type Content, distinctNames, heldArray, heldColumn, type StoredEntry } from './content';
import { findGrid, type Grid, notesOnGrid } from './grid';
import { attributesOf, type Heading } from './heading';
import { type HeldRows, type LongLayout, type LongRead, placeOf, readLongRows } from './long-rows';
import { inPixels } from './on-grid';
import { type PixelStretch, StreamedCube } from './streamed-cube';
import { nameOfColumn, type Table } from './table';
import { numberAt, rowsOf } from './table-rows';
import { columnOf } from './value-range';

/** What is common to all arrays of one file. */
interface LongScan {
  readonly table: Table;
  readonly layout: LongLayout;
  readonly read: LongRead;
  readonly grid: Grid | null;
}

/** @throws RimlightError 'scan' - where points do not share one axis, or a row is given twice */
export async function readLong(
  table: Table,
  layout: LongLayout,
  options: ReadOptions,
): Promise<Content> {
  const read = await readLongRows(table, layout, options);
  if (!read.isOrdered) await refuseRepeats(table, layout, read, options);
  const { points, axis, withoutAxis } = read;
  const grid = layout.position === null ? null : findGrid(points.x.values, points.y.values);
  const scan = { table, layout, read, grid };
  const isCube = cubesAmong(layout, read);
  const names = distinctNames(
    layout.values.map((column) => valueName(table, column, isCube.filter(Boolean).length)),
    ['axis', 'x', 'y', ...layout.labels.map((label) => nameOfColumn(table.headings, label))],
  );
  const headingOf = (column: number): Heading | null => table.headings?.[column] ?? null;
  const values = layout.values.map((column, j) => {
    const attributes = attributesOf(headingOf(column), names[j]);
    const shared = read.shared[j];
    return isCube[j] || shared === null
      ? cubeOf(scan, j, names[j], attributes)
      : heldColumn(names[j], columnOf(shared), attributes);
  });
  const channelHeading = headingOf(layout.channel);
  return {
    arrays: [
      ...values.toSorted((a, b) => b.entry.shape.length - a.entry.shape.length),
      heldColumn('axis', axis.values, attributesOf(channelHeading, 'axis')),
      ...positionArrays(scan),
    ],
    notes: [
      ...(withoutAxis === 0 ? [] : [`${withoutAxis} rows without an axis value were left out.`]),
      ...(layout.position === null ? [] : notesOnGrid(grid, points.x.length)),
    ],
  };
}

/** Columns that differ from point to point; where none does, the last one. */
function cubesAmong({ values }: LongLayout, { shared, points }: LongRead): readonly boolean[] {
  const isCube = values.map((_, j) => points.x.length > 1 && shared[j] === null);
  if (!isCube.includes(true)) isCube[isCube.length - 1] = true;
  return isCube;
}

/** "counts" for counts and for a column without a name; other quantities keep theirs. */
function valueName(table: Table, column: number, cubes: number): string {
  const text = table.headings?.[column]?.text ?? '';
  const isCounts = text === '' || /\b(?:counts?|cts|adu)\b/i.test(text.replace(/_/g, ' '));
  return cubes === 1 && isCounts ? 'counts' : nameOfColumn(table.headings, column);
}

function positionArrays({ table, layout, read, grid }: LongScan): readonly StoredEntry[] {
  const { points } = read;
  const attributes = (column: number, name: string) =>
    attributesOf(table.headings?.[column] ?? null, name);
  if (layout.position === null) {
    const name = nameOfColumn(table.headings, layout.labels[0]);
    return [heldColumn(name, points.x, attributes(layout.labels[0], name))];
  }
  const { x, y } = layout.position;
  return [
    heldColumn('x', grid === null ? points.x : columnOf(grid.x), attributes(x, 'x')),
    heldColumn('y', grid === null ? points.y : columnOf(grid.y), attributes(y, 'y')),
  ];
}

function cubeOf(
  scan: LongScan,
  column: number,
  path: string,
  attributes: StoredEntry['entry']['attributes'],
): StoredEntry {
  const { read, grid } = scan;
  const nk = read.axis.values.length;
  const space = grid === null ? [1, read.points.x.length] : [grid.y.length, grid.x.length];
  const shape = [...space, nk];
  const type = grid !== null && grid.missing > 0 ? 'float64' : read.ranges[column].type;
  const { held } = read;
  if (held !== null) {
    const values = new arrayOfType[type](space[0] * space[1] * nk);
    if (type === 'float64') values.fill(Number.NaN);
    placeHeld(held, column, nk, grid, values);
    return heldArray(path, shape, type, values, attributes);
  }
  const stretches = read.stretches.map((stretch) => inPixels(stretch, grid));
  const entry = { path, shape, type, attributes };
  const { table, layout } = scan;
  return new StreamedCube(entry, stretches, async (stretch, { from, to, values }, options) => {
    for await (const rows of longRowsOf(table, layout, read, stretch, options)) {
      for (const { point, channel, cells, line } of rows) {
        const pixel = grid === null ? point : grid.pixelOf[point];
        if (pixel < from || pixel >= to) continue;
        const value = numberAt(cells, layout.values[column], table, line);
        values[(pixel - from) * nk + channel] = value;
      }
    }
  });
}

function placeHeld(
  { points, channels, values }: HeldRows,
  column: number,
  nk: number,
  grid: Grid | null,
  out: CountsArray,
): void {
  const own = values[column];
  for (let row = 0; row < own.length; row++) {
    const pixel = grid === null ? points.at(row) : grid.pixelOf[points.at(row)];
    out[pixel * nk + channels.at(row)] = own.at(row);
  }
}

export interface LongRow {
  readonly point: number;
  readonly channel: number;
  readonly cells: readonly string[];
  readonly line: number;
}

/** Rows of a part of the file again, with their point and channel. */
export async function* longRowsOf(
  table: Table,
  layout: LongLayout,
  { points, axis }: Pick<LongRead, 'points' | 'axis'>,
  stretch: PixelStretch | null,
  options: ReadOptions,
): AsyncGenerator<readonly LongRow[]> {
  let next = 0;
  for await (const batch of rowsOf(table, stretch, options)) {
    const rows: LongRow[] = [];
    batch.rows.forEach((cells, i) => {
      const line = batch.lines[i];
      const at = numberAt(cells, layout.channel, table, line);
      if (Number.isNaN(at)) return;
      const point = points.find(...placeOf(cells, layout, table, line));
      const channel = axis.find(at, next);
      next = channel + 1;
      rows.push({ point, channel, cells, line });
    });
    yield rows;
  }
}

/** Where channels come in any order, a point may have one twice and lack another. */
async function refuseRepeats(
  table: Table,
  layout: LongLayout,
  read: LongRead,
  options: ReadOptions,
): Promise<void> {
  const channels = read.axis.values.length;
  const bits = new Uint8Array(Math.ceil((read.points.x.length * channels) / 8));
  for await (const rows of longRowsOf(table, layout, read, null, options)) {
    for (const { point, channel, line } of rows) {
      const at = point * channels + channel;
      const bit = 1 << (at & 7);
      if ((bits[at >> 3] & bit) !== 0) {
        throw scanError(
          `a second row has the axis value ${read.axis.values.values[channel]} at the same point`,
          `${table.file.source.name}: line ${line}`,
          'Keep one row for each channel of each point.',
        );
      }
      bits[at >> 3] |= bit;
    }
  }
}
