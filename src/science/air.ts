/**
 * Wavelengths in standard air and in vacuum, one into the other.
 * Standard air: dry, 15 °C, 101 325 Pa, 450 ppm CO₂.
 */

/** Below this air absorbs (the O₂ bands) and wavelengths are given in vacuum; the formula's poles lie further down. */
export const shortestAirNm = 185;

/**
 * Refractivity n − 1 of standard air.
 *
 * Fitted to measurements from 230 nm to 1690 nm; beyond, toward the infrared, it runs smoothly to its
 * long-wave limit of 2.726e-4.
 *
 * @param vacuumNm - vacuum wavelength, nm
 * @see P. E. Ciddor, Appl. Opt. 35, 1566 (1996), eq. 1
 */
export function airRefractivity(vacuumNm: number): number {
  const perUm = 1000 / vacuumNm;
  const sigma2 = perUm * perUm;
  return (5792105 / (238.0185 - sigma2) + 167917 / (57.362 - sigma2)) * 1e-8;
}

/** Wavelength in standard air, nm, of a vacuum wavelength, nm. */
export function airNmFromVacuum(vacuumNm: number): number {
  return vacuumNm / (1 + airRefractivity(vacuumNm));
}

/**
 * Vacuum wavelength, nm, of a wavelength in standard air, nm: λ ← λ_air n(λ), repeated until it no
 * longer changes. Each turn shrinks the error by λ|dn/dλ| (1e-5 in the visible, 1e-4 at 185 nm), so
 * four turns reach the last bit; NaN passes through.
 */
export function vacuumNmFromAir(airNm: number): number {
  let vacuumNm = airNm;
  for (let turn = 0; turn < 12; turn++) {
    const next = airNm * (1 + airRefractivity(vacuumNm));
    if (next === vacuumNm) break;
    vacuumNm = next;
  }
  return vacuumNm;
}
