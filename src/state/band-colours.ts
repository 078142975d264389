/** The colour of each band: its blend channel's, or one of the quiet tones for bands outside the blend. */
import { parseMapName } from '../recipe/map-names';
import type { Recipe } from '../recipe/schema';

const quietTones = ['#d9d4c6', '#b7b1a2', '#c9b8a0', '#a8b5b2', '#bfa8b4', '#b0b89c'] as const;

/** By band name; every band of the recipe has an entry. */
export function bandColours(recipe: Recipe): ReadonlyMap<string, string> {
  const colours = new Map<string, string>();
  for (const { source, colour } of recipe.blend?.channels ?? []) {
    const parsed = parseMapName(source);
    if (parsed?.kind === 'band' && !colours.has(parsed.band)) colours.set(parsed.band, colour);
  }
  let quiet = 0;
  for (const { name } of recipe.bands ?? []) {
    if (!colours.has(name)) colours.set(name, quietTones[quiet++ % quietTones.length] ?? '#d9d4c6');
  }
  return colours;
}
