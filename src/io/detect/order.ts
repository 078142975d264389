/** Which axis of the array is rows, columns and channels: stated, named by the file, or told by lengths. */
import { RimlightError } from '../../errors';
import type { ArrayEntry, FormatName } from '../container';
import type { Alternative } from '../scan-plan';
import type { RoledVector } from './agreement';
import { spaced } from './words';

export interface FoundOrder {
  /** letters of the file's axes in turn: "yxk", "xk", "k" */
  readonly order: string;
  readonly source: 'stated' | 'file' | 'guess';
  readonly evidence: string;
  readonly alternatives: readonly Alternative[];
  /** said to the user when the guess may as well be wrong */
  readonly warning: string | null;
}

export interface OrderQuestion {
  readonly entry: ArrayEntry;
  readonly format: FormatName;
  readonly stated: string | undefined;
  /** names of the file's axes in turn, "." where unnamed; null when the file does not say */
  readonly axisNames: readonly string[] | null;
  readonly vectors: readonly RoledVector[];
  /** number of channels the recipe's own axis has; null when it states none */
  readonly statedLength: number | null;
  /** shapes of arrays that look like a height map */
  readonly heightShapes: readonly (readonly number[])[];
}

/** @throws RimlightError 'recipe' - when a stated order is no permutation that fits the array */
export function findOrder(question: OrderQuestion): FoundOrder {
  const { shape } = question.entry;
  if (question.stated !== undefined) {
    const order = checkedOrder(question.stated, shape);
    return {
      order,
      source: 'stated',
      evidence: 'stated by the recipe',
      alternatives: otherOrders(order, shape, false),
      warning: null,
    };
  }
  if (shape.length === 1) {
    return {
      order: 'k',
      source: 'file',
      evidence: 'one axis: one spectrum',
      alternatives: [],
      warning: null,
    };
  }
  const channel = findChannelAxis(question);
  const rest = shape.map((_, axis) => axis).filter((axis) => axis !== channel.axis);
  const space =
    rest.length === 1 ? findLineAxis(question, rest[0]) : findRowAxis(question, rest[0], rest[1]);
  const letters = shape.map((_, axis) =>
    axis === channel.axis ? 'k' : (space.letters[axis] ?? 'x'),
  );
  const order = letters.join('');
  return {
    order,
    source: channel.isFirm && space.isFirm ? 'file' : 'guess',
    evidence: `${channel.evidence}; ${space.evidence}`,
    alternatives: otherOrders(order, shape, channel.isLengthKnown),
    warning: channel.warning,
  };
}

function checkedOrder(stated: string, shape: readonly number[]): string {
  const order = stated.trim().toLowerCase();
  const letters = [...order];
  const isPermutation =
    letters.length === shape.length &&
    new Set(letters).size === letters.length &&
    letters.every((letter) => 'yxk'.includes(letter)) &&
    letters.includes('k');
  if (isPermutation) return order;
  const examples = shape.length === 3 ? 'yxk, kyx' : shape.length === 2 ? 'xk, kx' : 'k';
  throw new RimlightError('recipe', {
    what: `“${stated}” does not name the ${shape.length === 1 ? 'one axis' : `${shape.length} axes`} of an array of ${shape.join(' × ')}`,
    where: 'scan.order',
    hint: `Write one letter for each axis in turn, y for rows, x for columns, k for channels, each once: ${examples}.`,
  });
}

interface ChannelAxis {
  readonly axis: number;
  readonly isFirm: boolean;
  /** an axis of values fits this length, so other lengths cannot be channels */
  readonly isLengthKnown: boolean;
  readonly evidence: string;
  readonly warning: string | null;
}

function findChannelAxis(question: OrderQuestion): ChannelAxis {
  const { entry, format, axisNames, vectors, statedLength } = question;
  const { shape } = entry;
  const named = axisNames?.findIndex((name) => isSpectralName(name, vectors)) ?? -1;
  if (axisNames !== null && axisNames.length === shape.length && named >= 0) {
    return {
      axis: named,
      isFirm: true,
      isLengthKnown: true,
      evidence: `the file names axis ${named + 1} “${axisNames[named]}”`,
      warning: null,
    };
  }
  const usual = format === 'TIFF' ? 0 : shape.length - 1;
  const usualWhy =
    format === 'TIFF' ? 'one page per channel' : 'channels run fastest in most files';
  const lengths = channelLengths(vectors, shape, statedLength);
  for (const { length, why, isFirm } of lengths) {
    const fits = shape.flatMap((count, axis) => (count === length ? [axis] : []));
    if (fits.length === 1) {
      const evidence = `axis ${fits[0] + 1} is ${length} long, ${why}`;
      return { axis: fits[0], isFirm, isLengthKnown: true, evidence, warning: null };
    }
    if (fits.length > 1) {
      const axis = fits.includes(usual) ? usual : (fits.at(-1) ?? usual);
      return {
        axis,
        isFirm: false,
        isLengthKnown: true,
        evidence: `axes ${fits.map((fit) => fit + 1).join(' and ')} are both ${length} long, ${why}; ${usualWhy}`,
        warning: `Several axes of ${shape.join(' × ')} are ${length} long: check that channels are axis ${axis + 1}.`,
      };
    }
  }
  const evidence = `no axis of matching length; ${usualWhy}`;
  return { axis: usual, isFirm: false, isLengthKnown: false, evidence, warning: null };
}

