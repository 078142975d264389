/** Units and meanings read from the words files use: attributes, column headings, dataset names. */
import type { ArrayEntry, AttributeValue } from '../container';

/** Canonical units. Lengths and wavelengths share theirs; what is meant follows from the array's name. */
export type KnownUnit =
  | 'nm'
  | 'um'
  | 'mm'
  | 'm'
  | 'angstrom'
  | 'eV'
  | 'meV'
  | 'cm-1'
  | 's'
  | 'ms'
  | 'us'
  | 'min'
  | 'V'
  | 'mV'
  | 'K'
  | 'counts'
  | 'px';

const spellings: Readonly<Record<KnownUnit, readonly string[]>> = {
  nm: ['nm', 'nanometer', 'nanometers', 'nanometre', 'nanometres'],
  um: [
    'um',
    'µm',
    'μm',
    'micron',
    'microns',
    'micrometer',
    'micrometers',
    'micrometre',
    'micrometres',
  ],
  mm: ['mm', 'millimeter', 'millimeters', 'millimetre', 'millimetres'],
  m: ['m', 'meter', 'meters', 'metre', 'metres'],
  angstrom: ['å', 'a', 'ang', 'angstrom', 'angstroms', 'ångström', 'ångstrom'],
  eV: ['ev', 'electronvolt', 'electronvolts', 'electron volt', 'electron volts'],
  meV: ['mev', 'millielectronvolt', 'millielectronvolts'],
  'cm-1': [
    'cm-1',
    'cm1',
    '1/cm',
    'cm^-1',
    'cm^{-1}',
    'cm**-1',
    'cm⁻¹',
    'cm−1',
    'cm–1',
    'cm^−1',
    '/cm',
    'rcm',
    'invcm',
    'inverse cm',
    'wavenumber',
    'wavenumbers',
  ],
  s: ['s', 'sec', 'secs', 'second', 'seconds'],
  ms: ['ms', 'msec', 'millisecond', 'milliseconds'],
  us: ['us', 'µs', 'μs', 'microsecond', 'microseconds'],
  min: ['min', 'minute', 'minutes'],
  V: ['v', 'volt', 'volts'],
  mV: ['mv', 'millivolt', 'millivolts'],
  K: ['k', 'kelvin'],
  counts: ['counts', 'count', 'cts', 'photons', 'electrons', 'adu'],
  px: ['px', 'pixel', 'pixels', 'index'],
};

const unitOfSpelling = new Map<string, KnownUnit>(
  Object.entries(spellings).flatMap(([unit, words]) =>
    words.map((word) => [word, unit as KnownUnit] as const),
  ),
);

/** One unit word, whatever its case and spelling ("1/CM", "nanometers"); null when it is none we know. */
export function parseUnit(text: string): KnownUnit | null {
  const word = text.trim().toLowerCase().replace(/\s+/g, ' ').replace(/\.$/, '');
  return unitOfSpelling.get(word) ?? unitOfSpelling.get(word.replace(/ /g, '')) ?? null;
}

/**
 * The unit a heading or name carries: in brackets ("Raman shift [cm-1]"), after a slash ("E / eV"),
 * or as its last word ("wavelength_nm", "gate_volts"). One-letter endings count only in brackets or
 * after a slash: "laser_a" is no ångström.
 */
export function unitInName(name: string): KnownUnit | null {
  const bracketed = /[([{]([^()[\]{}]+)[)\]}]\s*$/.exec(name);
  if (bracketed) return parseUnit(bracketed[1]);
  const slashed = /\S\s*\/\s+(\S+)\s*$/.exec(name) ?? /\S\s+\/\s*(\S+)\s*$/.exec(name);
  if (slashed) return parseUnit(slashed[1]);
  const words = name.split(/[\s_.]+/);
  const last = words.at(-1) ?? '';
  if (words.length < 2) return null;
  if (last.length === 1 && !['m', 's', 'v', 'V', 'K'].includes(last)) return null;
  const unit = parseUnit(last);
  // "absolute_wavenumber" and "pixel_index" are names of things, not units of them.
  return unit === 'cm-1' && /^wave/i.test(last)
    ? null
    : unit === 'px' && last === 'index'
      ? null
      : unit;
}

/** Last part of a path: what an array is called. */
export function nameOf(path: string): string {
  return path.split('/').at(-1) ?? path;
}

/** The folder part of a path: "/entry/data" of "/entry/data/counts"; "" where there is none. */
export function folderOf(path: string): string {
  const cut = path.lastIndexOf('/');
  return cut <= 0 ? '' : path.slice(0, cut);
}

/** An attribute looked up without regard to case, as text; arrays of one count as their element. */
export function textAttribute(
  attributes: Readonly<Record<string, AttributeValue>>,
  ...names: readonly string[]
): string | null {
  for (const name of names) {
    for (const [key, value] of Object.entries(attributes)) {
      if (key.toLowerCase() !== name) continue;
      const single = Array.isArray(value) && value.length === 1 ? value[0] : value;
      if (typeof single === 'string' && single.trim() !== '') return single.trim();
      if (typeof single === 'number') return String(single);
    }
  }
  return null;
}

export interface EntryUnit {
  readonly unit: KnownUnit;
  /** where it was read: `units = "nm"`, or `its name` */
  readonly from: string;
}

/** The unit of an array by its `units` attribute, else its long name, else its own name. */
export function entryUnit(entry: ArrayEntry): EntryUnit | null {
  const stated = textAttribute(entry.attributes, 'units', 'unit');
  if (stated !== null) {
    const unit = parseUnit(stated) ?? unitInName(`x [${stated}]`);
    return unit === null ? null : { unit, from: `units = “${stated}”` };
  }
  const longName = textAttribute(entry.attributes, 'long_name', 'label', 'title');
  const inLongName = longName === null ? null : unitInName(longName);
  if (inLongName !== null) return { unit: inLongName, from: `its long name “${longName}”` };
  const inName = unitInName(nameOf(entry.path));
  return inName === null ? null : { unit: inName, from: 'its name' };
}

/** What an array is called, long name included, in lower case with single spaces: for matching words. */
export function entryWords(entry: ArrayEntry): string {
  const longName = textAttribute(entry.attributes, 'long_name', 'label', 'title') ?? '';
  return spaced(`${nameOf(entry.path)} ${longName}`);
}

/** "RamanShift_cm1" → "raman shift cm1" */
export function spaced(name: string): string {
  return name
    .replace(/([a-z])([A-Z])/g, '$1 $2')
    .toLowerCase()
    .replace(/[^a-z0-9µμå]+/g, ' ')
    .trim();
}

/** Nanometres in a unit of length; null for anything else. */
export function nmIn(unit: string): number | null {
  const known = parseUnit(unit);
  if (known === 'nm') return 1;
  if (known === 'um') return 1000;
  if (known === 'mm') return 1e6;
  if (known === 'm') return 1e9;
  return known === 'angstrom' ? 0.1 : null;
}

/** Seconds in a unit of time; null for anything else. */
export function secondsIn(unit: KnownUnit | null): number | null {
  if (unit === 's') return 1;
  if (unit === 'ms') return 1e-3;
  if (unit === 'us') return 1e-6;
  return unit === 'min' ? 60 : null;
}
