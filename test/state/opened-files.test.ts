import { describe, expect, it } from 'vitest';
import { serialiseRecipe } from '../../src/recipe/serialise';
import { openFiles } from '../../src/state/opened-files';
import { openRecipe, recipeFile } from '../../src/state/recipe-files';
import { acceptImport } from '../../src/state/scan-opening';
import { openWorkbench, pause, twoBands } from './open-workbench';

const file = (name: string, content: string | Uint8Array<ArrayBuffer>) => new File([content], name);

describe('a recipe file', () => {
  it('is named after its scan and opens as it was saved', async () => {
    const { workbench } = await openWorkbench();
    const { name, text } = recipeFile(workbench);
    expect(name).toBe('made.recipe.json');
    const before = workbench.recipe.getState().recipe;
    workbench.recipe.edit('change', (recipe) => ({ ...recipe, title: 'another' }));
    openRecipe(workbench, text, name);
    expect(workbench.recipe.getState().recipe).toEqual(before);
    workbench.recipe.undo();
    expect(workbench.recipe.getState().recipe.title).toBe('another');
  });

  it('that says nothing of the scan leaves it as it is read', async () => {
    const { workbench } = await openWorkbench();
    const { scan } = workbench.recipe.getState().recipe;
    openRecipe(workbench, serialiseRecipe({ recipe: 1, title: 'bare' }), 'bare.json');
    expect(workbench.recipe.getState().recipe).toEqual({ recipe: 1, title: 'bare', scan });
  });

  it('that says the same of the scan in other words does not have it read again', async () => {
    const { workbench } = await openWorkbench();
    const { scan } = workbench.recipe.getState().recipe;
    const reversed = Object.fromEntries(Object.entries(scan ?? {}).reverse());
    const { scanNumber } = workbench.session.getState();
    openRecipe(
      workbench,
      JSON.stringify({ recipe: 1, scan: reversed, title: 'same' }),
      'same.json',
    );
    await pause(100);
    expect(workbench.recipe.getState().recipe.title).toBe('same');
    expect(workbench.session.getState().running).toBeNull();
    expect(workbench.session.getState().scanNumber).toBe(scanNumber);
  });

  it('with a mistake is refused in one notice that names it, and nothing changes', async () => {
    const { workbench } = await openWorkbench();
    const before = workbench.recipe.getState().recipe;
    await openFiles(workbench, [file('wrong.json', '{"recipe": 1, "bnads": []}')]);
    expect(workbench.recipe.getState().recipe).toBe(before);
    const [notice, ...others] = workbench.notices.getState().notices;
    expect(others).toEqual([]);
    expect(notice?.text).toContain('wrong.json was not opened');
    expect(notice?.text).toContain('bands');
  });
});

describe('files given together', () => {
  it('are a scan with its recipe', async () => {
    const { workbench, made } = await openWorkbench(null);
    const scan = made.inputs.scan;
    if (scan.kind !== 'memory') throw new Error('the made scan lies in memory');
    const bytes = Uint8Array.from(scan.bytes);
    await openFiles(workbench, [
      file('with.recipe.json', serialiseRecipe(twoBands)),
      file('again.npz', bytes),
    ]);
    while (workbench.session.getState().draft?.isLooking !== false) await pause();
    await acceptImport(workbench);
    expect(workbench.session.getState().scan?.inputs.scan.name).toBe('again.npz');
    expect(workbench.recipe.getState().recipe.bands).toEqual(twoBands.bands);
  });

  it('to an open sheet join its scan; with a recipe they are another scan', async () => {
    const { workbench, made } = await openWorkbench();
    const scan = made.inputs.scan;
    if (scan.kind !== 'memory') throw new Error('the made scan lies in memory');
    const bytes = Uint8Array.from(scan.bytes);
    const names = (): readonly (string | undefined)[] => {
      const inputs = workbench.session.getState().draft?.inputs;
      return [inputs?.scan.name, ...(inputs?.companions ?? []).map(({ name }) => name)];
    };
    await openFiles(workbench, [file('first.npz', bytes)]);
    await openFiles(workbench, [file('height.npy', bytes)]);
    expect(names()).toEqual(['first.npz', 'height.npy']);
    // The same file once more takes the place of the one before.
    await openFiles(workbench, [file('height.npy', bytes)]);
    expect(names()).toEqual(['first.npz', 'height.npy']);
    await openFiles(workbench, [
      file('second.npz', bytes),
      file('with.recipe.json', serialiseRecipe(twoBands)),
    ]);
    expect(names()).toEqual(['second.npz']);
    expect(workbench.session.getState().draft?.recipe?.bands).toEqual(twoBands.bands);
  });

  it('that are no scan leave the scan on screen, with one sentence', async () => {
    const { workbench } = await openWorkbench();
    const { scan } = workbench.session.getState();
    await openFiles(workbench, [file('diary.txt', 'nothing to see\n')]);
    while (workbench.session.getState().draft !== null) await pause();
    expect(workbench.session.getState().scan).toBe(scan);
    expect(workbench.notices.getState().notices).toHaveLength(1);
    expect(workbench.notices.getState().notices[0]?.hint).not.toBe('');
  });
});
