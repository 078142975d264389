import { describe, expect, it } from 'vitest';
import { offeredMaps } from '../../src/recipe/offered-maps';
import { planFit } from '../../src/recipe/plan-fit';
import type { ModelComponent, Recipe } from '../../src/recipe/schema';
import { createFitModel } from '../../src/science/fit/fit-model';
import { recordLayout } from '../../src/science/fit/fit-record';
import { fitOne } from '../../src/science/fit/pixel-fit';
import { FitPlanes } from '../../workers/fit-maps';
import { uniformAxis } from '../science/fit/made-spectra';

const axis = uniformAxis(300, 1.8, 2.1);

/** One of every shape, optional and with a role now and then. */
const components: readonly ModelComponent[] = [
  { name: 'a', shape: 'flat' },
  { name: 'b', shape: 'line' },
  { name: 'c', shape: 'parabola' },
  { name: 'd', shape: 'decay', optional: true },
  { name: 'e', shape: 'gaussian', role: 'exciton' },
  { name: 'f', shape: 'lorentzian', role: 'raman' },
  { name: 'g', shape: 'pseudo-voigt', optional: true },
  { name: 'h', shape: 'voigt', role: 'raman', optional: true },
  { name: 'i', shape: 'tailed', role: 'localised' },
  { name: 'j', shape: 'fano' },
];

describe('the maps of a fit', () => {
  it('are those the recipe offers, with their units, for every shape', () => {
    const recipe: Recipe = { recipe: 1, model: { components } };
    const context = { axis, noise: { kind: 'poisson' }, laserEv: 2.2, medium: 'air' } as const;
    const plan = planFit({ components }, context);
    const layout = recordLayout(createFitModel(plan, axis));
    const planes = new FitPlanes(layout, { ny: 2, nx: 3, nk: 300 });
    const offered = offeredMaps(recipe).filter(({ name }) => name.startsWith('fit.'));
    const made = planes.maps(plan, 'counts');
    expect(made.map(({ name, unit }) => [name, unit])).toEqual(
      offered.map(({ name, unit }) => [name, unit]),
    );
    for (const [i, { hasErrors }] of offered.entries()) {
      expect([made[i].name, made[i].errors !== null]).toEqual([offered[i].name, hasErrors]);
    }
  });

  it('are in the scan’s own quantity', () => {
    const one = [components[1]];
    const plan = planFit(
      { components: one },
      { axis, noise: { kind: 'none' }, laserEv: null, medium: 'air' },
    );
    const planes = new FitPlanes(recordLayout(createFitModel(plan, axis)), { ny: 1, nx: 1, nk: 9 });
    const units = planes.maps(plan, 'absorbance').map(({ unit }) => unit);
    expect(units.slice(0, 2)).toEqual(['absorbance per channel', 'absorbance per channel per eV']);
  });
});

describe('a spectrum that cannot be fitted', () => {
  const context = { axis, noise: { kind: 'poisson' }, laserEv: null, medium: 'air' } as const;
  const plan = planFit({ components: [components[1], components[4]] }, context);
  const model = createFitModel(plan, axis);

  it.each([
    ['without data', new Float64Array(300).fill(Number.NaN), 0],
    ['of zeros', new Float64Array(300), 4],
    [
      'with fewer counts than parameters',
      Float64Array.from({ length: 300 }, (_, k) => (k % 100 === 0 ? 1 : 0)),
      4,
    ],
  ])('%s says why: status %#', (_, counts, status) => {
    const fit = fitOne(model, counts);
    expect(fit.status).toBe(status);
    for (const { value } of fit.quantities) expect(value).toBeNaN();
  });

  it('with some channels missing is fitted on the others', () => {
    const counts = Float64Array.from({ length: 300 }, (_, k) => {
      const z = (axis.centresEv[k] - 1.95) / 0.02;
      return k % 7 === 0 ? Number.NaN : Math.round(20 + 200 * Math.exp(-0.5 * z * z));
    });
    const fit = fitOne(model, counts);
    expect(fit.status).toBe(1);
    const centre = fit.quantities.find(({ name }) => name === 'centre');
    expect(Math.abs((centre?.value ?? 0) - 1.95)).toBeLessThan(3e-4);
  });

  it('keeps an area at its bound, without an error, and says so', () => {
    const bounded = planFit(
      {
        components: [
          components[1],
          {
            name: 'e',
            shape: 'gaussian',
            area: { min: 0 },
            centre: { start: 1.95, fixed: true },
            fwhm: { start: 0.02, fixed: true },
          },
        ],
      },
      context,
    );
    const dip = Float64Array.from({ length: 300 }, (_, k) => {
      const z = (axis.centresEv[k] - 1.95) / 0.01;
      return Math.round(50 - 20 * Math.exp(-0.5 * z * z));
    });
    const fit = fitOne(createFitModel(bounded, axis), dip);
    const area = fit.quantities.find(({ name }) => name === 'area');
    expect([fit.status, area?.value, area?.error]).toEqual([2, 0, Number.NaN]);
    const [level] = fit.quantities;
    expect(level.error).toBeGreaterThan(0);
    expect(fit.freeCount).toBe(2);
  });
});
