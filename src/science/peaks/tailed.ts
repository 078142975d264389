/**
 * The tailed peak: a Gaussian convolved with a one-sided exponential toward low energy (the
 * exponentially modified Gaussian of chromatography: Grushka, Anal. Chem. 44, 1733 (1972)).
 * `centre` and `fwhm` are the Gaussian's, `tail` the energy over which the exponential falls by e.
 *
 * Always integrated over the channels, in closed form: with g and Φ the Gaussian and its integral and
 * τ the tail, the density f obeys f − τ f′ = g, so its integral is Φ + τ f, by σ it changes by σ f′ and
 * by τ by f + τ ∂f/∂τ. Each is taken at the channels' edges only. Rounding stays below 1e-12 of the height.
 */
import { exp } from '../numeric/elementary';
import { erfcx } from '../numeric/error-functions';
import { reachSigmas } from './gaussian';
import { area, centre, energyParameter, fwhm } from './peak-parameters';
import { type Shape, spanWithin } from './shape';
import { fwhmPerSigma, leastWidthEv } from './widths';

const sqrtTwoPi = 2.5066282746310002;
const sqrtHalf = Math.SQRT1_2;
/** exp(−20.8) is below 1e-9. */
const reachTails = 20.8;
/** A tail shorter than σ over this: by its series in tail/σ, where the closed form cancels. */
const longestRatio = 100;
/** (1/100)⁷ is below the rounding of f. */
const seriesTerms = 7;

/** Here by `tailedAt`: ½ erfc(|x|/σ√2), f, f′ and ∂(τ f)/∂τ. */
const edge = new Float64Array(4);

/** Cut where less than 1e-9 of the height is left: 6.5 σ above the centre, 6.5 σ and 20.8 tails below. */
export const tailed: Shape = {
  name: 'tailed',
  parameters: [area, centre, fwhm, energyParameter('tail')],
  evaluate(grid, values, counts, columns) {
    const total = values[0];
    const middle = values[1];
    const sigma = Math.max(values[2], leastWidthEv) / fwhmPerSigma;
    const tail = values[3];
    const below = reachSigmas * sigma + reachTails * tail;
    const span = spanWithin(grid, middle - below, middle + reachSigmas * sigma);
    const { edgesEv } = grid;
    let x = edgesEv[span.first] - middle;
    tailedAt(x, sigma, tail, edge);
    for (let k = span.first; k < span.end; k++) {
      const wasBelow = x < 0;
      const normal = edge[0];
      const density = edge[1];
      const slope = edge[2];
      const byTail = edge[3];
      x = edgesEv[k + 1] - middle;
      tailedAt(x, sigma, tail, edge);
      const gained = edge[1] - density;
      let share = tail * gained;
      if (x < 0) share += edge[0] - normal;
      else if (wasBelow) share += 1 - normal - edge[0];
      else share += normal - edge[0];
      counts[k] += total * share;
      if (columns === null) continue;
      columns[0][k] = share;
      columns[1][k] = -total * gained;
      columns[2][k] = (total * sigma * (edge[2] - slope)) / fwhmPerSigma;
      columns[3][k] = total * (edge[3] - byTail);
    }
    return span;
  },
};

/**
 * What the peak of unit area is at a distance from the Gaussian's centre.
 *
 * @param x - energy less centre, eV
 * @param tail - eV, 0 for none
 * @param into - (4) ½ erfc(|x|/σ√2); density f, 1/eV; f′, 1/eV²; ∂(tail · f)/∂tail, 1/eV
 */
export function tailedAt(x: number, sigma: number, tail: number, into: Float64Array): void {
  const u = x / sigma;
  const bell = exp(-0.5 * u * u);
  into[0] = 0.5 * bell * erfcx(Math.abs(u) * sqrtHalf);
  const gaussian = bell / (sqrtTwoPi * sigma);
  if (sigma > longestRatio * tail) {
    shortTail(u, tail / sigma, gaussian, into);
    into[2] /= sigma;
    return;
  }
  const ratio = sigma / tail;
  const s = (u + ratio) * sqrtHalf;
  const half = 0.5 / tail;
  const density =
    s >= 0
      ? half * bell * erfcx(s)
      : half * (2 * exp(ratio * (u + 0.5 * ratio)) - bell * erfcx(-s));
  const slope = (density - gaussian) / tail;
  into[1] = density;
  into[2] = slope;
  into[3] = -(x * density + sigma * sigma * slope) / tail;
}

/** The same for a short tail t, in units of σ: f = Σ τⁿ g⁽ⁿ⁾ by the Hermite polynomials of g⁽ⁿ⁾. */
function shortTail(u: number, t: number, gaussian: number, into: Float64Array): void {
  let power = 1;
  let hermite = 1;
  let next = u;
  let density = 0;
  let slope = 0;
  let byTail = 0;
  for (let n = 0; n < seriesTerms; n++) {
    density += power * hermite;
    slope -= power * next;
    byTail += (n + 1) * power * hermite;
    const after = u * next - (n + 1) * hermite;
    hermite = next;
    next = after;
    power *= -t;
  }
  into[1] = gaussian * density;
  into[2] = gaussian * slope;
  into[3] = gaussian * byTail;
}
