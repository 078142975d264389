import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  addBandBetween,
  moveBandEnds,
  selectBand,
  setBandEnds,
  setBandName,
} from '../../src/state/band-actions';
import { bandColours } from '../../src/state/band-colours';
import { placedBands } from '../../src/state/placed-bands';
import { createRecentlyUsed } from '../../src/state/recently-used';
import { idleWorkbench } from './idle-workbench';
import { openWorkbench } from './open-workbench';

describe('a band', () => {
  it('drawn either way has its ends in order, a name of its own, and is selected', () => {
    const workbench = idleWorkbench({});
    addBandBetween(workbench, 1.95, 1.9);
    addBandBetween(workbench, 1.8, 1.85);
    expect(workbench.recipe.getState().recipe.bands).toEqual([
      { name: 'band-1', from: 1.9, to: 1.95, unit: 'eV' },
      { name: 'band-2', from: 1.8, to: 1.85, unit: 'eV' },
    ]);
    expect(workbench.view.getState().selection).toEqual({ kind: 'band', name: 'band-2' });
  });

  it('dragged past its other end turns over and stays a band', () => {
    const workbench = idleWorkbench({ bands: [{ name: 'a', from: 1.9, to: 1.95, unit: 'eV' }] });
    moveBandEnds(workbench, { name: 'a' }, { fromEv: 1.97, toEv: 1.95 });
    expect(workbench.recipe.getState().recipe.bands?.[0]).toMatchObject({ from: 1.95, to: 1.97 });
  });

  it('keeps its unit when it is dragged: meV and cm⁻¹ land where the hand is', async () => {
    const open = await openWorkbench({
      recipe: 1,
      scan: { laser: { value: 594.1, unit: 'nm' } },
      bands: [
        { name: 'milli', from: 1850, to: 1900, unit: 'meV' },
        { name: 'shift', from: 400, to: 450, unit: 'cm-1' },
      ],
    });
    const wanted = { fromEv: 1.8731, toEv: 1.9012 };
    for (const name of ['milli', 'shift']) moveBandEnds(open.workbench, { name }, wanted);
    const { recipe } = open.workbench.recipe.getState();
    expect(recipe.bands?.map(({ unit }) => unit)).toEqual(['meV', 'cm-1']);
    const { scan } = open.workbench.session.getState();
    if (scan === null) throw new Error('no scan');
    for (const { fromEv, toEv } of placedBands(recipe, scan)) {
      // Two decimals of a meV or a cm⁻¹ (0.124 meV) are kept.
      expect(Math.abs(fromEv - wanted.fromEv)).toBeLessThan(1e-5);
      expect(Math.abs(toEv - wanted.toEv)).toBeLessThan(1e-5);
    }
  });

  it('refuses ends that are one', () => {
    const workbench = idleWorkbench({ bands: [{ name: 'a', from: 1.9, to: 1.95, unit: 'eV' }] });
    setBandEnds(workbench, 'a', 1.9, 1.9);
    expect(workbench.recipe.getState().past).toEqual([]);
    setBandEnds(workbench, 'a', 1.92, 1.91);
    expect(workbench.recipe.getState().recipe.bands?.[0]).toMatchObject({ from: 1.91, to: 1.92 });
  });

  it('stays selected under a new name', () => {
    const workbench = idleWorkbench({ bands: [{ name: 'a', from: 1.9, to: 1.95, unit: 'eV' }] });
    selectBand(workbench, 'a');
    setBandName(workbench, 'a', 'tail');
    expect(workbench.view.getState().selection).toEqual({ kind: 'band', name: 'tail' });
    setBandName(workbench, 'tail', 'tail');
    expect(workbench.recipe.getState().past).toHaveLength(1);
  });
});

describe('the colour of a band', () => {
  it('is its channel’s in the blend; bands outside it differ from each other', () => {
    const bands = ['a', 'b', 'c'].map((name) => ({
      name,
      from: 1.9,
      to: 1.95,
      unit: 'eV' as const,
    }));
    const colours = bandColours({
      recipe: 1,
      bands,
      blend: {
        mode: 'additive',
        channels: [
          { source: 'band.b.centroid', colour: '#123456' },
          { source: 'band.b.integral', colour: '#654321' },
        ],
      },
    });
    expect([...colours.keys()].sort()).toEqual(['a', 'b', 'c']);
    expect(colours.get('b')).toBe('#123456');
    expect(new Set(colours.values()).size).toBe(3);
  });
});

describe('maps kept for undo', () => {
  it('are those used last, as a list kept by hand says', () => {
    const steps = fc.array(fc.record({ key: fc.nat(6), isSet: fc.boolean(), value: fc.nat() }), {
      maxLength: 60,
    });
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 4 }), steps, (limit, all) => {
        const kept = createRecentlyUsed<number, number>(limit);
        let list: [number, number][] = [];
        for (const { key, isSet, value } of all) {
          const old = list.find(([other]) => other === key);
          if (isSet) kept.set(key, value);
          else expect(kept.get(key)).toBe(old?.[1]);
          const now = isSet ? value : old?.[1];
          if (now === undefined) continue;
          list = [...list.filter(([other]) => other !== key), [key, now] as [number, number]];
          list = list.slice(-limit);
        }
        for (const [key, value] of [...list]) expect(kept.get(key)).toBe(value);
      }),
    );
  });
});
