/** blend.png: the recipe's blend, decoded again. */
import { decode } from 'fast-png';
import { describe, expect, it } from 'vitest';
import { blendPicture } from '../../src/cli/blend-picture';
import { isRimlightError } from '../../src/errors';
import type { Recipe } from '../../src/recipe/schema';
import type { DerivedMap } from '../../src/science/scan';

const map: DerivedMap = {
  name: 'scan.total',
  unit: 'counts',
  ny: 1,
  nx: 3,
  values: Float64Array.of(0, Number.NaN, 10),
  errors: Float64Array.of(10, 0, 0),
};
const recipeOf = (source: string): Recipe => ({
  recipe: 1,
  blend: { mode: 'screen', channels: [{ source, colour: '#f50', low: 'p0', high: 'p100' }] },
});

describe('blendPicture', () => {
  it('has one pixel for each of the scan, transparent where there is no value', () => {
    const { width, height, data } = decode(blendPicture(recipeOf('scan.total'), [map])!());
    expect([width, height]).toEqual([3, 1]);
    expect([...data]).toEqual([0, 0, 0, 255, 0, 0, 0, 0, 255, 85, 0, 255]);
  });

  it('shows uncertainties as a map of their own', () => {
    const { data } = decode(blendPicture(recipeOf('scan.total.err'), [map])!());
    expect([...data.slice(0, 4)]).toEqual([255, 85, 0, 255]);
  });

  it('is none where the recipe has no blend', () => {
    expect(blendPicture({ recipe: 1 }, [map])).toBeNull();
  });

  it.each([
    ['scan.height', [map]],
    ['scan.total.err', [{ ...map, errors: null }]],
  ])('says that %s is missing, once the picture is asked for', (source, maps) => {
    const encode = blendPicture(recipeOf(source), maps)!;
    try {
      encode();
      expect.unreachable();
    } catch (error) {
      if (!isRimlightError(error)) throw error;
      expect(error.kind).toBe('recipe');
      expect(error.message).toContain(source);
      expect(error.where).toBe('blend.channels[0].source');
    }
  });
});
