/**
 * From a file's arrays to a scan: which array is the cube, how its axes lie, what its spectral axis
 * means. Each thing found is a guess with its evidence and alternatives; what the recipe states wins.
 */
import { isRimlightError, RimlightError } from '../../errors';
import { type AxisScale, type RecordedAxis, recordAxis } from '../../science/axis';
import { laserEvFrom } from '../../science/laser';
import type { ScanMeta } from '../../science/scan';
import type { ArrayEntry, Container, ReadOptions } from '../container';
import type { AxisChoice, ScanChoices } from '../scan-choices';
import type { Companion, CubePlan, Guess, GuessField, Inspection, ScanPlan } from '../scan-plan';
import { findAgreement, type RoledVector } from './agreement';
import { type FoundAxis, findAxis, statedAxisLength } from './axis-source';
import { entryLabel, type FoundCube, findCube } from './cube';
import { findExposure, findSerpentine } from './exposure';
import { type FoundHeight, findHeight, heightEntries } from './height';
import { type FoundLaser, findLaser, laserGuess, missingLaser } from './laser';
import { mediumSaid } from './medium';
import { findNexusSignal } from './nexus';
import { findNoise, quantityOf } from './noise';
import { type FoundOrder, findOrder } from './order';
import { type FoundPixel, findPixel } from './pixel';
import { assignRoles } from './roles';
import { sampleValuesOf } from './sample';
import { readSayings, type Saying } from './sayings';
import { type FoundScale, findMedium, findScale } from './scale';
import { readVectors } from './vectors';

/** What the file offers, read once. */
interface Evidence {
  readonly container: Container;
  readonly companions: readonly Companion[];
  readonly choices: ScanChoices;
  readonly fileName: string;
  readonly vectors: readonly RoledVector[];
  readonly sayings: readonly Saying[];
}

/** Guesses, problems and warnings as they come up. */
interface Findings {
  readonly guesses: Map<GuessField, Guess>;
  readonly problems: RimlightError[];
  readonly warnings: string[];
}

const fieldOrder: readonly GuessField[] = [
  'data',
  'order',
  'axis',
  'kind',
  'unit',
  'medium',
  'laser',
  'pixel',
  'height',
  'serpentine',
  'exposure',
  'noise',
];

/**
 * Looks at a file: every guess with its evidence, and the plan by which its rows are read.
 *
 * What is needed and nowhere found (a spectral axis, the laser of a Raman shift) and what the recipe
 * states wrongly are problems, all of them listed; the plan is then null. Reads all vectors, and of
 * the cube at most 4 MB.
 *
 * @param companions - files given beside the scan; an axis or height map among them is used where it
 * fits, also when the recipe does not name it
 * @throws RimlightError 'scan' - when the file is damaged where it is looked at
 */
export async function detectScan(
  container: Container,
  companions: readonly Companion[],
  choices: ScanChoices,
  fileName: string,
  options: ReadOptions = {},
): Promise<Inspection> {
  const quiet: ReadOptions = options.signal === undefined ? {} : { signal: options.signal };
  const vectors = assignRoles(await readVectors(container, companions, quiet), container);
  const sayings = await readSayings(container, quiet);
  const evidence: Evidence = { container, companions, choices, fileName, vectors, sayings };
  const findings: Findings = { guesses: new Map(), problems: [], warnings: [...container.notes] };
  const plan = await findPlan(evidence, findings, quiet);
  return {
    fileName,
    format: container.format,
    guesses: fieldOrder.flatMap((field) => findings.guesses.get(field) ?? []),
    problems: findings.problems,
    warnings: findings.warnings,
    plan: findings.problems.length === 0 ? plan : null,
  };
}

