/** How one band is summed on a scan: the same for every pixel and every slab. */
import type { EnergyAxis } from '../scan';
import type { BandFloor } from './band';
import type { BandChannels } from './band-channels';
import { endChannels, lineWeights } from './floor-line';

export interface BandPlan {
  readonly channels: BandChannels;
  /** channel by channel, instead of by the difference of two kept sums */
  readonly isSpan: boolean;
  /** centres relative to `referenceEv`, (nk), eV; those of the band's channels are set */
  readonly energies: Float64Array;
  readonly referenceEv: number;
  /** greatest |energy| that enters its sums */
  readonly reach: number;
  /** Σ f² eʲ over the band, j = 0 … 4: what a variance that is the same in every channel adds */
  readonly shareSquares: Float64Array;
  /** null for floor "none" */
  readonly floor: FloorTerms | null;
}

/**
 * The floor's line, which is leftWeights[k] times the counts of its left end, summed, and
 * rightWeights[k] times those of its right end; and what it takes from Σ f c eʲ: leftTerms[j] and
 * rightTerms[j] times the same.
 */
export interface FloorTerms {
  /** channels first … first + ends − 1 make the left level, last − ends + 1 … last the right one */
  readonly ends: number;
  /** (nk), of every channel on the axis */
  readonly leftWeights: Float64Array;
  readonly rightWeights: Float64Array;
  /** j = 0 … 2 */
  readonly leftTerms: Float64Array;
  readonly rightTerms: Float64Array;
}

/**
 * @param kept - energies relative to a reference for all channels, as the kept sums have them; used
 * when the band is not summed channel by channel
 */
export function planBand(
  axis: EnergyAxis,
  channels: BandChannels,
  floor: BandFloor,
  isSpan: boolean,
  kept: { readonly energies: Float64Array; readonly referenceEv: number },
): BandPlan {
  // Energies from the band's own middle, where there is a choice: narrow bands then lose no digits.
  const referenceEv = isSpan ? (channels.fromEv + channels.toEv) / 2 : kept.referenceEv;
  const energies = isSpan ? axis.centresEv.map((centre) => centre - referenceEv) : kept.energies;
  const from = isSpan ? channels.first : 0;
  const to = isSpan ? channels.last : energies.length - 1;
  const shares = powerSums(channels, energies, (share) => share, 4);
  return {
    channels,
    isSpan,
    energies,
    referenceEv,
    reach: Math.max(Math.abs(energies[from]), Math.abs(energies[to])),
    shareSquares: powerSums(channels, energies, (share) => share * share, 5),
    floor: floor === 'none' ? null : floorTerms(channels, energies, shares),
  };
}

/** Σ weight(f) eʲ over the band's channels, j < count. */
function powerSums(
  { first, last, firstShare, lastShare }: BandChannels,
  energies: Float64Array,
  weightOf: (share: number) => number,
  count: number,
): Float64Array {
  const sums = new Float64Array(count);
  for (let k = first; k <= last; k++) {
    let term = weightOf(k === first ? firstShare : k === last ? lastShare : 1);
    for (let j = 0; j < count; j++) {
      sums[j] += term;
      term *= energies[k];
    }
  }
  return sums;
}

/** @param shares - Σ f eʲ, j = 0 … 3 */
function floorTerms(
  channels: BandChannels,
  energies: Float64Array,
  shares: Float64Array,
): FloorTerms {
  const ends = endChannels(channels);
  let left = 0;
  let right = 0;
  for (let i = 0; i < ends; i++) {
    left += energies[channels.first + i] / ends;
    right += energies[channels.last - i] / ends;
  }
  const leftEnd = { energy: left, channels: ends };
  const rightEnd = { energy: right, channels: ends };
  const weights = Array.from(energies, (energy) => lineWeights(leftEnd, rightEnd, energy));
  const leftTerms = new Float64Array(3);
  const rightTerms = new Float64Array(3);
  const distance = right - left;
  for (let j = 0; j < 3; j++) {
    // A band of one channel: a flat line at its counts.
    leftTerms[j] =
      distance === 0 ? shares[j] : (right * shares[j] - shares[j + 1]) / distance / ends;
    rightTerms[j] = distance === 0 ? 0 : (shares[j + 1] - left * shares[j]) / distance / ends;
  }
  return {
    ends,
    leftWeights: Float64Array.from(weights, (weight) => weight.left),
    rightWeights: Float64Array.from(weights, (weight) => weight.right),
    leftTerms,
    rightTerms,
  };
}
