/** Which channels an interval of photon energy covers, and how much of each. */
import type { EnergyAxis } from '../scan';
import type { EnergyBand } from './band';

/** Channels first … last, all whole but the two at the ends; one channel where first equals last. */
export interface BandChannels {
  readonly first: number;
  readonly last: number;
  /** covered share of the first channel, 0 < share ≤ 1 */
  readonly firstShare: number;
  /** covered share of the last channel; of the only one when first equals last */
  readonly lastShare: number;
  /** lower and upper end of what is covered, eV: the band where it lies on the axis */
  readonly fromEv: number;
  readonly toEv: number;
}

/**
 * A share below this is rounding of a band's end that lies on a channel's edge; the channel is left
 * out, so that it cannot become the band's highest or carry its floor.
 */
const sliver = 1e-9;

/**
 * The part of a band that lies on the axis.
 *
 * @returns null when no channel is covered: outside the axis, or from ≥ to
 */
export function bandChannels(axis: EnergyAxis, band: EnergyBand): BandChannels | null {
  const { edgesEv } = axis;
  const nk = edgesEv.length - 1;
  const fromEv = Math.max(band.fromEv, edgesEv[0]);
  const toEv = Math.min(band.toEv, edgesEv[nk]);
  if (!(fromEv < toEv)) return null;
  let first = channelAt(edgesEv, fromEv);
  let last = channelAt(edgesEv, toEv);
  const widthOf = (k: number): number => edgesEv[k + 1] - edgesEv[k];
  if (first === last) {
    const share = (toEv - fromEv) / widthOf(first);
    return { first, last, firstShare: share, lastShare: share, fromEv, toEv };
  }
  let firstShare = (edgesEv[first + 1] - fromEv) / widthOf(first);
  let lastShare = (toEv - edgesEv[last]) / widthOf(last);
  if (firstShare < sliver) {
    first++;
    firstShare = first === last ? lastShare : 1;
  }
  if (lastShare < sliver && first < last) {
    last--;
    lastShare = first === last ? firstShare : 1;
  }
  return { first, last, firstShare, lastShare, fromEv, toEv };
}

/** The channel with edge ≤ energy < next edge; the last channel for the axis' upper end. */
function channelAt(edgesEv: Float64Array, energyEv: number): number {
  let low = 0;
  let high = edgesEv.length - 2;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if (edgesEv[middle] <= energyEv) low = middle;
    else high = middle - 1;
  }
  return low;
}

/** Covered share of channel k: 1 inside, 0 outside. */
export function shareOf(channels: BandChannels, k: number): number {
  if (k < channels.first || k > channels.last) return 0;
  if (k === channels.first) return channels.firstShare;
  return k === channels.last ? channels.lastShare : 1;
}
