/** Where a tailed peak is highest, and how wide any peak is as a whole: neither has a closed form for `tailed`. */
import { tailedAt } from './tailed';
import { fwhmPerSigma, leastWidthEv, voigtFwhm } from './widths';

/** Doubles have no more bits to halve. */
const bisections = 60;

const at = new Float64Array(4);

/**
 * Energy of a tailed peak's maximum, from its centre: 0 without a tail, otherwise below.
 *
 * @param fwhmEv - of the Gaussian
 * @returns eV, to 1e-15 of the distance searched
 */
export function tailedSummit(fwhmEv: number, tailEv: number): number {
  const sigma = Math.max(fwhmEv, leastWidthEv) / fwhmPerSigma;
  const isRising = (x: number): boolean => {
    tailedAt(x, sigma, tailEv, at);
    return at[2] >= 0;
  };
  return isRising(0) ? 0 : crossing(0, -sigma, (x) => !isRising(x));
}

/**
 * Full width at half maximum of a tailed peak as a whole, eV: its Gaussian's without a tail, ln 2 tails
 * without a Gaussian.
 *
 * @param fwhmEv - of the Gaussian
 */
export function tailedFwhm(fwhmEv: number, tailEv: number): number {
  const sigma = Math.max(fwhmEv, leastWidthEv) / fwhmPerSigma;
  const density = (x: number): number => {
    tailedAt(x, sigma, tailEv, at);
    return at[1];
  };
  const summit = tailedSummit(fwhmEv, tailEv);
  const half = density(summit) / 2;
  const isAbove = (x: number): boolean => density(x) > half;
  return crossing(summit, sigma, isAbove) - crossing(summit, -sigma - tailEv, isAbove);
}

/**
 * Full width at half maximum of a peak as a whole, eV; its own `fwhm` for shapes that have one width
 * (a Fano line's is that of its resonance). Voigt: Olivero and Longbothum 1977, within 0.02 %.
 *
 * @param values - in the order of the shape's parameters
 */
export function wholeFwhm(shape: string, values: ArrayLike<number>): number {
  if (shape === 'voigt') return voigtFwhm(values[2], values[3]);
  return shape === 'tailed' ? tailedFwhm(values[2], values[3]) : values[2];
}

/** Where something true at `from` ends to be, in the direction of `step`; it must end somewhere. */
function crossing(from: number, step: number, isTrue: (x: number) => boolean): number {
  let inside = from;
  let outside = from + step;
  for (let reach = step; isTrue(outside); reach *= 2) {
    inside = outside;
    outside += reach;
  }
  for (let turn = 0; turn < bisections; turn++) {
    const middle = 0.5 * (inside + outside);
    if (isTrue(middle)) inside = middle;
    else outside = middle;
  }
  return 0.5 * (inside + outside);
}
