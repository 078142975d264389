import { describe, expect, it } from 'vitest';
import type { ModelComponent, Recipe } from '../../src/recipe/schema';
import {
  addPeakAt,
  deleteComponent,
  movePeak,
  setComponentOptional,
  setComponentParameter,
  setComponentRole,
  setComponentShape,
} from '../../src/state/model-actions';
import type { Workbench } from '../../src/state/workbench';
import { idleWorkbench } from './idle-workbench';

const component = ({ recipe }: Workbench, name: string): ModelComponent | undefined =>
  recipe.getState().recipe.model?.components.find((one) => one.name === name);

const withModel = (...components: readonly ModelComponent[]): Workbench =>
  idleWorkbench({ model: { components } } satisfies Omit<Recipe, 'recipe'>);

describe('a peak', () => {
  it('is added where the user points; the first brings a line to stand on', () => {
    const workbench = idleWorkbench({});
    addPeakAt(workbench, 1.234567, 0.02);
    expect(workbench.recipe.getState().recipe.model?.components).toEqual([
      { name: 'floor', shape: 'line' },
      { name: 'peak', shape: 'gaussian', centre: 1.23457, fwhm: 0.02 },
    ]);
    expect(workbench.recipe.getState().past).toHaveLength(1);
    addPeakAt(workbench, 1.3, 0.02);
    expect(component(workbench, 'peak-2')).toMatchObject({ centre: 1.3 });
  });

  it('keeps what another shape has too', () => {
    const workbench = withModel({
      name: 'A1',
      role: 'raman',
      shape: 'pseudo-voigt',
      centre: 2,
      fwhm: 0.01,
      eta: 0.4,
    });
    setComponentShape(workbench, 'A1', 'lorentzian');
    expect(component(workbench, 'A1')).toEqual({
      name: 'A1',
      role: 'raman',
      shape: 'lorentzian',
      centre: 2,
      fwhm: 0.01,
    });
  });

  it('is moved within its bounds, one drag one step', () => {
    const workbench = withModel({
      name: 'exciton',
      shape: 'gaussian',
      centre: { start: 2, min: 1.98, max: 2.02 },
      fwhm: { start: 40, unit: 'meV' },
    });
    movePeak(workbench, 'exciton', { centreEv: 2.01 });
    movePeak(workbench, 'exciton', { centreEv: 2.5, fwhmEv: 0.05 });
    expect(component(workbench, 'exciton')).toMatchObject({
      centre: { start: 2.02, min: 1.98, max: 2.02 },
      fwhm: { start: 50, unit: 'meV' },
    });
    expect(workbench.recipe.getState().past).toHaveLength(1);
  });

  it('is given bounds and held, and freed again', () => {
    const workbench = withModel({ name: 'x', shape: 'gaussian', centre: 2 });
    setComponentParameter(workbench, 'x', 'centre', { min: 1.9, fixed: true });
    expect(component(workbench, 'x')).toMatchObject({
      centre: { start: 2, min: 1.9, fixed: true },
    });
    setComponentParameter(workbench, 'x', 'centre', { min: null, fixed: false });
    expect(component(workbench, 'x')).toMatchObject({ centre: 2 });
    setComponentParameter(workbench, 'x', 'centre', { start: null });
    expect(component(workbench, 'x')).toEqual({ name: 'x', shape: 'gaussian' });
  });

  it('keeps bounds that make sense: others are refused with a sentence', () => {
    const workbench = withModel({ name: 'x', shape: 'gaussian', centre: 2 });
    setComponentParameter(workbench, 'x', 'centre', { min: 2.1 });
    expect(component(workbench, 'x')).toMatchObject({ centre: 2 });
    expect(workbench.notices.getState().notices).toHaveLength(1);
  });

  it('is named for what it is, and kept only where needed', () => {
    const workbench = withModel({ name: 'x', shape: 'gaussian' });
    setComponentRole(workbench, 'x', 'localised');
    setComponentOptional(workbench, 'x', true);
    expect(component(workbench, 'x')).toEqual({
      name: 'x',
      shape: 'gaussian',
      role: 'localised',
      optional: true,
    });
    setComponentRole(workbench, 'x', null);
    setComponentOptional(workbench, 'x', false);
    expect(component(workbench, 'x')).toEqual({ name: 'x', shape: 'gaussian' });
  });

  it('is deleted with a way back', () => {
    const workbench = withModel({ name: 'x', shape: 'gaussian' }, { name: 'y', shape: 'flat' });
    deleteComponent(workbench, 'x');
    expect(component(workbench, 'x')).toBeUndefined();
    workbench.notices.getState().notices[0]?.action?.run();
    expect(component(workbench, 'x')).toBeDefined();
  });
});
