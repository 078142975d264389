/** One scan is opened after another: the later one is whole on screen, or the earlier one still is. */
import { describe, expect, it } from 'vitest';
import { RimlightError } from '../../src/errors';
import { openOffered, openScan } from '../../src/state/scan-opening';
import type { OpenScan, ScanEngine } from '../../workers/engine';
import { makeScan } from '../workers/made-scan';
import { openWorkbench, twoBands } from './open-workbench';

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
