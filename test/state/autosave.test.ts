import { describe, expect, it } from 'vitest';
import { emptyRecipe } from '../../src/recipe/defaults';
import { serialiseRecipe } from '../../src/recipe/serialise';
import {
  loadLastWork,
  loadRecipeFor,
  startAutosave,
  type WorkStorage,
} from '../../src/state/autosave';
import { moveBandEnds } from '../../src/state/band-actions';
import { offerEarlierRecipe } from '../../src/state/earlier-recipe';
import { openLastWork } from '../../src/state/last-work';
import { openOffered } from '../../src/state/scan-opening';
import { createWorkbench, type Workbench } from '../../src/state/workbench';
import type { ScanInputs } from '../../workers/engine';
import { createInProcessEngine } from '../../workers/in-process-engine';
import { makeScan } from '../workers/made-scan';
import { memoryStorage, openWorkbench, pause, twoBands } from './open-workbench';

const now = () => new Date('2026-05-04T10:00:00Z');

/** Waits until the work on screen, its hash known, is what the storage holds. */
async function written({ session, recipe }: Workbench, storage: WorkStorage): Promise<void> {
  const isThere = async (): Promise<boolean> => {
    const last = await loadLastWork(storage);
    const { sha256 } = session.getState();
    const isSameRecipe = last?.work.recipeText === serialiseRecipe(recipe.getState().recipe);
    return isSameRecipe && sha256 !== null && last.work.sha256 === sha256;
  };
  while (!(await isThere())) await pause();
  // The recipe under its scan's hash is written right after.
  await pause(0);
}

describe('the work of a visit', () => {
  it('is written down after an edit, with the name and hash of its scan', async () => {
    const storage = memoryStorage();
    const { workbench } = await openWorkbench();
    startAutosave(workbench, storage, now);
    moveBandEnds(workbench, { name: 'low' }, { fromEv: 1.83, toEv: 1.87 });
    await written(workbench, storage);
    const last = await loadLastWork(storage);
    expect(last?.work).toMatchObject({ scanName: 'made.npz', savedAt: '2026-05-04T10:00:00.000Z' });
    expect(last?.work.sha256).toMatch(/^[0-9a-f]{64}$/);
    expect(last?.recipe).toEqual(workbench.recipe.getState().recipe);
  });

  it('opens again with the user’s own file, and the maps are the same', async () => {
    const { workbench, made } = await openWorkbench();
    const before = workbench.results.getState().maps.get('band.low.integral');
    const again = createWorkbench(createInProcessEngine());
    const { recipe } = workbench.recipe.getState();
    expect(await openLastWork(again, made.inputs, recipe)).toBe(true);
    while (!again.results.getState().maps.has('band.low.integral')) await pause();
    expect(again.results.getState().maps.get('band.low.integral')?.values).toEqual(before?.values);
    expect(again.recipe.getState().recipe).toEqual(recipe);
  });

  it('goes through storage and back: a file of the user’s comes with the recipe it was left with', async () => {
    const storage = memoryStorage();
    const first = createWorkbench(createInProcessEngine());
    startAutosave(first, storage, now);
    const { inputs } = makeScan();
    await openLastWork(first, inputs, twoBands);
    moveBandEnds(first, { name: 'low' }, { fromEv: 1.83, toEv: 1.87 });
    await written(first, storage);
    while (!first.results.getState().maps.has('band.low.integral')) await pause();
    const last = await loadLastWork(storage);
    if (last === null || last.inputs === null) throw new Error('the file was not kept');
    const second = createWorkbench(createInProcessEngine());
    await openLastWork(second, last.inputs, last.recipe);
    while (!second.results.getState().maps.has('band.low.integral')) await pause();
    const { maps } = second.results.getState();
    expect(second.recipe.getState().recipe.bands?.[0]).toMatchObject({ from: 1.83, to: 1.87 });
    expect(maps.get('band.low.integral')?.values).toEqual(
      first.results.getState().maps.get('band.low.integral')?.values,
    );
  });

  it('never comes with the file of another scan', async () => {
    const storage = memoryStorage();
    const { workbench, made } = await openWorkbench();
    startAutosave(workbench, storage, now);
    await openLastWork(workbench, made.inputs, twoBands);
    await written(workbench, storage);
    expect((await loadLastWork(storage))?.inputs?.scan.name).toBe('made.npz');
    const other = { ...made.inputs, scan: { ...made.inputs.scan, name: 'other.npz' } };
    await storage.set('last-inputs', other);
    const last = await loadLastWork(storage);
    expect(last?.work.scanName).toBe('made.npz');
    expect(last?.inputs).toBeNull();
    // Nor with a file of the same name where the page itself offered the scan.
    await storage.set('last-inputs', made.inputs);
    await storage.set('last-work', { ...last?.work, url: '/sample-data/made.npz' });
    expect((await loadLastWork(storage))?.inputs).toBeNull();
    await storage.set('last-work', { ...last?.work, url: null });
    expect((await loadLastWork(storage))?.inputs).toEqual(made.inputs);
  });

  it('keeps no copy of a file the page can fetch again', async () => {
    const storage = memoryStorage();
    const { workbench, made } = await openWorkbench();
    startAutosave(workbench, storage, now);
    await storage.set('last-inputs', made.inputs);
    await openOffered(workbench, made.inputs, twoBands, '/sample-data/made.npz');
    moveBandEnds(workbench, { name: 'low' }, { fromEv: 1.83, toEv: 1.87 });
    await written(workbench, storage);
    expect(storage.kept.get('last-inputs')).toBeNull();
    const last = await loadLastWork(storage);
    expect(last?.work.url).toBe('/sample-data/made.npz');
    expect(last?.inputs).toBeNull();
  });

  it('keeps a copy of a file up to 256 MB, and of none larger', async () => {
    const storage = memoryStorage();
    const { workbench, made } = await openWorkbench();
    startAutosave(workbench, storage, now);
    const { scan } = workbench.session.getState();
    if (scan === null) throw new Error('no scan');
    const sized = (size: number): ScanInputs => {
      // As large as it says, without the bytes: only its size is asked for.
      const blob = Object.defineProperty(new Blob(['']), 'size', { value: size });
      return { scan: { kind: 'blob', name: 'sized.npz', blob }, companions: [made.inputs.scan] };
    };
    const companion = made.inputs.scan.kind === 'memory' ? made.inputs.scan.bytes.length : 0;
    const keptOf = async (size: number): Promise<unknown> => {
      workbench.session.setState(({ scanNumber }) => ({
        scan: { ...scan, inputs: sized(size), url: null },
        scanNumber: scanNumber + 1,
      }));
      await pause(0);
      return storage.kept.get('last-inputs');
    };
    expect(await keptOf(2 ** 28 - companion)).toMatchObject({ scan: { name: 'sized.npz' } });
    expect(await keptOf(2 ** 28 - companion + 1)).toBeNull();
  });

  it('that can no longer be read is told of, and leaves the screen as it is', async () => {
    const workbench = createWorkbench(createInProcessEngine());
    const bytes = new TextEncoder().encode('no scan any more');
    const inputs = { scan: { kind: 'memory' as const, name: 'gone.npy', bytes }, companions: [] };
    expect(await openLastWork(workbench, inputs, emptyRecipe(''))).toBe(false);
    expect(workbench.session.getState().scan).toBeNull();
    expect(workbench.notices.getState().notices).toHaveLength(1);
  });

  it('is none where what was kept is damaged', async () => {
    const storage = memoryStorage();
    await storage.set('last-work', { scanName: 'x', recipeText: '{"recipe": 99}' });
    expect(await loadLastWork(storage)).toBeNull();
    await storage.set('last-work', 'nonsense');
    expect(await loadLastWork(storage)).toBeNull();
  });

  it('is told once where the browser keeps nothing', async () => {
    const { workbench } = await openWorkbench();
    let tries = 0;
    const refusing = {
      get: async () => undefined,
      set: async () => {
        tries++;
        throw new Error('quota');
      },
    };
    startAutosave(workbench, refusing, now);
    for (const toEv of [1.87, 1.86]) {
      const before = tries;
      moveBandEnds(workbench, { name: 'low' }, { fromEv: 1.83, toEv });
      while (tries === before) await pause();
      await pause(0);
    }
    expect(workbench.notices.getState().notices.map(({ text }) => text)).toEqual([
      'This browser does not keep the work for the next visit.',
    ]);
  });
});

