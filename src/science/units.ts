/**
 * Photon energy, vacuum wavelength, wavenumber and Raman shift, one into the other; the only place
 * that knows hc. Wavelengths here are in vacuum: air is the business of `air.ts`.
 */

/**
 * hc, eV·nm: h = 6.626 070 15e-34 J·s, c = 299 792 458 m/s, e = 1.602 176 634e-19 C, all exact by
 * definition (SI 2019, CODATA 2018). The literal is the double nearest to the exact quotient.
 */
export const hcEvNm = 1239.8419843320025;

/** Wavenumber of a photon of 1 eV, cm⁻¹: 10⁷/hc. */
export const cm1PerEv = 1e7 / hcEvNm;

/** Photon energy, eV, of a vacuum wavelength, nm. */
export function evFromNm(vacuumNm: number): number {
  return hcEvNm / vacuumNm;
}

/** Vacuum wavelength, nm, of a photon energy, eV. */
export function nmFromEv(energyEv: number): number {
  return hcEvNm / energyEv;
}

/** Photon energy, eV, of an absolute wavenumber, cm⁻¹. */
export function evFromCm1(wavenumberCm1: number): number {
  return (wavenumberCm1 * hcEvNm) / 1e7;
}

/** Absolute wavenumber, cm⁻¹, of a photon energy, eV. */
export function cm1FromEv(energyEv: number): number {
  return (energyEv * 1e7) / hcEvNm;
}

/**
 * Photon energy, eV, of light shifted from the laser; Stokes shifts (toward lower energy) are positive.
 *
 * @param shiftCm1 - Raman shift, cm⁻¹
 * @param laserEv - photon energy of the laser, eV
 */
export function evFromShiftCm1(shiftCm1: number, laserEv: number): number {
  return laserEv - evFromCm1(shiftCm1);
}

/** Raman shift, cm⁻¹, Stokes positive, of light of `energyEv` under a laser of `laserEv`. */
export function shiftCm1FromEv(energyEv: number, laserEv: number): number {
  return cm1FromEv(laserEv - energyEv);
}

/** Width in eV of 1 nm at a photon energy: |dE/dλ| = E²/hc. Divides a density per nm into one per eV. */
export function evPerNm(energyEv: number): number {
  return (energyEv * energyEv) / hcEvNm;
}