async function findPlan(
  evidence: Evidence,
  findings: Findings,
  options: ReadOptions,
): Promise<ScanPlan | null> {
  const { container, choices, fileName, vectors, sayings } = evidence;
  const nexus = findNexusSignal(container);
  const cube = attempt(findings, () =>
    findCube({ container, fileName, stated: choices.data, nexus, vectors }),
  );
  if (cube === null) return null;
  const { entry } = cube;
  note(findings, {
    field: 'data',
    label: entryLabel(entry),
    source: cube.source,
    evidence: cube.evidence,
    alternatives: cube.alternatives,
  });
  const axisNames = nexus?.entry === entry ? nexus.axes : dimensionLabels(entry);
  const order = attempt(findings, () =>
    findOrder({
      entry,
      format: container.format,
      stated: choices.order,
      axisNames,
      vectors: vectors.filter(({ vector }) => vector.entry !== entry),
      statedLength: statedAxisLength(choices.axis ?? {}, vectors),
      heightShapes: heightEntries(container).map(({ shape }) => shape),
    }),
  );
  if (order === null) return null;
  noteOrder(findings, order, entry);

  const spectral = findSpectral(evidence, findings, entry, order, axisNames);
  const shape = spaceOf(entry, order);
  const nameOfAxis = (letter: string): string | null =>
    axisNames?.[order.order.indexOf(letter)] ?? null;
  const pixel = attempt(findings, () =>
    findPixel({
      ...shape,
      stated: choices.pixel,
      vectors: vectors.filter(({ vector }) => vector.entry !== spectral?.from?.vector.entry),
      xName: nameOfAxis('x'),
      yName: nameOfAxis('y'),
      sayings,
      cubePath: entry.path,
    }),
  );
  if (pixel !== null) {
    note(findings, pixel.guess);
    findings.warnings.push(...pixel.warnings);
  }
  const height = attempt(findings, () =>
    findHeight({
      ...shape,
      container,
      companions: evidence.companions,
      fileName,
      stated: choices.height,
      cubePath: entry.path,
      isColumnsFirst: /x.*y/.test(order.order),
    }),
  );
  if (height !== null) {
    note(findings, height.guess);
    findings.warnings.push(...height.warnings);
  }
  const serpentine = findSerpentine(choices.serpentine, sayings, shape.ny);
  note(findings, serpentine.guess);
  const exposure = attempt(findings, () => findExposure(choices.exposure_s, sayings));
  if (exposure !== null) note(findings, exposure.guess);
  const sample = await sampleValuesOf(container, entry, options);
  if (sample.finite === 0) {
    findings.problems.push(noData(entry, fileName, sample.looked, sample.isAll));
    return null;
  }
  const quantity = quantityOf(entry);
  const noise = attempt(findings, () => findNoise(choices.detector, sample, quantity));
  if (noise !== null) note(findings, noise.guess);

  if (spectral === null || pixel === null || height === null || exposure === null || noise === null)
    return null;
  const meta: ScanMeta = {
    name: fileName,
    shape: { ...shape, nk: spectral.recorded.channels.length },
    axis: spectral.recorded.energy,
    x: pixel.x,
    y: pixel.y,
    laserEv: spectral.laserEv,
    exposureS: exposure.exposureS,
    noise: noise.noise,
    quantity,
  };
  return {
    meta,
    cube: cubePlan(entry, order, spectral.recorded, serpentine.isSerpentine),
    height: height.plan,
    resolved: resolvedChoices(evidence, {
      cube,
      order,
      spectral,
      pixel,
      height,
      isSerpentine: serpentine.isSerpentine,
      exposureS: exposure.exposureS,
    }),
  };
}

interface Spectral {
  readonly recorded: RecordedAxis;
  readonly laserEv: number | null;
  readonly from: RoledVector | null;
  readonly axisChoice: AxisChoice;
  readonly laser: FoundLaser | null;
}