/** Lengths that the channel axis should have, the best reason first. */
function channelLengths(
  vectors: readonly RoledVector[],
  shape: readonly number[],
  statedLength: number | null,
): readonly { length: number; why: string; isFirm: boolean }[] {
  const fitting = vectors.filter(({ vector }) => shape.includes(vector.values.length));
  const scales = fitting.filter(({ role }) => role.kind === 'scale');
  const ramps = fitting.filter(({ role }) => role.kind === 'ramp' || role.kind === 'pixels');
  return [
    ...(statedLength === null
      ? []
      : [{ length: statedLength, why: 'as many as the stated axis has values', isFirm: true }]),
    ...scales.map(({ vector }) => ({
      length: vector.values.length,
      why: `as ${vector.label} is`,
      isFirm: true,
    })),
    ...ramps.map(({ vector }) => ({
      length: vector.values.length,
      why: `as ${vector.label} is`,
      isFirm: false,
    })),
  ];
}

interface SpaceAxes {
  /** letter by file axis */
  readonly letters: Readonly<Record<number, 'y' | 'x'>>;
  readonly isFirm: boolean;
  readonly evidence: string;
}

/** A 2-D array is a line of spectra, one row of columns, unless its axis is called y. */
function findLineAxis({ entry, axisNames, vectors }: OrderQuestion, axis: number): SpaceAxes {
  const length = entry.shape[axis];
  const along = vectors.filter(
    ({ vector, role }) => role.kind === 'position' && vector.values.length === length,
  );
  const isCalledY =
    spaced(axisNames?.[axis] ?? '').split(' ')[0] === 'y' ||
    (along.length === 1 && along[0].role.kind === 'position' && along[0].role.along === 'y');
  return {
    letters: { [axis]: isCalledY ? 'y' : 'x' },
    isFirm: true,
    evidence: isCalledY
      ? `the other axis is called y: ${length} rows of one spectrum`
      : `the other holds a line of ${length} spectra, one row`,
  };
}

function findRowAxis(question: OrderQuestion, first: number, second: number): SpaceAxes {
  const { entry, axisNames } = question;
  const yx: SpaceAxes['letters'] = { [first]: 'y', [second]: 'x' };
  const xy: SpaceAxes['letters'] = { [first]: 'x', [second]: 'y' };
  const names = [first, second].map((axis) => spaced(axisNames?.[axis] ?? '').split(' ')[0]);
  if (names[0] === 'y' || names[1] === 'x') {
    return { letters: yx, isFirm: true, evidence: 'the file names rows (y) before columns (x)' };
  }
  if (names[0] === 'x' || names[1] === 'y') {
    return { letters: xy, isFirm: true, evidence: 'the file names columns (x) before rows (y)' };
  }
  const a = entry.shape[first];
  const b = entry.shape[second];
  const told = a === b ? null : rowsByPositions(question, a, b);
  if (told !== null)
    return { letters: told.isRowsFirst ? yx : xy, isFirm: true, evidence: told.evidence };
  const isTurned = (shape: readonly number[]): boolean => shape[0] === b && shape[1] === a;
  if (a !== b && question.heightShapes.length > 0 && question.heightShapes.every(isTurned)) {
    return {
      letters: xy,
      isFirm: false,
      evidence: `the height map is ${b} × ${a}, so columns come before rows`,
    };
  }
  return { letters: yx, isFirm: false, evidence: 'rows before columns, as images are kept' };
}

/** Positions along x or y as long as one of the two axes; null when they are as long as both or contradict. */
function rowsByPositions(
  { vectors }: OrderQuestion,
  a: number,
  b: number,
): { isRowsFirst: boolean; evidence: string } | null {
  const told = vectors.flatMap(({ vector, role }) => {
    if (role.kind !== 'position' || role.along === null || vector.file !== null) return [];
    const length = vector.values.length;
    if (length !== a && length !== b) return [];
    const isRowsFirst = (role.along === 'y') === (length === a);
    return [{ isRowsFirst, evidence: `${vector.label} has ${length} values` }];
  });
  const [first] = told;
  return told.every(({ isRowsFirst }) => isRowsFirst === first.isRowsFirst)
    ? (first ?? null)
    : null;
}

/** Whether an axis name of the file belongs to the spectral axis. */
function isSpectralName(name: string, vectors: readonly RoledVector[]): boolean {
  if (name === '.' || name === '') return false;
  const own = vectors.find(
    ({ vector }) => vector.file === null && vector.entry.path.split('/').at(-1) === name,
  );
  if (own !== undefined && own.role.kind === 'scale') return true;
  return /\b(wave ?lengths?|wave ?numbers?|energ(y|ies)|shifts?|raman shift|spectral|spectrum|channels?|k|lambda)\b/.test(
    spaced(name),
  );
}

/** Every other way to read the axes, rows and columns exchanged first. */
function otherOrders(
  order: string,
  shape: readonly number[],
  isLengthKnown: boolean,
): readonly Alternative[] {
  const exchanged = [...order]
    .map((letter) => (letter === 'y' ? 'x' : letter === 'x' ? 'y' : letter))
    .join('');
  const all =
    order.length === 3
      ? ['yxk', 'xyk', 'kyx', 'kxy', 'ykx', 'xky']
      : order.length === 2
        ? ['xk', 'kx', 'yk', 'ky']
        : [];
  const channels = shape[order.indexOf('k')];
  return [exchanged, ...all.filter((other) => other !== exchanged)]
    .filter((other) => other !== order && all.includes(other))
    .filter((other) => !isLengthKnown || shape[other.indexOf('k')] === channels)
    .map((other) => ({
      label: other,
      evidence:
        other === exchanged
          ? order.length === 2
            ? 'spectra down a column instead of along a row'
            : 'rows and columns exchanged'
          : `channels are the ${shape[other.indexOf('k')]} of axis ${other.indexOf('k') + 1}`,
      choice: { order: other },
    }));
}
