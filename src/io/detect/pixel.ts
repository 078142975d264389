/** How far columns and rows lie apart: stated, from positions in the file, or from its attributes. */
import { RimlightError } from '../../errors';
import { formatLength } from '../../science/format';
import type { PositionAxis } from '../../science/scan';
import type { ScanChoices } from '../scan-choices';
import type { Guess } from '../scan-plan';
import type { RoledVector } from './agreement';
import { pitchOfSayings, roundedTo12, unknownAxis } from './pitch';
import type { FoundPixel, PixelQuestion } from './pixel-question';
import { shown } from './roles';
import { scatteredPoints } from './scattered-points';
import { nameOf, nmIn, spaced } from './words';

interface Found {
  readonly axis: PositionAxis;
  readonly evidence: string;
}

/** @throws RimlightError 'recipe' - when a stated pixel is no distance */
export function findPixel(question: PixelQuestion): FoundPixel {
  const { stated, nx, ny } = question;
  const xs = positionsAlong(question, 'x');
  const ys = positionsAlong(question, 'y');
  if (stated !== undefined) return statedPixel(question, stated, xs, ys);
  const points = scatteredPoints(question);
  if (points !== null) return points;
  const said =
    xs === null && ys === null ? pitchOfSayings(question.sayings, question.cubePath) : null;
  const foundX = xs?.axis ?? said?.x ?? unknownAxis('x');
  const foundY = ys?.axis ?? said?.y ?? unknownAxis('y');
  const x = nx === 1 ? asWideAs(foundX, foundY) : foundX;
  const y = ny === 1 ? asWideAs(foundY, foundX) : foundY;
  const isKnown = x.unit !== 'px' || y.unit !== 'px';
  const evidence = [xs?.evidence, ys?.evidence, said?.evidence].filter((one) => one !== undefined);
  const warnings = [...(nx > 1 ? unevenness(x) : []), ...(ny > 1 ? unevenness(y) : [])];
  return {
    x,
    y,
    warnings,
    choice: choiceOf(x, y, nx, ny),
    guess: {
      field: 'pixel',
      label: pixelLabel(x, y, nx, ny),
      source: isKnown ? 'file' : 'absent',
      evidence:
        evidence.length > 0
          ? evidence.join('; ')
          : nx * ny === 1
            ? 'one spectrum has no pitch'
            : 'nothing in the file gives positions; lengths are shown in pixels',
      alternatives: bareAlternatives(xs, ys, question),
    },
  };
}

/** A single row or column has no pitch of its own; it is drawn as wide as the pixels along it, where those are lengths. */
function asWideAs(single: PositionAxis, along: PositionAxis): PositionAxis {
  if (!along.isLength || single.unit !== 'px') return single;
  return { ...along, label: single.label, values: null };
}

function statedPixel(
  question: PixelQuestion,
  stated: NonNullable<ScanChoices['pixel']>,
  xs: Found | null,
  ys: Found | null,
): FoundPixel {
  const x = statedAxis('x', stated.x, stated.unit, xs);
  const y = statedAxis('y', stated.y, stated.unit, ys);
  return {
    x,
    y,
    warnings: [],
    choice: stated,
    guess: {
      field: 'pixel',
      label: pixelLabel(x, y, question.nx, question.ny),
      source: 'stated',
      evidence: 'stated by the recipe',
      alternatives: [],
    },
  };
}

/** Positions of the file keep their values and name where their pitch and unit are the stated ones. */
function statedAxis(
  label: 'x' | 'y',
  step: number,
  unit: string,
  inFile: Found | null,
): PositionAxis {
  const perNm = nmIn(unit);
  const isWrong =
    perNm === null ? !Number.isFinite(step) || step === 0 : !(step > 0) || !Number.isFinite(step);
  if (isWrong) {
    throw new RimlightError('recipe', {
      what: `a pixel cannot be ${step} ${unit} apart in ${label}`,
      where: `scan.pixel.${label}`,
      hint: 'State the distance from one pixel to the next.',
    });
  }
  const axis: PositionAxis = {
    label,
    unit: perNm === null ? unit : 'nm',
    isLength: perNm !== null,
    pitch: perNm === null ? step : roundedTo12(step * perNm),
    values: null,
  };
  const own = inFile?.axis;
  if (own === undefined || own.unit !== axis.unit) return axis;
  return Math.abs(own.pitch - axis.pitch) <= 1e-9 * Math.abs(axis.pitch) ? own : axis;
}

function positionsAlong(question: PixelQuestion, along: 'x' | 'y'): Found | null {
  const length = along === 'x' ? question.nx : question.ny;
  if (length < 2) return null;
  const name = along === 'x' ? question.xName : question.yName;
  const fitting = question.vectors.filter(
    ({ vector, role }) =>
      vector.file === null &&
      vector.values.length === length &&
      vector.entry.path !== question.cubePath &&
      vector.facts.finite === length &&
      (role.kind === 'position' ||
        role.kind === 'ramp' ||
        role.kind === 'pixels' ||
        role.kind === 'scale'),
  );
  const isNamed = ({ vector }: RoledVector): boolean =>
    name !== null && name !== '.' && nameOf(vector.entry.path) === name;
  const own =
    fitting.find(isNamed) ??
    fitting.find(({ role }) => role.kind === 'position' && role.along === along) ??
    lonePosition(fitting, question, along);
  return own === undefined ? null : positions(own, along);
}

