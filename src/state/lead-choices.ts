/** The maps that can be shown large or taken into the blend, grouped by what they are made from. */
import { offeredMaps } from '../recipe/offered-maps';
import type { Recipe } from '../recipe/schema';
import type { DerivedMap } from '../science/scan';

export interface MapChoice {
  /** contract name */
  readonly name: string;
  /** "Centroid of band tail" */
  readonly title: string;
  readonly unit: string;
}

export interface ChoiceGroup {
  /** "Scan", "Band tail" */
  readonly title: string;
  readonly maps: readonly MapChoice[];
}

/** Band maps are made when they are asked for, so all are offered; others only once they are known. */
export function leadChoices(
  recipe: Recipe,
  known: ReadonlyMap<string, DerivedMap>,
): readonly ChoiceGroup[] {
  const groups = new Map<string, MapChoice[]>();
  for (const { name, parts, title, unit } of offeredMaps(recipe)) {
    if (parts.kind !== 'band' && !known.has(name)) continue;
    const group = groupOf(parts);
    groups.set(group, [...(groups.get(group) ?? []), { name, title, unit }]);
  }
  return [...groups].map(([title, maps]) => ({ title, maps }));
}

/** The choice of this name, its ".err" map under the same title with a word more; null when the recipe makes none. */
export function choiceOf(groups: readonly ChoiceGroup[], name: string): MapChoice | null {
  const plain = name.replace(/\.err$/, '');
  const choice = groups.flatMap(({ maps }) => maps).find((map) => map.name === plain);
  if (choice === undefined) return null;
  return plain === name ? choice : { ...choice, name, title: `${choice.title}, uncertainty` };
}

function groupOf(parts: ReturnType<typeof offeredMaps>[number]['parts']): string {
  switch (parts.kind) {
    case 'scan':
      return 'Scan';
    case 'band':
      return `Band ${parts.band}`;
    case 'fit':
      return `Fit of ${parts.component}`;
    case 'fit-quality':
      return 'Fit';
    case 'strain':
    case 'strain-height':
      return 'Strain';
    case 'despike':
      return 'Preparation';
  }
}
