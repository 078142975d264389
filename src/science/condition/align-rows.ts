/**
 * Rows moved sideways by parts of a pixel so that neighbours match: how far each lies off, from its total
 * counts against those of the row before.
 */
import { medianInPlace } from '../numeric/select';
import { type ConditionedArray, type ConditionedSlab, zerosLike } from './conditioned';
import { type StepPlace, stepError } from './step-errors';

export interface RowShifts {
  /** (ny) pixels each row's content lies to the right of where it belongs; it is moved left by that */
  readonly shiftsPx: Float64Array;
  /** odd rows against even rows, pixels: what a scan in serpentines leaves */
  readonly serpentinePx: number;
  /** rows that do not resemble the one before enough to tell: taken to lie as that one does */
  readonly unsureRows: number;
  /** rows whose shift was cut to the greatest allowed */
  readonly limitedRows: number;
}

/** A correlation of unlike rows of n pixels scatters by 1/√n; it must exceed this many times that. */
const leastCorrelation = 4;
const refineRounds = 3;
/** Shifts that leave more than this of the rows' differences are not worth the blur they cost. */
const mostLeft = 0.7;
/** Fewer pixels tell nothing. */
const fewestPixels = 8;

/** (ny × nx) counts of each pixel, no data left out; NaN where all is missing. */
export function rowProfiles({ counts, shape }: ConditionedSlab): Float64Array {
  const { ny, nx, nk } = shape;
  const totals = new Float64Array(ny * nx);
  for (let pixel = 0; pixel < totals.length; pixel++) {
    let sum = 0;
    let found = 0;
    for (let k = 0; k < nk; k++) {
      const value = counts[pixel * nk + k];
      if (Number.isNaN(value)) continue;
      sum += value;
      found++;
    }
    totals[pixel] = found > 0 ? sum : Number.NaN;
  }
  return totals;
}

/**
 * Shifts of all rows from their profiles.
 *
 * First what turns its sign from row to row, the serpentine's: the median of how far each row lies
 * from the one before, by the highest normalised cross-correlation over lags of up to twice the greatest
 * shift, between pixels by a parabola. Then each row is put half the way towards where it best matches
 * the mean of the two beside it, three times over. That evens out what jumps from row to row; a slant, and
 * whatever bends over ten rows or more, stays: it cannot be told from a slanted or curved sample. Each
 * of the two is kept only if rows then differ from those beside them by less than 0.7 of what they did (sum
 * of squares): features alone suggest shifts too, which gain little.
 *
 * @param profiles - (ny × nx) of the whole scan
 * @throws RimlightError 'recipe' - for a greatest shift that is not above 0 or not below a quarter of the row
 */
export function findRowShifts(
  profiles: Float64Array,
  { ny, nx }: { readonly ny: number; readonly nx: number },
  maxShiftPx: number,
  place: StepPlace,
): RowShifts {
  assertShift(maxShiftPx, nx, place);
  const steps = new Float64Array(ny);
  let unsureRows = 0;
  for (let y = 1; y < ny; y++) {
    const row = profiles.subarray(y * nx, (y + 1) * nx);
    const before = profiles.subarray((y - 1) * nx, y * nx);
    const lag = bestLag(before, row, Math.ceil(2 * maxShiftPx));
    if (Number.isNaN(lag)) unsureRows++;
    steps[y] = lag;
  }
  const serpentinePx = alternation(steps);
  const none = new Float64Array(ny);
  const serpentine = none.map((_, y) => (y % 2 === 1 ? serpentinePx / 2 : -serpentinePx / 2));
  const start = isWorth(profiles, nx, none, serpentine) ? serpentine : none;
  const refined = start.slice();
  const lags = Math.ceil(2 * maxShiftPx);
  for (let round = 0; round < refineRounds; round++) refine(profiles, nx, refined, lags);
  const shiftsPx = isWorth(profiles, nx, start, refined) ? refined : start.slice();
  let limitedRows = 0;
  for (let y = 0; y < ny; y++) {
    if (Math.abs(shiftsPx[y]) > maxShiftPx) limitedRows++;
    shiftsPx[y] = Math.min(Math.max(shiftsPx[y], -maxShiftPx), maxShiftPx);
  }
  return { shiftsPx, serpentinePx, unsureRows, limitedRows };
}

