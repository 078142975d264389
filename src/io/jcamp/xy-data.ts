/**
 * (X++(Y..Y)): ordinates at equal steps from FIRSTX to LASTX. Each line repeats the abscissa it begins
 * at, and after differences the last ordinate: both are checked, so that a damaged or missing line is
 * found.
 *
 * @see R. S. McDonald, P. A. Wilks, Appl. Spectrosc. 42, 151 (1988), section 5
 */
import { scanError } from '../scan-error';
import { readOrdinateLine } from './asdf';
import { type JcampBlock, type JcampRecord, numberOf } from './records';

export interface SpectrumRead {
  readonly x: Float64Array;
  readonly y: Float64Array;
  readonly notes: readonly string[];
}

interface LineStart {
  /** number of the point it begins with, from 0 */
  readonly point: number;
  readonly abscissa: number;
  readonly resolution: number;
  readonly number: number;
}

interface Ordinates {
  readonly values: readonly number[];
  readonly starts: readonly LineStart[];
}

/** More is no spectrum. */
export const mostPoints = 1 << 24;

/** @throws RimlightError 'scan' - when the table contradicts its own checks or its header */
export function readXyData(block: JcampBlock, table: JcampRecord, fileName: string): SpectrumRead {
  const { values, starts } = readOrdinates(table, fileName);
  const notes: string[] = [];
  const count = values.length;
  if (count === 0) throw noPoints(table, fileName);
  refuseCutOff(block, count, fileName);
  const grid = gridOf(block, count, starts, fileName);
  const note = noteOnCount(block, count, starts, grid, fileName);
  if (note !== null) notes.push(note);
  if (areUnscaled(block, starts, grid, fileName)) {
    notes.push('The abscissae in the table are not divided by XFACTOR, as they should be.');
  }
  const factor = numberOf(block, 'YFACTOR') ?? 1;
  const y = Float64Array.from(values, (value) => value * factor);
  notes.push(...noteOnFirstY(block, values[0], factor));
  const x = Float64Array.from({ length: count }, (_, i) => pointAt(grid, i, count));
  return { x, y, notes };
}

function readOrdinates(table: JcampRecord, fileName: string): Ordinates {
  const values: number[] = [];
  const starts: LineStart[] = [];
  let isCheckDue = false;
  for (const { text, number } of table.lines) {
    const where = `${fileName}: line ${number}`;
    const { abscissa, resolution, ordinates, endsInDifference } = readOrdinateLine(text, where);
    if (isCheckDue && ordinates.length > 0) {
      refuseWrongCheck(values[values.length - 1], ordinates[0], where);
    }
    starts.push({ point: values.length - (isCheckDue ? 1 : 0), abscissa, resolution, number });
    for (let i = isCheckDue ? 1 : 0; i < ordinates.length; i++) values.push(ordinates[i]);
    if (values.length > mostPoints) {
      throw scanError(`the table has more than ${mostPoints} points`, where);
    }
    // A line with nothing but its check leaves the check of the next one due.
    isCheckDue = endsInDifference;
  }
  return { values, starts };
}

/** After differences each line begins with the last value of the line before. */
function refuseWrongCheck(last: number, check: number, where: string): void {
  const slack = 1e-6 * Math.max(1, Math.abs(last));
  if (!(Math.abs(last - check) > slack)) return;
  throw scanError(
    `the line begins with the check value ${check}, and the differences before it lead to ${last}`,
    where,
  );
}

interface XGrid {
  readonly first: number;
  readonly last: number;
  readonly step: number;
}

function pointAt({ first, last, step }: XGrid, i: number, count: number): number {
  return i === count - 1 && i > 0 ? last : first + i * step;
}

function gridOf(
  block: JcampBlock,
  count: number,
  starts: readonly LineStart[],
  fileName: string,
): XGrid {
  const factor = numberOf(block, 'XFACTOR') ?? 1;
  const first = numberOf(block, 'FIRSTX') ?? starts[0].abscissa * factor;
  const last = numberOf(block, 'LASTX') ?? lastFrom(block, first, count, starts, factor);
  if (count === 1) return { first, last: first, step: 0 };
  if (last === null || last === first) {
    throw scanError(
      'nothing says where the points lie: FIRSTX, LASTX and DELTAX are missing or alike',
      fileName,
      'Write ##FIRSTX= and ##LASTX= into the file, or export it again.',
    );
  }
  return { first, last, step: (last - first) / (count - 1) };
}

