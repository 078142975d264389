/**
 * (XY..XY): pairs of free numbers, for points at unequal steps. A comma or blanks stand inside a pair,
 * a semicolon, blanks or a line end between pairs.
 *
 * @see R. S. McDonald, P. A. Wilks, Appl. Spectrosc. 42, 151 (1988), section 5
 */
import { scanError } from '../scan-error';
import { type JcampBlock, type JcampRecord, numberOf } from './records';
import { mostPoints, noPoints, refuseCutOff, type SpectrumRead } from './xy-data';

const freeNumber = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?$/;

/** @throws RimlightError 'scan' - where a pair is incomplete or no pair of numbers */
export function readXyPoints(
  block: JcampBlock,
  table: JcampRecord,
  fileName: string,
): SpectrumRead {
  const numbers: number[] = [];
  for (const { text, number } of table.lines) {
    const where = `${fileName}: line ${number}`;
    for (const part of text.split(/[\s,;]+/)) {
      if (part === '') continue;
      if (part !== '?' && !freeNumber.test(part)) {
        throw scanError(`“${part.slice(0, 40)}” is not a number`, where);
      }
      numbers.push(part === '?' ? Number.NaN : Number(part));
    }
    if (numbers.length > 2 * mostPoints) {
      throw scanError(`the table has more than ${mostPoints} points`, where);
    }
  }
  if (numbers.length === 0) throw noPoints(table, fileName);
  const count = Math.floor(numbers.length / 2);
  refuseCutOff(block, count, fileName);
  if (numbers.length % 2 === 1) {
    throw scanError(
      'the last point has an abscissa and no ordinate',
      `${fileName}: line ${table.lines[table.lines.length - 1].number}`,
    );
  }
  const xFactor = numberOf(block, 'XFACTOR') ?? 1;
  const yFactor = numberOf(block, 'YFACTOR') ?? 1;
  const x = Float64Array.from({ length: count }, (_, i) => numbers[2 * i] * xFactor);
  const y = Float64Array.from({ length: count }, (_, i) => numbers[2 * i + 1] * yFactor);
  return { x, y, notes: [...noteOnCount(block, count), ...noteOnEnds(block, x)] };
}

function noteOnCount(block: JcampBlock, count: number): readonly string[] {
  const promised = numberOf(block, 'NPOINTS');
  return promised === null || promised === count
    ? []
    : [`##NPOINTS= says ${promised}, and the table has ${count} points.`];
}

function noteOnEnds(block: JcampBlock, x: Float64Array): readonly string[] {
  const ends = [
    ['FIRSTX', x[0]],
    ['LASTX', x[x.length - 1]],
  ] as const;
  const span = Math.abs(x[x.length - 1] - x[0]);
  return ends.flatMap(([label, value]) => {
    const stated = numberOf(block, label);
    const isFar = stated !== null && Math.abs(stated - value) > 1e-3 * span;
    return isFar ? [`##${label}= says ${stated}, and the table has ${value} there.`] : [];
  });
}
