/** The text of a recipe: same for the same recipe, easy to compare line by line. */
import { describe, expect, it } from 'vitest';
import type { Recipe } from '../../src/recipe/schema';
import { serialiseRecipe } from '../../src/recipe/serialise';
import { parseRecipe, validateRecipe } from '../../src/recipe/validate';
import { contractRecipe } from './contract-recipe';

function ensureRecipe(value: unknown): Recipe {
  const result = validateRecipe(value);
  if (!result.ok) throw new Error(result.problems[0].message);
  return result.recipe;
}

describe('the text of a recipe', () => {
  it('has one line for a band, a step, a pin, whatever order the fields were given in', () => {
    const recipe = ensureRecipe({
      bands: [
        { unit: 'eV', to: 1.925, floor: 'none', from: 1.865, name: 'tail' },
        { name: 'A1', from: 405, to: 430, unit: 'cm-1' },
      ],
      pins: [{ y: 16, x: 12, name: 'A', label: 'flat "µm"' }],
      condition: [{ threshold: 6, step: 'despike', off: true }],
      title: 'Tent field',
      recipe: 1,
    });
    expect(serialiseRecipe(recipe)).toBe(`{
  "recipe": 1,
  "title": "Tent field",
  "condition": [
    { "step": "despike", "off": true, "threshold": 6 }
  ],
  "bands": [
    { "name": "tail", "from": 1.865, "to": 1.925, "unit": "eV", "floor": "none" },
    { "name": "A1", "from": 405, "to": 430, "unit": "cm-1" }
  ],
  "pins": [
    { "name": "A", "x": 12, "y": 16, "label": "flat \\"µm\\"" }
  ]
}
`);
  });

  it('fills lines with a long list of numbers', () => {
    const values = Array.from({ length: 60 }, (_, k) => 500.25 + k);
    const text = serialiseRecipe(ensureRecipe({ recipe: 1, scan: { axis: { values } } }));
    const lines = text.split('\n');
    expect(Math.max(...lines.map((line) => line.length))).toBeLessThanOrEqual(100);
    expect(lines.length).toBeLessThan(20);
    expect(parseRecipe(text)).toEqual({
      ok: true,
      recipe: { recipe: 1, scan: { axis: { values } } },
    });
  });

  it('of the contract’s example stays within 100 columns and comes back equal', () => {
    const recipe = ensureRecipe(contractRecipe);
    const text = serialiseRecipe(recipe);
    expect(Math.max(...text.split('\n').map((line) => line.length))).toBeLessThanOrEqual(100);
    expect(parseRecipe(text)).toEqual({ ok: true, recipe });
    expect(text).toMatchSnapshot();
  });

  it('keeps a title no line can hold, empty blocks and the sign of zero', () => {
    const recipe = ensureRecipe({
      recipe: 1,
      title: 'x\n"y" '.repeat(60),
      scan: {},
      bands: [],
      condition: [{ step: 'offset', counts: -0 }],
    });
    expect(parseRecipe(serialiseRecipe(recipe))).toEqual({ ok: true, recipe });
  });
});
