/** What an edit of one part means for the parts that name it: names follow, and what lost its source goes. */
import { formatMapName, parseMapName } from './map-names';
import { offeredMaps } from './offered-maps';
import type { Blend, Recipe, Strain } from './schema';
import { unstrainedRegion } from './strain-block';

/** The recipe with every map name passed through `rename`; parts without such a name are shared. */
export function withSources(recipe: Recipe, rename: (source: string) => string): Recipe {
  const { blend, strain, features } = recipe;
  const channels = blend && renamedEach(blend.channels, rename);
  return {
    ...recipe,
    ...(blend === undefined || channels === undefined || channels === blend.channels
      ? {}
      : { blend: { ...blend, channels } }),
    ...(strain === undefined ? {} : { strain: renamedStrain(strain, rename) }),
    ...(features === undefined ? {} : { features: renamed(features, rename) }),
  };
}

interface Sourced {
  readonly source: string;
}

function renamed<T extends Sourced>(entry: T, rename: (source: string) => string): T {
  const source = rename(entry.source);
  return source === entry.source ? entry : { ...entry, source };
}

function renamedEach<T extends Sourced>(
  entries: readonly T[],
  rename: (source: string) => string,
): readonly T[] {
  const all = entries.map((entry) => renamed(entry, rename));
  return all.every((entry, index) => entry === entries[index]) ? entries : all;
}

function renamedStrain(strain: Strain, rename: (source: string) => string): Strain {
  const pl = strain.pl && renamed(strain.pl, rename);
  const raman = strain.raman && renamed(strain.raman, rename);
  if (pl === strain.pl && raman === strain.raman) return strain;
  return {
    ...strain,
    ...(pl === undefined ? {} : { pl }),
    ...(raman === undefined ? {} : { raman }),
  };
}

/** Map names of the band `from` as those of the band `to`; others unchanged. */
export function bandRenaming(from: string, to: string): (source: string) => string {
  return (source) => {
    const name = parseMapName(source);
    return name?.kind === 'band' && name.band === from
      ? formatMapName({ ...name, band: to })
      : source;
  };
}

/**
 * The recipe without what a removal left hanging: blend channels, strain maps and features whose
 * source is gone, strain that refers to a region that is gone, and what was made from these.
 */
export function withoutDangling(recipe: Recipe): Recipe {
  for (let whole = recipe; ; ) {
    const pruned = prunedOnce(whole);
    if (pruned === whole) return whole;
    whole = pruned;
  }
}

function prunedOnce(recipe: Recipe): Recipe {
  const maps = new Set(offeredMaps(recipe).map(({ name }) => name));
  const stands = (source: string): boolean => maps.has(source.replace(/\.err$/, ''));
  const regions = new Set((recipe.regions ?? []).map(({ name }) => name));
  const { blend, strain, features, ...rest } = recipe;
  const keptBlend = blend && prunedBlend(blend, stands);
  const keptStrain = strain && prunedStrain(strain, stands, regions);
  const keptFeatures = features && stands(features.source) ? features : undefined;
  if (keptBlend === blend && keptStrain === strain && keptFeatures === features) return recipe;
  return {
    ...rest,
    ...(keptBlend === undefined ? {} : { blend: keptBlend }),
    ...(keptStrain === undefined ? {} : { strain: keptStrain }),
    ...(keptFeatures === undefined ? {} : { features: keptFeatures }),
  };
}

function prunedBlend(blend: Blend, stands: (source: string) => boolean): Blend | undefined {
  const channels = blend.channels.filter(({ source }) => stands(source));
  if (channels.length === blend.channels.length) return blend;
  return channels.length === 0 ? undefined : { ...blend, channels };
}

function prunedStrain(
  strain: Strain,
  stands: (source: string) => boolean,
  regions: ReadonlySet<string>,
): Strain | undefined {
  const isKept = (block: Strain['pl'] | Strain['raman']): boolean => {
    if (block === undefined) return false;
    const region = unstrainedRegion(block.unstrained);
    return stands(block.source) && (region === null || regions.has(region));
  };
  const { pl, raman, height } = strain;
  const kept: Strain = {
    ...(pl !== undefined && isKept(pl) ? { pl } : {}),
    ...(raman !== undefined && isKept(raman) ? { raman } : {}),
    ...(height === undefined ? {} : { height }),
  };
  if (kept.pl === pl && kept.raman === raman) return strain;
  return Object.keys(kept).length === 0 ? undefined : kept;
}