/**
 * Rows moved left by their shifts, straight lines between pixels; counts, variances and background with
 * the same weights (of variances: squared). What comes from more than half a pixel outside has no data.
 * Neighbouring pixels share noise afterwards.
 *
 * @param shiftsPx - of the whole scan
 */
export function moveRows(slab: ConditionedSlab, shiftsPx: Float64Array): ConditionedSlab {
  const move = (
    array: ConditionedArray,
    weigh: (weight: number) => number = (weight) => weight,
  ): ConditionedArray => moved(array, slab, shiftsPx, weigh);
  const { background } = slab;
  return {
    ...slab,
    counts: move(slab.counts),
    variances: slab.variances === null ? null : move(slab.variances, (weight) => weight * weight),
    background:
      background.kind === 'channel'
        ? background
        : { kind: 'pixel', values: move(background.values) },
    replaced: slab.replaced === null ? null : movedMarks(slab.replaced, slab, shiftsPx),
    isIndependent: false,
  };
}

function assertShift(maxShiftPx: number, nx: number, place: StepPlace): void {
  if (nx < fewestPixels) {
    throw stepError(
      place,
      `rows of ${nx} pixels are too short to be aligned`,
      `Switch the step off; it needs ${fewestPixels} columns.`,
    );
  }
  if (maxShiftPx > 0 && maxShiftPx <= nx / 4) return;
  throw stepError(
    place,
    `rows of ${nx} pixels cannot be moved by up to ${maxShiftPx}`,
    `Give a number above 0, up to ${nx / 4}.`,
  );
}

/** How far `row` lies right of `before`; NaN where they are too unlike. */
function bestLag(before: Float64Array, row: Float64Array, most: number): number {
  const lags = Math.min(most, row.length - fewestPixels + 2);
  const correlations = Array.from({ length: 2 * lags + 1 }, (_, i) =>
    correlationAt(before, row, i - lags),
  );
  let best = 0;
  for (let i = 1; i < correlations.length; i++) {
    if (correlations[i] > correlations[best] || Number.isNaN(correlations[best])) best = i;
  }
  const noise = leastCorrelation / Math.sqrt(row.length - Math.abs(best - lags));
  if (!(correlations[best] > Math.min(noise, 0.9))) return Number.NaN;
  if (best === 0 || best === 2 * lags) return best - lags;
  const left = correlations[best - 1];
  const right = correlations[best + 1];
  const curvature = left - 2 * correlations[best] + right;
  const part = curvature < 0 ? (left - right) / (2 * curvature) : 0;
  return best - lags + part;
}

/** Correlation of before[x] with row[x + lag] where they overlap, each less its mean there. */
function correlationAt(before: Float64Array, row: Float64Array, lag: number): number {
  const from = Math.max(0, -lag);
  const to = Math.min(before.length, row.length - lag);
  let n = 0;
  let sumA = 0;
  let sumB = 0;
  for (let x = from; x < to; x++) {
    if (Number.isNaN(before[x] + row[x + lag])) continue;
    n++;
    sumA += before[x];
    sumB += row[x + lag];
  }
  let ab = 0;
  let aa = 0;
  let bb = 0;
  for (let x = from; x < to; x++) {
    const a = before[x] - sumA / n;
    const b = row[x + lag] - sumB / n;
    if (Number.isNaN(a + b)) continue;
    ab += a * b;
    aa += a * a;
    bb += b * b;
  }
  return n >= fewestPixels / 2 && aa > 0 && bb > 0 ? ab / Math.sqrt(aa * bb) : Number.NaN;
}

/** Median of the steps, those onto even rows with their sign turned. */
function alternation(steps: Float64Array): number {
  const turned = steps.map((step, y) => (y % 2 === 1 ? step : -step)).subarray(1);
  const known = turned.filter((step) => !Number.isNaN(step));
  return known.length < 2 ? 0 : medianInPlace(known);
}

