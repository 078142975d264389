/** An empty recipe, and what the fields left out of a recipe mean. */

import type { Medium } from '../science/axis';
import type { BandFloor } from '../science/bands/band';
import type { Detector } from '../science/scan';
import { defaults } from './default-values';
import {
  type BlendChannel,
  type BlendLimit,
  type Recipe,
  type RecipeBand,
  recipeFormat,
  type ScanBlock,
} from './schema';

export function emptyRecipe(title: string): Recipe {
  return title === '' ? { recipe: recipeFormat } : { recipe: recipeFormat, title };
}

/** The medium of every wavelength in the recipe: bands, crops and centres in nm. */
export function mediumOf(recipe: Recipe): Medium {
  return recipe.scan?.axis?.medium ?? defaults.scan.medium;
}

export function floorOf(band: RecipeBand): BandFloor {
  return band.floor ?? defaults.band.floor;
}

/** A detector block with its defaults filled in. */
export function detectorOf(block: NonNullable<ScanBlock['detector']>): Detector {
  const { detector } = defaults.scan;
  return {
    electronsPerCount: block.electrons_per_count ?? detector.electrons_per_count,
    offsetCounts: block.offset_counts ?? detector.offset_counts,
    readNoiseE: block.read_noise_e ?? detector.read_noise_e,
    excessNoise: block.excess_noise ?? detector.excess_noise,
  };
}

/** A blend channel with nothing left out. */
export interface FullChannel {
  readonly source: string;
  readonly colour: string;
  readonly low: BlendLimit;
  readonly high: BlendLimit;
  readonly gamma: number;
}

export function fullChannel(channel: BlendChannel): FullChannel {
  return { ...defaults.channel, ...channel };
}
