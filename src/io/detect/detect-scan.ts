/**
 * From a file's arrays to a scan: which array is the cube, how its axes lie, what its spectral axis
 * means. Each thing found is a guess with its evidence and alternatives; what the recipe states wins.
 */
import { RimlightError } from '../../errors';
import type { RecordedAxis } from '../../science/axis';
import type { ArrayEntry, Container, ReadOptions } from '../container';
import type { ScanChoices } from '../scan-choices';
import type { Companion, CubePlan, GuessField, Inspection, ScanPlan } from '../scan-plan';
import { attempt, type Evidence, type Findings, note } from './findings';
import { findLayout } from './layout';
import { findNoise, quantityOf } from './noise';
import type { FoundOrder } from './order';
import { resolvedChoices } from './resolve';
import { assignRoles } from './roles';
import { sampleValuesOf } from './sample';
import { readSayings } from './sayings';
import { findSetting } from './setting';
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
  const { container, choices, fileName } = evidence;
  const layout = findLayout(evidence, findings);
  if (layout === null) return null;
  const { cube, order, ny, nx } = layout;
  const { entry } = cube;
  const spectral = findSpectral(evidence, findings, layout);
  const setting = findSetting(evidence, findings, layout, spectral?.from?.vector ?? null);
  const sample = await sampleValuesOf(container, entry, options);
  if (sample.finite === 0) {
    findings.problems.push(noData(entry, fileName, sample.looked, sample.isAll));
    return null;
  }
  const quantity = quantityOf(entry);
  const noise = attempt(findings, () => findNoise(choices.detector, sample, quantity));
  if (noise !== null) note(findings, noise.guess);
  if (spectral === null || setting === null || noise === null) return null;
  const { recorded, laserEv } = spectral;
  const { pixel, height, isSerpentine, exposureS } = setting;
  return {
    meta: {
      name: fileName,
      shape: { ny, nx, nk: recorded.channels.length },
      axis: recorded.energy,
      x: pixel.x,
      y: pixel.y,
      laserEv,
      exposureS,
      noise: noise.noise,
      quantity,
    },
    cube: cubePlan(entry, order, recorded, isSerpentine),
    height: height.plan,
    resolved: resolvedChoices(choices, { cube, order, spectral, setting }),
  };
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
