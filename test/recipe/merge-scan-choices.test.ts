/** What stays and what goes stale when the user states something of a scan file. */
import { describe, expect, it } from 'vitest';
import type { ScanChoices } from '../../src/io/scan-choices';
import { mergeScanChoices } from '../../src/recipe/merge-scan-choices';
import { validateRecipe } from '../../src/recipe/validate';
import { contractRecipe } from './contract-recipe';

const validated = validateRecipe(contractRecipe);
const before: ScanChoices = (validated.ok ? validated.recipe.scan : null) ?? {};

describe('stated choices', () => {
  it('are laid over the old ones field by field', () => {
    expect(mergeScanChoices(before, { serpentine: true, detector: { read_noise_e: 5 } })).toEqual({
      ...before,
      serpentine: true,
      detector: { ...before.detector, read_noise_e: 5 },
    });
  });

  it('change nothing where there are none', () => {
    expect(mergeScanChoices(before, {})).toEqual(before);
    expect(mergeScanChoices({}, before)).toEqual(before);
    expect(mergeScanChoices(before, before)).toEqual(before);
  });

  it('of a medium keep the axis, of another axis drop its kind and unit', () => {
    expect(mergeScanChoices(before, { axis: { medium: 'vacuum' } }).axis).toEqual({
      ...before.axis,
      medium: 'vacuum',
    });
    expect(mergeScanChoices(before, { axis: { data: '/entry/shift' } }).axis).toEqual({
      data: '/entry/shift',
      medium: 'air',
    });
    expect(mergeScanChoices(before, { axis: { file: 'axis.npy', unit: 'eV' } }).axis).toEqual({
      file: 'axis.npy',
      unit: 'eV',
      medium: 'air',
    });
    expect(mergeScanChoices(before, { axis: { from: 500, to: 600 } }).axis).toEqual({
      from: 500,
      to: 600,
      medium: 'air',
    });
  });

  it('of another kind drop the unit, of the same kind keep it', () => {
    expect(mergeScanChoices(before, { axis: { kind: 'energy' } }).axis).toEqual({
      data: '/entry/wavelength',
      kind: 'energy',
      medium: 'air',
    });
    expect(mergeScanChoices(before, { axis: { kind: 'wavelength' } }).axis).toEqual(before.axis);
  });

  it('of another cube drop the axis order', () => {
    expect(mergeScanChoices(before, { data: '/other' }).order).toBeUndefined();
    expect(mergeScanChoices(before, { data: '/other', order: 'kyx' }).order).toBe('kyx');
    expect(mergeScanChoices(before, { data: '/entry/counts' }).order).toBe('yxk');
  });

  it('of another height map drop its unit and keep its shift', () => {
    expect(mergeScanChoices(before, { height: { data: '/z' } }).height).toEqual({
      data: '/z',
      shift_px: [0, 0],
    });
    expect(mergeScanChoices(before, { height: { unit: 'um' } }).height).toEqual({
      ...before.height,
      unit: 'um',
    });
  });

  it('leave the old choices as they were', () => {
    const copy = structuredClone(before);
    mergeScanChoices(before, { axis: { kind: 'energy' }, height: { data: '/z' }, data: '/other' });
    expect(before).toEqual(copy);
  });
});
