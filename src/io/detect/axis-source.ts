/** Where the axis values come from: the recipe's numbers, an array of the file, or one of a companion. */
import { RimlightError } from '../../errors';
import type { Container } from '../container';
import type { AxisChoice } from '../scan-choices';
import type { Alternative, Companion } from '../scan-plan';
import type { Agreement, RoledVector } from './agreement';
import { unknownName } from './cube';
import { nearestNames } from './nearest';
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

/** @throws RimlightError 'recipe' for what the recipe states and cannot be, 'scan' when there is no axis */
export function findAxis(question: AxisQuestion): FoundAxis {
  const { stated, fileChannels } = question;
  assertOnePlace(stated);
  if (stated.values !== undefined) {
    const found = listedAxis(stated.values, { values: stated.values });
    return checkedLength(found, fileChannels, 'scan.axis.values');
  }
  if (stated.from !== undefined && stated.to !== undefined) {
    return uniformAxis(stated.from, stated.to, fileChannels);
  }
  if (stated.file !== undefined) {
    return checkedLength(companionAxis(question, stated.file), fileChannels, 'scan.axis.file');
  }
  if (stated.data !== undefined) {
    return checkedLength(datasetAxis(question, stated.data), fileChannels, 'scan.axis.data');
  }
  return likeliestAxis(question);
}

/** How many channels the stated axis has; null when none is stated or only its ends are. */
export function statedAxisLength(
  stated: AxisChoice,
  vectors: readonly RoledVector[],
): number | null {
  if (stated.values !== undefined) return stated.values.length;
  const fits = vectors.find(({ vector }) =>
    stated.file !== undefined
      ? isFile(vector, stated.file)
      : stated.data !== undefined && vector.file === null && isPath(vector, stated.data),
  );
  return fits?.vector.values.length ?? null;
}

function assertOnePlace(stated: AxisChoice): void {
  const places = [
    stated.values === undefined ? null : 'values',
    stated.file === undefined ? null : 'file',
    stated.from === undefined && stated.to === undefined ? null : 'from and to',
    stated.data === undefined ? null : 'data',
  ].filter((place) => place !== null);
  if (places.length > 1) {
    throw new RimlightError('recipe', {
      what: `the axis is given twice, by ${places.join(' and by ')}`,
      where: 'scan.axis',
      hint: 'Keep one of them.',
    });
  }
  if ((stated.from === undefined) !== (stated.to === undefined)) {
    throw new RimlightError('recipe', {
      what: 'a uniform axis needs both its ends, from and to',
      where: 'scan.axis',
      hint: 'State scan.axis.from and scan.axis.to, the first and the last channel’s value.',
    });
  }
}

function listedAxis(values: readonly number[], place: AxisPlace): FoundAxis {
  return {
    values: Float64Array.from(values),
    from: null,
    place,
    where: 'scan.axis',
    label: 'values of the recipe',
    source: 'stated',
    evidence: 'stated by the recipe',
    alternatives: [],
  };
}

function uniformAxis(from: number, to: number, fileChannels: number): FoundAxis {
  if (!Number.isFinite(from) || !Number.isFinite(to) || from === to) {
    throw new RimlightError('recipe', {
      what: `a uniform axis cannot run from ${from} to ${to}`,
      where: 'scan.axis',
      hint: 'State the first and the last channel’s value.',
    });
  }
  const last = Math.max(fileChannels - 1, 1);
  const values = Array.from(
    { length: fileChannels },
    (_, k) => (from * (last - k) + to * k) / last,
  );
  return { ...listedAxis(values, { from, to }), label: `${shown(from)} to ${shown(to)}, uniform` };
}

function isPath(vector: Vector, stated: string): boolean {
  return vector.entry.path.replace(/^\//, '') === stated.replace(/^\//, '');
}

/** Recipes name files relative to their own folder; companions come without folders. */
export function isSameFile(name: string, stated: string): boolean {
  return name === stated || name === stated.split(/[\\/]/).at(-1);
}

function isFile(vector: Vector, stated: string): boolean {
  return vector.file !== null && isSameFile(vector.file, stated);
}

function statedAs(own: RoledVector, place: AxisPlace): FoundAxis {
  return {
    values: own.vector.values,
    from: own,
    place,
    where: own.vector.label,
    label: own.vector.label,
    source: 'stated',
    evidence: 'stated by the recipe',
    alternatives: [],
  };
}

function datasetAxis(question: AxisQuestion, stated: string): FoundAxis {
  const { container, vectors, fileName } = question;
  const own = vectors.find(({ vector }) => vector.file === null && isPath(vector, stated));
  if (own !== undefined) {
    const others = likely(question).filter(({ vector }) => vector !== own.vector);
    return { ...statedAs(own, { data: stated }), alternatives: choosable(own.vector, others) };
  }
  const entry = container.entries.find(
    ({ path }) => path.replace(/^\//, '') === stated.replace(/^\//, ''),
  );
  if (entry === undefined) throw unknownName(stated, 'scan.axis.data', container, fileName);
  throw new RimlightError('recipe', {
    what: `${stated} is an array of ${entry.shape.join(' × ')}, and an axis is one row of values`,
    where: 'scan.axis.data',
    hint: 'Name an array with one value per channel.',
  });
}

function companionAxis(question: AxisQuestion, stated: string): FoundAxis {
  const { companions, vectors, fileChannels } = question;
  assertCompanion(stated, 'scan.axis.file', companions);
  const inside = vectors.filter(({ vector }) => isFile(vector, stated));
  const fitting = inside.filter(({ vector }) => vector.values.length === fileChannels);
  const own = sortedByScore(question, fitting)[0] ?? inside[0];
  if (own !== undefined) return statedAs(own, { file: stated });
  throw new RimlightError('recipe', {
    what: `${stated} holds no row of axis values`,
    where: 'scan.axis.file',
    hint: 'Give a file with one value per channel.',
  });
}

/** @throws RimlightError 'recipe' - when a file the recipe names was not given beside the scan */
export function assertCompanion(
  stated: string,
  where: string,
  companions: readonly Companion[],
): Companion {
  const found = companions.find(({ name }) => isSameFile(name, stated));
  if (found !== undefined) return found;
  const near = nearestNames(
    stated,
    companions.map(({ name }) => name),
  );
  throw new RimlightError('recipe', {
    what: `the file ${stated} was not given with the scan`,
    where,
    hint:
      near.length === 0
        ? 'Put it beside the recipe, or drop it together with the scan.'
        : `Put it beside the recipe, or drop it together with the scan; given were: ${near.join(', ')}.`,
  });
}

function checkedLength(found: FoundAxis, fileChannels: number, where: string): FoundAxis {
  if (found.values.length === fileChannels) return found;
  throw new RimlightError('recipe', {
    what: `the axis has ${found.values.length} values, and the scan has ${fileChannels} channels`,
    where,
    hint: 'Name an axis with one value per channel, or check scan.order.',
  });
}

/** Vectors that may be the axis, best first. */
function likely(question: AxisQuestion): readonly RoledVector[] {
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

function sortedByScore(
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

function likeliestAxis(question: AxisQuestion): FoundAxis {
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
function choosable(chosen: Vector, others: readonly RoledVector[]): readonly Alternative[] {
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
