/**
 * The Fano line: a resonance on a continuum it interferes with (Fano, Phys. Rev. 124, 1866 (1961)),
 * less the continuum: (q + ε)²/(1 + ε²) − 1, ε = (E − centre)/(fwhm/2).
 *
 * Scaled by 1/(π fwhm/2 (q² + 1)), so that for large |q|, where the line is a Lorentzian, `area` is the
 * counts under it; in general these are area × (q² − 1)/(q² + 1).
 */
import { angleOf, logOfRatio } from './lorentzian-channel';
import { area, centre, fwhm, plainParameter } from './peak-parameters';
import type { Shape } from './shape';
import { leastWidthEv } from './widths';

/** Touches every channel; negative where the continuum is missing. Any q, infinite ones too. */
export const fano: Shape = {
  name: 'fano',
  parameters: [area, centre, fwhm, plainParameter('q')],
  evaluate({ edgesEv, widthsEv }, values, counts, columns) {
    const [total, middle, width, q] = values;
    const half = Math.max(width, leastWidthEv) / 2;
    const { even, odd, evenByQ, oddByQ } = weightsOf(q);
    const count = widthsEv.length;
    for (let k = 0; k < count; k++) {
      const low = (edgesEv[k] - middle) / half;
      const high = (edgesEv[k + 1] - middle) / half;
      const step = high - low;
      const atLow = 1 + low * low;
      const atHigh = 1 + high * high;
      const angle = angleOf(step, 1 + low * high) / Math.PI;
      const ratio = logOfRatio(atLow, atHigh, step * (low + high)) / Math.PI;
      const share = even * angle + 0.5 * odd * ratio;
      counts[k] += total * share;
      if (columns === null) continue;
      // The density in ε at both edges: what moves in and out when the line moves or widens.
      const densityLow = (even + odd * low) / (Math.PI * atLow);
      const densityHigh = (even + odd * high) / (Math.PI * atHigh);
      columns[0][k] = share;
      columns[1][k] = (total * (densityLow - densityHigh)) / half;
      columns[2][k] = (0.5 * total * (low * densityLow - high * densityHigh)) / half;
      columns[3][k] = total * (evenByQ * angle + 0.5 * oddByQ * ratio);
    }
    return { first: 0, end: count };
  },
};

interface Weights {
  /** (q² − 1)/(q² + 1), and 2q/(q² + 1) */
  readonly even: number;
  readonly odd: number;
  readonly evenByQ: number;
  readonly oddByQ: number;
}

/** Written in 1/q where |q| > 1, so that no square overflows. */
function weightsOf(q: number): Weights {
  if (Math.abs(q) > 1) {
    const p = 1 / q;
    const norm = 1 + p * p;
    const square = p * p;
    return {
      even: (1 - square) / norm,
      odd: (2 * p) / norm,
      evenByQ: (4 * p * square) / (norm * norm),
      oddByQ: (2 * square * (square - 1)) / (norm * norm),
    };
  }
  const norm = q * q + 1;
  return {
    even: (q * q - 1) / norm,
    odd: (2 * q) / norm,
    evenByQ: (4 * q) / (norm * norm),
    oddByQ: (2 * (1 - q * q)) / (norm * norm),
  };
}