/** A gate voltage or a time along the only axis of space: no name says x, but nothing else is as long. */
function lonePosition(
  fitting: readonly RoledVector[],
  { nx, ny }: PixelQuestion,
  along: 'x' | 'y',
): RoledVector | undefined {
  if (nx > 1 && ny > 1) return undefined;
  const free = fitting.filter(
    ({ vector, role }) =>
      vector.facts.direction !== 'mixed' &&
      (role.kind === 'ramp' ||
        (role.kind === 'position' && (role.along === null || role.along === along))),
  );
  return free.length === 1 ? free[0] : undefined;
}

function positions({ vector, role }: RoledVector, along: 'x' | 'y'): Found | null {
  const { facts, values } = vector;
  if (facts.direction === 'mixed') return null;
  const unit = vector.unit?.unit ?? null;
  const perNm = unit === null ? null : nmIn(unit);
  const step = Math.abs(facts.last - facts.first) / (values.length - 1);
  const isCalled = role.kind === 'position' && role.along !== null;
  const label = isCalled ? along : nameOf(vector.entry.path);
  const evidence = `${vector.label}, ${values.length} values from ${shown(facts.first)} to ${shown(facts.last)}`;
  if (perNm !== null) {
    const nm = values.map((value) => roundedTo12(value * perNm));
    const pitch = roundedTo12(step * perNm);
    const axis = { label, unit: 'nm', isLength: true, pitch, values: nm };
    return { axis, evidence: `${evidence}, unit ${unit} by ${vector.unit?.from ?? 'its name'}` };
  }
  if (unit === null || unit === 'px') {
    if (isCalled || facts.isIndex) {
      const why = facts.isIndex ? 'pixel numbers' : 'without a unit';
      return { axis: unknownAxis(along), evidence: `${evidence}, ${why}` };
    }
    const axis = { label, unit: '', isLength: false, pitch: roundedTo12(step), values };
    return { axis, evidence: `${evidence}, without a unit` };
  }
  const axis = { label, unit, isLength: false, pitch: roundedTo12(step), values };
  return { axis, evidence };
}

function unevenness(axis: PositionAxis): readonly string[] {
  const { values, pitch } = axis;
  if (values === null) return [];
  let worst = 0;
  for (let i = 1; i < values.length; i++) {
    worst = Math.max(worst, Math.abs(Math.abs(values[i] - values[i - 1]) - pitch));
  }
  if (worst <= 0.02 * pitch) return [];
  return [
    `${axis.label} is not evenly spaced: steps differ by up to ${shown(worst)} ${axis.unit} from the mean of ${shown(pitch)} ${axis.unit}, which maps are drawn with.`,
  ];
}

/** x and y without a unit: what they would be in the usual ones. */
function bareAlternatives(
  xs: Found | null,
  ys: Found | null,
  question: PixelQuestion,
): Guess['alternatives'] {
  const stepOf = (along: 'x' | 'y'): number | null => {
    const own = question.vectors.find(
      ({ vector, role }) =>
        role.kind === 'position' &&
        role.along === along &&
        vector.unit === null &&
        vector.values.length === (along === 'x' ? question.nx : question.ny),
    );
    if (own === undefined || own.vector.facts.isIndex || own.vector.values.length < 2) return null;
    return roundedTo12(
      Math.abs(own.vector.facts.last - own.vector.facts.first) / (own.vector.values.length - 1),
    );
  };
  if (xs === null && ys === null) return [];
  const x = stepOf('x') ?? stepOf('y');
  const y = stepOf('y') ?? x;
  if (x === null || y === null || !(x > 0) || !(y > 0)) return [];
  return (['nm', 'um'] as const).map((unit) => ({
    label: `${shown(x)} × ${shown(y)} ${unit === 'um' ? 'µm' : unit}`,
    evidence: 'positions of the file without a unit',
    choice: { pixel: { x, y, unit } },
  }));
}

function pixelLabel(x: PositionAxis, y: PositionAxis, nx: number, ny: number): string {
  const one = (axis: PositionAxis): string =>
    axis.isLength ? formatLength(axis.pitch) : `${shown(axis.pitch)} ${axis.unit}`.trim();
  if (nx * ny === 1) return '–';
  if (ny === 1) return x.label === 'x' ? one(x) : `${one(x)} along x (${spaced(x.label)})`;
  if (nx === 1) return y.label === 'y' ? one(y) : `${one(y)} along y (${spaced(y.label)})`;
  return x.unit === 'px' && y.unit === 'px' ? 'unknown' : `${one(x)} × ${one(y)}`;
}

/** The block has one unit for both directions; where the file has two, it is left to say so itself. */
function choiceOf(x: PositionAxis, y: PositionAxis, nx: number, ny: number): ScanChoices['pixel'] {
  if (nx * ny === 1) return undefined;
  const [a, b] = ny === 1 ? [x, x] : nx === 1 ? [y, y] : [x, y];
  if (!a.isLength || !b.isLength) return undefined;
  return { x: a.pitch, y: b.pitch, unit: 'nm' };
}
