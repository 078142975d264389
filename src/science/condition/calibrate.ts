/** Correction of the axis by lines whose true place is known: a polynomial from measured to true. */
import { airNmFromVacuum, vacuumNmFromAir } from '../air';
import { channelEdges, type Medium } from '../axis';
import { PolynomialBasis } from '../numeric/orthogonal-polynomials';
import type { EnergyAxis } from '../scan';
import { evFromNm, evFromShiftCm1, nmFromEv, shiftCm1FromEv } from '../units';
import type { ConditionedSlab } from './conditioned';
import { type StepPlace, stepError } from './step-errors';

/** What the points are given in: wavelengths of a medium, or shifts from a laser. */
export type CalibrationScale =
  | { readonly unit: 'nm'; readonly medium: Medium }
  | { readonly unit: 'cm-1'; readonly laserEv: number | null };

export interface Calibration {
  /** in the scale's unit */
  readonly trueOf: (measured: number) => number;
  /** true less fitted, one for each point, in the scale's unit */
  readonly residuals: Float64Array;
  /** the same where the point itself is left out of the fit; NaN where the rest do not fix it */
  readonly leaveOneOut: Float64Array;
  /** root mean squares of the two; the second NaN where one is */
  readonly rms: number;
  readonly leaveOneOutRms: number;
}

/**
 * Least-squares polynomial through pairs [measured, true].
 *
 * Fitted is what is to be added to the measured value, so that no digits are lost to the value itself.
 * Left-out residuals by the leverages, r/(1 − h), which is exact.
 *
 * @throws RimlightError 'recipe' - for too few points, points that are no numbers, or repeated ones
 * @see D. M. Allen, Technometrics 16, 125 (1974) for the left-out residuals
 */
export function fitCalibration(
  points: readonly (readonly [number, number])[],
  degree: number,
  place: StepPlace,
): Calibration {
  assertPoints(points, degree, place);
  const measured = points.map(([value]) => value);
  const shifts = points.map(([value, truth]) => truth - value);
  const fit = new PolynomialBasis(measured, degree).fit(shifts);
  const leaveOneOut = fit.residuals.map((residual, i) => {
    const rest = 1 - fit.leverages[i];
    return rest > 1e-9 ? residual / rest : Number.NaN;
  });
  return {
    trueOf: (value) => value + fit.at(value),
    residuals: fit.residuals,
    leaveOneOut,
    rms: rootMeanSquare(fit.residuals),
    leaveOneOutRms: rootMeanSquare(leaveOneOut),
  };
}

/**
 * The axis after a calibration. Channels stay what they were, only their energies move.
 *
 * @throws RimlightError 'recipe' - without the laser that shifts need, and when channels change places
 */
export function calibratedAxis(
  axis: EnergyAxis,
  { trueOf }: Calibration,
  scale: CalibrationScale,
  place: StepPlace,
): EnergyAxis {
  const centresEv = axis.centresEv.map((energyEv) =>
    onEnergy(trueOf(offEnergy(energyEv, scale, place)), scale, place),
  );
  const turn = centresEv.findIndex((value, k) => !(value > (k === 0 ? 0 : centresEv[k - 1])));
  if (turn >= 0) {
    throw stepError(
      place,
      `the calibration puts channel ${turn} at ${centresEv[turn].toPrecision(6)} eV, out of order`,
      'Lower the degree, or check the points: measured value first, true value second.',
    );
  }
  return { centresEv, edgesEv: channelEdges(centresEv) };
}

/** The same counts on another axis. */
export function onAxis(slab: ConditionedSlab, axis: EnergyAxis): ConditionedSlab {
  return { ...slab, axis };
}

/** A photon energy on the scale of a calibration. */
export function offEnergy(energyEv: number, scale: CalibrationScale, place: StepPlace): number {
  if (scale.unit === 'cm-1') return shiftCm1FromEv(energyEv, knownLaser(scale.laserEv, place));
  const nm = nmFromEv(energyEv);
  return scale.medium === 'air' ? airNmFromVacuum(nm) : nm;
}

function onEnergy(value: number, scale: CalibrationScale, place: StepPlace): number {
  if (scale.unit === 'cm-1') return evFromShiftCm1(value, knownLaser(scale.laserEv, place));
  return evFromNm(scale.medium === 'air' ? vacuumNmFromAir(value) : value);
}

function knownLaser(laserEv: number | null, place: StepPlace): number {
  if (laserEv !== null) return laserEv;
  throw stepError(
    place,
    'points in cm⁻¹ are shifts from the laser, which is not known',
    'Give scan.laser, or the points in nm.',
  );
}

function assertPoints(
  points: readonly (readonly [number, number])[],
  degree: number,
  place: StepPlace,
): void {
  if (points.length <= degree || points.length === 0) {
    throw stepError(
      place,
      `a polynomial of degree ${degree} needs ${degree + 1} points, and there are ${points.length}`,
      'Add points, or lower the degree.',
    );
  }
  const bad = points.findIndex((pair) => !pair.every((value) => Number.isFinite(value)));
  if (bad >= 0) {
    throw stepError(
      place,
      `point ${bad + 1} is [${points[bad].join(', ')}]`,
      'Give two numbers: measured and true.',
    );
  }
  const measured = points.map(([value]) => value);
  const twice = measured.find((value, i) => measured.indexOf(value) !== i);
  if (twice !== undefined) {
    throw stepError(
      place,
      `the measured value ${twice} has two true ones`,
      'Keep one of the two points.',
    );
  }
}

function rootMeanSquare(values: Float64Array): number {
  let sum = 0;
  for (const value of values) sum += value * value;
  return Math.sqrt(sum / values.length);
}
