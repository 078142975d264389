/** What a vector can be: the spectral axis and on which scale, a count of pixels, positions, or measured values. */
import type { AxisKind, AxisUnit } from '../../science/axis';
import type { Container } from '../container';
import { type Vector, type VectorFacts, vectorLength } from './vectors';
import { type KnownUnit, nmIn, textAttribute } from './words';

/** A spectral scale read from words or numbers, with the reason; `isFirm` when the file itself says so. */
export interface ScaleReading {
  /** `cm-1?`: wavenumbers that may be absolute or Raman shifts */
  readonly kind: AxisKind | 'cm-1?';
  readonly unit: AxisUnit;
  readonly evidence: string;
  readonly isFirm: boolean;
}

export type Role =
  | { readonly kind: 'scale'; readonly scale: ScaleReading }
  /** strictly one way and not named as anything else: may be an axis, its scale unknown */
  | { readonly kind: 'ramp'; readonly isNamed: boolean }
  | { readonly kind: 'pixels' }
  | { readonly kind: 'position'; readonly along: 'x' | 'y' | null }
  | { readonly kind: 'values' };

const valueWords =
  /\b(counts?|cts|intensit(y|ies)|signal|absorbance|transmi(ttance|ssion)|reflect(ance|ivity)|raw|dark|background|data|spectr(um|a)|emission|fluorescence|luminescence|pl|amplitude|height|topography)\b/;
const positionWords =
  /^([xy])( (um|nm|mm|m|µm|px|pos|position|stage|coordinate|axis|\d+))*$|^(stage|motor|sample|pos|position|piezo) ([xy])\b/;
const rowColumnWords = /^(rows?|lines?|columns?|cols?)( (index|number|px))?$/;
const pixelWords =
  /^(pixels?|channels?|index|detector pixel|pixel number|pixel index|channel number)( px)?( no| number)?$/;

const spectralUnits: readonly KnownUnit[] = ['nm', 'um', 'angstrom', 'eV', 'meV', 'cm-1'];

/** What one vector can be, by its words, unit and numbers, in this order of trust. */
export function roleOf(vector: Vector): Role {
  const { words, names, facts } = vector;
  const unit = vector.unit?.unit ?? null;
  const named = namedScale(vector);
  if (named !== null) return { kind: 'scale', scale: named };
  if (names.some((name) => pixelWords.test(name))) return pixelRole(facts);
  const along = positionAlong(names);
  if (along !== undefined && unit !== 'cm-1' && unit !== 'eV' && unit !== 'meV') {
    return { kind: 'position', along };
  }
  if (unit !== null && unit !== 'counts' && !spectralUnits.includes(unit) && unit !== 'px') {
    return { kind: 'position', along: null };
  }
  if (valueWords.test(words) || unit === 'counts') return { kind: 'values' };
  if (unit !== null && spectralUnits.includes(unit) && facts.direction !== 'mixed') {
    const isDistance = nmIn(unit) !== null && !isLikeWavelengths(unit, vector);
    return isDistance
      ? { kind: 'position', along: null }
      : { kind: 'scale', scale: scaleOfUnit(unit, vector) };
  }
  if (facts.direction === 'mixed') return { kind: 'values' };
  if (facts.isIndex) return { kind: 'pixels' };
  return { kind: 'ramp', isNamed: words !== '' && !/^(column|col|array|arr)? ?\d*$/.test(words) };
}

/** Undefined for what is named as no position. */
function positionAlong(names: readonly string[]): 'x' | 'y' | undefined {
  for (const name of names) {
    const match = positionWords.exec(name);
    if (match) return (match[1] ?? match[5]) === 'y' ? 'y' : 'x';
    if (rowColumnWords.test(name)) return /^(row|line)/.test(name) ? 'y' : 'x';
  }
  return undefined;
}

/** A pixel column of whole numbers counts pixels; one with fractions below zero can only be a Raman shift. */
function pixelRole(facts: VectorFacts): Role {
  if (facts.isWhole) return { kind: 'pixels' };
  if (facts.direction === 'mixed') return { kind: 'values' };
  if (facts.min >= 0) return { kind: 'ramp', isNamed: true };
  return {
    kind: 'scale',
    scale: {
      kind: 'shift',
      unit: 'cm-1',
      evidence: `called a pixel, but its values are not whole numbers and run from ${shown(facts.first)} to ${shown(facts.last)}: a Raman shift across the laser line, not a pixel number`,
      isFirm: false,
    },
  };
}

