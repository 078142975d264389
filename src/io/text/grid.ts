/** Whether points lie on a grid, in whatever order they come. */

export interface Grid {
  /** (nx) and (ny), ascending */
  readonly x: Float64Array;
  readonly y: Float64Array;
  /** (points) pixel of each point, row × nx + column */
  readonly pixelOf: Int32Array;
  /** pixels without a point */
  readonly missing: number;
  /** how far points lie from the grid they were put on, in x and y; zero where it is exact */
  readonly wander: number;
}

/** A grid less than half filled is no grid: scattered points share a coordinate by chance. */
const leastFill = 0.5;
const fewestPoints = 4;
/** Positions read back from a stage differ a little each time: gaps between columns are this much wider. */
const gapRatio = 8;
const leastFillOfWandering = 0.9;
const fewestWanderingPoints = 9;

/**
 * @param x - positions of the points, all finite; no two points alike
 * @returns null when the points are scattered
 */
export function findGrid(x: Float64Array, y: Float64Array): Grid | null {
  const exact = placed(x, y, distinct(x), distinct(y));
  if (exact?.missing === 0) return exact;
  const near = wandering(x, y);
  if (near !== null && (exact === null || near.missing < exact.missing)) return near;
  const isFilled = exact !== null && x.length > leastFill * exact.x.length * exact.y.length;
  return isFilled && x.length >= fewestPoints ? exact : null;
}

function wandering(x: Float64Array, y: Float64Array): Grid | null {
  if (x.length < fewestWanderingPoints) return null;
  const columns = clusters(x);
  const rows = clusters(y);
  const near = columns === null || rows === null ? null : placed(x, y, columns, rows);
  if (near === null) return null;
  return x.length >= leastFillOfWandering * near.x.length * near.y.length ? near : null;
}

function distinct(values: Float64Array): Float64Array {
  return Float64Array.from(new Set(values)).sort();
}

/** Null when the grid would be far too empty, or two points would fall on one pixel. */
function placed(
  x: Float64Array,
  y: Float64Array,
  columns: Float64Array,
  rows: Float64Array,
): Grid | null {
  const points = x.length;
  const pixels = columns.length * rows.length;
  if (points < leastFill * pixels) return null;
  const pixelOf = new Int32Array(points);
  const isTaken = new Uint8Array(pixels);
  let wander = 0;
  for (let i = 0; i < points; i++) {
    const column = nearest(columns, x[i]);
    const row = nearest(rows, y[i]);
    const pixel = row * columns.length + column;
    if (isTaken[pixel] === 1) return null;
    isTaken[pixel] = 1;
    pixelOf[i] = pixel;
    wander = Math.max(wander, Math.abs(x[i] - columns[column]), Math.abs(y[i] - rows[row]));
  }
  return { x: columns, y: rows, pixelOf, missing: pixels - points, wander };
}

/** Index of the nearest of ascending values. */
function nearest(ascending: Float64Array, value: number): number {
  let low = 0;
  let high = ascending.length - 1;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (ascending[middle] < value) low = middle + 1;
    else high = middle;
  }
  return low > 0 && value - ascending[low - 1] < ascending[low] - value ? low - 1 : low;
}

/**
 * Means of groups of near values: the gaps between groups are much wider than any inside one. Null
 * when the values do not fall into groups.
 */
function clusters(values: Float64Array): Float64Array | null {
  const sorted = values.toSorted();
  const gaps = Float64Array.from(
    { length: sorted.length - 1 },
    (_, i) => sorted[i + 1] - sorted[i],
  );
  const widest = gaps.toSorted().reverse();
  if (widest[0] === 0) return sorted.subarray(0, 1);
  // The first great fall in width parts columns from wandering; a later one, to nothing, is rounding.
  const split = widest.findIndex((gap, i) => gap > gapRatio * (widest[i + 1] ?? gap));
  if (split < 0) return null;
  const means: number[] = [];
  let from = 0;
  for (let i = 0; i < sorted.length; i++) {
    if (i < gaps.length && gaps[i] < widest[split]) continue;
    const group = sorted.subarray(from, i + 1);
    const [first] = group;
    const spread = group[group.length - 1] - first;
    if (spread > widest[split] / 2) return null;
    // Counted from the first, equal values have exactly themselves for a mean.
    means.push(first + group.reduce((sum, value) => sum + (value - first), 0) / group.length);
    from = i + 1;
  }
  return Float64Array.from(means);
}

/** The first point at the place of an earlier one; null when all places differ. */
export function findRepeat(x: Float64Array, y: Float64Array): number | null {
  const seen = new Map<number, Set<number>>();
  for (let i = 0; i < x.length; i++) {
    const column = seen.get(x[i]);
    if (column === undefined) seen.set(x[i], new Set([y[i]]));
    else if (column.has(y[i])) return i;
    else column.add(y[i]);
  }
  return null;
}

/** What the user should know of how the points were placed. */
export function notesOnGrid(grid: Grid | null, points: number): readonly string[] {
  if (grid === null) {
    return [
      `The ${points} points are scattered, not on a grid: they are kept side by side in the order of the file.`,
    ];
  }
  const { missing, wander, x, y } = grid;
  return [
    ...(missing === 0
      ? []
      : [`${missing} of ${x.length * y.length} pixels are missing in the file and hold no data.`]),
    ...(wander === 0
      ? []
      : [
          `Positions wander by up to ${Number(wander.toPrecision(2))} about a grid of ${y.length} rows × ${x.length} columns, whose mean positions are given.`,
        ]),
  ];
}
