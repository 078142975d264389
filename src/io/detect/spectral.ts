/** Axis, kind, unit, medium and laser, which lean on one another. */
import { RimlightError } from '../../errors';
import { type AxisScale, type RecordedAxis, recordAxis } from '../../science/axis';
import { laserEvFrom } from '../../science/laser';
import type { ArrayEntry } from '../container';
import type { AxisChoice } from '../scan-choices';
import { findAgreement, type RoledVector } from './agreement';
import type { FoundAxis } from './axis-search';
import { findAxis } from './axis-source';
import { attempt, type Evidence, type Findings, missingGuess, note } from './findings';
import { type FoundLaser, findLaser, laserGuess, missingLaser } from './laser';
import { findMedium, mediumSaid } from './medium';
import { quantityOf } from './noise';
import type { FoundOrder } from './order';
import { type FoundScale, findScale } from './scale';

export interface Spectral {
  readonly recorded: RecordedAxis;
  readonly laserEv: number | null;
  readonly from: RoledVector | null;
  readonly axisChoice: AxisChoice;
  readonly laser: FoundLaser | null;
}

/** The axis in photon energy and the laser; null, with the reason among the problems, when either cannot be had. */
export function findSpectral(
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
