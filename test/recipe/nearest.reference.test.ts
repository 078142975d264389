/** The edit distance against published examples. */
import { describe, expect, it } from 'vitest';
import { editDistance, nearestWord } from '../../src/recipe/nearest';

describe('edit distance', () => {
  it.each([
    // Worked examples of the literature: "kitten"/"sitting" 3 and "saturday"/"sunday" 3 for the distance
    // without swaps; "ca"/"abc" 3 is where optimal string alignment differs from unrestricted swaps (2).
    ['kitten', 'sitting', 3],
    ['saturday', 'sunday', 3],
    ['ca', 'abc', 3],
    ['', 'abc', 3],
    ['abc', 'abc', 0],
    // One of each kind Damerau counts (Commun. ACM 7, 171 (1964)): replaced, left out, put in, swapped.
    ['centre', 'cantre', 1],
    ['centre', 'cente', 1],
    ['centre', 'centrae', 1],
    ['centre', 'center', 1],
  ])('of %j and %j is %i, either way', (a, b, distance) => {
    expect(editDistance(a, b)).toBe(distance);
    expect(editDistance(b, a)).toBe(distance);
  });
});

describe('the nearest word', () => {
  it.each([
    ['center', ['centre', 'area', 'fwhm'], 'centre'],
    ['gauss', ['gaussian', 'lorentzian'], 'gaussian'],
    ['min_area', ['min_area_px', 'split'], 'min_area_px'],
    ['EV', ['eV', 'meV'], 'eV'],
    ['cm1', ['eV', 'nm', 'cm-1'], 'cm-1'],
    ['fwhm-g', ['fwhm', 'fwhm_g', 'fwhm_l'], 'fwhm_g'],
    ['banana', ['eV', 'meV', 'nm'], null],
    ['', ['eV'], null],
    [5, ['eV'], null],
  ])('to %j among %j is %j', (word, known, nearest) => {
    expect(nearestWord(word, known)).toBe(nearest);
  });

  it('to a very long word is not sought', () => {
    expect(nearestWord('x'.repeat(100_000), ['x'.repeat(99_999)])).toBeNull();
  });
});
