import { describe, expect, it } from 'vitest';
import { setScanChoices } from '../../src/recipe/edits';
import { openScan } from '../../src/state/scan-opening';
import { type OpenWorkbench, openWorkbench, pause } from './open-workbench';

const pixelSize = ({ workbench }: OpenWorkbench): number | undefined =>
  workbench.session.getState().scan?.open.plan.meta.x.pitch;

async function readAgain({ workbench }: OpenWorkbench, change: () => void): Promise<void> {
  const { scanNumber } = workbench.session.getState();
  change();
  while (workbench.session.getState().scanNumber === scanNumber) await pause();
}

describe('how the scan is read', () => {
  it('follows the recipe, and its undo', async () => {
    const open = await openWorkbench();
    const before = pixelSize(open);
    const state = () =>
      open.workbench.recipe.edit('Correct', (recipe) =>
        setScanChoices(recipe, { ...recipe.scan, pixel: { x: 40, y: 40, unit: 'nm' } }),
      );
    await readAgain(open, state);
    expect(pixelSize(open)).toBe(40);
    await readAgain(open, open.workbench.recipe.undo);
    expect(pixelSize(open)).toBe(before);
  });

  it('keeps the crosshair where it is', async () => {
    const open = await openWorkbench();
    open.workbench.crosshair.set({ y: 3, x: 4 });
    await readAgain(open, () =>
      open.workbench.recipe.edit('Correct', (recipe) =>
        setScanChoices(recipe, { ...recipe.scan, exposure_s: 2 }),
      ),
    );
    expect(open.workbench.crosshair.get()).toEqual({ y: 3, x: 4 });
  });
});

describe('the scan on screen', () => {
  it('stays when another is stopped while it loads', async () => {
    const { workbench, made } = await openWorkbench();
    const { scan } = workbench.session.getState();
    if (scan === null) throw new Error('no scan');
    const opening = openScan(workbench, {
      inputs: made.inputs,
      plan: scan.open.plan,
      url: null,
      recipeFor: null,
    });
    workbench.session.getState().running?.stop();
    expect(await opening).toBe(false);
    expect(workbench.session.getState().scan).toBe(scan);
    expect(workbench.session.getState().running).toBeNull();
    expect(workbench.notices.getState().notices).toEqual([]);
  });
});

describe('the hovered spectrum', () => {
  it('is that of the newest pixel, whatever came before', async () => {
    const { workbench, made } = await openWorkbench();
    for (let x = 0; x < 9; x++) workbench.crosshair.set({ y: 2, x });
    const wanted = 2 * 9 + 8;
    while (workbench.spectra.getState().hovered?.pixel.x !== 8) await pause();
    expect([...(workbench.spectra.getState().hovered?.counts ?? [])]).toEqual([
      ...made.counts.subarray(wanted * made.nk, (wanted + 1) * made.nk),
    ]);
  });

  it('goes with the crosshair', async () => {
    const { workbench } = await openWorkbench();
    workbench.crosshair.set({ y: 0, x: 0 });
    while (workbench.spectra.getState().hovered === null) await pause();
    workbench.crosshair.set(null);
    expect(workbench.spectra.getState().hovered).toBeNull();
  });
});
