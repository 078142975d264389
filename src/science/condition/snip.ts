/** Statistics-sensitive peak clipping: what is higher than the mean of two channels on either side is cut to it. */
import { exp, log } from '../numeric/elementary';
import type { BaselineFinder } from './baseline';
import { type StepPlace, stepError } from './step-errors';

/**
 * Counts are compressed twice by the logarithm, clipped to the mean of the channels m to the left and
 * right, with m from `halfWidth` down to 1, and let out again. Peaks up to twice as wide are cut off.
 *
 * Gaps are bridged by straight lines first. A spectrum that goes below 0 is lifted by its lowest value
 * for the logarithms. Near the ends the width is what fits.
 *
 * @see C. G. Ryan et al., Nucl. Instrum. Methods B 34, 396 (1988); falling widths: M. Morháč et al., Nucl.
 * Instrum. Methods A 401, 113 (1997), from memory
 */
export class SnipBaseline implements BaselineFinder {
  readonly #halfWidth: number;
  readonly #spare: Float64Array;

  /** @throws RimlightError 'recipe' - when the width is no whole number of channels, or does not fit the spectrum */
  constructor(nk: number, halfWidth: number, place: StepPlace) {
    if (!Number.isInteger(halfWidth) || halfWidth < 1 || 2 * halfWidth >= nk) {
      throw stepError(
        place,
        `a half width of ${halfWidth} channels does not fit into ${nk}`,
        `Give a whole number from 1 to ${Math.max(1, Math.floor((nk - 1) / 2))}.`,
      );
    }
    this.#halfWidth = halfWidth;
    this.#spare = new Float64Array(nk);
  }

  find(spectrum: Float64Array, out: Float64Array): boolean {
    if (!bridgeGaps(spectrum, out)) {
      out.fill(Number.NaN);
      return true;
    }
    const least = out.reduce((low, value) => Math.min(low, value), 0);
    for (let k = 0; k < out.length; k++) out[k] = log(log(out[k] - least + 1) + 1);
    let from = out;
    let to = this.#spare;
    for (let width = this.#halfWidth; width >= 1; width--) {
      clip(from, to, width);
      [from, to] = [to, from];
    }
    for (let k = 0; k < out.length; k++) out[k] = exp(exp(from[k]) - 1) - 1 + least;
    return true;
  }
}

function clip(from: Float64Array, to: Float64Array, width: number): void {
  const end = from.length - width;
  for (let k = 0; k < width; k++) {
    to[k] = from[k];
    to[end + k] = from[end + k];
  }
  for (let k = width; k < end; k++) {
    const mean = (from[k - width] + from[k + width]) / 2;
    to[k] = Math.min(mean, from[k]);
  }
}

/** The spectrum with straight lines over its gaps, level at its ends; false where it has no data. */
function bridgeGaps(spectrum: Float64Array, out: Float64Array): boolean {
  let last = -1;
  for (let k = 0; k < spectrum.length; k++) {
    if (Number.isNaN(spectrum[k])) continue;
    for (let gap = last + 1; gap < k; gap++) {
      const share = last < 0 ? 1 : (gap - last) / (k - last);
      out[gap] = share * spectrum[k] + (last < 0 ? 0 : (1 - share) * spectrum[last]);
    }
    out[k] = spectrum[k];
    last = k;
  }
  if (last >= 0) out.fill(spectrum[last], last + 1);
  return last >= 0;
}
