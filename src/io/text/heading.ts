/** What the heading of a column says: a name, a unit, a position along x or y, or an axis value. */
import type { AttributeValue } from '../container';
import { parseUnit, spaced, unitInName } from '../detect/words';
import { cellNumber, type DecimalMark } from './cell';

export interface Heading {
  /** as it stands, line ends as spaces; "" for none */
  readonly text: string;
  /** "nm", "cm-1", "a.u."; null where nothing tells */
  readonly unit: string | null;
  readonly along: 'x' | 'y' | null;
  /** the axis value it is, in a header of axis values; null for a name */
  readonly value: number | null;
  /** a name for wavelength, energy, wavenumber, shift or channel number */
  readonly isSpectral: boolean;
}

const position =
  /^(?:(?:stage|motor|sample|pos|position|piezo|scan) )?([xy])(?: (?:um|µm|μm|micron|microns|nm|mm|m|px|pos|position|stage|coordinate|coord|axis|index|pixel|motor|\d+))*$/;
const rowOrColumn = /^(?:(rows?|lines?)|(?:columns?|cols?))(?: (?:index|number|px))?$/;
const spectral =
  /\b(?:wave ?lengths?|wave ?num(?:ber)?s?|lambda|wl|wn|energ(?:y|ies)|ev|mev|(?:raman )?shifts?|cm1|cm 1|channels?|pixels?)\b/;
const measured = /\b(?:counts?|cts|intensit(?:y|ies)|signal|laser|excitation)\b/;

/**
 * @param text - the heading's cell
 * @param unitText - what a second line of units says; "" or absent for nothing
 */
export function readHeading(text: string, mark: DecimalMark, unitText = ''): Heading {
  const line = text.replace(/\s+/g, ' ').trim();
  const words = spaced(line);
  const axis = axisValue(line, mark);
  return {
    text: line,
    unit: unitOf(line, unitText, axis?.unit ?? null),
    along: positionAlong(words),
    value: axis?.value ?? null,
    isSpectral: spectral.test(words) && !measured.test(words),
  };
}

function positionAlong(words: string): 'x' | 'y' | null {
  const named = position.exec(words);
  if (named) return named[1] === 'y' ? 'y' : 'x';
  const counted = rowOrColumn.exec(words);
  if (!counted) return null;
  return counted[1] === undefined ? 'x' : 'y';
}

/** "600.5", "600.5 nm" or "600,5nm" */
function axisValue(line: string, mark: DecimalMark): { value: number; unit: string | null } | null {
  const bare = cellNumber(line, mark);
  if (bare !== undefined) return Number.isNaN(bare) ? null : { value: bare, unit: null };
  const match = /^([+-]?[\d.,]+(?:[eE][+-]?\d+)?) ?([^\d.,\s].*)$/.exec(line);
  if (match === null) return null;
  const value = cellNumber(match[1], mark);
  const unit = parseUnit(match[2]);
  return value === undefined || Number.isNaN(value) || unit === null ? null : { value, unit };
}

function unitOf(line: string, unitText: string, ofValue: string | null): string | null {
  if (ofValue !== null) return ofValue;
  const below = unbracketed(unitText.trim());
  if (below !== '') return below;
  const bracketed = /[([{]([^()[\]{}]+)[)\]}]\s*$/.exec(line);
  if (bracketed) return bracketed[1].trim();
  const slashed = /\S\s*\/\s*([^\s/]+)$/.exec(line);
  if (slashed && (parseUnit(slashed[1]) !== null || /\s\/|\/\s/.test(line))) return slashed[1];
  return unitInName(line);
}

function unbracketed(text: string): string {
  return text.replace(/^[([{](.*)[)\]}]$/, '$1').trim();
}

/** Whether a second line of headings is one of units: "nm", "(counts)", "a.u." under names. */
export function isLineOfUnits(cells: readonly string[]): boolean {
  const words = cells.map((cell) => unbracketed(cell.trim())).filter((word) => word !== '');
  const known = words.filter((word) => parseUnit(word) !== null);
  return known.length > 0 && words.every((word) => word.length <= 12);
}

/** `units` and, where it says more than the entry's own name, `long_name`. */
export function attributesOf(
  heading: Heading | null,
  name: string,
): Readonly<Record<string, AttributeValue>> {
  if (heading === null) return {};
  const { text, unit } = heading;
  return {
    ...(unit === null ? {} : { units: unit }),
    ...(text === '' || (text === name && !text.includes('/')) ? {} : { long_name: text }),
  };
}

/**
 * Headings that are one word with a number each ("I_600.5", "ch 1"): the numbers. Null where they are
 * not all of one word, or do not run one way.
 */
export function numbersAfterOneWord(
  headings: readonly Heading[],
  mark: DecimalMark,
): { readonly word: string; readonly values: readonly number[] } | null {
  const parts = headings.map(({ text }) => /^(.*?[^\d.,+-])([+-]?\d[\d.,]*)$/.exec(text));
  const word = parts[0]?.[1] ?? '';
  const values: number[] = [];
  for (const part of parts) {
    const value = part === null ? undefined : cellNumber(part[2], mark);
    if (part === null || part[1] !== word || value === undefined || Number.isNaN(value))
      return null;
    values.push(value);
  }
  return { word: word.replace(/[\s_-]+$/, ''), values };
}