function namedScale(vector: Vector): ScaleReading | null {
  const { words } = vector;
  const unit = vector.unit?.unit ?? null;
  const says = `named “${nameShown(vector)}”`;
  if (/\b(counts?|intensity|cts)\b/.test(words)) return null;
  if (/\bshifts?\b/.test(words) && (unit === null || unit === 'cm-1')) {
    return { kind: 'shift', unit: 'cm-1', evidence: says, isFirm: true };
  }
  if (/\b(wave ?lengths?|lambda|wl)\b/.test(words) && !/\b(laser|excitation)\b/.test(words)) {
    const own = unit === 'nm' || unit === 'um' || unit === 'angstrom' ? unit : null;
    return {
      kind: 'wavelength',
      unit: own ?? wavelengthUnit(vector.facts),
      evidence:
        own === null ? `${says}; its unit is not stated and is taken from its values` : says,
      isFirm: own !== null,
    };
  }
  if (/\b(wave ?num(ber)?s?|wn)\b/.test(words)) {
    return { kind: 'cm-1?', unit: 'cm-1', evidence: says, isFirm: false };
  }
  if (
    /\b(energ(y|ies)|photon energy|ev|mev)\b/.test(words) &&
    !/\b(laser|excitation)\b/.test(words)
  ) {
    if (unit === 'cm-1') return { kind: 'cm-1?', unit, evidence: says, isFirm: false };
    const own = unit === 'eV' || unit === 'meV' ? unit : null;
    return {
      kind: 'energy',
      unit: own ?? (vector.facts.max > 25 ? 'meV' : 'eV'),
      evidence:
        own === null ? `${says}; its unit is not stated and is taken from its values` : says,
      isFirm: own !== null,
    };
  }
  return null;
}

function scaleOfUnit(unit: KnownUnit, vector: Vector): ScaleReading {
  const evidence = `unit by ${vector.unit?.from ?? 'its name'}`;
  if (unit === 'cm-1') return { kind: 'cm-1?', unit, evidence, isFirm: false };
  if (unit === 'eV' || unit === 'meV') return { kind: 'energy', unit, evidence, isFirm: true };
  const length = unit === 'um' || unit === 'angstrom' ? unit : 'nm';
  return { kind: 'wavelength', unit: length, evidence, isFirm: true };
}

/** A length without a telling name: wavelengths of light lie between 0.18 and 20 µm, distances mostly do not. */
function isLikeWavelengths(unit: KnownUnit, { words, facts }: Vector): boolean {
  if (/\b(distance|offset|depth|length|line|stage|position|z)\b/.test(words)) return false;
  const perNm = nmIn(unit) ?? Number.NaN;
  return facts.min * perNm >= 180 && facts.max * perNm <= 20_000;
}

/** Wavelengths without a unit: micrometres stay below 25, ångströms of the visible lie above 3000. */
function wavelengthUnit(facts: VectorFacts): 'nm' | 'um' | 'angstrom' {
  if (facts.max < 25) return 'um';
  return facts.min > 2800 && facts.max < 20_000 ? 'angstrom' : 'nm';
}

/**
 * The scale of axis values without name or unit, from the numbers alone; null where they fit several
 * scales equally well (1010 to 1766 may be nm or cm⁻¹).
 */
export function scaleOfNumbers(facts: VectorFacts): ScaleReading | null {
  const range = `${shown(Math.min(facts.first, facts.last))} to ${shown(Math.max(facts.first, facts.last))}`;
  if (facts.min < 0 && facts.max > 60) {
    return {
      kind: 'shift',
      unit: 'cm-1',
      evidence: `values from ${range} cross zero, as only a Raman shift does`,
      isFirm: false,
    };
  }
  if (facts.min >= 0.3 && facts.max <= 7 && !facts.isWhole) {
    return {
      kind: 'energy',
      unit: 'eV',
      evidence: `values from ${range} are photon energies of light in eV; nothing in the file says so`,
      isFirm: false,
    };
  }
  if (facts.min >= 300 && facts.max <= 1100 && facts.max - facts.min > 5) {
    return {
      kind: 'wavelength',
      unit: 'nm',
      evidence: `values from ${range} lie in the range of a silicon detector in nm; nothing in the file says so`,
      isFirm: false,
    };
  }
  return null;
}

/** The fuller name, which is the one that tells. */
function nameShown({ entry, file }: Vector): string {
  const longName = textAttribute(entry.attributes, 'long_name', 'label', 'title');
  const name = longName ?? entry.path.split('/').at(-1) ?? '';
  return name === '' ? (file ?? 'the array') : name;
}

export function shown(value: number): string {
  return String(Number(value.toPrecision(6)));
}

/**
 * Every vector with its role, the file seen as a whole: where there is no array of several axes,
 * columns called x and y are a spectrum against its axis, not positions.
 */
export function assignRoles(
  vectors: readonly Vector[],
  container: Container,
): readonly { readonly vector: Vector; readonly role: Role }[] {
  const isSpectrum = container.entries.every(
    ({ shape }) => vectorLength(shape) !== null || shape.length === 0,
  );
  const roled = vectors.map((vector) => ({ vector, role: roleOf(vector) }));
  if (!isSpectrum) return roled;
  const hasValues = roled.some(
    ({ vector, role }) => vector.file === null && role.kind === 'values',
  );
  return roled.map(({ vector, role }) => {
    if (vector.file !== null || role.kind !== 'position') return { vector, role };
    const isX = role.along === 'x';
    if (!isX && !hasValues) return { vector, role: { kind: 'values' as const } };
    const unit = vector.unit?.unit ?? null;
    if (!isX || vector.facts.direction === 'mixed') return { vector, role };
    const scale = unit !== null && spectralUnits.includes(unit) ? scaleOfUnit(unit, vector) : null;
    return {
      vector,
      role:
        scale === null
          ? { kind: 'ramp' as const, isNamed: true }
          : { kind: 'scale' as const, scale },
    };
  });
}
