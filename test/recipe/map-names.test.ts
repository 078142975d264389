/** Names of derived maps, the contract's table of them, and which a recipe makes. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { formatMapName, type MapName, parseMapName } from '../../src/recipe/map-names';
import { offeredMaps } from '../../src/recipe/offered-maps';
import type { Recipe } from '../../src/recipe/schema';
import { validateRecipe } from '../../src/recipe/validate';
import { arbitraryRecipe } from './arbitrary-recipe';
import { contractRecipe } from './contract-recipe';

const result = validateRecipe(contractRecipe);
const recipe: Recipe = result.ok ? result.recipe : { recipe: 1 };

describe('a map name', () => {
  it.each<[string, MapName]>([
    ['scan.total', { kind: 'scan', quantity: 'total', isError: false }],
    ['scan.height', { kind: 'scan', quantity: 'height', isError: false }],
    ['band.tail.peak_at', { kind: 'band', band: 'tail', quantity: 'peak_at', isError: false }],
    ['band.tail.centroid.err', { kind: 'band', band: 'tail', quantity: 'centroid', isError: true }],
    ['band.err.integral', { kind: 'band', band: 'err', quantity: 'integral', isError: false }],
    [
      'fit.A1.centre_cm1',
      { kind: 'fit', component: 'A1', parameter: 'centre_cm1', isError: false },
    ],
    ['fit.tail.needed', { kind: 'fit', component: 'tail', parameter: 'needed', isError: false }],
    ['fit.status', { kind: 'fit-quality', quantity: 'status', isError: false }],
    ['fit.status.fwhm.err', { kind: 'fit', component: 'status', parameter: 'fwhm', isError: true }],
    ['strain.pl.err', { kind: 'strain', method: 'pl', isError: true }],
    ['strain.height.angle', { kind: 'strain-height', component: 'angle', isError: false }],
    ['despike.count', { kind: 'despike', quantity: 'count', isError: false }],
  ])('%s has its parts, and they its text', (text, parts) => {
    expect(parseMapName(text)).toEqual(parts);
    expect(formatMapName(parts)).toBe(text);
  });

  it.each([
    '',
    'scan',
    'scan.',
    'scan.totals',
    'scan.height.err',
    'band.tail',
    'band..integral',
    'band.tail.fwhm',
    'band.tail.integral.err.err',
    'fit.exciton',
    'fit.tail.needed.err',
    'fit.chi2r.err',
    'fit.status.err',
    'strain.height',
    'strain.height.err',
    'strain.pl.xx',
    'despike.count.err',
    'Band.tail.integral',
    'band.tail.integral.x',
  ])('%j is none', (text) => {
    expect(parseMapName(text)).toBeNull();
  });

  it('is never read into parts that give another name', () => {
    const word = fc.constantFrom(
      'scan',
      'band',
      'fit',
      'strain',
      'despike',
      'total',
      'height',
      'tail',
      'integral',
      'err',
      'pl',
      'xx',
      'count',
      'status',
      'centre',
      '',
    );
    fc.assert(
      fc.property(fc.array(word, { maxLength: 5 }), (words) => {
        const text = words.join('.');
        const parts = parseMapName(text);
        if (parts !== null) expect(formatMapName(parts)).toBe(text);
      }),
      { numRuns: 2000 },
    );
  });
});

describe('the maps of a recipe', () => {
  const named = new Map(offeredMaps(recipe).map((map) => [map.name, map]));

  it('are those of the contract’s table, with their units', () => {
    expect([...named].map(([name, { unit, hasErrors }]) => [name, unit, hasErrors])).toEqual([
      ['scan.total', 'counts', true],
      ['scan.height', 'nm', false],
      ['despike.count', 'channels', false],
      ['band.tail.integral', 'counts', true],
      ['band.tail.centroid', 'eV', true],
      ['band.tail.median', 'eV', true],
      ['band.tail.spread', 'eV', true],
      ['band.tail.peak', 'counts', true],
      ['band.tail.peak_at', 'eV', true],
      ['band.A1.integral', 'counts', true],
      ['band.A1.centroid', 'eV', true],
      ['band.A1.median', 'eV', true],
      ['band.A1.spread', 'eV', true],
      ['band.A1.peak', 'counts', true],
      ['band.A1.peak_at', 'eV', true],
      ['fit.floor.level', 'counts per channel', true],
      ['fit.floor.slope', 'counts per channel per eV', true],
      ['fit.exciton.area', 'counts', true],
      ['fit.exciton.centre', 'eV', true],
      ['fit.exciton.fwhm', 'eV', true],
      ['fit.exciton.height', 'counts per channel', true],
      ['fit.tail.area', 'counts', true],
      ['fit.tail.centre', 'eV', true],
      ['fit.tail.fwhm', 'eV', true],
      ['fit.tail.tail', 'eV', true],
      ['fit.tail.height', 'counts per channel', true],
      ['fit.tail.needed', '', false],
      ['fit.A1.area', 'counts', true],
      ['fit.A1.centre', 'eV', true],
      ['fit.A1.fwhm', 'eV', true],
      ['fit.A1.height', 'counts per channel', true],
      ['fit.A1.centre_cm1', 'cm-1', true],
      ['fit.chi2r', '', false],
      ['fit.status', '', false],
      ['fit.iterations', '', false],
      ['strain.pl', 'percent', true],
      ['strain.raman', 'percent', true],
      ['strain.height.xx', 'percent', true],
      ['strain.height.yy', 'percent', true],
      ['strain.height.xy', 'percent', true],
      ['strain.height.sum', 'percent', true],
      ['strain.height.major', 'percent', true],
      ['strain.height.minor', 'percent', true],
      ['strain.height.angle', 'degrees', true],
    ]);
  });

  it('have titles in words, each its own', () => {
    expect(named.get('band.tail.centroid')?.title).toBe('Centroid of band tail');
    expect(named.get('fit.tail.tail')?.title).toBe('Tail of tail');
    const titles = [...named.values()].map(({ title }) => title);
    expect(new Set(titles).size).toBe(titles.length);
  });

  it('have names that read back to their parts, whatever the recipe', () => {
    fc.assert(
      fc.property(arbitraryRecipe, (value) => {
        const valid = validateRecipe(value);
        for (const { name, parts, hasErrors } of valid.ok ? offeredMaps(valid.recipe) : []) {
          expect(parseMapName(name)).toEqual(parts);
          expect(parseMapName(`${name}.err`) !== null).toBe(hasErrors);
        }
      }),
    );
  });
});
