/** The Gaussian peak, integrated over each channel. */
import { exp } from '../numeric/elementary';
import { erfc } from '../numeric/error-functions';
import { area, centre, fwhm } from './peak-parameters';
import { type Shape, spanWithin } from './shape';
import { fwhmPerSigma, leastWidthEv } from './widths';

const sqrtTwoPi = 2.5066282746310002;
const sqrtHalf = Math.SQRT1_2;
/** Beyond so many standard deviations less than 1e-9 of the height is left. */
export const reachSigmas = 6.5;
/**
 * Channels narrower than this many standard deviations: density at the centre times the width, and
 * the next term of the integral, which leaves 1.6e-7 of the height; wider ones by the error function.
 */
const narrowChannel = 0.1;

/**
 * Area × share of the normal distribution in each channel.
 *
 * With z = (E − centre)/σ and w the width over σ: the density's integral over the channel is
 * φ(z) w (1 + w² (z² − 1)/24) + O(w⁵).
 */
export const gaussian: Shape = {
  name: 'gaussian',
  parameters: [area, centre, fwhm],
  evaluate(grid, values, counts, columns) {
    const [total, middle, width] = values;
    const sigma = Math.max(width, leastWidthEv) / fwhmPerSigma;
    const reach = reachSigmas * sigma;
    const span = spanWithin(grid, middle - reach, middle + reach);
    const { centresEv, widthsEv, edgesEv } = grid;
    for (let k = span.first; k < span.end; k++) {
      const w = widthsEv[k] / sigma;
      let share: number;
      let byCentre: number;
      let bySigma: number;
      if (w <= narrowChannel) {
        const z = (centresEv[k] - middle) / sigma;
        const square = z * z;
        const density = (exp(-0.5 * square) / sqrtTwoPi) * w;
        const correction = (w * w) / 24;
        share = density * (1 + correction * (square - 1));
        byCentre = (density * z * (1 + correction * (square - 3))) / sigma;
        bySigma = (density * (square - 1 + correction * (square * (square - 6) + 3))) / sigma;
      } else {
        const low = (edgesEv[k] - middle) / sigma;
        const high = (edgesEv[k + 1] - middle) / sigma;
        const atLow = exp(-0.5 * low * low) / sqrtTwoPi;
        const atHigh = exp(-0.5 * high * high) / sqrtTwoPi;
        share = normalShare(low, high);
        byCentre = (atLow - atHigh) / sigma;
        bySigma = (low * atLow - high * atHigh) / sigma;
      }
      counts[k] += total * share;
      if (columns === null) continue;
      columns[0][k] = share;
      columns[1][k] = total * byCentre;
      columns[2][k] = (total * bySigma) / fwhmPerSigma;
    }
    return span;
  },
};

/** Share of the normal distribution from low to high, standard deviations; no cancellation in the wings. */
export function normalShare(low: number, high: number): number {
  if (low > 0) return 0.5 * (erfc(low * sqrtHalf) - erfc(high * sqrtHalf));
  if (high < 0) return 0.5 * (erfc(-high * sqrtHalf) - erfc(-low * sqrtHalf));
  return 1 - 0.5 * (erfc(-low * sqrtHalf) + erfc(high * sqrtHalf));
}
