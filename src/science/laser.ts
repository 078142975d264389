/** The laser's photon energy from how people state it. */
import { vacuumNmFromAir } from './air';
import type { Medium } from './axis';
import { evFromCm1, evFromNm } from './units';

export interface LaserLine {
  readonly value: number;
  readonly unit: 'nm' | 'eV' | 'cm-1';
}

/**
 * Photon energy of a laser line, eV; NaN unless the value is positive.
 *
 * A laser given in nm is read in the medium of the scan's wavelengths: a laboratory that calibrates
 * its spectrograph in air also names its laser by the wavelength in air (632.8 nm is the line at
 * 632.991 nm in vacuum), and one medium for both keeps Raman shifts right.
 */
export function laserEvFrom(laser: LaserLine, medium: Medium): number {
  if (!(laser.value > 0)) return Number.NaN;
  if (laser.unit === 'eV') return laser.value;
  if (laser.unit === 'cm-1') return evFromCm1(laser.value);
  return evFromNm(medium === 'air' ? vacuumNmFromAir(laser.value) : laser.value);
}
