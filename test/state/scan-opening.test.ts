import { describe, expect, it } from 'vitest';
import type { ScanChoices } from '../../src/io/scan-choices';
import type { Inspection, ScanPlan } from '../../src/io/scan-plan';
import { emptyRecipe } from '../../src/recipe/defaults';
import { createNotices } from '../../src/state/notices';
import { createRecipeStore } from '../../src/state/recipe-store';
import {
  acceptImport,
  addCompanions,
  cancelImport,
  removeCompanion,
  reviseImport,
  stateChoices,
} from '../../src/state/scan-opening';
import { createSessionStore } from '../../src/state/session-store';
import type { Workbench } from '../../src/state/workbench';
import type { OpenScan, ScanEngine, ScanInputs } from '../../workers/engine';

const file = (name: string) => ({ kind: 'path', name, path: name }) as const;

/** An engine that looks at files only as far as the test lets it. */
function bench() {
  const looks: { choices: ScanChoices; inputs: ScanInputs; end: () => void }[] = [];
  const preview = {
    ny: 1,
    nx: 1,
    totals: Float64Array.of(1),
    meanSpectrum: Float64Array.of(1),
    step: 1,
  };
  const engine: Pick<ScanEngine, 'inspect' | 'preview'> = {
    inspect: (inputs: ScanInputs, choices: ScanChoices) =>
      new Promise<Inspection>((resolve) => {
        const plan = { resolved: choices } as ScanPlan;
        const found = { fileName: '', format: 'npy', guesses: [], problems: [], warnings: [] };
        looks.push({ choices, inputs, end: () => resolve({ ...found, plan } as Inspection) });
      }),
    preview: async () => preview,
  };
  const session = createSessionStore();
  const recipe = createRecipeStore(emptyRecipe(''));
  const inputs = { scan: file('scan.npy'), companions: [] };
  session.setState({ scan: { inputs, url: null, open: {} as OpenScan } });
  const workbench = { engine, session, recipe, notices: createNotices() } as Workbench;
  const settle = async (): Promise<void> => {
    for (let i = 0; i < 10; i++) await Promise.resolve();
  };
  /** Ends the newest look at the file, and lets what waits for it go on. */
  const lookEnds = async (): Promise<void> => {
    looks.at(-1)?.end();
    await settle();
  };
  return { workbench, session, recipe, looks, lookEnds };
}

describe('an import sheet', () => {
  it('is accepted with what was stated last, though the file is still being looked at', async () => {
    const { workbench, recipe, session, lookEnds } = bench();
    reviseImport(workbench);
    await lookEnds();
    stateChoices(workbench, { exposure_s: 0.5 });
    const accepted = acceptImport(workbench);
    expect(session.getState().draft).not.toBeNull();
    await lookEnds();
    await accepted;
    expect(session.getState().draft).toBeNull();
    expect(recipe.getState().recipe.scan).toEqual({ exposure_s: 0.5 });
  });

  it('is accepted once, however often that is pressed', async () => {
    const { workbench, recipe, lookEnds } = bench();
    reviseImport(workbench);
    await lookEnds();
    stateChoices(workbench, { exposure_s: 2 });
    const presses = [acceptImport(workbench), acceptImport(workbench)];
    await lookEnds();
    await Promise.all(presses);
    expect(recipe.getState().past).toHaveLength(1);
  });

  it('that is closed while the file is being looked at changes nothing', async () => {
    const { workbench, recipe, session, lookEnds } = bench();
    reviseImport(workbench);
    await lookEnds();
    stateChoices(workbench, { exposure_s: 2 });
    const accepted = acceptImport(workbench);
    cancelImport(workbench);
    await accepted;
    await lookEnds();
    expect(session.getState().draft).toBeNull();
    expect(recipe.getState().past).toEqual([]);
  });

  it('looks again with files added to it, and without those taken away', async () => {
    const { workbench, looks, lookEnds } = bench();
    reviseImport(workbench);
    await lookEnds();
    addCompanions(workbench, [file('axis.npy'), file('height.npy')]);
    await lookEnds();
    removeCompanion(workbench, 'axis.npy');
    await lookEnds();
    const names = looks.map(({ inputs }) => inputs.companions.map(({ name }) => name));
    expect(names).toEqual([[], ['axis.npy', 'height.npy'], ['height.npy']]);
  });
});
