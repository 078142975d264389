/** Where the axis values come from: the recipe's numbers, an array it names, a companion, or else the likeliest vector. */
import { RimlightError } from '../../errors';
import type { AxisChoice } from '../scan-choices';
import type { Companion } from '../scan-plan';
import type { RoledVector } from './agreement';
import {
  type AxisPlace,
  type AxisQuestion,
  choosable,
  type FoundAxis,
  likeliestAxis,
  likely,
  sortedByScore,
} from './axis-search';
import { unknownName } from './cube';
import { nearestNames } from './nearest';
import { shown } from './roles';
import type { Vector } from './vectors';

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
