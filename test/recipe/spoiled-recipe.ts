/** Recipes spoiled in one place, and what is said of them. */
import type { RecipeProblem } from '../../src/recipe/problems';
import { validateRecipe } from '../../src/recipe/validate';
import { contractCopy, type Spoilable } from './contract-recipe';

export function problemsOf(value: unknown): readonly RecipeProblem[] {
  const result = validateRecipe(value);
  return result.ok ? [] : result.problems;
}

/** The contract's recipe with one thing changed. */
export function spoiled(change: (recipe: Spoilable) => void): readonly RecipeProblem[] {
  const recipe = contractCopy();
  change(recipe);
  return problemsOf(recipe);
}

export const set = (target: unknown, fields: Record<string, unknown>): void => {
  Object.assign(target as object, fields);
};
