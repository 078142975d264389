import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { emptyRecipe } from '../../src/recipe/defaults';
import { setTitle } from '../../src/recipe/edits';
import { createRecipeStore } from '../../src/state/recipe-store';

const titled = (title: string) => (recipe: Parameters<typeof setTitle>[0]) =>
  setTitle(recipe, title);

describe('the history of a recipe', () => {
  it('takes one step back for each edit, and forward again', () => {
    const store = createRecipeStore(emptyRecipe('start'));
    store.edit('one', titled('one'));
    store.edit('two', titled('two'));
    store.undo();
    expect(store.getState().recipe.title).toBe('one');
    store.redo();
    expect(store.getState().recipe.title).toBe('two');
    store.undo();
    store.undo();
    store.undo();
    expect(store.getState().recipe.title).toBe('start');
  });

  it('makes one step of a gesture, however many edits it has', () => {
    const store = createRecipeStore(emptyRecipe('start'));
    for (const title of ['a', 'b', 'c']) store.edit('drag', titled(title), 'drag');
    store.endGesture();
    store.edit('drag', titled('d'), 'drag');
    expect(store.getState().past).toHaveLength(2);
    store.undo();
    expect(store.getState().recipe.title).toBe('c');
    store.undo();
    expect(store.getState().recipe.title).toBe('start');
  });

  it('forgets what was undone once something else is done', () => {
    const store = createRecipeStore(emptyRecipe('start'));
    store.edit('one', titled('one'));
    store.undo();
    store.edit('other', titled('other'));
    store.redo();
    expect(store.getState().recipe.title).toBe('other');
  });

  it('does not grow by an edit that changes nothing', () => {
    const store = createRecipeStore(emptyRecipe('start'));
    store.edit('nothing', (recipe) => recipe);
    expect(store.getState().past).toEqual([]);
  });

  it('names the edit that undo takes back and redo brings', () => {
    const store = createRecipeStore(emptyRecipe('start'));
    store.edit('Move band tail', titled('moved'));
    expect(store.getState().past.at(-1)?.label).toBe('Move band tail');
    store.undo();
    expect(store.getState().future[0]?.label).toBe('Move band tail');
  });

  it('leads back to the start and forth to the end, whatever was done between', () => {
    fc.assert(
      fc.property(
        fc.array(fc.string({ minLength: 1, maxLength: 8 }), { maxLength: 30 }),
        (titles) => {
          const store = createRecipeStore(emptyRecipe('start'));
          for (const title of titles) store.edit('edit', titled(title));
          const end = store.getState().recipe;
          const steps = store.getState().past.length;
          for (let step = 0; step < steps; step++) store.undo();
          expect(store.getState().recipe).toEqual(emptyRecipe('start'));
          for (let step = 0; step < steps; step++) store.redo();
          expect(store.getState().recipe).toBe(end);
        },
      ),
    );
  });
});
