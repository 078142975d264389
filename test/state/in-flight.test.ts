/** What was asked before and answers late must not put itself over what is wanted now. */
import { describe, expect, it } from 'vitest';
import { RimlightError } from '../../src/errors';
import { setScanChoices } from '../../src/recipe/edits';
import { deleteBand, moveBandEnds, setBandName } from '../../src/state/band-actions';
import { showLeadMap } from '../../src/state/lead-actions';
import { openOffered, openScan } from '../../src/state/scan-opening';
import type { OpenScan, ScanEngine } from '../../workers/engine';
import { makeScan } from '../workers/made-scan';
import { openWorkbench, twoBands } from './open-workbench';

const moved = { fromEv: 1.83, toEv: 1.89 };

describe('maps that answer late', () => {
  it('do not undo an undo made while they were computed', async () => {
    const { workbench, answered } = await openWorkbench();
    const before = workbench.results.getState().maps.get('band.low.integral');
    moveBandEnds(workbench, { name: 'low' }, moved);
    workbench.recipe.undo();
    await answered();
    expect(workbench.results.getState().maps.get('band.low.integral')).toBe(before);
    expect([...workbench.results.getState().pending]).toEqual([]);
  });

  it('do not bring back a band deleted while they were computed', async () => {
    const { workbench, answered } = await openWorkbench();
    moveBandEnds(workbench, { name: 'low' }, moved);
    deleteBand(workbench, 'low');
    await answered();
    const names = [...workbench.results.getState().maps.keys()];
    expect(names.filter((name) => name.startsWith('band.low.'))).toEqual([]);
    expect(names).toContain('band.high.integral');
    expect([...workbench.results.getState().pending]).toEqual([]);
  });

  it('do not stay under a name the band no longer has', async () => {
    const { workbench, answered } = await openWorkbench();
    moveBandEnds(workbench, { name: 'low' }, moved);
    setBandName(workbench, 'low', 'tail');
    await answered();
    const names = [...workbench.results.getState().maps.keys()];
    expect(names.filter((name) => name.startsWith('band.low.'))).toEqual([]);
    expect(names).toContain('band.tail.integral');
  });

  it('of a quantity no longer looked at do not outlive the ends they were made for', async () => {
    const { workbench, settled } = await openWorkbench();
    showLeadMap(workbench, 'band.low.median');
    await settled();
    showLeadMap(workbench, 'scan.total');
    moveBandEnds(workbench, { name: 'low' }, moved);
    await settled();
    expect(workbench.results.getState().maps.has('band.low.median')).toBe(false);
    expect(workbench.results.getState().maps.has('band.low.integral')).toBe(true);
  });

  it('are behind the recipe until the newest are there', async () => {
    const { workbench, answered } = await openWorkbench();
    const first = { fromEv: 1.825, toEv: 1.885 };
    moveBandEnds(workbench, { name: 'low' }, first);
    moveBandEnds(workbench, { name: 'low' }, moved);
    const seen: boolean[] = [];
    const start = workbench.results.getState().maps.get('band.low.integral');
    workbench.results.subscribe((now, before) => {
      const map = now.maps.get('band.low.integral');
      if (map !== before.maps.get('band.low.integral') && map !== start) {
        seen.push(now.pending.has('low'));
      }
    });
    await answered();
    expect(seen).toEqual([true, true]);
    expect(workbench.results.getState().pending.size).toBe(0);
  });
});

describe('a spectrum that answers late', () => {
  it('is not drawn once the cursor has left', async () => {
    const { workbench, answered } = await openWorkbench();
    workbench.crosshair.set({ y: 1, x: 1 });
    workbench.crosshair.set(null);
    await answered();
    expect(workbench.spectra.getState().hovered).toBeNull();
  });
});

describe('a fit that answers late', () => {
  const model = {
    components: [
      { name: 'floor', shape: 'flat' as const },
      { name: 'peak', shape: 'gaussian' as const, centre: 1.9, fwhm: 0.03 },
    ],
  };

  it('is drawn for the newest pixel', async () => {
    const { workbench, answered } = await openWorkbench({ ...twoBands, model });
    workbench.crosshair.set({ y: 1, x: 1 });
    workbench.crosshair.set({ y: 2, x: 3 });
    await answered();
    expect(workbench.fit.getState().fitted?.pixel).toEqual({ y: 2, x: 3 });
  });

  it('is not drawn once its model is taken away', async () => {
    const { workbench, answered } = await openWorkbench({ ...twoBands, model });
    workbench.crosshair.set({ y: 1, x: 1 });
    workbench.recipe.edit('Delete the model', ({ model: _, ...others }) => others);
    await answered();
    expect(workbench.fit.getState().fitted).toBeNull();
  });
});

describe('a failing engine', () => {
  it('leaves no map of a band whose ends it could not compute, and says so once', async () => {
    const { workbench, answered, breakBands } = await openWorkbench();
    breakBands('the numbers ran out');
    moveBandEnds(workbench, { name: 'low' }, moved);
    await answered();
    const names = [...workbench.results.getState().maps.keys()];
    expect(names.filter((name) => name.startsWith('band.low.'))).toEqual([]);
    expect(names).toContain('band.high.integral');
    expect(workbench.results.getState().pending.size).toBe(0);
    expect(workbench.notices.getState().notices).toHaveLength(1);
    expect(workbench.notices.getState().notices[0]?.text).toMatch(/numbers ran out/i);
  });
});

