/** The height map of the same area: stated, in the scan file, or a companion of its shape. */
import { RimlightError } from '../../errors';
import type { ArrayEntry, Container } from '../container';
import { mapShape } from '../load-height';
import type { LengthUnit, ScanChoices } from '../scan-choices';
import type { Alternative, Companion, Guess, HeightPlan } from '../scan-plan';
import { assertCompanion } from './axis-source';
import { entryLabel, unknownName } from './cube';
import { entryUnit, entryWords, nmIn, spaced } from './words';

export interface FoundHeight {
  readonly plan: HeightPlan | null;
  readonly guess: Guess;
  readonly choice: ScanChoices['height'];
  readonly warnings: readonly string[];
}

export interface HeightQuestion {
  readonly container: Container;
  readonly companions: readonly Companion[];
  readonly fileName: string;
  readonly ny: number;
  readonly nx: number;
  readonly stated: ScanChoices['height'];
  readonly cubePath: string;
  /** the cube keeps columns before rows, and so may its height map */
  readonly isColumnsFirst: boolean;
}

interface Candidate {
  readonly file: string | null;
  readonly entry: ArrayEntry;
  readonly evidence: string;
}

const surfaceWords = /\b(heights?|topograph(y|ies)|topo|afm|z|surface)\b/;
const otherMaps =
  /\b(dark|background|bg|mask|counts?|intensity|total|sum|fit|error|err|reference|response|weights?)\b/;

/** Arrays of the scan file that look like a height map, of whatever shape. */
export function heightEntries(container: Container): readonly ArrayEntry[] {
  return container.entries.filter(
    (entry) =>
      entry.shape.length === 2 && entry.type !== 'bool' && isSurface(entryWords(entry), entry),
  );
}

function isSurface(words: string, entry: ArrayEntry): boolean {
  if (otherMaps.test(words)) return false;
  if (surfaceWords.test(words)) return true;
  const unit = entryUnit(entry);
  return unit !== null && nmIn(unit.unit) !== null;
}

/** @throws RimlightError 'recipe' - when the stated map is not there, or not rows × columns of the scan */
export function findHeight(question: HeightQuestion): FoundHeight {
  const { stated, ny, nx } = question;
  if (stated?.data !== undefined || stated?.file !== undefined) {
    return answer(question, statedMap(question, stated), 'stated', []);
  }
  const found = ny * nx === 1 ? [] : candidates(question);
  const [best, ...others] = found;
  if (best === undefined) return noHeight(question);
  return answer(
    question,
    best,
    best.file === null ? 'file' : 'guess',
    others.map(({ file, entry, evidence }) => ({
      label: file ?? entry.path,
      evidence,
      choice: { height: file === null ? { data: entry.path } : { file } },
    })),
  );
}

function candidates(question: HeightQuestion): readonly Candidate[] {
  const { container, companions, cubePath } = question;
  const inside = heightEntries(container)
    .filter((entry) => entry.path !== cubePath && isShape(entry, question))
    .map((entry) => ({
      file: null,
      entry,
      evidence: `${entry.path} is a map of ${entry.shape.join(' × ')} whose name or unit is that of a height`,
    }));
  const beside = companions.flatMap(({ name, container: companion }) => {
    const maps = companion.entries.filter((entry) => isShape(entry, question));
    const entry = bestOf(maps);
    if (entry === undefined || otherMaps.test(spaced(`${name} ${entry.path}`))) return [];
    return [
      {
        file: name,
        entry,
        evidence: `${name} was given with the scan and is ${entry.shape.join(' × ')}`,
      },
    ];
  });
  return [...inside, ...beside];
}

function bestOf(maps: readonly ArrayEntry[]): ArrayEntry | undefined {
  return maps.find((entry) => surfaceWords.test(entryWords(entry))) ?? maps[0];
}

/** rows × columns, or columns × rows where the cube itself is kept that way */
function isShape(entry: ArrayEntry, { ny, nx }: HeightQuestion): boolean {
  const shape = mapShape(entry.shape);
  if (shape === null) return false;
  return (shape[0] === ny && shape[1] === nx) || (shape[0] === nx && shape[1] === ny);
}

