/** The axis the recipe does not state: the likeliest vector of the file and its companions. */
import { RimlightError } from '../../errors';
import type { Container } from '../container';
import type { AxisChoice } from '../scan-choices';
import type { Alternative, Companion } from '../scan-plan';
import type { Agreement, RoledVector } from './agreement';
import { shown } from './roles';
import type { Vector } from './vectors';

/** The part of an axis choice that says where the values are. */
export type AxisPlace = Pick<AxisChoice, 'data' | 'values' | 'file' | 'from' | 'to'>;

export interface FoundAxis {
  /** one per channel of the file; NaN where the file has none */
  readonly values: Float64Array;
  /** the array they were read from; null for numbers of the recipe */
  readonly from: RoledVector | null;
  readonly place: AxisPlace;
  /** for errors about the values */
  readonly where: string;
  readonly label: string;
  readonly source: 'stated' | 'file' | 'guess';
  readonly evidence: string;
  readonly alternatives: readonly Alternative[];
}

export interface AxisQuestion {
  readonly container: Container;
  readonly companions: readonly Companion[];
  readonly fileName: string;
  /** channels of the cube as the file has them */
  readonly fileChannels: number;
  readonly vectors: readonly RoledVector[];
  readonly stated: AxisChoice;
  /** what the file calls the cube's channel axis; null when it does not say */
  readonly axisName: string | null;
  readonly agreement: Agreement;
  readonly isLaserStated: boolean;
}

/** Vectors that may be the axis, best first. */
export function likely(question: AxisQuestion): readonly RoledVector[] {
  const fitting = question.vectors.filter(
    ({ vector, role }) =>
      vector.values.length === question.fileChannels &&
      (role.kind === 'scale' || role.kind === 'ramp' || isNamedByFile(question, vector)),
  );
  return sortedByScore(question, fitting);
}

function isNamedByFile({ axisName }: AxisQuestion, vector: Vector): boolean {
  return (
    axisName !== null && vector.file === null && vector.entry.path.split('/').at(-1) === axisName
  );
}

export function sortedByScore(
  question: AxisQuestion,
  vectors: readonly RoledVector[],
): readonly RoledVector[] {
  return [...vectors].sort((a, b) => score(question, b) - score(question, a));
}

/**
 * A shift whose laser is known comes first: that is what a Raman set-up is calibrated in. Then
 * wavelengths, wavenumbers, energies in the order of how seldom they are computed from another.
 */
function score(question: AxisQuestion, { vector, role }: RoledVector): number {
  let points = isNamedByFile(question, vector) ? 1000 : 0;
  if (vector.file === null) points += 3;
  if (vector.facts.finite < vector.values.length) points -= 1;
  if (vector.facts.direction === 'mixed') points -= 15;
  if (role.kind === 'ramp') return points + (role.isNamed ? 10 : 5);
  if (role.kind !== 'scale') return points;
  const isLaserKnown = question.isLaserStated || question.agreement.laser !== null;
  if (role.scale.kind === 'shift') return points + (isLaserKnown ? 40 : 25);
  if (role.scale.kind === 'wavelength') return points + 38;
  return points + (role.scale.kind === 'cm-1?' ? 34 : 30);
}

export function likeliestAxis(question: AxisQuestion): FoundAxis {
  const [best, ...others] = likely(question);
  if (best === undefined) throw noAxis(question);
  const { vector, role } = best;
  const isNamed = isNamedByFile(question, vector);
  const isFirm = isNamed || (vector.file === null && role.kind === 'scale' && others.length === 0);
  const why = isNamed
    ? 'the file names it as the axis of the channels'
    : role.kind === 'scale'
      ? role.scale.evidence
      : 'it runs one way and has one value per channel';
  const fit = vector.file === null ? '' : `; ${vector.file} was given with the scan and fits`;
  const choice = others.length === 0 ? '' : `; ${preference(best, others)}`;
  return {
    values: vector.values,
    from: best,
    place: placeOf(vector),
    where: vector.file === null ? `${question.fileName} · ${vector.label}` : vector.label,
    label: vector.label,
    source: isFirm ? 'file' : 'guess',
    evidence: `${why}${fit}${choice}`,
    alternatives: choosable(vector, others),
  };
}

function preference(best: RoledVector, others: readonly RoledVector[]): string {
  const names = others.map(({ vector }) => vector.label).join(', ');
  const kind = best.role.kind === 'scale' ? best.role.scale.kind : 'unknown';
  const because =
    kind === 'shift'
      ? 'the shift is preferred where its laser is known'
      : kind === 'wavelength'
        ? 'wavelengths are preferred, being what a spectrograph is calibrated in'
        : kind === 'cm-1?'
          ? 'wavenumbers are preferred, energies being mostly computed from them'
          : 'its name is the likeliest';
  return `${names} ${others.length === 1 ? 'fits' : 'fit'} too, ${because}`;
}

function placeOf(vector: Vector): AxisPlace {
  return vector.file === null ? { data: vector.entry.path } : { file: vector.file };
}

/** Of each companion only its likeliest array can be named in a recipe. */
export function choosable(chosen: Vector, others: readonly RoledVector[]): readonly Alternative[] {
  const files = new Set([chosen.file]);
  return others
    .filter(({ vector }) => {
      if (vector.file === null) return true;
      const isNew = !files.has(vector.file);
      files.add(vector.file);
      return isNew;
    })
    .map(asAlternative);
}

/** Kind and unit go along, so that those of the axis chosen before do not stay behind. */
function asAlternative({ vector, role }: RoledVector): Alternative {
  const { facts } = vector;
  const range = `${shown(facts.first)} to ${shown(facts.last)}`;
  const place = placeOf(vector);
  if (role.kind !== 'scale')
    return { label: vector.label, evidence: range, choice: { axis: place } };
  const { kind, unit } = role.scale;
  const settled = kind !== 'cm-1?' ? kind : facts.min < 50 ? 'shift' : 'energy';
  return {
    label: vector.label,
    evidence: `${kind === 'cm-1?' ? 'wavenumber' : kind}, ${range}`,
    choice: { axis: { ...place, kind: settled, unit } },
  };
}

function noAxis({ vectors, fileChannels, fileName }: AxisQuestion): RimlightError {
  const pixels = vectors.find(
    ({ vector, role }) => role.kind === 'pixels' && vector.values.length === fileChannels,
  );
  const near = vectors.filter(({ role }) => role.kind === 'scale').map(({ vector }) => vector);
  const wrongLength =
    near.length === 0
      ? ''
      : `; ${near.map((vector) => `${vector.label} has ${vector.values.length}`).join(', ')}`;
  return new RimlightError('scan', {
    what:
      pixels === undefined
        ? `no spectral axis with ${fileChannels} values was found${wrongLength}`
        : `the only axis, ${pixels.vector.label}, counts detector pixels and carries no wavelength`,
    where: fileName,
    hint: `Give one with scan.axis: a file of ${fileChannels} values beside the scan, its values, or from and to for a uniform one, with kind (wavelength, energy or shift) and unit.`,
  });
}
