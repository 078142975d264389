/** A band of the recipe as an interval of photon energy, and energies back in the band's own unit. */
import { RimlightError } from '../errors';
import { airNmFromVacuum, shortestAirNm, vacuumNmFromAir } from '../science/air';
import type { Medium } from '../science/axis';
import type { EnergyBand } from '../science/bands/band';
import { evFromNm, evFromShiftCm1, nmFromEv, shiftCm1FromEv } from '../science/units';
import { floorOf } from './defaults';
import type { Recipe, RecipeBand } from './schema';
import type { EnergyUnit } from './schema-parts';

/**
 * The band's interval in eV, its ends in ascending order.
 *
 * @param laserEv - photon energy of the laser, eV; null when unknown
 * @param medium - medium of the scan's wavelengths, in which ends in nm are read
 * @param where - named in errors; `bandEnergies` names "bands[1]"
 * @throws RimlightError 'recipe' - when a band in cm-1 has no laser, or an end no photon energy
 */
export function bandToEnergy(
  band: RecipeBand,
  laserEv: number | null,
  medium: Medium,
  where = `band "${band.name}"`,
): EnergyBand {
  const one = energyOf(band.from, { unit: band.unit, laserEv, medium, where });
  const other = energyOf(band.to, { unit: band.unit, laserEv, medium, where });
  if (one === other) {
    throw new RimlightError('recipe', {
      what: `the ends ${band.from} and ${band.to} ${band.unit} fall together in energy`,
      where,
      hint: 'Give the band two different ends.',
    });
  }
  return { fromEv: Math.min(one, other), toEv: Math.max(one, other), floor: floorOf(band) };
}

/** Every band of the recipe in eV, in the recipe's order. @throws as `bandToEnergy` */
export function bandEnergies(
  recipe: Recipe,
  laserEv: number | null,
  medium: Medium,
): readonly EnergyBand[] {
  return (recipe.bands ?? []).map((band, index) =>
    bandToEnergy(band, laserEv, medium, `bands[${index}], "${band.name}"`),
  );
}

interface Conversion {
  readonly unit: EnergyUnit;
  readonly laserEv: number | null;
  readonly medium: Medium;
  readonly where: string;
}

function energyOf(value: number, { unit, laserEv, medium, where }: Conversion): number {
  switch (unit) {
    case 'eV':
      return value;
    case 'meV':
      return value / 1000;
    case 'nm':
      return medium === 'air' ? evFromAir(value, where) : evFromNm(value);
    case 'cm-1':
      return shiftedEnergy(value, laserEv, where);
  }
}

function evFromAir(airNm: number, where: string): number {
  if (airNm >= shortestAirNm) return evFromNm(vacuumNmFromAir(airNm));
  throw new RimlightError('recipe', {
    what: `a wavelength of ${airNm} nm cannot be one in air, which is opaque below ${shortestAirNm} nm`,
    where,
    hint: 'State scan.axis.medium as "vacuum", or give the band in eV.',
  });
}

function shiftedEnergy(shiftCm1: number, laserEv: number | null, where: string): number {
  if (laserEv === null) throw noLaser(where);
  const energyEv = evFromShiftCm1(shiftCm1, laserEv);
  if (energyEv > 0) return energyEv;
  throw new RimlightError('recipe', {
    what: `a Raman shift of ${shiftCm1} cm-1 is more than the laser's photons have`,
    where,
    hint: 'Check the band and scan.laser.',
  });
}

function noLaser(where: string): RimlightError {
  return new RimlightError('recipe', {
    what: 'Raman shifts in cm-1 need the laser, which is not known',
    where,
    hint: 'State scan.laser, or give the band in eV.',
  });
}

/**
 * A photon energy in the unit a band is written in: the inverse of `bandToEnergy` for one end.
 *
 * @throws RimlightError 'recipe' - when the unit is cm-1 and there is no laser
 */
export function energyToBandUnit(
  energyEv: number,
  unit: EnergyUnit,
  laserEv: number | null,
  medium: Medium,
): number {
  switch (unit) {
    case 'eV':
      return energyEv;
    case 'meV':
      return energyEv * 1000;
    case 'nm': {
      const vacuumNm = nmFromEv(energyEv);
      return medium === 'air' ? airNmFromVacuum(vacuumNm) : vacuumNm;
    }
    case 'cm-1':
      if (laserEv === null) throw noLaser('');
      return shiftCm1FromEv(energyEv, laserEv);
  }
}
