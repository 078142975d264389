import { describe, expect, it } from 'vitest';
import { setModel } from '../../src/recipe/model-edits';
import { suggestModel } from '../../src/recipe/suggest-model';
import { validateRecipe } from '../../src/recipe/validate';
import { evFromNm, evFromShiftCm1 } from '../../src/science/units';

const laserEv = evFromNm(594.1);
const peak = (centreEv: number, fwhmEv: number) => ({
  centreEv,
  fwhmEv,
  area: 1000,
  significance: 20,
});

describe('a suggested model', () => {
  const lineEv = evFromShiftCm1(418, laserEv);
  const peaks = [peak(1.92, 0.05), peak(lineEv, 0.0008), peak(2.01, 0.04)];

  it('names luminescence by energy and lines by their shift', () => {
    const { components } = suggestModel(peaks, laserEv);
    expect(components.map(({ name, role, shape }) => [name, role, shape])).toEqual([
      ['floor', undefined, 'line'],
      ['exciton', 'exciton', 'gaussian'],
      ['localised', 'localised', 'gaussian'],
      ['line-418', 'raman', 'lorentzian'],
    ]);
  });

  it('is a valid recipe', () => {
    const recipe = setModel({ recipe: 1 }, suggestModel(peaks, laserEv));
    expect(validateRecipe(JSON.parse(JSON.stringify(recipe)))).toMatchObject({ ok: true });
  });

  it('takes nothing for a Raman line without a laser, nor what is too far from it', () => {
    const roles = (laser: number | null) =>
      suggestModel(peaks, laser).components.map(({ role }) => role);
    expect(roles(null)).not.toContain('raman');
    expect(roles(evFromNm(300))).not.toContain('raman');
  });

  it('of two lines at one shift keeps both under names of their own', () => {
    const twice = [peak(lineEv, 0.0008), peak(lineEv + 1e-5, 0.0007)];
    const names = suggestModel(twice, laserEv).components.map(({ name }) => name);
    expect(new Set(names).size).toBe(names.length);
  });
});
