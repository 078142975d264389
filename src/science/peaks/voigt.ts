/** The Voigt peak: a Gaussian convolved with a Lorentzian, by the Faddeeva function. */
import { faddeeva } from '../numeric/faddeeva';
import { area, centre, energyParameter } from './peak-parameters';
import { integrateOverChannels } from './quadrature';
import type { Shape } from './shape';
import { fwhmPerSigma, voigtFwhm } from './widths';

const sqrtTwo = Math.SQRT2;
const sqrtTwoPi = 2.5066282746310002;
const twoOverSqrtPi = 1.1283791670955126;
/** A Gaussian this much narrower than the Lorentzian changes nothing any more. */
const leastShare = 1e-6;

const w = new Float64Array(2);
const out = new Float64Array(4);
const sums = new Float64Array(4);

/**
 * Density Re w(z)/(σ √2π), z = (E − centre + iγ)/(σ √2); derivatives from w' = −2 z w + 2i/√π.
 */
export const voigt: Shape = {
  name: 'voigt',
  parameters: [area, centre, energyParameter('fwhm_g'), energyParameter('fwhm_l')],
  evaluate(grid, values, counts, columns) {
    const [total, middle, gaussianFwhm, lorentzianFwhm] = values;
    const sigma = Math.max(gaussianFwhm, leastShare * lorentzianFwhm) / fwhmPerSigma;
    const gamma = lorentzianFwhm / 2;
    const scale = 1 / (sigma * sqrtTwo);
    const height = 1 / (sigma * sqrtTwoPi);
    const y = gamma * scale;
    const density = (energyEv: number, into: Float64Array): void => {
      const x = (energyEv - middle) * scale;
      faddeeva(x, y, w);
      const slopeReal = -2 * (x * w[0] - y * w[1]);
      const slopeImaginary = twoOverSqrtPi - 2 * (x * w[1] + y * w[0]);
      into[0] = height * w[0];
      into[1] = -height * scale * slopeReal;
      into[2] =
        (-height / sigma) * (w[0] + x * slopeReal - y * slopeImaginary) * (1 / fwhmPerSigma);
      into[3] = -0.5 * height * scale * slopeImaginary;
    };
    const span = { first: 0, end: grid.centresEv.length };
    const finest = voigtFwhm(gaussianFwhm, lorentzianFwhm) / fwhmPerSigma;
    integrateOverChannels(grid, span, finest, density, total, out, sums, counts, columns);
    return span;
  },
};
