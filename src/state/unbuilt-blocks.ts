/** What the recipe asks for that this build cannot run: told, never skipped in silence. */
import { unbuiltBlocks } from '../recipe/executable';
import type { Recipe } from '../recipe/schema';

/** Paths of blocks and steps ("model", "condition[2]") with what each is, in words. */
export function unbuiltByPath(recipe: Recipe): ReadonlyMap<string, string> {
  return new Map(unbuiltBlocks(recipe).map(({ path, title }) => [path, title]));
}
