/**
 * The straight line under a band whose floor is "ends", in counts per channel over photon energy.
 *
 * The level at each end is the mean counts of the band's outermost three channels there (of fewer where
 * the band has less than six, so that no channel serves both ends), at the mean energy of those
 * channels. Channels without data are left out of both means.
 */
import type { BandChannels } from './band-channels';

const mostEndChannels = 3;

/** How many channels make the level at each end. */
export function endChannels({ first, last }: Pick<BandChannels, 'first' | 'last'>): number {
  return Math.max(1, Math.min(mostEndChannels, (last - first + 1) >> 1));
}

/** One end of the line: where its channels lie on average, and how many had data. */
export interface LineEnd {
  /** mean energy, eV, relative to any reference that is the same for both ends */
  readonly energy: number;
  readonly channels: number;
}

/**
 * Weights by which each channel of the left and of the right end enters the line at an energy: the
 * line there is weight.left · Σ left counts + weight.right · Σ right counts.
 *
 * Two ends at one energy (a band of one channel) make a flat line at the left end's level.
 */
export function lineWeights(
  left: LineEnd,
  right: LineEnd,
  energy: number,
): { readonly left: number; readonly right: number } {
  const distance = right.energy - left.energy;
  if (distance === 0) return { left: 1 / left.channels, right: 0 };
  return {
    left: (right.energy - energy) / distance / left.channels,
    right: (energy - left.energy) / distance / right.channels,
  };
}

/**
 * Counts of which rounding may be all: what is left of a band that lies on its floor.
 *
 * @param gross - counts of the band, and of its floor, before one is taken from the other
 */
export function leastLeft(gross: number): number {
  return 1e-12 * gross;
}

/**
 * What a second or fourth central moment, summed channel by channel, may be from rounding alone: such a
 * moment is zero.
 *
 * @param most - what the moment would be with all counts at the band's ends
 */
export function nothingOf(most: number): number {
  return most / 17592186044416;
}