describe('reading a scan again', () => {
  it('that fails leaves the recipe saying how the scan on screen is read', async () => {
    const { workbench, answered } = await openWorkbench();
    const { scan } = workbench.recipe.getState().recipe;
    const current = workbench.session.getState().scan;
    workbench.recipe.edit('Correct', (recipe) =>
      setScanChoices(recipe, { ...recipe.scan, data: 'no-such-array' }),
    );
    await answered();
    expect(workbench.session.getState().scan).toBe(current);
    expect(workbench.recipe.getState().recipe.scan).toEqual(scan);
    expect(workbench.notices.getState().notices).toHaveLength(1);
    expect(workbench.notices.getState().notices[0]?.text).toContain('no-such-array');
  });

  it('that is stopped does too, without a word', async () => {
    const { workbench, answered } = await openWorkbench();
    const { scan } = workbench.recipe.getState().recipe;
    const current = workbench.session.getState().scan;
    const stopOnce = workbench.session.subscribe(({ running }) => {
      if (running === null) return;
      stopOnce();
      running.stop();
    });
    workbench.recipe.edit('Correct', (recipe) =>
      setScanChoices(recipe, { ...recipe.scan, exposure_s: 7 }),
    );
    await answered();
    expect(workbench.session.getState().scan).toBe(current);
    expect(workbench.recipe.getState().recipe.scan).toEqual(scan);
    expect(workbench.notices.getState().notices).toEqual([]);
  });
});

describe('two scans opened in a row', () => {
  it('leave the later one on screen, its progress never taken away by the earlier', async () => {
    const { workbench, made, answered } = await openWorkbench();
    const { scan } = workbench.session.getState();
    if (scan === null) throw new Error('no scan');
    const { plan } = scan.open;
    const request = (name: string) => ({
      inputs: { ...made.inputs, scan: { ...made.inputs.scan, name } },
      plan,
      url: null,
      recipeFor: null,
    });
    /** The later one is given its scan once the earlier has ended. */
    let firstEnds = (): void => undefined;
    const firstEnded = new Promise<void>((resolve) => {
      firstEnds = resolve;
    });
    const open: ScanEngine['open'] = async (inputs, ...others) => {
      if (inputs.scan.name === 'second.npz') await firstEnded;
      return workbench.engine.open(inputs, ...others);
    };
    const patient = { ...workbench, engine: { ...workbench.engine, open } };
    const labels: (string | null)[] = [];
    const first = openScan(patient, request('first.npz'));
    const second = openScan(patient, request('second.npz'));
    workbench.session.subscribe(({ running, scan: shown }) => {
      if (shown === scan) labels.push(running?.label ?? null);
    });
    expect(await first).toBe(false);
    expect(workbench.session.getState().running?.label).toBe('Opening second.npz');
    firstEnds();
    expect(await second).toBe(true);
    await answered();
    expect(workbench.session.getState().scan?.inputs.scan.name).toBe('second.npz');
    expect(new Set(labels)).toEqual(new Set(['Opening second.npz']));
    expect(workbench.session.getState().running).toBeNull();
    expect(workbench.notices.getState().notices).toEqual([]);
  });

  it('leave nothing of the earlier in the workers’ memory', async () => {
    const { workbench, made } = await openWorkbench();
    const earlier = workbench.session.getState().scan?.open;
    await openOffered(workbench, made.inputs, twoBands, '/again.npz');
    await expect(earlier?.spectrum({ y: 0, x: 0 })).rejects.toThrow();
    const later = workbench.session.getState().scan?.open;
    expect(await later?.spectrum({ y: 0, x: 0 })).toHaveLength(made.nk);
  });
});

describe('a scan whose recipe does not fit it', () => {
  it('is let go of again, and the one on screen stays with its maps', async () => {
    const { workbench, made } = await openWorkbench();
    const before = workbench.results.getState().maps;
    const { scan } = workbench.session.getState();
    if (scan === null) throw new Error('no scan');
    let refused: OpenScan | null = null;
    const opened = await openScan(workbench, {
      inputs: made.inputs,
      plan: scan.open.plan,
      url: null,
      recipeFor: (open) => {
        refused = open;
        throw new RimlightError('recipe', { what: 'it does not fit', where: '', hint: 'Mend it.' });
      },
    });
    expect(opened).toBe(false);
    await expect((refused as OpenScan | null)?.spectrum({ y: 0, x: 0 })).rejects.toThrow();
    expect(workbench.session.getState().scan).toBe(scan);
    expect(workbench.results.getState().maps).toBe(before);
    expect(workbench.session.getState().running).toBeNull();
    expect(workbench.notices.getState().notices.map(({ text }) => text)).toEqual([
      'It does not fit.',
    ]);
  });
});

describe('another scan with bands of the same names', () => {
  it('never shows maps of the scan before it', async () => {
    const { workbench, settled } = await openWorkbench();
    const { recipe } = workbench.recipe.getState();
    const other = makeScan({ ny: 4, nx: 5, seed: 9 });
    const shapes = new Set<string>();
    workbench.session.subscribe((now, before) => {
      if (now.scanNumber === before.scanNumber) return;
      for (const map of workbench.results.getState().maps.values()) {
        shapes.add(`${map.ny} × ${map.nx}`);
      }
    });
    await openOffered(workbench, other.inputs, recipe, '/other.npz');
    await settled();
    expect([...shapes]).toEqual(['4 × 5']);
    expect(workbench.results.getState().maps.get('band.low.integral')?.values).toHaveLength(20);
  });
});
