/** Which array of the file is the scan: stated, marked by the file, or the likeliest by rank, name and size. */
import { RimlightError } from '../../errors';
import type { ArrayEntry, Container } from '../container';
import type { Alternative } from '../scan-plan';
import type { RoledVector } from './agreement';
import { nearestNames } from './nearest';
import type { NexusSignal } from './nexus';
import { vectorLength } from './vectors';
import { entryWords, nameOf, textAttribute } from './words';

export interface FoundCube {
  readonly entry: ArrayEntry;
  readonly source: 'stated' | 'file' | 'guess';
  readonly evidence: string;
  readonly alternatives: readonly Alternative[];
}

export interface CubeQuestion {
  readonly container: Container;
  readonly fileName: string;
  readonly stated: string | undefined;
  readonly nexus: NexusSignal | null;
  /** vectors of the scan file and its companions, with what they can be */
  readonly vectors: readonly RoledVector[];
}

interface Candidate {
  readonly entry: ArrayEntry;
  readonly score: number;
  readonly reasons: readonly string[];
}

const usualOrders = ['k', 'xk', 'yxk'] as const;

/** @throws RimlightError 'recipe' for an unknown name, 'scan' when nothing in the file can be a scan */
export function findCube(question: CubeQuestion): FoundCube {
  const { container, nexus, stated } = question;
  const candidates = container.entries
    .filter((entry) => isScanShape(entry.shape) && entry.type !== 'bool')
    .filter((entry) => !isAxis(entry, question.vectors))
    .map((entry) => rated(entry, question))
    .sort((a, b) => b.score - a.score);
  const alternativesTo = (chosen: ArrayEntry): readonly Alternative[] =>
    candidates
      .filter(({ entry }) => entry.path !== chosen.path)
      .slice(0, 8)
      .map(({ entry, reasons }) => ({
        label: entryLabel(entry),
        evidence: reasons.join(', '),
        // An order stated for the array chosen before would not fit one of another rank.
        choice:
          entry.shape.length === chosen.shape.length
            ? { data: entry.path }
            : { data: entry.path, order: usualOrders[entry.shape.length - 1] },
      }));
  if (stated !== undefined) {
    const entry = statedEntry(question, stated);
    const evidence = 'stated by the recipe';
    return { entry, source: 'stated', evidence, alternatives: alternativesTo(entry) };
  }
  if (nexus !== null && isScanShape(nexus.entry.shape)) {
    return {
      entry: nexus.entry,
      source: 'file',
      evidence: nexus.evidence,
      alternatives: alternativesTo(nexus.entry),
    };
  }
  const best = candidates[0];
  if (best === undefined) throw noCube(question);
  return {
    entry: best.entry,
    source: candidates.length === 1 ? 'file' : 'guess',
    evidence:
      candidates.length === 1
        ? `the only array that can hold spectra (${best.reasons.join(', ')})`
        : best.reasons.join(', '),
    alternatives: alternativesTo(best.entry),
  };
}

/** "/scan/absorbance · 22 × 16 × 3527, float64" */
export function entryLabel(entry: ArrayEntry): string {
  const shape = entry.shape.length === 0 ? 'one value' : entry.shape.join(' × ');
  return `${entry.path === '' ? '' : `${entry.path} · `}${shape}, ${entry.type}`;
}

function isScanShape(shape: readonly number[]): boolean {
  const size = shape.reduce((product, count) => product * count, 1);
  return shape.length >= 1 && shape.length <= 3 && size >= 2;
}

/** A vector that is a spectral axis, a pixel count or a position is no scan, unless it is all there is. */
function isAxis(entry: ArrayEntry, vectors: readonly RoledVector[]): boolean {
  const own = vectors.find(
    ({ vector }) => vector.file === null && vector.entry.path === entry.path,
  );
  if (own === undefined) return false;
  const isAlone = vectors.filter(({ vector }) => vector.file === null).length === 1;
  const { kind } = own.role;
  if (isAlone && (kind === 'ramp' || kind === 'pixels')) return false;
  if (kind === 'scale' || kind === 'pixels' || kind === 'position') return true;
  if (kind !== 'ramp') return false;
  // Of unnamed columns that all run one way, the first is the axis.
  const rest = vectors.filter(({ vector }) => vector.file === null);
  const hasScale = rest.some(({ role }) => role.kind === 'scale');
  return !hasScale && rest.find(({ role }) => role.kind === 'ramp') === own;
}

const likely =
  /\b(counts?|cts|intensit(y|ies)|signal|spectra|spectrum|data|cube|image|map|scan|pl|raman|luminescence|absorbance)\b/;
