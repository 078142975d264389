/** JCAMP-DX tables in each form, written by the standard: what the reader is held against. */

export type Form = 'AFFN' | 'PAC' | 'SQZ' | 'DIF' | 'DIFDUP';

export interface JcampFile {
  readonly form: Form;
  readonly ordinates: readonly number[];
  readonly firstX: number;
  readonly step: number;
  /** ordinates a line, its check not counted */
  readonly perLine: number;
  readonly xFactor?: number;
  readonly yFactor?: number;
}

const squeezed = ['@ABCDEFGHI', '@abcdefghi'];
const steps = ['%JKLMNOPQR', '%jklmnopqr'];
const repeats = 'STUVWXYZs';

function pseudo(value: number, letters: readonly string[]): string {
  const digits = String(Math.abs(value));
  return letters[value < 0 ? 1 : 0][Number(digits[0])] + digits.slice(1);
}

function repeated(count: number): string {
  if (count === 1) return '';
  const digits = String(count);
  return repeats[Number(digits[0]) - 1] + digits.slice(1);
}

/** Runs of equal values as the value and how often. */
function runs(values: readonly number[]): (readonly [number, number])[] {
  const found: [number, number][] = [];
  for (const value of values) {
    const last = found.at(-1);
    if (last !== undefined && last[0] === value) last[1]++;
    else found.push([value, 1]);
  }
  return found;
}

function lineOf(form: Form, values: readonly number[]): string {
  const [first, ...rest] = values;
  const differences = rest.map((value, i) => value - values[i]);
  switch (form) {
    case 'AFFN':
      return ` ${values.join(' ')}`;
    case 'PAC':
      return values.map((value) => `${value < 0 ? '' : '+'}${value}`).join('');
    case 'SQZ':
      return values.map((value) => pseudo(value, squeezed)).join('');
    case 'DIF':
      return pseudo(first, squeezed) + differences.map((one) => pseudo(one, steps)).join('');
    case 'DIFDUP':
      return (
        pseudo(first, squeezed) +
        runs(differences)
          .map(([one, count]) => pseudo(one, steps) + repeated(count))
          .join('')
      );
  }
}

/** The lines of the table, with checks after differences. */
export function tableLines({ form, ordinates, firstX, step, perLine, xFactor = 1 }: JcampFile) {
  const isChecked = form === 'DIF' || form === 'DIFDUP';
  const at = (point: number): string => ((firstX + point * step) / xFactor).toFixed(4);
  const lines: string[] = [];
  for (let from = 0; from < ordinates.length; from += perLine) {
    const start = isChecked && from > 0 ? from - 1 : from;
    const values = ordinates.slice(start, from + perLine);
    // A line of one value holds no difference, and the next has nothing to check.
    lines.push(at(start) + lineOf(form, values));
  }
  if (isChecked && ordinates.length > 1) {
    const last = ordinates.length - 1;
    lines.push(at(last) + pseudo(ordinates[last], squeezed));
  }
  return lines;
}

export function jcampText(file: JcampFile): string {
  const { ordinates, firstX, step, xFactor = 1, yFactor = 1 } = file;
  const lines = [
    '##TITLE= written by a test',
    '##JCAMP-DX= 4.24',
    '##DATA TYPE= INFRARED SPECTRUM',
    '##ORIGIN= test',
    '##OWNER= public domain',
    '##XUNITS= 1/CM',
    '##YUNITS= ARBITRARY UNITS',
    `##XFACTOR= ${xFactor}`,
    `##YFACTOR= ${yFactor}`,
    `##FIRSTX= ${firstX}`,
    `##LASTX= ${firstX + (ordinates.length - 1) * step}`,
    `##NPOINTS= ${ordinates.length}`,
    `##FIRSTY= ${ordinates[0] * yFactor}`,
    '##XYDATA= (X++(Y..Y))',
    ...tableLines(file),
    '##END=',
  ];
  return `${lines.join('\n')}\n`;
}