function statedMap(
  question: HeightQuestion,
  stated: NonNullable<ScanChoices['height']>,
): Candidate {
  const { container, companions, fileName, ny, nx } = question;
  if (stated.data !== undefined && stated.file !== undefined) {
    throw new RimlightError('recipe', {
      what: 'the height map is given twice, by data and by file',
      where: 'scan.height',
      hint: 'Keep one of them.',
    });
  }
  const isOurs = stated.data !== undefined;
  const where = isOurs ? 'scan.height.data' : 'scan.height.file';
  const named = stated.data ?? stated.file ?? '';
  const companion = isOurs ? null : assertCompanion(named, where, companions);
  const entries = companion === null ? container.entries : companion.container.entries;
  const entry = isOurs
    ? entries.find(({ path }) => path.replace(/^\//, '') === named.replace(/^\//, ''))
    : (bestOf(entries.filter((one) => isShape(one, question))) ??
      entries.find(({ shape }) => shape.length === 2) ??
      entries[0]);
  if (entry === undefined && isOurs) throw unknownName(named, where, container, fileName);
  if (entry === undefined || !isShape(entry, question)) {
    throw new RimlightError('recipe', {
      what: `the height map ${named} is ${entry === undefined ? 'empty' : entryLabel(entry)}, and the scan has ${ny} rows of ${nx} pixels`,
      where,
      hint: 'Give a map with one height per pixel of the scan.',
    });
  }
  return { file: companion?.name ?? null, entry, evidence: 'stated by the recipe' };
}

function answer(
  question: HeightQuestion,
  { file, entry, evidence }: Candidate,
  source: Guess['source'],
  alternatives: readonly Alternative[],
): FoundHeight {
  const { stated } = question;
  const read =
    entryUnit(entry) ??
    (file === null ? null : entryUnit({ ...entry, path: file.replace(/\.[^.]+$/, '') }));
  const ownUnit = read === null ? null : lengthUnit(read.unit);
  const unit: LengthUnit = stated?.unit ?? ownUnit ?? 'nm';
  const isGuessed = stated?.unit === undefined && ownUnit === null;
  const shiftPx = stated?.shift_px ?? ([0, 0] as const);
  const place = file === null ? { data: entry.path } : { file: stated?.file ?? file };
  return {
    plan: { file, path: entry.path, unitNm: nmIn(unit) ?? 1, shiftPx },
    choice: { ...place, unit, shift_px: shiftPx },
    warnings:
      mapShape(entry.shape)?.[0] === question.ny || (file === null && question.isColumnsFirst)
        ? []
        : [`The height map ${file ?? entry.path} is kept as columns × rows and is turned.`],
    guess: {
      field: 'height',
      label: `${file ?? entry.path} · ${entry.shape.join(' × ')}, ${unit === 'um' ? 'µm' : unit}`,
      source: source === 'file' && isGuessed ? 'guess' : source,
      evidence: isGuessed ? `${evidence}; its unit is not stated and is taken to be nm` : evidence,
      alternatives: [
        ...alternatives,
        ...(isGuessed
          ? (['um', 'm'] as const).map((other) => ({
              label: `in ${other === 'um' ? 'µm' : other}`,
              evidence: 'another unit of the same map',
              choice: { height: { ...place, unit: other } },
            }))
          : []),
      ],
    },
  };
}

function lengthUnit(unit: string): LengthUnit | null {
  const known: readonly LengthUnit[] = ['nm', 'um', 'mm', 'm', 'angstrom'];
  return known.find((one) => one === unit) ?? null;
}

function noHeight({ container, ny, nx, stated, cubePath }: HeightQuestion): FoundHeight {
  const other = heightEntries(container).find(({ path }) => path !== cubePath);
  return {
    plan: null,
    choice: stated,
    warnings: [],
    guess: {
      field: 'height',
      label: 'none',
      source: 'absent',
      evidence:
        other === undefined
          ? `no map of ${ny} × ${nx} heights in the file or beside it`
          : `${other.path} is ${other.shape.join(' × ')}, not the scan’s ${ny} × ${nx}`,
      alternatives: [],
    },
  };
}
