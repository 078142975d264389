/** Which of the layouts a table has: spectra in rows, long rows, values at points, columns, a matrix. */
import { cellNumber } from './cell';
import { runsOneWay } from './dialect';
import { type Heading, numbersAfterOneWord } from './heading';
import type { Table } from './table';

/** Column numbers of the two positions of a pixel. */
export interface PositionColumns {
  readonly x: number;
  readonly y: number;
}

/** The axis values a header gives, one for each column of values. */
export interface HeaderAxis {
  readonly values: readonly number[];
  readonly unit: string | null;
  /** the word before each number: "I" of "I_600"; "" where there is none */
  readonly word: string;
}

export type Layout =
  /** a row per pixel or position: labels, then one value per channel */
  | {
      readonly kind: 'spectra';
      readonly labels: readonly number[];
      readonly position: PositionColumns | null;
      readonly values: readonly number[];
      readonly axis: HeaderAxis;
    }
  /** a row per channel of each point: positions, axis value, measured values */
  | {
      readonly kind: 'long';
      readonly labels: readonly number[];
      readonly position: PositionColumns | null;
      readonly channel: number;
      readonly values: readonly number[];
    }
  /** a row per point with single values: a height map as x, y, z */
  | {
      readonly kind: 'points';
      readonly position: PositionColumns;
      readonly values: readonly number[];
      /** x, y and one more column may as well be a spectrum */
      readonly isSure: boolean;
    }
  /** a row per channel, a column per spectrum, after the column of the axis */
  | {
      readonly kind: 'turned';
      readonly axis: number;
      readonly values: readonly number[];
      /** the numbers of the spectra's headings: 1, 2, 3 of "run 1"; null where they have none */
      readonly spectra: HeaderAxis | null;
    }
  /** one spectrum; without names it may turn out to be a matrix */
  | {
      readonly kind: 'columns';
      readonly columns: readonly number[];
      readonly mayBeMatrix: boolean;
    }
  | { readonly kind: 'matrix'; readonly columns: readonly number[] };

/** More columns without names are a matrix of values. */
const mostNamelessColumns = 12;
/** Fewer numbered columns ("run 1", "run 2") are looked at one by one. */
const fewestNumbered = 8;
/** More columns with names are no list of single spectra. */
const mostNamedColumns = 256;

export function findLayout(table: Table): Layout {
  const { headings } = table;
  const columns = table.isText.flatMap((isText, i) => (isText ? [] : [i]));
  return headings === null
    ? namelessLayout(table, columns)
    : (spectraByHeader(headings, columns) ??
        positionedLayout(table, headings, columns) ??
        labelledLong(table, headings, columns) ??
        spectraInColumns(table, headings, columns) ?? {
          kind: 'columns',
          columns,
          mayBeMatrix: false,
        });
}

function namelessLayout(table: Table, columns: readonly number[]): Layout {
  if (columns.length === 4 && isLong(table, columns.slice(0, 2), columns[2])) {
    const [x, y, channel, value] = columns;
    return { kind: 'long', labels: [], position: { x, y }, channel, values: [value] };
  }
  if (columns.length === 3 && isLong(table, [columns[0]], columns[1])) {
    const [label, channel, value] = columns;
    const first = table.sample[0][label];
    // One place all along may as well be a column that says the same in every row of a spectrum.
    if (table.sample.some((cells) => cells[label] !== first)) {
      return { kind: 'long', labels: [label], position: null, channel, values: [value] };
    }
  }
  if (columns.length > mostNamelessColumns) return { kind: 'matrix', columns };
  return { kind: 'columns', columns, mayBeMatrix: columns.length >= 3 };
}

/** Axis values in the header, after at least one column that has a name, or none under an empty corner. */
function spectraByHeader(headings: readonly Heading[], columns: readonly number[]): Layout | null {
  let from = headings.length;
  while (from > 0 && headings[from - 1].value !== null && columns.includes(from - 1)) from--;
  const tail = headings.slice(from);
  if (tail.length < 2 || from === 0) return null;
  const labels = columns.filter((column) => column < from);
  const units = new Set(tail.map(({ unit }) => unit));
  return {
    kind: 'spectra',
    labels,
    position: positionOf(headings, labels) ?? namelessPosition(headings, labels),
    values: columns.filter((column) => column >= from),
    axis: {
      values: tail.map(({ value }) => value ?? Number.NaN),
      unit: units.size === 1 ? tail[0].unit : null,
      word: '',
    },
  };
}

