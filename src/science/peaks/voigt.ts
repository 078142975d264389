/**
 * The Voigt peak: a Gaussian convolved with a Lorentzian, by the Faddeeva function; its wings are never cut.
 *
 * Density Re w(z)/(σ √2π), z = (E − centre + iγ)/(σ √2), γ half the Lorentzian's full width. It is
 * integrated over every channel, from w and three derivatives at the edges (Hermite's two-point rule of
 * eighth order), with more points between where the peak is narrow: error below 1e-8 of the height.
 * Derivatives by the parameters need no rule: by σ the density changes by σ ∂²/∂E², by γ by the
 * Hilbert transform of ∂/∂E, so that their integrals are values at the edges.
 */
import { faddeevaJet } from '../numeric/faddeeva';
import { area, centre, energyParameter } from './peak-parameters';
import type { Shape } from './shape';
import { fwhmPerSigma, leastWidthEv } from './widths';

const sqrtTwo = Math.SQRT2;
const sqrtTwoPi = 2.5066282746310002;
/**
 * A Gaussian narrower than this share of the Lorentzian is evaluated at the share, less half the
 * difference of variances times the second derivative: exact to the share's fourth power.
 */
const leastShare = 1e-3;
/** Longest step of the rule, in units of z: near the centre, and as a share of |z|. */
const nearStep = 0.3;
const farShare = 0.18;

const jet = new Float64Array(6);

/** Touches every channel. A width of 0 leaves the other shape, both of 0 a spike. */
export const voigt: Shape = {
  name: 'voigt',
  parameters: [area, centre, energyParameter('fwhm_g'), energyParameter('fwhm_l')],
  evaluate({ edgesEv, centresEv }, values, counts, columns) {
    const total = values[0];
    const middle = values[1];
    const trueSigma = values[2] / fwhmPerSigma;
    const sigma = Math.max(values[2], leastShare * values[3], leastWidthEv) / fwhmPerSigma;
    const scale = 1 / (sigma * sqrtTwo);
    const height = 1 / (sigma * sqrtTwoPi);
    const y = 0.5 * values[3] * scale;
    // What is missing of the variance, halved, in units of z; 0 for all but the narrowest Gaussians.
    const missing = 0.5 * (trueSigma - sigma) * (trueSigma + sigma) * scale * scale;
    const bySigma = (total * trueSigma * height * scale) / fwhmPerSigma;
    const count = centresEv.length;

    let x = (edgesEv[0] - middle) * scale;
    faddeevaJet(x, y, jet);
    let third = thirdReal(x, y);
    for (let k = 0; k < count; k++) {
      const value = jet[0] + missing * jet[4];
      const conjugate = jet[1] + missing * jet[5];
      const first = jet[2];
      const slope = first + missing * third;
      const end = (edgesEv[k + 1] - middle) * scale;
      let integral = 0;
      while (x < end) {
        const to = nextPoint(x, end, y);
        const h = to - x;
        const w = jet[0];
        const w1 = jet[2];
        const w2 = jet[4];
        const w3 = third;
        faddeevaJet(to, y, jet);
        third = thirdReal(to, y);
        const odd = (3 / 28) * (w1 - jet[2]) + h * h * (1 / 1680) * (w3 - third);
        integral += h * (0.5 * (w + jet[0]) + h * (odd + h * (1 / 84) * (w2 + jet[4])));
        x = to;
      }
      const share = (integral + missing * (jet[2] - first)) * (height / scale);
      counts[k] += total * share;
      if (columns === null) continue;
      columns[0][k] = share;
      columns[1][k] = total * height * (value - jet[0] - missing * jet[4]);
      columns[2][k] = bySigma * (jet[2] + missing * third - slope);
      columns[3][k] = 0.5 * total * height * (conjugate - jet[1] - missing * jet[5]);
    }
    return { first: 0, end: count };
  },
};

/** Re w‴ from the jet: w‴ = −4w′ − 2zw″. */
function thirdReal(x: number, y: number): number {
  return -4 * jet[2] - 2 * (x * jet[4] - y * jet[5]);
}

/** Where the next step of the rule ends, at `end` at the latest. */
function nextPoint(x: number, end: number, y: number): number {
  const nearest = x >= 0 ? x : Math.min(end, 0);
  const most = Math.max(nearStep, farShare * Math.sqrt(nearest * nearest + y * y));
  if (end - x <= most) return end;
  if (x >= 0) return x + most;
  // Toward the centre a step must suit the end it reaches.
  const share = farShare / (1 + farShare);
  return Math.min(end, x + Math.max(nearStep, share * Math.sqrt(x * x + y * y)));
}