describe('the recipe kept under a scan’s hash', () => {
  it('is not overwritten by one nobody has touched, and is offered when the scan is opened', async () => {
    const storage = memoryStorage();
    const first = await openWorkbench();
    startAutosave(first.workbench, storage, now);
    moveBandEnds(first.workbench, { name: 'low' }, { fromEv: 1.83, toEv: 1.87 });
    await written(first.workbench, storage);
    const { sha256 } = first.workbench.session.getState();
    const edited = first.workbench.recipe.getState().recipe;

    const second = createWorkbench(createInProcessEngine());
    offerEarlierRecipe(second, storage);
    startAutosave(second, storage, now);
    await openLastWork(second, first.made.inputs, twoBands);
    while (second.session.getState().sha256 === null) await pause();
    await written(second, storage);
    expect((await loadRecipeFor(storage, sha256 ?? ''))?.recipe).toEqual(edited);
    const [notice] = second.notices.getState().notices;
    expect(notice?.text).toBe('made.npz was open before.');
    notice?.action?.run();
    expect(second.recipe.getState().recipe).toEqual(edited);
    second.recipe.undo();
    expect(second.recipe.getState().recipe).toEqual(twoBands);
  });

  it('is not offered over another scan', async () => {
    const storage = memoryStorage();
    const first = await openWorkbench();
    startAutosave(first.workbench, storage, now);
    moveBandEnds(first.workbench, { name: 'low' }, { fromEv: 1.83, toEv: 1.87 });
    await written(first.workbench, storage);
    const second = createWorkbench(createInProcessEngine());
    offerEarlierRecipe(second, storage);
    await openLastWork(second, first.made.inputs, twoBands);
    while (second.notices.getState().notices.length === 0) await pause();
    await openLastWork(second, makeScan({ seed: 4 }).inputs, twoBands);
    expect(second.notices.getState().notices).toEqual([]);
  });
});
