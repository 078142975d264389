/** One pass over long rows (x, y, axis, counts): points, axis, and what the rows hold. */
import type { ReadOptions } from '../container';
import { scanError } from '../scan-error';
import type { Layout } from './layout';
import { AxisIndex, PointIndex } from './point-index';
import { nothingHeld, withoutPlace } from './row-errors';
import { heldBytes, type PixelStretch } from './streamed-cube';
import type { Table } from './table';
import { numberAt, rowsOf } from './table-rows';
import { GrowingValues, ValueRange } from './value-range';

export type LongLayout = Extract<Layout, { readonly kind: 'long' }>;

/** More is no detector. */
const mostChannels = 200_000;

export interface LongRead {
  readonly points: PointIndex;
  readonly axis: AxisIndex;
  /** one for each column of values */
  readonly ranges: readonly ValueRange[];
  /** (channels) of each column of values: its value at each channel, where that is one for all points */
  readonly shared: readonly (Float64Array | null)[];
  /** rows as they come; null when they are too many to hold */
  readonly held: HeldRows | null;
  /** lowest and highest are point numbers */
  readonly stretches: readonly PixelStretch[];
  /** rows left out because they have no axis value */
  readonly withoutAxis: number;
  /** every point has its channels in the order of the axis, so none twice */
  readonly isOrdered: boolean;
}

export interface HeldRows {
  readonly points: GrowingValues;
  readonly channels: GrowingValues;
  readonly values: readonly GrowingValues[];
}

/**
 * @throws RimlightError 'scan' - when a point has another axis or other channels than the rest, or a
 * row has no position
 */
export async function readLongRows(
  table: Table,
  layout: LongLayout,
  options: ReadOptions,
): Promise<LongRead> {
  const pass = new LongPass(table, layout);
  for await (const batch of rowsOf(table, null, options)) {
    pass.begin();
    batch.rows.forEach((cells, i) => {
      pass.row(cells, batch.lines[i]);
    });
    pass.end(batch.from, batch.to, batch.line);
  }
  return pass.finish();
}

/** Positions of a row; a label alone counts as x. */
export function placeOf(
  cells: readonly string[],
  { position, labels }: LongLayout,
  table: Table,
  line: number,
): readonly [number, number] {
  if (position === null) return [numberAt(cells, labels[0], table, line), 0];
  return [numberAt(cells, position.x, table, line), numberAt(cells, position.y, table, line)];
}

class LongPass {
  private readonly points = new PointIndex();
  private readonly axis = new AxisIndex();
  private readonly ranges: readonly ValueRange[];
  private readonly seen: readonly GrowingValues[];
  private readonly isShared: boolean[];
  private held: HeldRows | null;
  private readonly stretches: PixelStretch[] = [];
  /** channels met so far, and first line, of each point */
  private readonly counts: number[] = [];
  private readonly lines: number[] = [];
  private rows = 0;
  private withoutAxis = 0;
  /** the first point's channels follow one another: its axis is complete where the next begins */
  private isInBlocks = false;
  private isOrdered = true;
  private lowest = 0;
  private highest = 0;
  private firstRow = 0;

  constructor(
    private readonly table: Table,
    private readonly layout: LongLayout,
  ) {
    const { values } = layout;
    this.ranges = values.map(() => new ValueRange());
    this.seen = values.map(() => new GrowingValues());
    this.isShared = values.map(() => true);
    this.held = {
      points: new GrowingValues(),
      channels: new GrowingValues(),
      values: values.map(() => new GrowingValues()),
    };
  }

  begin(): void {
    this.firstRow = this.rows;
    this.lowest = Number.POSITIVE_INFINITY;
    this.highest = -1;
  }

  end(from: number, to: number, line: number): void {
    const { lowest, highest, firstRow: row } = this;
    if (highest >= 0) this.stretches.push({ from, to, line, row, lowest, highest });
  }

  row(cells: readonly string[], line: number): void {
    const { table, layout } = this;
    const at = numberAt(cells, layout.channel, table, line);
    if (Number.isNaN(at)) {
      this.withoutAxis++;
      return;
    }
    const [x, y] = placeOf(cells, layout, table, line);
    if (Number.isNaN(x + y)) throw withoutPlace(this.where(line));
    const point = this.pointAt(x, y, line);
    const channel = this.channelAt(at, point, line);
    this.counts[point]++;
    if (point < this.lowest) this.lowest = point;
    if (point > this.highest) this.highest = point;
    layout.values.forEach((column, j) => {
      const value = numberAt(cells, column, table, line);
      this.ranges[j].add(value);
      this.share(j, channel, value);
      this.held?.values[j].push(value);
    });
    this.hold(point, channel);
    this.rows++;
  }

  private pointAt(x: number, y: number, line: number): number {
    const known = this.points.find(x, y);
    if (known >= 0) {
      if (this.rows === 1) this.isInBlocks = true;
      return known;
    }
    this.counts.push(0);
    this.lines.push(line);
    return this.points.add(x, y);
  }

  private channelAt(at: number, point: number, line: number): number {
    const next = this.counts[point];
    const known = this.axis.find(at, next);
    if (known >= 0) {
      if (known !== next) this.isOrdered = false;
      return known;
    }
    if (this.isInBlocks && point > 0) {
      throw scanError(
        `${this.named(point)} has an axis of its own: the points before have no value at ${at}`,
        this.where(line),
        'A scan has one axis: bring all spectra onto it before saving, or open one point at a time.',
      );
    }
    if (this.axis.values.length >= mostChannels) {
      throw scanError(
        `there are more than ${mostChannels} different axis values`,
        this.where(line),
        'Check which column is the axis, or save the scan as HDF5 or npy.',
      );
    }
    return this.axis.add(at);
  }

  private share(column: number, channel: number, value: number): void {
    const seen = this.seen[column];
    if (channel === seen.length) seen.push(value);
    else if (this.isShared[column] && !Object.is(seen.at(channel), value)) {
      this.isShared[column] = false;
    }
  }

  private hold(point: number, channel: number): void {
    if (this.held === null) return;
    this.held.points.push(point);
    this.held.channels.push(channel);
    if (this.rows * 8 * (2 + this.ranges.length) > heldBytes) this.held = null;
  }

  finish(): LongRead {
    const { points, axis, ranges, seen, isShared, held, stretches, withoutAxis, isOrdered } = this;
    if (ranges.every(({ finite }) => finite === 0)) throw nothingHeld(this.table.file.source.name);
    const channels = axis.values.length;
    const odd = this.counts.findIndex((count) => count !== channels);
    if (odd >= 0) {
      throw scanError(
        `${this.named(odd)} has ${this.counts[odd] === 1 ? '1 channel' : `${this.counts[odd]} channels`}, and the axis has ${channels}`,
        this.where(this.lines[odd]),
        'Give every point the same channels; write NaN where there is no value.',
      );
    }
    return {
      points,
      axis,
      ranges,
      shared: seen.map(({ values }, j) => (isShared[j] ? values : null)),
      held,
      stretches,
      withoutAxis,
      isOrdered,
    };
  }

  private named(point: number): string {
    const { position, labels } = this.layout;
    const x = this.points.x.values[point];
    if (position !== null) return `the point at x = ${x}, y = ${this.points.y.values[point]}`;
    return `the spectrum at ${this.table.headings?.[labels[0]].text ?? 'position'} = ${x}`;
  }

  private where(line: number): string {
    return `${this.table.file.source.name}: line ${line}`;
  }
}
