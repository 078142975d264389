/** What is meant where nothing is written. */
import { describe, expect, it } from 'vitest';
import { detectorOf, emptyRecipe, floorOf, fullChannel, mediumOf } from '../../src/recipe/defaults';
import { validateRecipe } from '../../src/recipe/validate';

describe('defaults', () => {
  it('an empty recipe is valid, with its title or without', () => {
    expect(validateRecipe(emptyRecipe('')).ok).toBe(true);
    expect(emptyRecipe('')).toEqual({ recipe: 1 });
    expect(emptyRecipe('Tent field')).toEqual({ recipe: 1, title: 'Tent field' });
  });

  it('are those of the contract', () => {
    expect(floorOf({ name: 'a', from: 1, to: 2, unit: 'eV' })).toBe('none');
    expect(mediumOf(emptyRecipe(''))).toBe('air');
    expect(mediumOf({ recipe: 1, scan: { axis: { medium: 'vacuum' } } })).toBe('vacuum');
    expect(fullChannel({ source: 'scan.total', colour: '#ffffff' })).toEqual({
      source: 'scan.total',
      colour: '#ffffff',
      low: 'p1',
      high: 'p99.5',
      gamma: 1,
    });
    expect(detectorOf({ read_noise_e: 4 })).toEqual({
      electronsPerCount: 1,
      offsetCounts: 0,
      readNoiseE: 4,
      excessNoise: 1,
    });
  });
});
