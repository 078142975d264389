/** Axis, kind, unit, medium and laser, which lean on one another. */
import { RimlightError } from '../../errors';
import { type AxisScale, type Medium, type RecordedAxis, recordAxis } from '../../science/axis';
import { laserEvFrom } from '../../science/laser';
import type { ArrayEntry } from '../container';
import type { AxisChoice } from '../scan-choices';
import { type Agreement, findAgreement, type RoledVector } from './agreement';
import type { FoundAxis } from './axis-search';
import { findAxis } from './axis-source';
import { attempt, type Evidence, type Findings, missingGuess, note } from './findings';
import { type FoundLaser, findLaser, laserGuess, missingLaser } from './laser';
import type { Layout } from './layout';
import { findMedium, mediumSaid } from './medium';
import { quantityOf } from './noise';

import { type FoundScale, findScale } from './scale';

export interface Spectral {
  readonly recorded: RecordedAxis;
  readonly laserEv: number | null;
  readonly from: RoledVector | null;
  readonly axisChoice: AxisChoice;
  readonly laser: FoundLaser | null;
}

/** What the steps below share. */
interface Looking {
  readonly evidence: Evidence;
  readonly findings: Findings;
  readonly stated: AxisChoice;
  readonly fileChannels: number;
  readonly agreement: Agreement;
  /** null after a laser was stated that cannot be */
  readonly laserIn: ((isNeeded: boolean) => FoundLaser | null) | null;
}

/** The axis in photon energy and the laser; null, with the reason among the problems, when either cannot be had. */
export function findSpectral(
  evidence: Evidence,
  findings: Findings,
  layout: Layout,
): Spectral | null {
  const looking = lookingAt(evidence, findings, layout);
  const { laserIn } = looking;
  const axis = axisOf(looking, layout);
  const scale = axis === null ? null : scaleOf(looking, axis, layout.cube.entry);
  if (axis === null || scale === null) {
    if (laserIn !== null) note(findings, laserGuess(laserIn(false), false));
    return null;
  }
  const isNeeded = scale.kind === 'shift';
  const laser = laserIn === null ? null : laserIn(isNeeded);
  if (laserIn !== null) note(findings, laserGuess(laser, isNeeded));
  const { medium, isUsed } = mediumOf(looking, axis, scale, laser);
  if (laserIn === null) return null;
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
      `${recorded.droppedChannels} of ${looking.fileChannels} channels have no axis value and are left out.`,
    );
  }
  const { kind, unit } = scale;
  const axisChoice = { ...axis.place, kind, unit, ...(isUsed ? { medium } : {}) };
  return { recorded, laserEv, from: axis.from, axisChoice, laser };
}

function lookingAt(evidence: Evidence, findings: Findings, layout: Layout): Looking {
  const { choices, sayings, fileName, vectors } = evidence;
  const { entry } = layout.cube;
  const fileChannels = entry.shape[layout.order.order.indexOf('k')];
  const agreement = findAgreement(
    vectors.filter(
      ({ vector }) =>
        vector.entry !== entry && vector.file === null && vector.values.length === fileChannels,
    ),
  );
  const laserIn = (isNeeded: boolean): FoundLaser | null =>
    findLaser({ stated: choices.laser, sayings, agreement, fileName, isNeeded });
  const isUsable = attempt(findings, () => ({ laser: laserIn(false) })) !== null;
  return {
    evidence,
    findings,
    stated: choices.axis ?? {},
    fileChannels,
    agreement,
    laserIn: isUsable ? laserIn : null,
  };
}

function axisOf(looking: Looking, { cube, nameOf }: Layout): FoundAxis | null {
  const { evidence, findings, stated, fileChannels, agreement, laserIn } = looking;
  const { container, companions, fileName, vectors } = evidence;
  const axis = attempt(findings, () =>
    findAxis({
      container,
      companions,
      fileName,
      fileChannels,
      vectors: vectors.filter(({ vector }) => vector.entry !== cube.entry),
      stated,
      axisName: nameOf('k'),
      agreement,
      isLaserStated: laserIn !== null && laserIn(false) !== null,
    }),
  );
  if (axis === null) note(findings, missingGuess('axis', findings.problems.at(-1)?.what ?? ''));
  else noteAxis(findings, axis);
  return axis;
}

function scaleOf(looking: Looking, axis: FoundAxis, entry: ArrayEntry): FoundScale | null {
  const { findings, stated, agreement } = looking;
  const answer = attempt(findings, () =>
    findScale({ axis, stated, agreement, quantity: quantityOf(entry) }),
  );
  if (answer === null) return null;
  if (answer.found === null) {
    findings.problems.push(answer.problem);
    note(findings, answer.kindGuess);
    return null;
  }
  note(findings, answer.found.kindGuess);
  note(findings, answer.found.unitGuess);
  return answer.found;
}

function mediumOf(
  { evidence, findings, stated, agreement }: Looking,
  axis: FoundAxis,
  scale: FoundScale,
  laser: FoundLaser | null,
): { readonly medium: Medium; readonly isUsed: boolean } {
  const { medium, guess } = findMedium(
    scale.kind,
    stated.medium,
    agreement,
    mediumSaid(axis.from?.vector.entry ?? null, evidence.sayings),
    laser?.line.unit === 'nm',
  );
  note(findings, guess);
  return { medium, isUsed: guess.source !== 'absent' };
}

function axisScale(scale: FoundScale, medium: Medium, laserEv: number | null): AxisScale {
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
