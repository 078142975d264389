import { describe, expect, it } from 'vitest';
import { validateRecipe } from '../../src/recipe/validate';
import type { DerivedMap } from '../../src/science/scan';
import { evFromNm } from '../../src/science/units';
import { grouped, valuesAt, withShifts, wordsOf } from '../../src/state/cursor-values';
import { shownMaps } from '../../src/state/shown-maps';

const map = (
  name: string,
  values: number[],
  errors: number[] | null,
  unit = 'counts',
): DerivedMap => ({
  name,
  unit,
  ny: 1,
  nx: values.length,
  values: Float64Array.from(values),
  errors: errors === null ? null : Float64Array.from(errors),
});

function recipeOf(value: object) {
  const result = validateRecipe({ recipe: 1, ...value });
  if (!result.ok) throw new Error('the recipe of this test is not valid');
  return result.recipe;
}

describe('values under the cursor', () => {
  it('come one row a map, with the uncertainty of that pixel', () => {
    const rows = valuesAt([map('band.tail.integral', [10, 20], [3, 4])], { y: 0, x: 1 });
    expect(rows).toEqual([
      {
        name: 'band.tail.integral',
        group: 'tail',
        label: 'counts',
        value: 20,
        error: 4,
        unit: 'counts',
      },
    ]);
  });

  it('are none outside the scan, and have no uncertainty where there is no noise model', () => {
    const maps = [map('scan.total', [1, 2], null)];
    expect(valuesAt(maps, { y: 0, x: 2 })).toEqual([]);
    expect(valuesAt(maps, { y: -1, x: 0 })).toEqual([]);
    expect(valuesAt(maps, { y: 0, x: 0 })[0]?.error).toBeNull();
  });

  it('are told as Raman shifts for bands the recipe gives as shifts', () => {
    const recipe = recipeOf({
      scan: { laser: { value: 532, unit: 'nm' } },
      bands: [
        { name: 'Si', from: 500, to: 540, unit: 'cm-1' },
        { name: 'pl', from: 1.9, to: 2, unit: 'eV' },
      ],
    });
    const laserEv = evFromNm(532);
    // 520.5 cm⁻¹ below 532 nm lies at 547.15 nm (common practice, no source: 10⁷/532 − 520.5 = 10⁷/547.15).
    const centreEv = evFromNm(1e7 / (1e7 / 532 - 520.5));
    const rows = valuesAt(
      [
        map('band.Si.centroid', [centreEv], [1e-4], 'eV'),
        map('band.pl.centroid', [1.95], [1e-3], 'eV'),
      ],
      { y: 0, x: 0 },
    );
    const [si, pl] = withShifts(rows, recipe, laserEv);
    expect(si?.unit).toBe('cm-1');
    expect(si?.value).toBeCloseTo(520.5, 6);
    // 1 eV is 8065.54 cm⁻¹ (CODATA 2018, electron volt–inverse metre relationship).
    expect(si?.error).toBeCloseTo(0.806554, 5);
    expect(pl).toEqual(rows[1]);
    expect(withShifts(rows, recipe, null)).toEqual(rows);
  });

  it('are named in few words, under what they belong to', () => {
    expect(wordsOf('band.tail.peak_at')).toEqual({ group: 'tail', label: 'energy of it' });
    expect(wordsOf('scan.height')).toEqual({ group: '', label: 'height' });
    expect(wordsOf('fit.exciton.centre')).toEqual({ group: 'exciton fit', label: 'centre' });
    expect(wordsOf('fit.chi2r')).toEqual({ group: 'fit', label: 'χ² reduced' });
  });

  it('are gathered by band, none lost', () => {
    const names = ['band.a.integral', 'band.a.centroid', 'band.b.integral', 'scan.total'];
    const rows = valuesAt(
      names.map((name) => map(name, [1], null)),
      { y: 0, x: 0 },
    );
    const groups = grouped(rows);
    expect(groups.map(({ group }) => group)).toEqual(['a', 'b', '']);
    expect(groups.flatMap((group) => group.rows)).toEqual(rows);
  });

  it('follow the order of the recipe, the scan last', () => {
    const recipe = recipeOf({
      bands: [
        { name: 'b', from: 1.9, to: 2, unit: 'eV' },
        { name: 'a', from: 1.8, to: 1.9, unit: 'eV' },
      ],
    });
    const names = ['scan.total', 'band.a.integral', 'band.b.centroid', 'band.b.integral'];
    const known = new Map(names.map((name) => [name, map(name, [1], null)]));
    expect(shownMaps(recipe, known).map(({ name }) => name)).toEqual([
      'band.b.integral',
      'band.b.centroid',
      'band.a.integral',
      'scan.total',
    ]);
  });
});
