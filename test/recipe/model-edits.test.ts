import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  addComponent,
  nextComponentName,
  removeComponent,
  renameComponent,
  setComponent,
  setModel,
  setModelWindow,
} from '../../src/recipe/model-edits';
import type { ModelComponent, Recipe } from '../../src/recipe/schema';
import { validateRecipe } from '../../src/recipe/validate';
import { arbitraryRecipe } from './arbitrary-recipe';

const exciton: ModelComponent = { name: 'exciton', role: 'exciton', shape: 'gaussian', centre: 2 };
const tail: ModelComponent = {
  name: 'tail',
  shape: 'gaussian',
  centre: { tie: { to: 'exciton.centre', plus: -0.09 } },
};
const base: Recipe = {
  recipe: 1,
  model: { components: [exciton, tail] },
  blend: {
    mode: 'additive',
    channels: [
      { source: 'fit.exciton.area', colour: '#ff0000' },
      { source: 'fit.tail.area', colour: '#00ff00' },
    ],
  },
};

const componentOf = (recipe: Recipe, name: string): ModelComponent | undefined =>
  recipe.model?.components.find((component) => component.name === name);

describe('a component', () => {
  it('begins a model, or joins one', () => {
    const begun = addComponent({ recipe: 1 }, exciton);
    expect(begun.model).toEqual({ components: [exciton] });
    const line: ModelComponent = { name: 'floor', shape: 'line' };
    expect(addComponent(begun, line).model?.components).toEqual([exciton, line]);
  });

  it('is refused under a name that is taken, in capitals or not, and where it is not valid', () => {
    expect(() => addComponent(base, { ...exciton, name: 'Tail' })).toThrow(/taken/);
    expect(() => addComponent(base, { name: 'x', shape: 'gaussian', fwhm: -1 })).toThrow(/fwhm/);
  });

  it('takes its ties and maps along to a new name', () => {
    const renamed = renameComponent(base, 'exciton', 'A');
    expect(componentOf(renamed, 'tail')).toMatchObject({ centre: { tie: { to: 'A.centre' } } });
    expect(renamed.blend?.channels.map(({ source }) => source)).toEqual([
      'fit.A.area',
      'fit.tail.area',
    ]);
  });

  it('goes with the ties to it and what was made from its maps', () => {
    const without = removeComponent(base, 'exciton');
    expect(without.model?.components).toEqual([{ ...tail, centre: {} }]);
    expect(without.blend?.channels.map(({ source }) => source)).toEqual(['fit.tail.area']);
    expect(removeComponent(without, 'tail')).toEqual({ recipe: 1 });
  });

  it('of another shape loses what was made from maps it has no more', () => {
    const wide = setComponent(base, 'tail', { name: 'tail', shape: 'flat' });
    expect(wide.blend?.channels.map(({ source }) => source)).toEqual(['fit.exciton.area']);
  });

  it('gets a name nobody has', () => {
    expect(nextComponentName(base, 'peak')).toBe('peak');
    expect(nextComponentName(base, 'Exciton')).toBe('Exciton-2');
  });
});

describe('the model', () => {
  it('has a window, or the whole axis', () => {
    const narrow = setModelWindow(base, [1.9, 2.1]);
    expect(narrow.model?.window).toEqual([1.9, 2.1]);
    expect(setModelWindow(narrow, null).model).toEqual(base.model);
    expect(() => setModelWindow(base, [2, 2])).toThrow();
  });

  it('is refused where a tie leads nowhere', () => {
    expect(() => setModel(base, { components: [tail] })).toThrow(/exciton\.centre/);
  });

  it('stays valid through any edit of a valid recipe', () => {
    fc.assert(
      fc.property(arbitraryRecipe, fc.nat(), (value, pick) => {
        const result = validateRecipe(value);
        if (!result.ok || result.recipe.model === undefined) return;
        const { recipe } = result;
        const { components } = result.recipe.model;
        const { name } = components[pick % components.length] as ModelComponent;
        const edited = [
          removeComponent(recipe, name),
          renameComponent(recipe, name, `${name}q`.slice(0, 60)),
          addComponent(recipe, { ...exciton, name: nextComponentName(recipe, 'new') }),
        ];
        for (const one of edited) expect(validateRecipe(one)).toMatchObject({ ok: true });
      }),
      { numRuns: 60 },
    );
  });
});
