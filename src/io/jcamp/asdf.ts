/**
 * One line of a (X++(Y..Y)) table: an abscissa and ordinates in any of the forms of JCAMP-DX, told apart
 * by the first character of each value: free numbers (AFFN), numbers set apart by their signs (PAC),
 * squeezed (SQZ, leading digit and sign in one letter), differences (DIF), repeats (DUP).
 *
 * @see R. S. McDonald, P. A. Wilks, Appl. Spectrosc. 42, 151 (1988), section 5 and Table VII
 */
import { scanError } from '../scan-error';

export interface OrdinateLine {
  /** as written, before XFACTOR */
  readonly abscissa: number;
  /** half the last digit written would be rounding; this is that digit's unit */
  readonly resolution: number;
  /** as written, before YFACTOR; NaN for "?" */
  readonly ordinates: readonly number[];
  /** the last value is a difference or repeats one: the next line begins with it again, as a check */
  readonly endsInDifference: boolean;
}

/** A line longer than this is no text line of the standard's 80 characters by any stretch. */
const mostOrdinates = 1 << 20;

const abscissaForm = /\s*([+-]?(?:\d+\.?\d*|\.\d+)(?:[Ee][+-]\d{1,3})?)/y;

/**
 * E followed by a sign is an exponent, and so it is after a decimal point, where a squeezed value
 * cannot begin in the middle of a number; any other E is the squeezed digit 5.
 */
const ordinateForm =
  /[\s,;]*(?:(\?)|([@A-Ia-i])(\d*\.?\d*)|([%J-Rj-r])(\d*\.?\d*)|([S-Zs])(\d*)|([+-]?(?:\d+\.\d*(?:[Ee][+-]?\d{1,3})?|\.\d+(?:[Ee][+-]?\d{1,3})?|\d+(?:[Ee][+-]\d{1,3})?)))/y;

/** @throws RimlightError 'scan' - where the line is none of the forms */
export function readOrdinateLine(text: string, where: string): OrdinateLine {
  abscissaForm.lastIndex = 0;
  const x = abscissaForm.exec(text);
  if (x === null) throw unreadable(text, where);
  const ordinates: number[] = [];
  let difference: number | null = null;
  let endsInDifference = false;
  ordinateForm.lastIndex = abscissaForm.lastIndex;
  const end = text.trimEnd().length;
  while (ordinateForm.lastIndex < end) {
    const from = ordinateForm.lastIndex;
    const match = ordinateForm.exec(text);
    if (match === null) throw unreadable(text.slice(from), where);
    const [, lost, squeezed, squeezedRest, step, stepRest, repeat, repeatRest, plain] = match;
    const last = ordinates.at(-1);
    if (repeat !== undefined) {
      const times = digitOf(repeat) * 10 ** repeatRest.length + Number(repeatRest);
      if (last === undefined || !(times >= 1)) throw unreadable(text.slice(from), where);
      if (ordinates.length + times > mostOrdinates) throw tooMany(where);
      for (let i = 1; i < times; i++) ordinates.push((ordinates.at(-1) ?? 0) + (difference ?? 0));
      continue;
    }
    if (step !== undefined) {
      if (last === undefined || Number.isNaN(last)) throw noBase(where);
      difference = signed(step, stepRest);
      ordinates.push(last + difference);
      endsInDifference = true;
      continue;
    }
    difference = null;
    endsInDifference = false;
    if (lost !== undefined) ordinates.push(Number.NaN);
    else ordinates.push(squeezed === undefined ? Number(plain) : signed(squeezed, squeezedRest));
    if (ordinates.length > mostOrdinates) throw tooMany(where);
  }
  return {
    abscissa: Number(x[1]),
    resolution: resolutionOf(x[1]),
    ordinates,
    endsInDifference,
  };
}

/** Table VII: the leading digit and sign each letter stands for. */
function digitOf(letter: string): number {
  if (letter === '@' || letter === '%') return 0;
  if (letter === 's') return 9;
  const code = letter.charCodeAt(0);
  if (letter >= 'a' && letter <= 'i') return -(code - 0x60);
  if (letter >= 'j' && letter <= 'r') return -(code - 0x69);
  if (letter >= 'A' && letter <= 'I') return code - 0x40;
  return letter >= 'J' && letter <= 'R' ? code - 0x49 : code - 0x52;
}

function signed(letter: string, rest: string): number {
  const digit = digitOf(letter);
  const size = Number(`${Math.abs(digit)}${rest}`);
  return digit < 0 ? -size : size;
}

/** The unit of the last digit written: 0.001 for "599.860". */
function resolutionOf(number: string): number {
  const [mantissa, exponent = '0'] = number.toLowerCase().split('e');
  const decimals = mantissa.includes('.') ? mantissa.length - mantissa.indexOf('.') - 1 : 0;
  return Number(`1e${Number(exponent) - decimals}`);
}

function unreadable(text: string, where: string) {
  const shown = text.trim().slice(0, 40);
  return scanError(`“${shown}” is no part of a JCAMP-DX table`, where);
}

function noBase(where: string) {
  return scanError('a difference follows no value it could be counted from', where);
}

function tooMany(where: string) {
  return scanError(`a line stands for more than ${mostOrdinates} values`, where);
}
