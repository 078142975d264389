/** Full widths at half maximum and the scales that formulas speak in; heights from areas. */

import { pow } from '../numeric/elementary';

/** Full width of a Gaussian over its standard deviation: 2√(2 ln 2). */
export const fwhmPerSigma = 2.3548200450309493;
/** Widths below this many eV, far below any channel, are taken as this one, so that 0 is a width too. */
export const leastWidthEv = 1e-12;
const sqrtTwoPi = 2.5066282746310002;

/** Counts per eV at the centre of a Gaussian of unit area. */
export function gaussianHeight(fwhmEv: number): number {
  return fwhmPerSigma / (sqrtTwoPi * fwhmEv);
}

/** Counts per eV at the centre of a Lorentzian of unit area. */
export function lorentzianHeight(fwhmEv: number): number {
  return 2 / (Math.PI * fwhmEv);
}

/**
 * Full width of a Voigt profile, within 0.02 % (Olivero and Longbothum, J. Quant. Spectrosc. Radiat.
 * Transf. 17, 233 (1977)).
 */
export function voigtFwhm(fwhmGaussian: number, fwhmLorentzian: number): number {
  const g = fwhmGaussian * fwhmGaussian;
  const l = fwhmLorentzian * fwhmLorentzian;
  return 0.5346 * fwhmLorentzian + Math.sqrt(0.2166 * l + g);
}

/**
 * Width and Lorentzian share of the pseudo-Voigt that is nearest to a Voigt profile (Thompson, Cox
 * and Hastings, J. Appl. Cryst. 20, 79 (1987)).
 */
export function nearestPseudoVoigt(
  fwhmGaussian: number,
  fwhmLorentzian: number,
): { readonly fwhm: number; readonly eta: number } {
  const g = fwhmGaussian;
  const l = fwhmLorentzian;
  const fifth =
    g * g * g * g * g +
    2.69269 * g * g * g * g * l +
    2.42843 * g * g * g * l * l +
    4.47163 * g * g * l * l * l +
    0.07842 * g * l * l * l * l +
    l * l * l * l * l;
  const fwhm = pow(fifth, 0.2);
  const share = l / fwhm;
  return { fwhm, eta: share * (1.36603 - share * (0.47719 - 0.11116 * share)) };
}
