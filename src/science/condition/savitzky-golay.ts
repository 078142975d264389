/** Smoothing for the eye: a polynomial through the channels around each. For display only, never for a number. */
import { RimlightError } from '../../errors';
import { PolynomialBasis } from '../numeric/orthogonal-polynomials';

/**
 * Weights of the 2 half + 1 channels around one, for the value (or a derivative by channel number) of the
 * least-squares polynomial at its middle.
 *
 * @param half - channels on either side
 * @param degree - of the polynomial, less than 2 half + 1
 * @param derivative - 0 for the value, 1 for the slope
 * @see A. Savitzky and M. J. E. Golay, Anal. Chem. 36, 1627 (1964); corrected tables: J. Steinier,
 * Y. Termonia and J. Deltour, Anal. Chem. 44, 1906 (1972)
 */
export function savitzkyGolayWeights(
  half: number,
  degree: number,
  derivative: 0 | 1 = 0,
): Float64Array {
  return weightsAt(half, degree, 0, derivative);
}

/**
 * The spectrum smoothed. Towards the ends the outermost window's polynomial is read off its middle. A
 * channel stays as it is where its window has a gap.
 *
 * @param spectrum - (nk), no data is NaN
 */
export function smoothForDisplay(
  spectrum: Float64Array,
  half: number,
  degree: number,
): Float64Array {
  const nk = spectrum.length;
  const out = spectrum.slice();
  if (nk < 2 * half + 1) return out;
  const weights = Array.from({ length: 2 * half + 1 }, (_, i) =>
    weightsAt(half, degree, i - half, 0),
  );
  for (let k = 0; k < nk; k++) {
    const middle = Math.min(Math.max(k, half), nk - 1 - half);
    const own = weights[k - middle + half];
    let sum = 0;
    for (let i = -half; i <= half; i++) sum += own[i + half] * spectrum[middle + i];
    if (!Number.isNaN(sum)) out[k] = sum;
  }
  return out;
}

/** Each weight is what a count of 1 in that channel alone makes of the polynomial. */
function weightsAt(half: number, degree: number, at: number, derivative: 0 | 1): Float64Array {
  const count = 2 * half + 1;
  if (!Number.isInteger(half) || half < 1 || !(degree >= 0 && degree < count)) {
    throw new RimlightError('fault', {
      what: `smoothing with ${count} channels and degree ${degree} is not possible`,
      where: 'display smoothing',
      hint: 'Please report this.',
    });
  }
  const places = Array.from({ length: count }, (_, i) => i - half);
  const basis = new PolynomialBasis(places, degree);
  return Float64Array.from(places, (_, channel) => {
    const unit = places.map((_, i) => (i === channel ? 1 : 0));
    const fit = basis.fit(unit);
    return derivative === 0 ? fit.at(at) : fit.slopeAt(at);
  });
}
