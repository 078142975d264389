import { describe, expect, it } from 'vitest';
import { suggestPeaks } from '../../src/state/suggest-peaks';
import { openWorkbench } from './open-workbench';

describe('a suggested model', () => {
  it('has the peak that is in the scan, as one edit that can be undone', async () => {
    const { workbench } = await openWorkbench();
    await suggestPeaks(workbench);
    const { recipe, past } = workbench.recipe.getState();
    const components = recipe.model?.components ?? [];
    expect(components[0]).toEqual({ name: 'floor', shape: 'line' });
    expect(components.length).toBeGreaterThan(1);
    // The made scan's bumps lie between 40 % and 60 % of its axis.
    const { axis } = workbench.session.getState().scan?.open.overview.meta ?? {};
    const from = axis?.centresEv[120] ?? 0;
    const to = axis?.centresEv[280] ?? 0;
    const exciton = components.find(({ role }) => role === 'exciton');
    const centre = exciton?.shape === 'gaussian' ? exciton.centre : undefined;
    const start = typeof centre === 'object' ? centre.start : centre;
    expect(start).toBeGreaterThan(from);
    expect(start).toBeLessThan(to);
    expect(past).toHaveLength(1);
    workbench.recipe.undo();
    expect(workbench.recipe.getState().recipe.model).toBeUndefined();
  });

  it('is none where there is no peak, and that is said', async () => {
    const { workbench } = await openWorkbench(undefined, {
      change: (counts) => counts.fill(7),
    });
    await suggestPeaks(workbench);
    expect(workbench.recipe.getState().recipe.model).toBeUndefined();
    expect(workbench.notices.getState().notices[0]?.text).toBe('No peak stands out of the noise.');
  });
});
