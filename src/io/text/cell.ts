/** One cell of a table: a number, no data, or neither. */

export type DecimalMark = '.' | ',';

/** What programs write where a value is missing or beyond a number; lower case. */
const missingWords: ReadonlySet<string> = new Set([
  '',
  '-',
  '--',
  'na',
  'n/a',
  '#n/a',
  '<na>',
  'nan',
  '+nan',
  '-nan',
  'null',
  'none',
  'nil',
  'inf',
  '+inf',
  '-inf',
  'infinity',
  '+infinity',
  '-infinity',
  // older C run-time libraries
  '1.#qnan',
  '-1.#ind',
  'nan(ind)',
  '-nan(ind)',
  '1.#inf',
  '-1.#inf',
]);

/** Decimal digits with a point, and an exponent of E or (Fortran) D. */
const plainNumber = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eEdD][+-]?\d+)?$/;

/**
 * The number in a cell, rounded to the nearest double.
 *
 * @returns NaN for no data (empty, NA, NaN, inf, "-", a number beyond 1.8e308); undefined for anything else
 */
export function cellNumber(text: string, mark: DecimalMark): number | undefined {
  if (mark === ',') {
    if (text.includes('.')) return noNumber(text);
    return pointNumber(text.replace(',', '.'), text);
  }
  return pointNumber(text, text);
}

/** The quick way for almost every cell; `text` is the cell as it stands in the file. */
function pointNumber(pointed: string, text: string): number | undefined {
  const first = pointed.charCodeAt(0);
  const isDigit = first >= 0x30 && first <= 0x39;
  // Number() takes 0x1f, 0b1 and 0o7 for numbers too; after a sign it does not.
  const isHex = first === 0x30 && pointed.charCodeAt(1) > 0x39 && !/^0[eEdD]/.test(pointed);
  if ((isDigit && !isHex) || first === 0x2d) {
    const value = Number(pointed);
    if (value < Number.POSITIVE_INFINITY && value > Number.NEGATIVE_INFINITY) return value;
  }
  const trimmed = pointed.trim();
  const signed = trimmed.includes('−') ? trimmed.replaceAll('−', '-') : trimmed;
  if (!plainNumber.test(signed)) return noNumber(text);
  const value = Number(/[dD]/.test(signed) ? signed.replace(/[dD]/, 'e') : signed);
  return Number.isFinite(value) ? value : Number.NaN;
}

function noNumber(text: string): number | undefined {
  return missingWords.has(text.trim().toLowerCase()) ? Number.NaN : undefined;
}

export type CellKind = 'number' | 'missing' | 'text';

export function kindOfCell(text: string, mark: DecimalMark): CellKind {
  const value = cellNumber(text, mark);
  if (value === undefined) return 'text';
  return Number.isNaN(value) ? 'missing' : 'number';
}

/** Digits in groups of three: 1,234.5 or 1.234,5 or 1'234 or 12 345 or 1.234.567. */
export function hasThousandsSeparators(text: string): boolean {
  const trimmed = text.trim();
  return (
    /^[+-]?\d{1,3}(?:[' \u00a0\u202f]\d{3})+(?:[.,]\d*)?$/.test(trimmed) ||
    /^[+-]?\d{1,3}(?:,\d{3})+\.\d*$/.test(trimmed) ||
    /^[+-]?\d{1,3}(?:\.\d{3})+,\d*$/.test(trimmed) ||
    /^[+-]?\d{1,3}(?:([.,])\d{3})(?:\1\d{3})+$/.test(trimmed)
  );
}

/** A cell as it can be quoted in a sentence. */
export function quoted(text: string): string {
  const line = text.replace(/\s+/g, ' ').trim();
  return `“${line.length > 40 ? `${line.slice(0, 40)}…` : line}”`;
}
