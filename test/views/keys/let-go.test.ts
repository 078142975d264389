import { describe, expect, it } from 'vitest';
import { letGo } from '../../../src/views/keys/let-go';
import { idleWorkbench } from '../../state/idle-workbench';

const band = { name: 'tail', from: 1.86, to: 1.92, unit: 'eV' } as const;

describe('letting go', () => {
  it('leaves no band selected and no crosshair, and the recipe as it was', () => {
    const workbench = idleWorkbench({ bands: [band] });
    const before = workbench.recipe.getState().recipe;
    workbench.view.setState({ selection: { kind: 'band', name: 'tail' } });
    workbench.crosshair.set({ y: 1, x: 2 });
    letGo(workbench);
    expect(workbench.view.getState().selection.kind).not.toBe('band');
    expect(workbench.crosshair.get()).toBeNull();
    expect(workbench.recipe.getState().recipe).toBe(before);
  });

  it('leaves the settings shown of the lead map where they are', () => {
    const workbench = idleWorkbench({});
    workbench.view.setState({ selection: { kind: 'lead' } });
    letGo(workbench);
    expect(workbench.view.getState().selection).toEqual({ kind: 'lead' });
  });
});
