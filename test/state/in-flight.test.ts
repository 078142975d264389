/** What was asked before and answers late must not put itself over what is wanted now. */
import { describe, expect, it } from 'vitest';
import { setScanChoices } from '../../src/recipe/edits';
import { deleteBand, moveBandEnds, setBandName } from '../../src/state/band-actions';
import { showLeadMap } from '../../src/state/lead-actions';
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
