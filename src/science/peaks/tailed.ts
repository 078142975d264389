/**
 * The tailed peak: a Gaussian convolved with a one-sided exponential toward low energy (the
 * exponentially modified Gaussian of chromatography: Grushka, Anal. Chem. 44, 1733 (1972)).
 * `centre` and `fwhm` are the Gaussian's, `tail` the energy over which the exponential falls by e.
 */
import { exp } from '../numeric/elementary';
import { erfc, erfcx } from '../numeric/error-functions';
import { reachSigmas } from './gaussian';
import { area, centre, energyParameter, fwhm } from './peak-parameters';
import { integrateOverChannels } from './quadrature';
import { type Shape, spanWithin } from './shape';
import { fwhmPerSigma } from './widths';

const sqrtTwoPi = 2.5066282746310002;
const sqrtHalf = Math.SQRT1_2;
/** exp(−20.8) is below 1e-9. */
const reachTails = 20.8;
/** A tail shorter than σ over this: the density by its series in tail/σ, where the closed form cancels. */
const longestRatio = 100;

const out = new Float64Array(4);
const sums = new Float64Array(4);

export const tailed: Shape = {
  name: 'tailed',
  parameters: [area, centre, fwhm, energyParameter('tail')],
  evaluate(grid, values, counts, columns) {
    const [total, middle, width, tail] = values;
    const sigma = width / fwhmPerSigma;
    const below = reachSigmas * sigma + reachTails * tail;
    const span = spanWithin(grid, middle - below, middle + reachSigmas * sigma);
    const density = sigma > longestRatio * tail ? seriesDensity : closedDensity;
    const at = (energyEv: number, into: Float64Array): void =>
      density(energyEv - middle, sigma, tail, into);
    integrateOverChannels(grid, span, sigma, at, total, out, sums, counts, columns);
    return span;
  },
};

/**
 * Density f of unit area and its derivatives by centre, fwhm and tail, at a distance from the centre.
 *
 * With g the Gaussian: f − τ f' = g, from which all derivatives follow.
 */
function closedDensity(x: number, sigma: number, tail: number, into: Float64Array): void {
  const u = x / sigma;
  const ratio = sigma / tail;
  const s = (u + ratio) * sqrtHalf;
  const g = exp(-0.5 * u * u) / (sqrtTwoPi * sigma);
  const f =
    s >= 0
      ? (0.5 / tail) * exp(-0.5 * u * u) * erfcx(s)
      : (0.5 / tail) * exp(ratio * (u + 0.5 * ratio)) * erfc(s);
  const steepness = (f - g) / tail;
  into[0] = f;
  into[1] = -steepness;
  into[2] = (ratio * steepness + (g * u) / tail) / fwhmPerSigma;
  into[3] = -(f + f * (x / tail) + ratio * ratio * tail * steepness) / tail;
}

/** The same for a short tail: f = Σ τⁿ g⁽ⁿ⁾, four terms. */
function seriesDensity(x: number, sigma: number, tail: number, into: Float64Array): void {
  const u = x / sigma;
  const g = exp(-0.5 * u * u) / (sqrtTwoPi * sigma);
  const t = tail / sigma;
  // Derivatives of g in units of σ: (−1)ⁿ times the Hermite polynomials of the statisticians.
  const h1 = -u;
  const h2 = u * u - 1;
  const h3 = -u * (u * u - 3);
  const h4 = u * u * (u * u - 6) + 3;
  const h5 = -u * (u * u * (u * u - 10) + 15);
  into[0] = g * (1 + t * (h1 + t * (h2 + t * h3)));
  into[1] = (-g / sigma) * (h1 + t * (h2 + t * (h3 + t * h4)));
  into[2] = ((g / sigma) * (h2 + t * (h3 + t * (h4 + t * h5)))) / fwhmPerSigma;
  into[3] = (g / sigma) * (h1 + t * (2 * h2 + t * 3 * h3));
}
