/**
 * From a spectral axis as recorded to channels in ascending photon energy: units converted, channels
 * without an axis value dropped, edges set between the centres in energy.
 */
import { RimlightError } from '../errors';
import { shortestAirNm, vacuumNmFromAir } from './air';
import type { EnergyAxis } from './scan';
import { cm1FromEv, evFromCm1, evFromNm, evFromShiftCm1 } from './units';

export type AxisKind = 'wavelength' | 'energy' | 'shift';
export type Medium = 'air' | 'vacuum';

/** Units an axis may be given in, by kind; the first is the usual one. */
export const axisUnits = {
  wavelength: ['nm', 'um', 'angstrom'],
  energy: ['eV', 'meV', 'cm-1'],
  shift: ['cm-1'],
} as const;

export type AxisUnit = (typeof axisUnits)[AxisKind][number];

/** Unions over `kind`, so that a wavelength cannot be in eV nor a shift without its laser. */
export type AxisScale =
  | {
      readonly kind: 'wavelength';
      readonly unit: (typeof axisUnits.wavelength)[number];
      readonly medium: Medium;
    }
  | { readonly kind: 'energy'; readonly unit: (typeof axisUnits.energy)[number] }
  | { readonly kind: 'shift'; readonly unit: 'cm-1'; readonly laserEv: number };

export interface RecordedAxis {
  readonly energy: EnergyAxis;
  /** (nk) recorded channel of each channel in ascending energy */
  readonly channels: Int32Array;
  /** recorded channels without a finite axis value, left out */
  readonly droppedChannels: number;
  /** whether the recorded values run toward lower photon energy, as wavelengths and shifts mostly do */
  readonly isReversed: boolean;
}

const nmPerUnit = { nm: 1, um: 1000, angstrom: 0.1 } as const;

/**
 * Photon energy, eV, of one value on a scale; NaN stays NaN. Values are not checked: a negative
 * wavelength gives a negative energy.
 */
export function energyOnScale(value: number, scale: AxisScale): number {
  switch (scale.kind) {
    case 'wavelength': {
      const nm = value * nmPerUnit[scale.unit];
      return evFromNm(scale.medium === 'air' ? vacuumNmFromAir(nm) : nm);
    }
    case 'energy':
      if (scale.unit === 'cm-1') return evFromCm1(value);
      return scale.unit === 'meV' ? value / 1000 : value;
    case 'shift':
      return evFromShiftCm1(value, scale.laserEv);
  }
}

/**
 * The energy axis of recorded axis values, and the order of channels that goes with it.
 *
 * Values that are not finite drop their channel. The rest must run strictly one way.
 *
 * @param values - recorded axis, in the scale's unit, ascending or descending, uniform or not
 * @param where - named in errors: file and dataset, or the recipe's field
 * @throws RimlightError 'scan' - when fewer than two channels have a value, when values repeat or
 * turn back, or when one has no positive photon energy
 */
export function recordAxis(
  values: ArrayLike<number>,
  scale: AxisScale,
  where: string,
): RecordedAxis {
  const kept: number[] = [];
  for (let k = 0; k < values.length; k++) if (Number.isFinite(values[k])) kept.push(k);
  if (kept.length < 2) throw tooShort(values.length, kept.length, where);
  assertOneWay(values, kept, where);
  const energies = new Float64Array(kept.length);
  for (let i = 0; i < kept.length; i++) {
    energies[i] = positiveEnergy(values, kept[i], scale, where);
  }
  const isReversed = energies[0] > energies[energies.length - 1];
  if (isReversed) {
    energies.reverse();
    kept.reverse();
  }
  assertDistinct(energies, where);
  return {
    energy: { centresEv: energies, edgesEv: channelEdges(energies) },
    channels: Int32Array.from(kept),
    droppedChannels: values.length - kept.length,
    isReversed,
  };
}

/**
 * Channel edges: midpoints between centres in energy, the outermost mirrored about their centre.
 *
 * @param centresEv - (nk ≥ 2), ascending, eV
 * @returns (nk + 1), ascending, eV
 */
