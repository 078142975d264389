/** Integrals of a density over channels by Gauss–Legendre points, more of them where it is narrow. */
import type { ChannelSpan, FitGrid } from './shape';

/** Points and weights on −1 … 1 of three-point Gauss–Legendre quadrature (Abramowitz and Stegun, table 25.4). */
const points = [-0.7745966692414834, 0, 0.7745966692414834] as const;
const weights = [0.5555555555555556, 0.8888888888888888, 0.5555555555555556] as const;

/** Writes density and derivatives at an energy into `out`. */
export type DensityAt = (energyEv: number, out: Float64Array) => void;

/**
 * Adds the integral of a density, and of its derivatives, over each channel of a span.
 *
 * Each channel is cut into pieces narrower than a third of `scaleEv`, the density's finest detail, of
 * three points each: the error is below 1e-8 of the height.
 *
 * @param total - the area: counts get total × density, columns[0] the density, the rest total × derivative
 * @param out - room for the density and its derivatives
 */
export function integrateOverChannels(
  grid: FitGrid,
  span: ChannelSpan,
  scaleEv: number,
  density: DensityAt,
  total: number,
  out: Float64Array,
  sums: Float64Array,
  counts: Float64Array,
  columns: readonly Float64Array[] | null,
): void {
  const { edgesEv, widthsEv } = grid;
  for (let k = span.first; k < span.end; k++) {
    const pieces = Math.min(mostPieces, Math.max(1, Math.ceil((3 * widthsEv[k]) / scaleEv)));
    const halfEv = widthsEv[k] / (2 * pieces);
    sums.fill(0);
    for (let piece = 0; piece < pieces; piece++) {
      const middle = edgesEv[k] + (2 * piece + 1) * halfEv;
      for (let i = 0; i < 3; i++) {
        density(middle + points[i] * halfEv, out);
        for (let j = 0; j < out.length; j++) sums[j] += weights[i] * halfEv * out[j];
      }
    }
    counts[k] += total * sums[0];
    if (columns === null) continue;
    columns[0][k] = sums[0];
    for (let j = 1; j < columns.length; j++) columns[j][k] = total * sums[j];
  }
}

/** A peak finer than a hundredth of a channel is a spike to the detector, whatever its shape. */
const mostPieces = 256;
