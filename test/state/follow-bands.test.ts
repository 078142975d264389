import { describe, expect, it } from 'vitest';
import { directBand } from '../../src/science/bands/direct-band';
import { deleteBand, moveBandEnds, setBandName } from '../../src/state/band-actions';
import { showLeadMap } from '../../src/state/lead-actions';
import { type OpenWorkbench, openWorkbench } from './open-workbench';

/** The contract's definition at one pixel, straight from the counts. */
function defined({ workbench, made }: OpenWorkbench, fromEv: number, toEv: number, pixel: number) {
  const { meta } = workbench.session.getState().scan?.open.overview ?? {};
  if (meta === undefined) throw new Error('no scan is open');
  const counts = made.counts.subarray(pixel * made.nk, (pixel + 1) * made.nk);
  return directBand(counts, meta.axis, { fromEv, toEv, floor: 'none' }, meta.noise);
}

const shownValue = ({ workbench }: OpenWorkbench, name: string, pixel: number): number =>
  workbench.results.getState().maps.get(name)?.values[pixel] ?? Number.NaN;

describe('band maps', () => {
  it('are there for every band of the recipe, as defined', async () => {
    const open = await openWorkbench();
    for (const pixel of [0, 17, 62]) {
      const { integral, centroid } = defined(open, 1.82, 1.88, pixel);
      expect(shownValue(open, 'band.low.integral', pixel)).toBeCloseTo(integral.value, 9);
      expect(shownValue(open, 'band.low.centroid', pixel)).toBeCloseTo(centroid.value, 12);
      const errors = open.workbench.results.getState().maps.get('band.low.integral')?.errors;
      expect(errors?.[pixel]).toBeCloseTo(integral.error ?? Number.NaN, 9);
    }
  });

  it('end where a storm of drags ends, and most of the way is never computed', async () => {
    const open = await openWorkbench();
    const before = open.asked.length;
    for (let step = 1; step <= 200; step++) {
      const ends = { fromEv: 1.82, toEv: 1.88 + step * 1e-4 };
      moveBandEnds(open.workbench, { name: 'low' }, ends);
    }
    await open.settled();
    const { integral } = defined(open, 1.82, 1.9, 5);
    expect(shownValue(open, 'band.low.integral', 5)).toBeCloseTo(integral.value, 9);
    expect(open.asked.length - before).toBeLessThan(20);
    expect(open.workbench.recipe.getState().past).toHaveLength(1);
  });

  it('come back by undo without asking the engine again', async () => {
    const open = await openWorkbench();
    const shown = open.workbench.results.getState().maps.get('band.low.integral');
    moveBandEnds(open.workbench, { name: 'low' }, { fromEv: 1.83, toEv: 1.89 });
    await open.settled();
    const asked = open.asked.length;
    open.workbench.recipe.undo();
    await open.settled();
    expect(open.workbench.results.getState().maps.get('band.low.integral')).toBe(shown);
    expect(open.asked).toHaveLength(asked);
  });

  it('of further quantities are made when one leads', async () => {
    const open = await openWorkbench();
    expect(open.workbench.results.getState().maps.has('band.high.median')).toBe(false);
    showLeadMap(open.workbench, 'band.high.median');
    await open.settled();
    const { median } = defined(open, 1.9, 1.95, 30);
    expect(shownValue(open, 'band.high.median', 30)).toBeCloseTo(median.value, 9);
  });

  it('of a deleted band are gone, and another map leads', async () => {
    const open = await openWorkbench();
    showLeadMap(open.workbench, 'band.low.centroid');
    await open.settled();
    deleteBand(open.workbench, 'low');
    await open.settled();
    const names = [...open.workbench.results.getState().maps.keys()];
    expect(names.filter((name) => name.startsWith('band.low.'))).toEqual([]);
    expect(open.workbench.view.getState().leadMap).toBe('scan.total');
    open.workbench.recipe.undo();
    await open.settled();
    expect(open.workbench.results.getState().maps.has('band.low.integral')).toBe(true);
  });

  it('keep leading and blending under a new name', async () => {
    const open = await openWorkbench();
    showLeadMap(open.workbench, 'band.low.centroid');
    setBandName(open.workbench, 'low', 'tail');
    await open.settled();
    expect(open.workbench.view.getState().leadMap).toBe('band.tail.centroid');
    const { blend } = open.workbench.recipe.getState().recipe;
    expect(blend?.channels[0]?.source).toBe('band.tail.integral');
    expect(open.workbench.results.getState().maps.has('band.tail.integral')).toBe(true);
  });

  it('have no uncertainty where the values are not counts', async () => {
    const open = await openWorkbench(undefined, {
      type: 'float64',
      change: (counts) => {
        counts[3] = -2.5;
      },
    });
    const map = open.workbench.results.getState().maps.get('band.low.integral');
    expect(map?.errors).toBeNull();
  });
});
