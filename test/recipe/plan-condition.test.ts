import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { defaults } from '../../src/recipe/default-values';
import { type ConditionContext, chainSteps, conditionFiles } from '../../src/recipe/plan-condition';
import type { Recipe } from '../../src/recipe/schema';
import { validateRecipe } from '../../src/recipe/validate';
import { planChain } from '../../src/science/condition/chain';
import { gridOf } from '../science/condition/made-conditioned';
import { step as arbitraryStep } from './arbitrary-step';

type Steps = NonNullable<Recipe['condition']>;

const recipeOf = (...condition: Steps): Recipe => ({ recipe: 1, condition });
const dark = { name: 'dark.npy', shape: [8], values: new Float64Array(8).fill(3), y0: 0 };
const curve = {
  name: 'qe.csv',
  unit: 'eV',
  medium: 'air',
  axis: [1, 3],
  response: [1, 0.5],
} as const;
const context: ConditionContext = {
  laserEv: 2.33,
  medium: 'air',
  files: { recordings: new Map([['dark.npy', dark]]), curves: new Map([['qe.csv', curve]]) },
};
const stepsOf = (...condition: Steps) => chainSteps(recipeOf(...condition), context);

describe('the condition block as a chain', () => {
  it('has every default filled in', () => {
    expect(
      stepsOf(
        { step: 'despike' },
        { step: 'baseline', method: 'arpls' },
        { step: 'baseline', method: 'asls' },
        { step: 'baseline', method: 'snip' },
        { step: 'baseline', method: 'polynomial' },
        { step: 'denoise', method: 'svd' },
        { step: 'align-rows' },
        { step: 'bin', k: 2 },
      ),
    ).toEqual([
      { isOff: false, step: 'despike', ...defaults.despike, kept: [] },
      { isOff: false, step: 'baseline', method: 'arpls', smoothness: 1e5, iterations: 20 },
      {
        isOff: false,
        step: 'baseline',
        method: 'asls',
        smoothness: 1e5,
        asymmetry: 0.01,
        iterations: 20,
      },
      { isOff: false, step: 'baseline', method: 'snip', halfWidth: 40 },
      { isOff: false, step: 'baseline', method: 'polynomial', degree: 2, windows: null },
      { isOff: false, step: 'denoise', rank: 'auto' },
      { isOff: false, step: 'align-rows', maxShiftPx: 3 },
      { isOff: false, step: 'bin', x: 1, y: 1, k: 2 },
    ]);
  });

  it('has its files at hand, and energies in eV', () => {
    const [offset, response, farfield, crop] = stepsOf(
      { step: 'offset', file: 'dark.npy' },
      { step: 'response', file: 'qe.csv' },
      { step: 'farfield', file: 'dark.npy', scale: 'fit', window: [1.9, 2] },
      { step: 'crop', axis: [0, 8065.543937], unit: 'cm-1', x: [0, 3] },
    );
    expect(offset).toEqual({ isOff: false, step: 'offset', dark });
    expect(response).toEqual({ isOff: false, step: 'response', curve });
    expect(farfield).toMatchObject({ outside: dark, scale: 'fit', window: [1.9, 2] });
    // 8065.543937 cm⁻¹ is 1 eV (CODATA 2018).
    expect(crop).toMatchObject({ x: [0, 3], y: null });
    const [low, high] = crop.isOff || crop.step !== 'crop' ? [] : (crop.axisEv ?? []);
    expect(low).toBeCloseTo(1.33, 9);
    expect(high).toBeCloseTo(2.33, 9);
  });

  it('keeps the places of steps that are off, and looks at nothing of them', () => {
    const steps = stepsOf({ step: 'offset', file: 'gone.npy', off: true }, { step: 'bin', k: 2 });
    expect(steps[0]).toEqual({ isOff: true, step: 'offset' });
    const { steps: planned } = planChain(steps, gridOf({ ny: 1, nx: 1, nk: 8 }));
    expect(planned.map(({ place }) => place)).toEqual(['condition[1], bin']);
  });

  it('lists the files it needs', () => {
    const recipe = recipeOf(
      { step: 'offset', file: 'dark.npy' },
      { step: 'offset', counts: 3 },
      { step: 'response', file: 'qe.csv' },
      { step: 'farfield', file: 'out.npy', off: true },
    );
    expect(conditionFiles(recipe)).toEqual([
      { path: 'dark.npy', kind: 'recording', where: 'condition[0].file' },
      { path: 'qe.csv', kind: 'curve', where: 'condition[2].file' },
    ]);
    expect(conditionFiles({ recipe: 1 })).toEqual([]);
  });

  it('is refused without a file, or a laser for shifts', () => {
    expect(() => stepsOf({ step: 'response', file: 'gone.csv' })).toThrow(
      'gone.csv was not read (condition[0], response)',
    );
    const blind = { ...context, laserEv: null };
    const crop = recipeOf({ step: 'crop', axis: [100, 200], unit: 'cm-1' });
    expect(() => chainSteps(crop, blind)).toThrow('condition[0], crop');
  });

  it('exists for every valid block, or is refused in a sentence that names the step', () => {
    fc.assert(
      fc.property(fc.array(arbitraryStep, { maxLength: 4 }), (condition) => {
        const result = validateRecipe({ recipe: 1, condition });
        if (!result.ok) return;
        const { recipe } = result;
        const paths = conditionFiles(recipe).map(({ path }) => path);
        const files = {
          recordings: new Map(paths.map((path) => [path, dark])),
          curves: new Map(paths.map((path) => [path, curve])),
        };
        try {
          const steps = chainSteps(recipe, { ...context, files });
          expect(steps).toHaveLength(condition.length);
          planChain(steps, gridOf({ ny: 4, nx: 4, nk: 8 }));
        } catch (error) {
          expect(error).toMatchObject({
            kind: 'recipe',
            where: expect.stringMatching(/^condition\[\d\], /),
          });
        }
      }),
    );
  });
});
