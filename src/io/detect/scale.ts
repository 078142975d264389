/** On which scale the axis values are: kind, unit and medium, stated or read. */
import { RimlightError } from '../../errors';
import { type AxisKind, type AxisUnit, axisUnits } from '../../science/axis';
import { formatUnit } from '../../science/format';
import type { AxisChoice } from '../scan-choices';
import type { Alternative, Guess } from '../scan-plan';
import type { Agreement } from './agreement';
import type { FoundAxis } from './axis-search';
import { type ScaleReading, scaleOfNumbers } from './roles';
import { vectorFacts } from './vectors';
import { parseUnit } from './words';

type Source = Guess['source'];

export interface FoundScale {
  readonly kind: AxisKind;
  readonly unit: AxisUnit;
  readonly kindGuess: Guess;
  readonly unitGuess: Guess;
}

export interface ScaleQuestion {
  readonly axis: FoundAxis;
  readonly stated: AxisChoice;
  readonly agreement: Agreement;
  /** what the cube holds: "counts", "absorbance" */
  readonly quantity: string;
}

/** Either a scale, or the guesses to show and the problem that keeps the scan closed. */
export type ScaleAnswer =
  | { readonly found: FoundScale; readonly problem: null }
  | { readonly found: null; readonly problem: RimlightError; readonly kindGuess: Guess };

const kindWords: Readonly<Record<AxisKind, string>> = {
  wavelength: 'wavelength',
  energy: 'photon energy',
  shift: 'Raman shift',
};

/** @throws RimlightError 'recipe' - when a stated kind and unit do not go together */
export function findScale(question: ScaleQuestion): ScaleAnswer {
  const { stated } = question;
  const unitStated = stated.unit === undefined ? null : checkedUnit(stated.unit);
  const reading = readScale(question);
  const kind = stated.kind ?? kindOfUnit(unitStated, reading) ?? reading?.kind ?? null;
  if (kind === null) return unknownScale(question, unitStated);
  const units: readonly AxisUnit[] = axisUnits[kind];
  if (unitStated !== null && !units.includes(unitStated)) {
    throw new RimlightError('recipe', {
      what: `a ${kindWords[kind]} cannot be in ${unitStated}`,
      where: 'scan.axis.unit',
      hint: `State one of: ${units.join(', ')}.`,
    });
  }
  const { unit, guess: unitGuess } = unitOf(question, kind, unitStated, reading);
  const source = stated.kind !== undefined ? 'stated' : sourceOf(reading, unitStated);
  const evidence =
    source === 'stated' ? 'stated by the recipe' : (reading?.evidence ?? `its unit is ${unit}`);
  const kindGuess: Guess = {
    field: 'kind',
    label: kindWords[kind],
    source,
    evidence,
    alternatives: otherKinds(kind, unit),
  };
  return { found: { kind, unit, kindGuess, unitGuess }, problem: null };
}

/** The unit of a kind that is settled: stated, read, or told by the size of the values. */
function unitOf(
  { axis }: ScaleQuestion,
  kind: AxisKind,
  unitStated: AxisUnit | null,
  reading: SettledReading | null,
): { readonly unit: AxisUnit; readonly guess: Guess } {
  const units: readonly AxisUnit[] = axisUnits[kind];
  const answer = (unit: AxisUnit, source: Source, evidence: string) => ({
    unit,
    guess: {
      field: 'unit' as const,
      label: formatUnit(unit),
      source,
      evidence,
      alternatives: units
        .filter((other) => other !== unit)
        .map((other) => ({
          label: formatUnit(other),
          evidence: 'another unit of this kind',
          choice: { axis: { unit: other } },
        })),
    },
  });
  if (unitStated !== null) return answer(unitStated, 'stated', 'stated by the recipe');
  if (kind === 'shift') {
    const evidence = axis.from?.vector.unit?.from ?? 'Raman shifts are in cm⁻¹';
    return answer('cm-1', 'file', evidence);
  }
  if (reading !== null && units.includes(reading.unit)) {
    const evidence = axis.from?.vector.unit?.from ?? reading.evidence;
    return answer(reading.unit, sourceOf(reading, null), evidence);
  }
  return answer(unitOfRange(kind, axis), 'guess', 'not stated; taken from the size of the values');
}

function sourceOf(reading: ScaleReading | null, unitStated: AxisUnit | null): Source {
  if (unitStated !== null && unitStated !== 'cm-1') return 'stated';
  return reading?.isFirm === true ? 'file' : 'guess';
}

type SettledReading = ScaleReading & { readonly kind: AxisKind };

