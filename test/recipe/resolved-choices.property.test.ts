/** What detection resolves, and every alternative it offers, can be written into a recipe. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { detectScan } from '../../src/io/detect/detect-scan';
import { emptyRecipe } from '../../src/recipe/defaults';
import { setScanChoices } from '../../src/recipe/edits';
import { mergeScanChoices } from '../../src/recipe/merge-scan-choices';
import { serialiseRecipe } from '../../src/recipe/serialise';
import { parseRecipe } from '../../src/recipe/validate';
import { type FakeArray, fakeContainer } from '../io/fake-container';

const axes = fc.constantFrom(
  ['wavelength_nm', 600],
  ['energy', 1.8],
  ['Raman shift [cm-1]', 100],
  ['wavenumber', 18_000],
  ['axis', 600],
) as fc.Arbitrary<[string, number]>;

/** Small cubes in every order, with pitches of all kinds, perhaps a laser and a height map. */
const files = fc
  .record({
    axis: axes,
    shape: fc.constantFrom([3, 4, 5], [5, 4, 3], [4, 5], [5, 4], [5], [5, 2, 3]),
    step: fc.constantFrom(-15, 0.5, 2),
    unit: fc.constantFrom('nm', 'um', 'V', 'furlong', ''),
    laser: fc.boolean(),
    height: fc.boolean(),
    exposure: fc.boolean(),
  })
  .map(({ axis: [name, first], shape, step, unit, laser, height, exposure }) => {
    const size = shape.reduce((product, length) => product * length, 1);
    const positions = (length: number): FakeArray => ({
      shape: [length],
      data: Array.from({ length }, (_, i) => i * step),
      attributes: unit === '' ? {} : { units: unit },
    });
    const arrays: Record<string, FakeArray> = {
      counts: { shape, data: Uint16Array.from({ length: size }, (_, i) => i) },
      [name]: { shape: [5], data: [0, 1, 2, 3, 4].map((k) => first + k / 8) },
      x: positions(4),
      y: positions(3),
      ...(height
        ? { height: { shape: [3, 4], data: Float64Array.from({ length: 12 }, (_, i) => i) } }
        : {}),
      ...(exposure ? { exposure_s: { shape: [], data: [0.5] } } : {}),
      ...(laser ? { laser_nm: { shape: [], data: [594.1] } } : {}),
    };
    return arrays;
  });

describe('what detection finds', () => {
  it('is a valid scan block, comes back from its text, and so is every alternative laid over it', async () => {
    let plans = 0;
    let alternatives = 0;
    await fc.assert(
      fc.asyncProperty(files, async (arrays) => {
        const container = fakeContainer({ format: 'npz', arrays });
        const found = await detectScan(container, [], {}, 'scan.npz');
        for (const { choice } of found.guesses.flatMap((guess) => guess.alternatives)) {
          alternatives++;
          expect(() => setScanChoices(emptyRecipe(''), choice)).not.toThrow();
        }
        if (found.plan === null) return;
        plans++;
        const { resolved } = found.plan;
        const recipe = setScanChoices(emptyRecipe('Found'), resolved);
        expect(parseRecipe(serialiseRecipe(recipe))).toEqual({ ok: true, recipe });
        expect(mergeScanChoices(resolved, resolved)).toEqual(resolved);
        for (const { choice } of found.guesses.flatMap((guess) => guess.alternatives)) {
          expect(() => setScanChoices(recipe, choice)).not.toThrow();
        }
      }),
      { numRuns: 300 },
    );
    expect(plans).toBeGreaterThan(50);
    expect(alternatives).toBeGreaterThan(100);
  });
});