function positionOf(
  headings: readonly Heading[],
  columns: readonly number[],
): PositionColumns | null {
  const along = (which: 'x' | 'y') => columns.find((column) => headings[column].along === which);
  const x = along('x');
  const y = along('y');
  return x === undefined || y === undefined ? null : { x, y };
}

/** Two columns without a name before the axis values: x and y, in this order. */
function namelessPosition(
  headings: readonly Heading[],
  labels: readonly number[],
): PositionColumns | null {
  const isNameless = labels.every((column) => headings[column].text === '');
  return labels.length === 2 && isNameless ? { x: labels[0], y: labels[1] } : null;
}

function positionedLayout(
  table: Table,
  headings: readonly Heading[],
  columns: readonly number[],
): Layout | null {
  const position = positionOf(headings, columns);
  if (position === null || columns.length < 3) return null;
  const { x, y } = position;
  const rest = columns.filter((column) => column !== x && column !== y);
  if (rest.length >= fewestNumbered) {
    const numbered = numbersAfterOneWord(
      rest.map((column) => headings[column]),
      table.dialect.mark,
    );
    if (numbered !== null && runsOneWay(numbered.values)) {
      const axis = { values: numbered.values, unit: null, word: numbered.word };
      return { kind: 'spectra', labels: [x, y], position, values: rest, axis };
    }
  }
  const channel = rest.find((column) => headings[column].isSpectral);
  const places = placesIn(table, x, y);
  const rows = table.sample.length;
  // One repeated place may be a slip; without an axis by name it takes more.
  const isRepeated = channel === undefined ? 2 * places <= rows : places < rows;
  const isChannelSlow = channel !== undefined && isConstant(table, channel);
  if (rest.length >= 2 && (isRepeated || isChannelSlow)) {
    const own = channel ?? rest[0];
    const values = rest.filter((column) => column !== own);
    return { kind: 'long', labels: [], position, channel: own, values };
  }
  return { kind: 'points', position, values: rest, isSure: rest.length > 1 };
}

/** Long rows of a line of spectra: "gate_volts, wavelength_nm, counts". */
function labelledLong(
  table: Table,
  headings: readonly Heading[],
  columns: readonly number[],
): Layout | null {
  const [label] = columns;
  const channel = columns.find((column) => headings[column].isSpectral);
  if (columns.length < 3 || channel === undefined || channel === label) return null;
  if (/count|intens|signal|dark/i.test(headings[label].text)) return null;
  if (!isLong(table, [label], channel)) return null;
  const values = columns.filter((column) => column !== label && column !== channel);
  return { kind: 'long', labels: [label], position: null, channel, values };
}

/** "wavelength_nm, run 1, run 2, …", or so many columns that they are spectra whatever they are called. */
function spectraInColumns(
  table: Table,
  headings: readonly Heading[],
  columns: readonly number[],
): Layout | null {
  const [axis, ...values] = columns;
  const named = values.map((column) => headings[column]);
  const numbered =
    values.length >= fewestNumbered ? numbersAfterOneWord(named, table.dialect.mark) : null;
  const isMany = columns.length > mostNamedColumns;
  if (!isMany && (numbered === null || !headings[axis].isSpectral)) return null;
  const spectra = numbered === null ? null : { ...numbered, unit: null };
  return { kind: 'turned', axis, values, spectra };
}

/** Whether the labels stay while the channel runs one way, and change only where it begins anew. */
function isLong(table: Table, labels: readonly number[], channel: number): boolean {
  const rows = table.sample.map((cells) => ({
    key: labels.map((column) => cells[column].trim()).join('\t'),
    at: cellNumber(cells[channel], table.dialect.mark) ?? Number.NaN,
  }));
  if (rows.length < 3 || rows[0].key !== rows[1].key || rows[1].key !== rows[2].key) return false;
  const isUp = rows[1].at > rows[0].at;
  return rows.every(({ key, at }, i) => {
    if (i === 0) return true;
    const before = rows[i - 1];
    if (key !== before.key) return at === rows[0].at;
    return isUp ? at > before.at : at < before.at;
  });
}

/** How many places the first rows are at. */
function placesIn({ sample, dialect }: Table, x: number, y: number): number {
  const place = (cells: readonly string[]): string =>
    `${cellNumber(cells[x], dialect.mark)},${cellNumber(cells[y], dialect.mark)}`;
  return new Set(sample.map(place)).size;
}

function isConstant({ sample, dialect }: Table, column: number): boolean {
  const values = sample.map((cells) => cellNumber(cells[column], dialect.mark));
  return values.length >= 2 && values.every((value) => value === values[0]);
}
