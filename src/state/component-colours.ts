/** The colour of each component of the model: its blend channel's, its role's, or one of the quiet tones. */
import { parseMapName } from '../recipe/map-names';
import type { ModelComponent, Recipe } from '../recipe/schema';

const roleColours: Readonly<Record<NonNullable<ModelComponent['role']>, string>> = {
  localised: '#ff5a4d',
  interlayer: '#ff9f43',
  trion: '#3fd07a',
  exciton: '#4c8dff',
  raman: '#d9d4c6',
};
const quietTones = ['#c77dff', '#3fd6e0', '#ffc83d', '#b7b1a2'] as const;

/** By component name; every component of the recipe has an entry. */
export function componentColours(recipe: Recipe): ReadonlyMap<string, string> {
  const colours = new Map<string, string>();
  for (const { source, colour } of recipe.blend?.channels ?? []) {
    const parsed = parseMapName(source);
    if (parsed?.kind === 'fit' && !colours.has(parsed.component)) {
      colours.set(parsed.component, colour);
    }
  }
  let quiet = 0;
  for (const { name, role } of recipe.model?.components ?? []) {
    if (colours.has(name)) continue;
    const own = role === undefined ? quietTones[quiet++ % quietTones.length] : roleColours[role];
    colours.set(name, own ?? '#b7b1a2');
  }
  return colours;
}