/** Each row, moved as found so far, against the mean of those beside it; half of what is left is added. */
function refine(profiles: Float64Array, nx: number, shiftsPx: Float64Array, lags: number): void {
  const ny = shiftsPx.length;
  const rows = Array.from({ length: ny }, (_, y) =>
    movedProfile(profiles.subarray(y * nx, (y + 1) * nx), shiftsPx[y]),
  );
  for (let y = 0; y < ny && ny > 1; y++) {
    const above = rows[y > 0 ? y - 1 : 1];
    const below = rows[y + 1 < ny ? y + 1 : ny - 2];
    const beside = above.map((value, x) => (value + below[x]) / 2);
    const lag = bestLag(beside, rows[y], lags);
    if (!Number.isNaN(lag)) shiftsPx[y] += lag / 2;
  }
}

/** Whether rows moved by `then` fit those beside them so much better than by `now`. */
function isWorth(
  profiles: Float64Array,
  nx: number,
  now: Float64Array,
  then: Float64Array,
): boolean {
  return mismatch(profiles, nx, then) < mostLeft * mismatch(profiles, nx, now);
}

/** Sum of squared differences of each row from the mean of the two beside it. */
function mismatch(profiles: Float64Array, nx: number, shiftsPx: Float64Array): number {
  const rows = Array.from(shiftsPx, (shift, y) =>
    movedProfile(profiles.subarray(y * nx, (y + 1) * nx), shift),
  );
  let sum = 0;
  for (let y = 1; y + 1 < rows.length; y++) {
    for (let x = 0; x < nx; x++) {
      const rest = rows[y][x] - (rows[y - 1][x] + rows[y + 1][x]) / 2;
      if (!Number.isNaN(rest)) sum += rest * rest;
    }
  }
  return sum;
}

function movedProfile(profile: Float64Array, shiftPx: number): Float64Array {
  return profile.map((_, x) => {
    const place = between(x, shiftPx, profile.length);
    if (place === null) return Number.NaN;
    return (1 - place.share) * profile[place.left] + place.share * profile[place.right];
  });
}

/** The two pixels a place lies between, the share of the right one; null too far outside. */
function between(
  x: number,
  shiftPx: number,
  nx: number,
): { readonly left: number; readonly right: number; readonly share: number } | null {
  const from = x + shiftPx;
  if (from < -0.5 || from > nx - 0.5) return null;
  const inside = Math.min(Math.max(from, 0), nx - 1);
  const left = Math.floor(inside);
  return { left, right: Math.min(left + 1, nx - 1), share: inside - left };
}

function moved(
  array: ConditionedArray,
  { y0, shape }: ConditionedSlab,
  shiftsPx: Float64Array,
  weigh: (weight: number) => number,
): ConditionedArray {
  const { ny, nx, nk } = shape;
  const out = zerosLike(array, array.length);
  for (let pixel = 0; pixel < ny * nx; pixel++) {
    const x = pixel % nx;
    const row = pixel - x;
    const place = between(x, shiftsPx[y0 + row / nx], nx);
    const at = pixel * nk;
    if (place === null) {
      out.fill(Number.NaN, at, at + nk);
      continue;
    }
    const left = (row + place.left) * nk;
    if (place.share === 0) {
      out.set(array.subarray(left, left + nk), at);
      continue;
    }
    const right = (row + place.right) * nk;
    const leftWeight = weigh(1 - place.share);
    const rightWeight = weigh(place.share);
    for (let k = 0; k < nk; k++) {
      out[at + k] = leftWeight * array[left + k] + rightWeight * array[right + k];
    }
  }
  return out;
}

function movedMarks(
  marks: Uint8Array,
  { y0, shape }: ConditionedSlab,
  shiftsPx: Float64Array,
): Uint8Array {
  const { ny, nx, nk } = shape;
  const out = new Uint8Array(marks.length);
  for (let pixel = 0; pixel < ny * nx; pixel++) {
    const x = pixel % nx;
    const row = pixel - x;
    const place = between(x, shiftsPx[y0 + row / nx], nx);
    if (place === null) continue;
    for (let k = 0; k < nk; k++) {
      const left = marks[(row + place.left) * nk + k];
      const right = place.share === 0 ? 0 : marks[(row + place.right) * nk + k];
      out[pixel * nk + k] = left | right;
    }
  }
  return out;
}
