/** Problems of a recipe as the one error a user meets. */
import { describe, expect, it } from 'vitest';
import { formatProblem, recipeError } from '../../src/recipe/problems';
import { parseRecipe } from '../../src/recipe/validate';
import { problemsOf } from './spoiled-recipe';

describe('the error of a recipe', () => {
  it('says the first problem with its place and the word meant, and how many more there are', () => {
    const result = parseRecipe(
      '{ "recipe": 1,\n  "bands": [{ "name": "a", "from": 1, "to": 2, "unit": "ev", "flor": 1 }] }',
    );
    if (result.ok) throw new Error('passes');
    const error = recipeError(result.problems, 'tent.json');
    expect(error.kind).toBe('recipe');
    expect(error.message).toBe(
      'unit is "ev"; expected "eV", "meV", "nm" or "cm-1", and 1 more problem (tent.json: bands[0].unit, line 2, column 56). Did you mean "eV"?',
    );
  });

  it('shows each problem on one line', () => {
    const [problem] = problemsOf({ recipe: 1, bands: [{ name: 'a', from: 1, to: 2, unit: 'nn' }] });
    expect(formatProblem(problem)).toBe(
      'bands[0].unit: unit is "nn"; expected "eV", "meV", "nm" or "cm-1"; did you mean "nm"?',
    );
  });
});
