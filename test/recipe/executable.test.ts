/** What this build cannot run is said, never skipped. */
import { describe, expect, it } from 'vitest';
import { RimlightError } from '../../src/errors';
import { assertExecutable, unbuiltBlocks } from '../../src/recipe/executable';
import type { Recipe } from '../../src/recipe/schema';
import { validateRecipe } from '../../src/recipe/validate';
import { contractRecipe } from './contract-recipe';

function ensureRecipe(value: unknown): Recipe {
  const result = validateRecipe(value);
  if (!result.ok) throw new Error(result.problems[0].message);
  return result.recipe;
}

describe('what this build cannot run', () => {
  it('is nothing in a recipe of scan, bands, blend, pins and regions', () => {
    const { recipe, title, scan, bands, blend, regions } = contractRecipe;
    const pins = [{ name: 'A', x: 0, y: 0 }];
    const built = ensureRecipe({ recipe, title, scan, bands, blend, regions, pins });
    expect(unbuiltBlocks(built)).toEqual([]);
    expect(() => assertExecutable(built)).not.toThrow();
  });

  it('is every step that is not off, and strain and features', () => {
    expect(unbuiltBlocks(ensureRecipe(contractRecipe)).map(({ path }) => path)).toEqual([
      ...contractRecipe.condition.map((_, index) => `condition[${index}]`),
      'strain',
      'features',
    ]);
  });

  it('does not count steps that are off', () => {
    const condition = contractRecipe.condition.map((step) => ({ ...step, off: true }));
    expect(unbuiltBlocks(ensureRecipe({ recipe: 1, condition }))).toEqual([]);
  });

  it('is named in the error, with its place and what can be done', () => {
    const condition = [
      { step: 'despike', off: true },
      { step: 'offset', counts: 1 },
    ];
    const features = { source: 'scan.height' };
    const run = (): void => assertExecutable(ensureRecipe({ recipe: 1, condition, features }));
    expect(run).toThrow(RimlightError);
    expect(run).toThrow(
      'this build cannot run the offset step and the features yet (condition[1], features). Set "off": true in the steps to keep them for later, and take out the other blocks.',
    );
  });
});
