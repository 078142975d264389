/** A fit of all pixels is started, stopped, gone on with, and stays out of the way of what the user does meanwhile. */
import { describe, expect, it } from 'vitest';
import type { Recipe } from '../../src/recipe/schema';
import { planOf, runFit } from '../../src/state/fit-actions';
import { openScan } from '../../src/state/scan-opening';
import type { Workbench } from '../../src/state/workbench';
import type { OpenScan } from '../../workers/engine';
import { openWorkbench, twoBands } from './open-workbench';

const withModel: Recipe = {
  ...twoBands,
  model: {
    components: [
      { name: 'floor', shape: 'flat' },
      { name: 'peak', shape: 'lorentzian', centre: 1.9, fwhm: 0.04 },
    ],
  },
};

const fitMaps = ({ results }: Workbench): readonly string[] =>
  [...results.getState().maps.keys()].filter((name) => name.startsWith('fit.'));

const notFitted = ({ results }: Workbench): number =>
  [...(results.getState().maps.get('fit.status')?.values ?? [])].filter((status) => status === 0)
    .length;

/** Does something once, as soon as the first fitted pixels are on screen. */
function onceFitting({ results }: Workbench, act: () => void): void {
  const leave = results.subscribe(({ maps }) => {
    if (!maps.has('fit.status')) return;
    leave();
    act();
  });
}

