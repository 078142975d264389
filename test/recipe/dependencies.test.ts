/** Which edits leave a kept result in place, and which do not. */
import { describe, expect, it } from 'vitest';
import { dependencyKey } from '../../src/recipe/dependencies';
import * as edits from '../../src/recipe/edits';
import { offeredMaps } from '../../src/recipe/offered-maps';
import type { Recipe } from '../../src/recipe/schema';
import { validateRecipe } from '../../src/recipe/validate';
import { contractRecipe } from './contract-recipe';

function ensureRecipe(value: unknown): Recipe {
  const result = validateRecipe(value);
  if (!result.ok) throw new Error(result.problems[0].message);
  return result.recipe;
}

const sha = 'ab'.repeat(32);
const recipe = ensureRecipe({
  ...contractRecipe,
  strain: {
    ...contractRecipe.strain,
    pl: {
      ...contractRecipe.strain.pl,
      source: 'band.tail.centroid',
      unstrained: { region: 'flat' },
    },
  },
});
const names = offeredMaps(recipe).map(({ name }) => name);

/** Names of the maps whose key an edit changes. */
function touched(change: (recipe: Recipe) => Recipe, sha256 = sha): readonly string[] {
  const changed = change(recipe);
  return names.filter(
    (name) => dependencyKey(name, recipe, sha) !== dependencyKey(name, changed, sha256),
  );
}

const startingWith = (...stems: string[]): readonly string[] =>
  names.filter((name) => stems.some((stem) => name.startsWith(stem)));

describe('the key of a map', () => {
  it('is 64 hexadecimal digits, the same every time and another for each map', () => {
    const keys = names.map((name) => dependencyKey(name, recipe, sha));
    for (const key of keys) expect(key).toMatch(/^[0-9a-f]{64}$/);
    expect(new Set(keys).size).toBe(keys.length);
    expect(names.map((name) => dependencyKey(name, structuredClone(recipe), sha))).toEqual(keys);
  });

  it('is shared by a map and its uncertainty', () => {
    expect(dependencyKey('band.tail.centroid.err', recipe, sha)).toBe(
      dependencyKey('band.tail.centroid', recipe, sha),
    );
  });

  it('changes with a band’s edge for that band and what is made of it, and for nothing else', () => {
    expect(touched((r) => edits.moveBandEdge(r, 'A1', 'to', 431))).toEqual(startingWith('band.A1'));
    expect(touched((r) => edits.moveBandEdge(r, 'tail', 'to', 1.93))).toEqual(
      startingWith('band.tail', 'strain.pl'),
    );
    expect(touched((r) => edits.setBandFloor(r, 'A1', 'none'))).toEqual(startingWith('band.A1'));
  });

  it('does not change with a stated default, the order of ends, or the order of fields', () => {
    const plain = { name: 'tail', unit: 'eV', to: 1.865, from: 1.925 };
    const { strain: _, ...others } = contractRecipe;
    const rewritten = ensureRecipe({ ...others, bands: [plain] });
    for (const name of startingWith('band.tail')) {
      expect(dependencyKey(name, rewritten, sha)).toBe(dependencyKey(name, recipe, sha));
    }
  });

  it('does not change with blend, pins, title, features or a band’s name', () => {
    expect(touched((r) => edits.setBlendMode(r, 'screen'))).toEqual([]);
    expect(touched((r) => edits.addPin(r, { x: 0, y: 0 }))).toEqual([]);
    expect(touched((r) => edits.setTitle(r, 'Other'))).toEqual([]);
    expect(touched(({ features: _, ...rest }) => rest)).toEqual([]);
    const renamed = edits.renameBand(recipe, 'tail', 'rim');
    expect(dependencyKey('band.rim.centroid', renamed, sha)).toBe(
      dependencyKey('band.tail.centroid', recipe, sha),
    );
  });

  it('changes for every map with the scan, its block, or a step; a step that is off is none', () => {
    expect(touched((r) => r, 'cd'.repeat(32))).toEqual(names);
    expect(touched((r) => edits.setScanChoices(r, { serpentine: true }))).toEqual(names);
    expect(touched((r) => edits.toggleStep(r, 0))).toEqual(names);
    const off = edits.toggleStep(recipe, 0);
    const without = { ...recipe, condition: recipe.condition?.slice(1) ?? [] };
    for (const name of startingWith('band')) {
      expect(dependencyKey(name, off, sha)).toBe(dependencyKey(name, without, sha));
    }
  });

  it('changes with the model for the fit and what is made of it', () => {
    const other = (r: Recipe): Recipe =>
      r.model === undefined ? r : { ...r, model: { ...r.model, seed: 'start' } };
    expect(touched(other)).toEqual(startingWith('fit', 'strain.raman'));
  });

  it('changes with a region for the strain that takes it as unstrained', () => {
    const drawn = { name: 'flat', shape: 'rectangle', x: [0, 9], y: [0, 9] } as const;
    expect(touched((r) => edits.replaceRegion(r, 'flat', drawn))).toEqual(
      startingWith('strain.pl', 'strain.raman'),
    );
  });

  it('changes with the content of a file the recipe names', () => {
    const key = (hash: string): string =>
      dependencyKey('band.tail.integral', recipe, sha, new Map([['qe.csv', hash]]));
    expect(key('1')).not.toBe(key('2'));
    expect(key('1')).toBe(key('1'));
  });

  it('of a map the recipe does not make is refused', () => {
    expect(() => dependencyKey('band.nowhere.integral', recipe, sha)).toThrow(/makes no map/);
    expect(() => dependencyKey('nonsense', recipe, sha)).toThrow(/makes no map/);
    expect(() => dependencyKey('fit.status', { recipe: 1 }, sha)).toThrow(/makes no map/);
    expect(() => dependencyKey('strain.height.xx', { recipe: 1 }, sha)).toThrow(/makes no map/);
  });

  it('hashes a long axis once: a drag costs a small part of the first key', () => {
    const recipeOf = (offset: number) =>
      ensureRecipe({
        recipe: 1,
        scan: { axis: { values: Array.from({ length: 100_000 }, (_, k) => offset + k / 1000) } },
        bands: contractRecipe.bands,
      });
    const spent = (work: () => unknown): number => {
      const started = performance.now();
      work();
      return performance.now() - started;
    };
    const fresh = [500, 501, 502].map(recipeOf);
    const first = fresh.map((recipe) =>
      spent(() => dependencyKey('band.tail.integral', recipe, sha)),
    );
    let dragged = fresh[0] as Recipe;
    const steps = Array.from({ length: 50 }, (_, step) => {
      dragged = edits.moveBandEdge(dragged, 'tail', 'to', 1.926 + step / 1000);
      return spent(() => dependencyKey('band.tail.integral', dragged, sha));
    });
    // The quickest of each, so that a busy machine weighs on neither.
    expect(Math.min(...steps)).toBeLessThan(Math.min(...first) / 5);
  });
});