/** Axis, kind, unit, medium and laser, which lean on one another. */
function findSpectral(
  evidence: Evidence,
  findings: Findings,
  entry: ArrayEntry,
  order: FoundOrder,
  axisNames: readonly string[] | null,
): Spectral | null {
  const { container, companions, choices, fileName, sayings } = evidence;
  const kAxis = order.order.indexOf('k');
  const fileChannels = entry.shape[kAxis];
  const vectors = evidence.vectors.filter(({ vector }) => vector.entry !== entry);
  const stated = choices.axis ?? {};
  const agreement = findAgreement(
    vectors.filter(({ vector }) => vector.file === null && vector.values.length === fileChannels),
  );
  const laserIn = (isNeeded: boolean): FoundLaser | null =>
    findLaser({ stated: choices.laser, sayings, agreement, fileName, isNeeded });
  const statedLaser = attempt(findings, () => ({ laser: laserIn(false) }));
  const axis = attempt(findings, () =>
    findAxis({
      container,
      companions,
      fileName,
      fileChannels,
      vectors,
      stated,
      axisName: axisNames?.[kAxis] ?? null,
      agreement,
      isLaserStated: statedLaser?.laser != null,
    }),
  );
  if (axis === null) {
    note(findings, missingGuess('axis', findings.problems.at(-1)?.what ?? ''));
    if (statedLaser !== null) note(findings, laserGuess(statedLaser.laser, false));
    return null;
  }
  noteAxis(findings, axis);
  const answer = attempt(findings, () =>
    findScale({ axis, stated, agreement, quantity: quantityOf(entry) }),
  );
  if (answer === null) return null;
  if (answer.found === null) {
    findings.problems.push(answer.problem);
    note(findings, answer.kindGuess);
    return null;
  }
  const scale = answer.found;
  note(findings, scale.kindGuess);
  note(findings, scale.unitGuess);
  const isNeeded = scale.kind === 'shift';
  const laser = statedLaser === null ? null : laserIn(isNeeded);
  if (statedLaser !== null) note(findings, laserGuess(laser, isNeeded));
  const { medium, guess } = findMedium(
    scale.kind,
    stated.medium,
    agreement,
    mediumSaid(axis.from?.vector.entry ?? null, sayings),
    laser?.line.unit === 'nm',
  );
  note(findings, guess);
  if (statedLaser === null) return null;
  if (isNeeded && laser === null) {
    findings.problems.push(missingLaser(axis.where));
    return null;
  }
  const laserEv = laser === null ? null : laserEvFrom(laser.line, medium);
  const recorded = attempt(findings, () =>
    recordAxis(axis.values, axisScale(scale, medium, laserEv), axis.where),
  );
  if (recorded === null) return null;
  if (recorded.droppedChannels > 0) {
    findings.warnings.push(
      `${recorded.droppedChannels} of ${fileChannels} channels have no axis value and are left out.`,
    );
  }
  const usesMedium = guess.source !== 'absent' || stated.medium !== undefined;
  const axisChoice: AxisChoice = {
    ...axis.place,
    kind: scale.kind,
    unit: scale.unit,
    ...(usesMedium ? { medium } : {}),
  };
  return { recorded, laserEv, from: axis.from, axisChoice, laser };
}

function axisScale(scale: FoundScale, medium: 'air' | 'vacuum', laserEv: number | null): AxisScale {
  const { kind, unit } = scale;
  if (kind === 'shift' && laserEv !== null) return { kind, unit: 'cm-1', laserEv };
  if (kind === 'energy' && (unit === 'eV' || unit === 'meV' || unit === 'cm-1'))
    return { kind, unit };
  if (kind === 'wavelength' && (unit === 'nm' || unit === 'um' || unit === 'angstrom')) {
    return { kind, unit, medium };
  }
  throw new RimlightError('fault', {
    what: `no scale of ${kind} in ${unit}`,
    where: '',
    hint: 'Please report this.',
  });
}

/** Runs one step; a problem the user can mend is listed, anything else is thrown on. */
function attempt<T>(findings: Findings, step: () => T): T | null {
  try {
    return step();
  } catch (error) {
    if (!isRimlightError(error) || error.kind === 'fault' || error.kind === 'cancelled')
      throw error;
    findings.problems.push(error);
    return null;
  }
}

function note(findings: Findings, guess: Guess): void {
  findings.guesses.set(guess.field, guess);
}

function missingGuess(field: GuessField, evidence: string): Guess {
  return { field, label: 'unknown', source: 'missing', evidence, alternatives: [] };
}

