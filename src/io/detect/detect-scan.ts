/**
 * From a file's arrays to a scan: which array is the cube, how its axes lie, what its spectral axis
 * means. Each thing found is a guess with its evidence and alternatives; what the recipe states wins.
 */
import { RimlightError } from '../../errors';
import type { RecordedAxis } from '../../science/axis';
import type { ScanMeta } from '../../science/scan';
import type { ArrayEntry, Container, ReadOptions } from '../container';
import type { ScanChoices } from '../scan-choices';
import type { Companion, CubePlan, GuessField, Inspection, ScanPlan } from '../scan-plan';
import { statedAxisLength } from './axis-source';
import { entryLabel, findCube } from './cube';
import { findExposure, findSerpentine } from './exposure';
import { attempt, type Evidence, type Findings, note } from './findings';
import { findHeight, heightEntries } from './height';
import { findNexusSignal } from './nexus';
import { findNoise, quantityOf } from './noise';
import { type FoundOrder, findOrder } from './order';
import { findPixel } from './pixel';
import { resolvedChoices } from './resolve';
import { assignRoles } from './roles';
import { sampleValuesOf } from './sample';
import { readSayings } from './sayings';
import { findSpectral } from './spectral';
import { readVectors } from './vectors';

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
    // Readers that lay scattered points side by side have said so already.
    const isSaid = container.notes.some((one) => one.includes('scattered'));
    findings.warnings.push(...(isSaid ? [] : pixel.warnings));
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
    resolved: resolvedChoices(choices, {
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

function noteOrder(findings: Findings, found: FoundOrder, entry: ArrayEntry): void {
  const { order, source, evidence, alternatives, warning } = found;
  const words = { y: 'row', x: 'column', k: 'channel' } as const;
  const label = [...order]
    .map(
      (letter, axis) =>
        `${entry.shape[axis]} ${words[letter as 'y' | 'x' | 'k']}${entry.shape[axis] === 1 ? '' : 's'}`,
    )
    .join(' × ');
  note(findings, { field: 'order', label: `${order} · ${label}`, source, evidence, alternatives });
  if (warning !== null) findings.warnings.push(warning);
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