function lastFrom(
  block: JcampBlock,
  first: number,
  count: number,
  starts: readonly LineStart[],
  factor: number,
): number | null {
  const step = numberOf(block, 'DELTAX');
  if (step !== null) return first + step * (count - 1);
  const from = starts[0];
  const to = starts[starts.length - 1];
  if (to.point === from.point) return null;
  return first + ((to.abscissa - from.abscissa) * factor * (count - 1)) / (to.point - from.point);
}

/** Where NPOINTS and the table differ, the lines must tell that NPOINTS is wrong, and not the table. */
function noteOnCount(
  block: JcampBlock,
  count: number,
  starts: readonly LineStart[],
  grid: XGrid,
  fileName: string,
): string | null {
  const promised = numberOf(block, 'NPOINTS');
  if (promised === null || promised === count) return null;
  const factor = numberOf(block, 'XFACTOR') ?? 1;
  const agree = (step: number): boolean =>
    strayLine(starts, { ...grid, step }, factor, { digits: 0.51, steps: 0.05 }) === undefined;
  const asPromised = agree((grid.last - grid.first) / (promised - 1));
  if (!asPromised && agree(grid.step)) {
    return `##NPOINTS= says ${promised}, and the table has ${count} points, with which the abscissa of every line agrees.`;
  }
  throw scanError(
    `##NPOINTS= says ${promised}, and the table has ${count} points`,
    fileName,
    'Values are missing, or too many: export the file again.',
  );
}

/**
 * Each line must begin where its first point lies, to the digits written.
 *
 * @returns true where the abscissae agree only without XFACTOR, a slip of some programs
 */
function areUnscaled(
  block: JcampBlock,
  starts: readonly LineStart[],
  grid: XGrid,
  fileName: string,
): boolean {
  const factor = numberOf(block, 'XFACTOR') ?? 1;
  // Some programs cut the last digit off instead of rounding it.
  const slack = { digits: 1, steps: 0.25 };
  const stray = strayLine(starts, grid, factor, slack);
  if (stray === undefined) return false;
  if (factor !== 1 && strayLine(starts, grid, 1, slack) === undefined) return true;
  const { point, abscissa, number } = stray;
  const expected = Number((grid.first + point * grid.step).toPrecision(8));
  throw scanError(
    `the line begins at ${Number((abscissa * factor).toPrecision(8))}, and its first value is point ${point + 1}, which lies at ${expected}: values are missing or too many before it, or FIRSTX, LASTX and NPOINTS are wrong`,
    `${fileName}: line ${number}`,
  );
}

/** How far a line may begin from its point: units of the last digit written, and steps. */
interface Slack {
  readonly digits: number;
  readonly steps: number;
}

function strayLine(
  starts: readonly LineStart[],
  { first, step }: XGrid,
  factor: number,
  { digits, steps }: Slack,
): LineStart | undefined {
  return starts.find(({ point, abscissa, resolution }) => {
    const slack = digits * resolution * Math.abs(factor) + steps * Math.abs(step);
    return Math.abs(abscissa * factor - (first + point * step)) > slack;
  });
}

/** A block without ##END= whose table is short was cut off. */
export function refuseCutOff(block: JcampBlock, count: number, fileName: string): void {
  const promised = numberOf(block, 'NPOINTS');
  if (block.isEnded || promised === null || count >= promised) return;
  throw scanError(
    `the table has ${count} of ${promised} points and no ##END=, so the file was cut off`,
    fileName,
    'Copy it again, or repeat the export.',
  );
}

export function noPoints(table: JcampRecord, fileName: string) {
  return scanError('the table holds no points', `${fileName}: line ${table.number}`);
}

function noteOnFirstY(block: JcampBlock, first: number, factor: number): readonly string[] {
  const stated = numberOf(block, 'FIRSTY');
  if (stated === null || Number.isNaN(first)) return [];
  const slack = Math.abs(factor) + 1e-3 * Math.abs(stated);
  const isNear = (value: number): boolean => Math.abs(value - stated) <= slack;
  if (isNear(first * factor) || isNear(first)) return [];
  return [`##FIRSTY= says ${stated}, and the table begins with ${first * factor}.`];
}
