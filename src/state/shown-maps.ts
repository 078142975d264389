/** The known maps in the order the values column reads them: bands by the recipe, then the rest. */
import { offeredMaps } from '../recipe/offered-maps';
import type { Recipe } from '../recipe/schema';
import type { DerivedMap } from '../science/scan';

/** Maps the recipe makes and that are known, in the order of the recipe; the scan's own come last. */
export function shownMaps(
  recipe: Recipe,
  known: ReadonlyMap<string, DerivedMap>,
): readonly DerivedMap[] {
  const maps = offeredMaps(recipe).flatMap(({ name }) => known.get(name) ?? []);
  const isOfScan = ({ name }: DerivedMap): boolean => name.startsWith('scan.');
  return [...maps.filter((map) => !isOfScan(map)), ...maps.filter(isOfScan)];
}