export function channelEdges(centresEv: Float64Array): Float64Array {
  const nk = centresEv.length;
  const edges = new Float64Array(nk + 1);
  for (let k = 1; k < nk; k++) edges[k] = (centresEv[k - 1] + centresEv[k]) / 2;
  edges[0] = 2 * centresEv[0] - edges[1];
  edges[nk] = 2 * centresEv[nk - 1] - edges[nk - 1];
  return edges;
}

function assertOneWay(values: ArrayLike<number>, kept: readonly number[], where: string): void {
  const isAscending = values[kept[1]] > values[kept[0]];
  for (let i = 1; i < kept.length; i++) {
    const before = values[kept[i - 1]];
    const here = values[kept[i]];
    if (here === before) {
      throw new RimlightError('scan', {
        what: `the spectral axis has the value ${here} at two neighbouring channels, ${kept[i - 1]} and ${kept[i]}`,
        where,
        hint: 'Give an axis in which every channel has its own value, or name another dataset as scan.axis.',
      });
    }
    if (here > before !== isAscending) {
      const turn = isAscending ? 'ascends and then falls' : 'descends and then rises';
      throw new RimlightError('scan', {
        what: `the spectral axis ${turn}: ${before} at channel ${kept[i - 1]}, ${here} at channel ${kept[i]}`,
        where,
        hint: 'Give an axis that runs one way, or name another dataset as scan.axis.',
      });
    }
  }
}

function positiveEnergy(
  values: ArrayLike<number>,
  k: number,
  scale: AxisScale,
  where: string,
): number {
  const value = values[k];
  if (scale.kind === 'wavelength' && scale.medium === 'air') {
    const nm = value * nmPerUnit[scale.unit];
    if (nm > 0 && nm < shortestAirNm) {
      throw new RimlightError('scan', {
        what: `a wavelength of ${value} ${scale.unit} cannot be one in air, which is opaque below ${shortestAirNm} nm (channel ${k})`,
        where,
        hint: 'State scan.axis.medium as vacuum, or check the axis kind and unit.',
      });
    }
  }
  if (scale.kind !== 'shift' && value <= 0) {
    throw new RimlightError('scan', {
      what: `the spectral axis has ${value} ${scale.unit} at channel ${k}, and a ${scale.kind} must be positive`,
      where,
      hint: 'Check scan.axis: a Raman shift may be zero or negative, a wavelength or energy may not.',
    });
  }
  const energyEv = energyOnScale(value, scale);
  if (Number.isFinite(energyEv) && energyEv > 0) return energyEv;
  const limit = scale.kind === 'shift' ? Math.floor(cm1FromEv(scale.laserEv)) : 0;
  throw new RimlightError('scan', {
    what:
      scale.kind === 'shift'
        ? `a Raman shift of ${value} cm⁻¹ is more than the laser's photons have, ${limit} cm⁻¹ (channel ${k})`
        : `the axis value ${value} ${scale.unit} at channel ${k} has no photon energy`,
    where,
    hint: 'Check the axis kind and unit, and the laser.',
  });
}

/** Neighbours can fall together only when a conversion rounds them to one double. */
function assertDistinct(energies: Float64Array, where: string): void {
  for (let k = 1; k < energies.length; k++) {
    if (energies[k] > energies[k - 1]) continue;
    throw new RimlightError('scan', {
      what: `neighbouring channels of the spectral axis cannot be told apart in photon energy, near ${energies[k]} eV`,
      where,
      hint: 'Check the axis kind and unit.',
    });
  }
}

function tooShort(length: number, finite: number, where: string): RimlightError {
  const found =
    finite === length
      ? `has ${length === 1 ? 'one value' : `${length} values`}`
      : `has ${finite === 1 ? 'one finite value' : `${finite} finite values`} of ${length}`;
  return new RimlightError('scan', {
    what: `the spectral axis ${found}, and a spectrum needs at least two channels`,
    where,
    hint: 'Name the right dataset as scan.axis, or check which array is the cube.',
  });
}