function noteOrder(findings: Findings, found: FoundOrder, entry: ArrayEntry): void {
  const { order, source, evidence, alternatives, warning } = found;
  const words = { y: 'rows', x: 'columns', k: 'channels' } as const;
  const label = [...order]
    .map((letter, axis) => `${entry.shape[axis]} ${words[letter as 'y' | 'x' | 'k']}`)
    .join(' × ');
  note(findings, { field: 'order', label: `${order} · ${label}`, source, evidence, alternatives });
  if (warning !== null) findings.warnings.push(warning);
}

function noteAxis(findings: Findings, axis: FoundAxis): void {
  const { label, source, evidence, alternatives, values } = axis;
  const finite = values.filter(Number.isFinite);
  const range =
    finite.length === 0 ? 'no values' : `${brief(finite[0])} – ${brief(finite[finite.length - 1])}`;
  const count =
    finite.length === values.length
      ? `${values.length} values`
      : `${finite.length} of ${values.length} values`;
  note(findings, {
    field: 'axis',
    label: `${label} · ${range}, ${count}`,
    source,
    evidence,
    alternatives,
  });
}

function brief(value: number): string {
  return String(Number(value.toPrecision(7)));
}

/** HDF5 dimension labels, where the file has them. */
function dimensionLabels(entry: ArrayEntry): readonly string[] | null {
  const labels = entry.attributes.DIMENSION_LABELS ?? entry.attributes.dimension_labels;
  if (labels === undefined || typeof labels === 'string' || typeof labels === 'number') return null;
  return labels.length === entry.shape.length ? labels.map(String) : null;
}

function spaceOf(entry: ArrayEntry, { order }: FoundOrder): { ny: number; nx: number } {
  const length = (letter: string): number => {
    const axis = order.indexOf(letter);
    return axis < 0 ? 1 : entry.shape[axis];
  };
  return { ny: length('y'), nx: length('x') };
}

function cubePlan(
  entry: ArrayEntry,
  { order }: FoundOrder,
  recorded: RecordedAxis,
  isSerpentine: boolean,
): CubePlan {
  return {
    path: entry.path,
    fileShape: entry.shape,
    yAxis: order.indexOf('y'),
    xAxis: order.indexOf('x'),
    kAxis: order.indexOf('k'),
    channels: recorded.channels,
    serpentine: isSerpentine,
  };
}

interface Settled {
  readonly cube: FoundCube;
  readonly order: FoundOrder;
  readonly spectral: Spectral;
  readonly pixel: FoundPixel;
  readonly height: FoundHeight;
  readonly isSerpentine: boolean;
  readonly exposureS: number | null;
}

/** Everything settled, as a scan block. What has no field there (a gate voltage along x) the file says itself. */
function resolvedChoices({ choices }: Evidence, settled: Settled): ScanChoices {
  const { cube, order, spectral, pixel, height, isSerpentine, exposureS } = settled;
  return {
    ...(cube.entry.path === '' ? {} : { data: cube.entry.path }),
    order: order.order,
    axis: spectral.axisChoice,
    ...(pixel.choice === undefined ? {} : { pixel: pixel.choice }),
    ...(spectral.laser === null ? {} : { laser: spectral.laser.line }),
    serpentine: isSerpentine,
    ...(exposureS === null ? {} : { exposure_s: exposureS }),
    ...(choices.detector === undefined ? {} : { detector: choices.detector }),
    ...(height.choice === undefined ? {} : { height: height.choice }),
  };
}

function noData(
  entry: ArrayEntry,
  fileName: string,
  looked: number,
  isAll: boolean,
): RimlightError {
  return new RimlightError('scan', {
    what: isAll
      ? 'the scan holds no data: every value is missing (NaN)'
      : `the scan seems to hold no data: all of the ${looked} values looked at are missing (NaN)`,
    where: entry.path === '' ? fileName : `${fileName} · ${entry.path}`,
    hint: 'Check that the right array is the cube (scan.data) and that the scan was saved whole.',
  });
}
