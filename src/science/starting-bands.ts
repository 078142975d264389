/** Where to begin on a fresh scan: bands that share out the light of its mean spectrum. */
import type { EnergyAxis } from './scan';

export interface StartingBand {
  readonly fromEv: number;
  readonly toEv: number;
}

/**
 * Adjoining bands that each hold the same share of the mean spectrum above its floor.
 *
 * The floor is the spectrum's own lowest tenth (its 10 % quantile), so that a dark offset does not
 * count as light; the outer 2 % of the light on either side stay outside. Channels without data are
 * left out. With no light above the floor the axis is divided evenly.
 *
 * @param axis - channel energies
 * @param meanSpectrum - mean counts per channel, (nk); NaN where there is no data
 * @param count - how many bands, at least 1
 */
export function startingBands(
  axis: EnergyAxis,
  meanSpectrum: Float64Array,
  count: number,
): readonly StartingBand[] {
  const finite = meanSpectrum.filter(Number.isFinite).sort();
  const floor = finite.length === 0 ? 0 : (finite[Math.floor(finite.length / 10)] ?? 0);
  const light = Float64Array.from(meanSpectrum, (counts) =>
    Number.isFinite(counts) ? Math.max(counts - floor, 0) : 0,
  );
  const total = light.reduce((sum, counts) => sum + counts, 0);
  const { edgesEv } = axis;
  const low = edgesEv[0] ?? 0;
  const high = edgesEv[edgesEv.length - 1] ?? 0;
  const edgeAt = (share: number): number =>
    total > 0
      ? energyAtShare(edgesEv, light, 0.02 * total + share * 0.96 * total)
      : low + share * (high - low);
  return Array.from({ length: count }, (_, band) => ({
    fromEv: edgeAt(band / count),
    toEv: edgeAt((band + 1) / count),
  }));
}

/** The energy below which the channels hold `wanted` counts, linear inside a channel. */
function energyAtShare(edgesEv: Float64Array, light: Float64Array, wanted: number): number {
  let below = 0;
  for (let k = 0; k < light.length; k++) {
    const here = light[k] ?? 0;
    const from = edgesEv[k] ?? 0;
    const to = edgesEv[k + 1] ?? from;
    if (here > 0 && below + here >= wanted) return from + ((wanted - below) / here) * (to - from);
    below += here;
  }
  return edgesEv[edgesEv.length - 1] ?? 0;
}
