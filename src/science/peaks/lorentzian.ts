/** The Lorentzian peak, integrated over each channel in closed form; its wings are never cut. */
import { angleOf } from './lorentzian-channel';
import { area, centre, fwhm } from './peak-parameters';
import type { Shape } from './shape';
import { leastWidthEv } from './widths';

/**
 * Area/π × [atan(b/γ) − atan(a/γ)] with a, b the channel's edges from the centre and γ half the full
 * width; the difference as one angle, atan2(γ (b − a), γ² + a b), so that nothing cancels.
 */
export const lorentzian: Shape = {
  name: 'lorentzian',
  parameters: [area, centre, fwhm],
  evaluate({ edgesEv, widthsEv }, values, counts, columns) {
    const [total, middle, width] = values;
    const half = Math.max(width, leastWidthEv) / 2;
    const square = half * half;
    const count = widthsEv.length;
    for (let k = 0; k < count; k++) {
      const low = edgesEv[k] - middle;
      const high = edgesEv[k + 1] - middle;
      const share = angleOf(half * widthsEv[k], square + low * high) / Math.PI;
      counts[k] += total * share;
      if (columns === null) continue;
      const atLow = low * low + square;
      const atHigh = high * high + square;
      columns[0][k] = share;
      // 1/atLow − 1/atHigh without cancellation: the difference of squares is (high − low)(high + low).
      const scale = (total * widthsEv[k]) / (Math.PI * atLow * atHigh);
      columns[1][k] = scale * half * (high + low);
      columns[2][k] = 0.5 * scale * (low * high - square);
    }
    return { first: 0, end: count };
  },
};
