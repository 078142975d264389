import { describe, expect, it } from 'vitest';
import { serialiseRecipe } from '../../src/recipe/serialise';
import { parseRecipe } from '../../src/recipe/validate';
import { openWorkbench } from './open-workbench';

describe('the recipe a fresh scan begins with', () => {
  it('is a whole recipe: three adjoining bands over the light, all in the blend, titled by the file', async () => {
    const { workbench, made } = await openWorkbench(null);
    const { recipe } = workbench.recipe.getState();
    expect(parseRecipe(serialiseRecipe(recipe))).toMatchObject({ ok: true });
    expect(recipe.title).toBe('made');
    const bands = recipe.bands ?? [];
    expect(bands.map(({ name }) => name)).toEqual(['low', 'middle', 'high']);
    expect(bands[1]?.from).toBe(bands[0]?.to);
    expect(bands[2]?.from).toBe(bands[1]?.to);
    expect(bands[0]?.from).toBeGreaterThan(made.energiesEv[0] ?? 9);
    expect(bands[2]?.to).toBeLessThan(made.energiesEv.at(-1) ?? 0);
    expect(recipe.blend?.channels.map(({ source }) => source)).toEqual([
      'band.low.integral',
      'band.middle.integral',
      'band.high.integral',
    ]);
  });

  it('states how the file was read, so that it reads the same without guessing', async () => {
    const { workbench } = await openWorkbench(null);
    expect(workbench.recipe.getState().recipe.scan).toMatchObject({
      data: 'counts',
      order: 'yxk',
      axis: { kind: 'energy', unit: 'eV' },
    });
    expect(workbench.recipe.getState().past).toEqual([]);
  });

  it('gives every band a share of the light in its maps', async () => {
    const { workbench } = await openWorkbench(null);
    const { maps } = workbench.results.getState();
    for (const name of ['low', 'middle', 'high']) {
      const values = maps.get(`band.${name}.integral`)?.values ?? new Float64Array();
      expect(values).toHaveLength(63);
      expect(Math.min(...values)).toBeGreaterThan(100);
    }
  });
});