/** The reading of the axis vector, with "wavenumbers" settled as absolute or shift; null when there is none. */
function readScale({ axis, agreement, quantity }: ScaleQuestion): SettledReading | null {
  const facts = axis.from?.vector.facts ?? vectorFacts(axis.values);
  const role = axis.from?.role;
  const reading = role?.kind === 'scale' ? role.scale : scaleOfNumbers(facts);
  if (reading === null) return null;
  if (reading.kind !== 'cm-1?') return { ...reading, kind: reading.kind };
  const proven = axis.from === null ? undefined : agreement.absolute.get(axis.from.vector);
  if (proven !== undefined) {
    return { ...reading, kind: 'energy', evidence: `${reading.evidence}; ${proven}`, isFirm: true };
  }
  if (facts.min < 50) {
    const evidence = `${reading.evidence}; values down to ${facts.min} cm⁻¹ are shifts from a laser`;
    return { ...reading, kind: 'shift', evidence };
  }
  if (facts.max > 8000) {
    const evidence = `${reading.evidence}; values up to ${facts.max} cm⁻¹ are those of visible or near-infrared light`;
    return { ...reading, kind: 'energy', evidence };
  }
  if (/absorb|transmi|reflect/.test(quantity)) {
    const evidence = `${reading.evidence}; the values are ${quantity}, so the wavenumbers are those of the light itself`;
    return { ...reading, kind: 'energy', evidence };
  }
  return {
    ...reading,
    kind: 'shift',
    evidence: `${reading.evidence}; below 8000 cm⁻¹ an emission spectrum can only be a Raman shift`,
  };
}

function kindOfUnit(unit: AxisUnit | null, reading: SettledReading | null): AxisKind | null {
  if (unit === null) return null;
  if (unit === 'eV' || unit === 'meV') return 'energy';
  if (unit !== 'cm-1') return 'wavelength';
  return reading !== null && reading.kind !== 'wavelength' && reading.unit === 'cm-1'
    ? reading.kind
    : null;
}

function checkedUnit(stated: string): AxisUnit {
  const known: readonly AxisUnit[] = ['nm', 'um', 'angstrom', 'eV', 'meV', 'cm-1'];
  const unit = known.find((one) => one === parseUnit(stated));
  if (unit !== undefined) return unit;
  throw new RimlightError('recipe', {
    what: `“${stated}” is no unit of a spectral axis`,
    where: 'scan.axis.unit',
    hint: `State one of: ${known.join(', ')}.`,
  });
}

function unitOfRange(kind: AxisKind, axis: FoundAxis): AxisUnit {
  const { min, max } = vectorFacts(axis.values);
  if (kind === 'shift') return 'cm-1';
  if (kind === 'energy') return max < 25 ? 'eV' : min > 5000 ? 'cm-1' : 'meV';
  return max < 25 ? 'um' : min > 2800 && max < 20_000 ? 'angstrom' : 'nm';
}

function otherKinds(kind: AxisKind, unit: AxisUnit): readonly Alternative[] {
  return kindChoices
    .filter((other) => other.kind !== kind)
    .map((other) => ({
      label: kindWords[other.kind],
      evidence: other.evidence,
      choice: {
        axis: {
          kind: other.kind,
          unit: unit === 'cm-1' && other.kind === 'energy' ? 'cm-1' : other.unit,
        },
      },
    }));
}

const kindChoices: readonly { kind: AxisKind; unit: AxisUnit; evidence: string }[] = [
  { kind: 'wavelength', unit: 'nm', evidence: 'if the values are wavelengths' },
  {
    kind: 'energy',
    unit: 'eV',
    evidence: 'if the values are the photon energies or wavenumbers of the light itself',
  },
  { kind: 'shift', unit: 'cm-1', evidence: 'if the values are counted from the laser line' },
];

function unknownScale({ axis }: ScaleQuestion, unit: AxisUnit | null): ScaleAnswer {
  const { first, last } = vectorFacts(axis.values);
  const what =
    unit === 'cm-1'
      ? `the axis in cm⁻¹ may be absolute wavenumbers or Raman shifts`
      : `the kind of the spectral axis, ${first} to ${last}, is not stated and its values fit more than one`;
  return {
    found: null,
    problem: new RimlightError('scan', {
      what,
      where: axis.where,
      hint: 'State scan.axis.kind (wavelength, energy or shift) and scan.axis.unit (nm, eV, cm-1).',
    }),
    kindGuess: {
      field: 'kind',
      label: 'unknown',
      source: 'missing',
      evidence: what,
      alternatives: kindChoices
        .filter(
          (choice) =>
            unit === null || choice.unit === unit || (unit === 'cm-1' && choice.kind === 'energy'),
        )
        .map((choice) => ({
          label: `${kindWords[choice.kind]}, ${formatUnit(unit ?? choice.unit)}`,
          evidence: choice.evidence,
          choice: { axis: { kind: choice.kind, unit: unit ?? choice.unit } },
        })),
    },
  };
}