const unlikely =
  /\b(err(or)?s?|errors|sigma|std|stdev|var(iance)?|unc(ertainty)?|mask|weights?|fit(ted)?|model|residuals?|baseline|quality|flags?|responses?|efficiency|qe)\b/;
const background = /\b(dark|background|bg|bkg|reference|blank|flat ?field)\b/;
const derived = /\b(minus|corrected|subtracted|normali[sz]ed|smoothed|processed)\b/;
const surface = /\b(height|topography|topo|afm|z)\b/;

function rated(entry: ArrayEntry, question: CubeQuestion): Candidate {
  const rank = vectorLength(entry.shape) === null ? entry.shape.length : 1;
  const words = entryWords(entry);
  const reasons: string[] = [];
  let score = rank * 100;
  const count = (points: number, reason: string): void => {
    score += points;
    reasons.push(reason);
  };
  reasons.push(rank === 1 ? 'one spectrum' : `${entry.shape.length} axes`);
  const axis = question.vectors.find(
    ({ vector, role }) =>
      role.kind === 'scale' &&
      vector.entry.path !== entry.path &&
      entry.shape.includes(vector.values.length),
  );
  if (axis !== undefined) count(50, `one axis as long as ${axis.vector.label}`);
  if (likely.test(words)) count(20, `called “${nameOf(entry.path)}”`);
  if (unlikely.test(words)) count(-150, 'its name speaks of something derived');
  if (derived.test(words)) count(-8, 'already corrected');
  else if (background.test(words)) count(-60, 'its name speaks of a background');
  if (rank < 3 && surface.test(words)) count(-120, 'its name speaks of a surface');
  if (/\braw\b/.test(words)) count(4, 'as the detector gave it');
  if (textAttribute(entry.attributes, 'interpretation') === 'spectrum')
    count(30, 'marked as spectra');
  const size = entry.shape.reduce((product, length) => product * length, 1);
  // Size decides between equals only: 2^40 values are worth four points.
  return { entry, score: score + Math.log2(size) / 10, reasons };
}

function statedEntry({ container, fileName }: CubeQuestion, stated: string): ArrayEntry {
  const wanted = stated.replace(/^\//, '');
  const entry = container.entries.find(({ path }) => path.replace(/^\//, '') === wanted);
  if (entry === undefined) throw unknownName(stated, 'scan.data', container, fileName);
  if (isScanShape(entry.shape)) return entry;
  throw new RimlightError('recipe', {
    what: `${stated} is ${entryLabel(entry)}, and a scan has one, two or three axes and at least two values`,
    where: 'scan.data',
    hint: 'Name an array of rows × columns × channels, of spectra in a line, or of one spectrum.',
  });
}

/** For a name of the recipe that the file does not have. */
export function unknownName(
  stated: string,
  where: string,
  container: Container,
  fileName: string,
): RimlightError {
  const known = container.entries.map(({ path }) => path).filter((path) => path !== '');
  const near = nearestNames(stated, known);
  return new RimlightError('recipe', {
    what: `${fileName} has no array called ${stated}`,
    where,
    hint:
      near.length === 0
        ? 'The file holds one array without a name: leave this field out.'
        : `The nearest names in the file: ${near.join(', ')}.`,
  });
}

function noCube({ container, fileName }: CubeQuestion): RimlightError {
  const { entries } = container;
  const isEmpty = (entry: ArrayEntry): boolean => entry.shape.includes(0);
  const many = entries.find(({ shape }) => shape.length > 3 && !shape.includes(0));
  if (many !== undefined) {
    return new RimlightError('scan', {
      what: `${entryLabel(many)} has ${many.shape.length} axes, and a scan has at most three: rows, columns, channels`,
      where: fileName,
      hint: 'Save one scan of the series as an array of its own and open that.',
    });
  }
  if (entries.length > 0 && entries.every(isEmpty)) {
    return new RimlightError('scan', {
      what: `${entryLabel(entries[0])} holds no values`,
      where: fileName,
      hint: 'Check that the scan was saved before the file was closed.',
    });
  }
  const held = entries
    .slice(0, 4)
    .map((entry) => entryLabel(entry))
    .join('; ');
  return new RimlightError('scan', {
    what:
      entries.length === 0
        ? 'the file holds no numeric array'
        : `none of the file’s arrays can be a scan (${held}${entries.length > 4 ? '; …' : ''})`,
    where: fileName,
    hint: 'Open a file with an array of rows × columns × channels, of spectra in a line, or of one spectrum with its axis.',
  });
}
