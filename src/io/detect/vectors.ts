/** One-dimensional arrays of a file and its companions: read once, described, and told apart by what they can be. */
import type { ArrayEntry, Container, ReadOptions } from '../container';
import type { Companion } from '../scan-plan';
import { type EntryUnit, entryUnit, nameOf, spaced, textAttribute } from './words';

export interface Vector {
  /** companion's file name; null for the scan file itself */
  readonly file: string | null;
  readonly entry: ArrayEntry;
  readonly values: Float64Array;
  /** as shown: "/scan/energy", or "axis.csv" */
  readonly label: string;
  /** name, long name and, for an array without a name, its file's: in lower case with single spaces */
  readonly names: readonly string[];
  /** all of `names` in one */
  readonly words: string;
  readonly unit: EntryUnit | null;
  readonly facts: VectorFacts;
}

/** What the numbers alone say. Infinite values count as missing. */
export interface VectorFacts {
  readonly finite: number;
  readonly min: number;
  readonly max: number;
  readonly first: number;
  readonly last: number;
  /** strictly `up` or `down` among finite values, `mixed` otherwise (also with fewer than two) */
  readonly direction: 'up' | 'down' | 'mixed';
  readonly isWhole: boolean;
  /** 0, 1, 2 … or 1, 2, 3 …: a count of channels or pixels */
  readonly isIndex: boolean;
}

/** Longer ones are data, not axes. */
const longestVector = 1 << 20;
/** A file with more is no scan with its axes; the first ones are looked at. */
const mostVectors = 256;

/** Length of an array that is a vector in all but name: at most one axis longer than one. */
export function vectorLength(shape: readonly number[]): number | null {
  if (shape.length === 0) return null;
  const long = shape.filter((count) => count !== 1);
  if (long.length > 1) return null;
  return long[0] ?? 1;
}

/** Reads every vector of the scan file and of its companions. */
export async function readVectors(
  container: Container,
  companions: readonly Companion[],
  options: ReadOptions,
): Promise<readonly Vector[]> {
  const vectors: Vector[] = [];
  for (const [file, from] of filesOf(container, companions)) {
    for (const entry of from.entries) {
      const length = vectorLength(entry.shape);
      if (length === null || length < 1 || length > longestVector) continue;
      if (vectors.length >= mostVectors) return vectors;
      vectors.push(await readVector(file, from, entry, options));
    }
  }
  return vectors;
}

function filesOf(
  container: Container,
  companions: readonly Companion[],
): readonly (readonly [string | null, Container])[] {
  return [
    [null, container],
    ...companions.map((companion) => [companion.name, companion.container] as const),
  ];
}

async function readVector(
  file: string | null,
  container: Container,
  entry: ArrayEntry,
  options: ReadOptions,
): Promise<Vector> {
  const start = entry.shape.map(() => 0);
  const values = Float64Array.from(await container.read(entry.path, start, entry.shape, options));
  const stem = file === null || entry.path !== '' ? '' : file.replace(/\.[^.]+$/, '');
  const longName = textAttribute(entry.attributes, 'long_name', 'label', 'title') ?? '';
  const names = [nameOf(entry.path), longName, stem].map(spaced).filter((name) => name !== '');
  return {
    file,
    entry,
    values,
    label: labelOf(file, entry, container),
    names,
    words: names.join(' '),
    unit: entryUnit(entry) ?? unitOfFileName(file, entry),
    facts: vectorFacts(values),
  };
}

function labelOf(file: string | null, entry: ArrayEntry, container: Container): string {
  if (file === null) return entry.path === '' ? 'the array' : entry.path;
  return container.entries.length === 1 ? file : `${file} · ${entry.path}`;
}

/** "wavelength_nm.npy" names its unit although the array inside has no name. */
function unitOfFileName(file: string | null, entry: ArrayEntry): EntryUnit | null {
  if (file === null || nameOf(entry.path) !== '') return null;
  const named = entryUnit({ ...entry, path: file.replace(/\.[^.]+$/, '') });
  return named === null ? null : { unit: named.unit, from: 'its file’s name' };
}

export function vectorFacts(values: Float64Array): VectorFacts {
  const finite = values.filter((value) => Number.isFinite(value));
  let isUp = finite.length > 1;
  let isDown = isUp;
  for (let i = 1; i < finite.length; i++) {
    if (!(finite[i] > finite[i - 1])) isUp = false;
    if (!(finite[i] < finite[i - 1])) isDown = false;
  }
  const first = finite.at(0) ?? Number.NaN;
  return {
    finite: finite.length,
    min: finite.reduce((least, value) => Math.min(least, value), Number.POSITIVE_INFINITY),
    max: finite.reduce((most, value) => Math.max(most, value), Number.NEGATIVE_INFINITY),
    first,
    last: finite.at(-1) ?? Number.NaN,
    direction: isUp ? 'up' : isDown ? 'down' : 'mixed',
    isWhole: finite.every((value) => Number.isInteger(value)),
    isIndex: (first === 0 || first === 1) && finite.every((value, i) => value === first + i),
  };
}
