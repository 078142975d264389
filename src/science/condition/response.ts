/** Division by the response of detector and optics: a curve over wavelength or energy, smooth between its points. */
import { airNmFromVacuum } from '../air';
import type { Medium } from '../axis';
import { monotoneCubic } from '../numeric/monotone-cubic';
import type { EnergyAxis } from '../scan';
import { nmFromEv } from '../units';
import { type ConditionedSlab, zerosLike } from './conditioned';
import { type StepPlace, stepError } from './step-errors';

/** A curve as a file gives it. */
export interface ResponseCurve {
  readonly name: string;
  readonly unit: 'nm' | 'eV';
  /** of wavelengths */
  readonly medium: Medium;
  /** in any order */
  readonly axis: ArrayLike<number>;
  readonly response: ArrayLike<number>;
}

export interface ResponseOnAxis {
  /** (nk) response as a fraction; NaN outside of the curve and where it is not above 0 */
  readonly values: Float64Array;
  /** whether the curve was given in percent */
  readonly isPercent: boolean;
  readonly outsideChannels: number;
  /** channels inside the curve whose response is 0 or below */
  readonly blindChannels: number;
  /** channels below a tenth of the greatest response on the axis: mostly noise is seen there */
  readonly faintChannels: number;
}

/** Above this a fraction would be more than one and a half electrons for a photon: it is percent. */
const mostFraction = 1.5;
const faintShare = 0.1;

/**
 * The curve at each channel's centre, by monotone cubic interpolation in the curve's own unit.
 *
 * @throws RimlightError 'recipe' - for fewer than two points, repeated places, numbers that are none, a
 * curve without a positive value, or one that covers no channel
 */
export function responseOnAxis(
  curve: ResponseCurve,
  axis: EnergyAxis,
  place: StepPlace,
): ResponseOnAxis {
  const { x, y } = sortedCurve(curve, place);
  const most = Math.max(...y);
  if (!(most > 0)) {
    throw stepError(
      place,
      `the response in ${curve.name} is nowhere above 0`,
      'Give a curve of percent or fractions; its second column is read.',
    );
  }
  const isPercent = most > mostFraction;
  const at = monotoneCubic(x, y);
  const values = axis.centresEv.map((energyEv) => at(placeOn(curve, energyEv)));
  const outsideChannels = values.filter((value) => Number.isNaN(value)).length;
  if (outsideChannels === values.length) throw coversNothing(curve, x, axis, place);
  const blindChannels = values.filter((value) => value <= 0).length;
  if (outsideChannels + blindChannels === values.length) {
    throw stepError(
      place,
      `the response in ${curve.name} is nowhere above 0 on the scan's axis`,
      'Give the curve of the detector the scan was recorded with.',
    );
  }
  const kept = values.map((value) => (value > 0 ? (isPercent ? value / 100 : value) : Number.NaN));
  const greatest = Math.max(...kept.filter((value) => value > 0));
  return {
    values: kept,
    isPercent,
    outsideChannels,
    blindChannels,
    faintChannels: kept.filter((value) => value < faintShare * greatest).length,
  };
}

/** Counts divided by the response, variances by its square, the factor multiplied; no data where it is NaN. */
export function divideByResponse(slab: ConditionedSlab, response: Float64Array): ConditionedSlab {
  const { nk } = slab.shape;
  const length = slab.counts.length;
  const counts = zerosLike(slab.counts, length);
  const variances = slab.variances === null ? null : zerosLike(slab.counts, length);
  // Products take a quarter of the time of quotients, and are off by one rounding more.
  const times = response.map((value) => 1 / value);
  const squares = times.map((value) => value * value);
  for (let at = 0; at < length; at += nk) {
    for (let k = 0; k < nk; k++) counts[at + k] = slab.counts[at + k] * times[k];
    if (variances === null || slab.variances === null) continue;
    for (let k = 0; k < nk; k++) variances[at + k] = slab.variances[at + k] * squares[k];
  }
  const factor = slab.factor.map((value, k) => value * response[k]);
  return { ...slab, counts, variances, factor };
}

function placeOn({ unit, medium }: ResponseCurve, energyEv: number): number {
  if (unit === 'eV') return energyEv;
  const nm = nmFromEv(energyEv);
  return medium === 'air' ? airNmFromVacuum(nm) : nm;
}

function sortedCurve(
  { name, axis, response }: ResponseCurve,
  place: StepPlace,
): { readonly x: Float64Array; readonly y: Float64Array } {
  if (axis.length < 2 || axis.length !== response.length) {
    throw stepError(
      place,
      `${name} has ${axis.length} places and ${response.length} values, and a curve needs two of each at least`,
      'Give two columns: wavelength or energy, and response.',
    );
  }
  const order = Array.from({ length: axis.length }, (_, i) => i).sort((a, b) => axis[a] - axis[b]);
  const x = Float64Array.from(order, (i) => axis[i]);
  const y = Float64Array.from(order, (i) => response[i]);
  const bad = order.find((i) => !Number.isFinite(axis[i]) || !Number.isFinite(response[i]));
  if (bad !== undefined) {
    throw stepError(
      place,
      `${name} has ${axis[bad]} and ${response[bad]} as its point ${bad + 1}`,
      'Take out the points without numbers.',
    );
  }
  const twice = x.findIndex((value, i) => i > 0 && value === x[i - 1]);
  if (twice >= 0) {
    throw stepError(
      place,
      `${name} gives the response at ${x[twice]} more than once`,
      'Give each place once.',
    );
  }
  return { x, y };
}

function coversNothing(
  curve: ResponseCurve,
  x: Float64Array,
  { centresEv }: EnergyAxis,
  place: StepPlace,
): Error {
  const ends = [centresEv[0], centresEv[centresEv.length - 1]].map((end) => placeOn(curve, end));
  const low = Math.min(...ends).toPrecision(6);
  const high = Math.max(...ends).toPrecision(6);
  return stepError(
    place,
    `the curve in ${curve.name} runs from ${x[0]} to ${x[x.length - 1]} ${curve.unit}, and the scan from ${low} to ${high} ${curve.unit}`,
    'Give a curve that covers the scan, and check whether its first column is nm or eV.',
  );
}