describe('a fit of all pixels', () => {
  it('gives every pixel the values the engine finds, and is over', async () => {
    const { workbench } = await openWorkbench(withModel);
    await runFit(workbench);
    const { scan, running } = workbench.session.getState();
    const plan = scan === null ? null : planOf(workbench.recipe.getState().recipe, scan);
    if (scan === null || plan === null) throw new Error('nothing to fit');
    const { maps } = await scan.open.fit(plan);
    const centres = workbench.results.getState().maps.get('fit.peak.centre');
    expect(centres?.values).toEqual(maps.find(({ name }) => name === 'fit.peak.centre')?.values);
    expect(centres?.values.every((ev) => ev > 1.85 && ev < 2)).toBe(true);
    expect(notFitted(workbench)).toBe(0);
    expect(running).toBeNull();
    expect(workbench.fit.getState()).toMatchObject({ isRunning: false });
    expect(workbench.fit.getState().scanFit?.isWhole).toBe(true);
  });

  it('keeps what is done when it is stopped, and goes on to the same values', async () => {
    const { workbench } = await openWorkbench(withModel);
    onceFitting(workbench, () => workbench.session.getState().running?.stop());
    await runFit(workbench);
    const left = notFitted(workbench);
    expect(left).toBeGreaterThan(0);
    expect(left).toBeLessThan(7 * 9);
    expect(workbench.notices.getState().notices).toEqual([]);
    await runFit(workbench);
    expect(notFitted(workbench)).toBe(0);
    const whole = await openWorkbench(withModel);
    await runFit(whole.workbench);
    const centresOf = (each: Workbench) =>
      each.results.getState().maps.get('fit.peak.centre')?.values;
    expect(centresOf(workbench)).toEqual(centresOf(whole.workbench));
  });

  it('makes way for a scan that is opened, whose progress it never takes away', async () => {
    const { workbench, made } = await openWorkbench(withModel);
    const { scan } = workbench.session.getState();
    if (scan === null) throw new Error('no scan');
    const { plan } = scan.open;
    /** what is said to run, whenever something of the session changes while the first scan is on screen */
    const labels: (string | null)[] = [];
    let opening: Promise<boolean> | null = null;
    onceFitting(workbench, () => {
      opening = openScan(workbench, { inputs: made.inputs, plan, url: null, recipeFor: null });
      workbench.session.subscribe(({ running, scan: shown }) => {
        if (shown === scan) labels.push(running?.label ?? null);
      });
    });
    await runFit(workbench);
    expect(await opening).toBe(true);
    expect(new Set(labels)).toEqual(new Set(['Opening made.npz']));
    expect(workbench.session.getState().scan).not.toBe(scan);
    expect(fitMaps(workbench)).toEqual([]);
    expect(workbench.session.getState().running).toBeNull();
    expect(workbench.fit.getState()).toMatchObject({ madeOf: null, isRunning: false });
  });

  it('waits for its turn while a scan is being opened', async () => {
    const { workbench, made } = await openWorkbench(withModel);
    const { scan } = workbench.session.getState();
    if (scan === null) throw new Error('no scan');
    const { plan } = scan.open;
    const request = { inputs: made.inputs, plan, url: null, recipeFor: null };
    const opening = openScan(workbench, request);
    await runFit(workbench);
    expect(fitMaps(workbench)).toEqual([]);
    expect(workbench.session.getState().running?.label).toBe('Opening made.npz');
    expect(await opening).toBe(true);
  });

  it('that ends after its scan has gone puts nothing over the next', async () => {
    const { workbench, made } = await openWorkbench(withModel);
    const { scan } = workbench.session.getState();
    if (scan === null) throw new Error('no scan');
    const { open } = scan;
    const request = { inputs: made.inputs, plan: open.plan, url: null, recipeFor: null };
    // The engine's answer is held back until the other scan is on screen.
    const fit: OpenScan['fit'] = async (plan) => {
      const done = await open.fit(plan);
      expect(await openScan(workbench, request)).toBe(true);
      return done;
    };
    workbench.session.setState({ scan: { ...scan, open: { ...open, fit } } });
    await runFit(workbench);
    expect(workbench.session.getState().scan?.open).not.toBe(open);
    expect(fitMaps(workbench)).toEqual([]);
    expect(workbench.fit.getState()).toMatchObject({ madeOf: null, scanFit: null });
  });

  it('begins anew, and not from what was stopped, once its model was changed', async () => {
    const other = (recipe: Recipe): Recipe => ({
      ...recipe,
      model: {
        components: [
          { name: 'floor', shape: 'flat' },
          { name: 'peak', shape: 'gaussian', centre: 1.9, fwhm: 0.04 },
        ],
      },
    });
    const stopped = await openWorkbench(withModel);
    onceFitting(stopped.workbench, () => stopped.workbench.session.getState().running?.stop());
    await runFit(stopped.workbench);
    stopped.workbench.recipe.edit('Another shape', other);
    await runFit(stopped.workbench);
    const fresh = await openWorkbench(other(withModel));
    await runFit(fresh.workbench);
    for (const name of ['fit.peak.area', 'fit.peak.centre', 'fit.chi2r']) {
      const [one, another] = [stopped, fresh].map(({ workbench }) =>
        workbench.results.getState().maps.get(name),
      );
      expect(one?.values).toEqual(another?.values);
    }
  });

  it('leaves no map of a model that was taken away while it ran', async () => {
    const { workbench } = await openWorkbench(withModel);
    onceFitting(workbench, () =>
      workbench.recipe.edit('Delete the model', ({ model: _, ...others }) => others),
    );
    await runFit(workbench);
    expect(fitMaps(workbench)).toEqual([]);
  });

  it('comes back by undo without another fit, whatever was done to its model', async () => {
    const { workbench } = await openWorkbench(withModel);
    await runFit(workbench);
    const names = fitMaps(workbench);
    const centres = workbench.results.getState().maps.get('fit.peak.centre')?.values;
    workbench.recipe.edit('Delete the model', ({ model: _, ...others }) => others);
    expect(fitMaps(workbench)).toEqual([]);
    workbench.recipe.undo();
    expect(fitMaps(workbench)).toEqual(names);
    expect(workbench.results.getState().maps.get('fit.peak.centre')?.values).toBe(centres);
    // Maps of a model that was changed stay, and are said to be of the old one, until it is fitted.
    workbench.recipe.edit('Another start', (recipe) => ({
      ...recipe,
      model: { components: [{ name: 'peak', shape: 'lorentzian', centre: 1.91, fwhm: 0.04 }] },
    }));
    expect(workbench.results.getState().maps.has('fit.floor.level')).toBe(false);
    expect(workbench.results.getState().maps.get('fit.peak.centre')?.values).toBe(centres);
  });

  it('is refused with one sentence where the model does not fit the scan', async () => {
    const { workbench } = await openWorkbench({
      ...twoBands,
      model: { components: [{ name: 'far', shape: 'gaussian', centre: 3.4, fwhm: 0.02 }] },
    });
    // The pixel under the last pin is fitted for drawing only where there is a pin: none here.
    await runFit(workbench);
    expect(workbench.notices.getState().notices).toHaveLength(1);
    expect(workbench.notices.getState().notices[0]?.text).toContain('far');
    expect(fitMaps(workbench)).toEqual([]);
    expect(workbench.fit.getState().isRunning).toBe(false);
    expect(workbench.session.getState().running).toBeNull();
  });
});
