/** Whatever is done to a recipe in whatever order, it stays valid, and its text brings it back. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { isRimlightError } from '../../src/errors';
import * as edits from '../../src/recipe/edits';
import { offeredMaps } from '../../src/recipe/offered-maps';
import type { Recipe } from '../../src/recipe/schema';
import { serialiseRecipe } from '../../src/recipe/serialise';
import { parseRecipe, validateRecipe } from '../../src/recipe/validate';
import { arbitraryRecipe } from './arbitrary-recipe';

type Edit = (recipe: Recipe) => Recipe;

const pick = <T>(list: readonly T[] | undefined, n: number): T | undefined =>
  list?.[n % (list.length || 1)];
const bandName = (recipe: Recipe, n: number): string => pick(recipe.bands, n)?.name ?? 'none';
const pinName = (recipe: Recipe, n: number): string => pick(recipe.pins, n)?.name ?? 'A';

/** Numbers as hands and scripts give them, nonsense included. */
const number = fc.oneof(
  fc.double({ min: 0.5, max: 3, noNaN: true }),
  fc.constantFrom(0, -1, Number.NaN, Number.POSITIVE_INFINITY, 1.9),
);
const name = fc.constantFrom('a', 'A', 'b', 'tail', 'a.b', '', 'x'.repeat(99));
const n = fc.nat({ max: 20 });
const unit = fc.constantFrom('eV', 'meV', 'nm', 'cm-1');

const edit: fc.Arbitrary<Edit> = fc.oneof(
  fc.tuple(name, number, number, unit).map(
    ([name, from, to, unit]): Edit =>
      (r) =>
        edits.addBand(r, { name, from, to, unit }),
  ),
  fc.tuple(n, number, number).map(
    ([i, from, to]): Edit =>
      (r) =>
        edits.moveBandEdges(r, bandName(r, i), from, to),
  ),
  fc.tuple(n, fc.constantFrom('from', 'to'), number).map(
    ([i, edge, value]): Edit =>
      (r) =>
        edits.moveBandEdge(r, bandName(r, i), edge, value),
  ),
  fc.tuple(n, number, number, unit).map(
    ([i, from, to, unit]): Edit =>
      (r) =>
        edits.setBandInterval(r, bandName(r, i), { from, to, unit }),
  ),
  fc.tuple(n, name).map(
    ([i, to]): Edit =>
      (r) =>
        edits.renameBand(r, bandName(r, i), to),
  ),
  n.map(
    (i): Edit =>
      (r) =>
        edits.removeBand(r, bandName(r, i)),
  ),
  fc.tuple(n, fc.constantFrom('none', 'ends')).map(
    ([i, floor]): Edit =>
      (r) =>
        edits.setBandFloor(r, bandName(r, i), floor),
  ),
  fc.tuple(n, n).map(
    ([x, y]): Edit =>
      (r) =>
        edits.addPin(r, { x, y }),
  ),
  fc.tuple(n, number, n).map(
    ([i, x, y]): Edit =>
      (r) =>
        edits.movePin(r, pinName(r, i), { x, y }),
  ),
  fc.tuple(n, fc.string()).map(
    ([i, label]): Edit =>
      (r) =>
        edits.labelPin(r, pinName(r, i), label),
  ),
  n.map(
    (i): Edit =>
      (r) =>
        edits.removePin(r, pinName(r, i)),
  ),
  n.map(
    (i): Edit =>
      (r) =>
        edits.addBlendChannel(r, {
          source: pick(offeredMaps(r), i)?.name ?? '',
          colour: '#12aB9f',
        }),
  ),
  fc.tuple(n, number, number).map(
    ([i, low, high]): Edit =>
      (r) =>
        edits.setBlendChannel(r, i, { low, high }),
  ),
  fc.tuple(n, number).map(
    ([i, gamma]): Edit =>
      (r) =>
        edits.setBlendChannel(r, i, { gamma }),
  ),
  fc.tuple(n, n).map(
    ([i, j]): Edit =>
      (r) =>
        edits.setBlendChannel(r, i, { source: `${pick(offeredMaps(r), j)?.name}` }),
  ),
  n.map(
    (i): Edit =>
      (r) =>
        edits.removeBlendChannel(r, i),
  ),
  fc.constantFrom('additive', 'screen').map(
    (mode): Edit =>
      (r) =>
        edits.setBlendMode(r, mode),
  ),
  n.map(
    (i): Edit =>
      (r) =>
        edits.toggleStep(r, i),
  ),
  fc.tuple(name, number).map(
    ([name, rx]): Edit =>
      (r) =>
        edits.addRegion(r, { name, shape: 'ellipse', x: 1, y: 1, rx, ry: 1 }),
  ),
  n.map(
    (i): Edit =>
      (r) =>
        edits.removeRegion(r, pick(r.regions, i)?.name ?? 'none'),
  ),
  fc.string().map(
    (title): Edit =>
      (r) =>
        edits.setTitle(r, title),
  ),
  fc
    .constantFrom(
      { axis: { data: '/other' } },
      { axis: { kind: 'shift' } as const },
      { data: '/x' },
      { detector: { read_noise_e: 3 } },
      { axis: { unit: 'parsec' } },
    )
    .map(
      (choices): Edit =>
        (r) =>
          edits.setScanChoices(r, choices),
    ),
);

describe('edits', () => {
  it('never make a recipe invalid: they change it, leave it, or refuse', () => {
    let changed = 0;
    fc.assert(
      fc.property(
        arbitraryRecipe,
        fc.array(edit, { minLength: 1, maxLength: 15 }),
        (value, list) => {
          const start = validateRecipe(value);
          if (!start.ok) throw new Error('the arbitrary recipe is not valid');
          let recipe = start.recipe;
          for (const apply of list) {
            const before = structuredClone(recipe);
            let next = recipe;
            try {
              next = apply(recipe);
            } catch (error) {
              if (!isRimlightError(error) || error.kind !== 'recipe') throw error;
            }
            expect(recipe).toEqual(before);
            if (next !== recipe) changed++;
            recipe = next;
            const result = validateRecipe(recipe);
            if (!result.ok) expect(result.problems).toEqual([]);
          }
          expect(parseRecipe(serialiseRecipe(recipe))).toEqual({ ok: true, recipe });
        },
      ),
      { numRuns: 200 },
    );
    expect(changed).toBeGreaterThan(200);
  });

  it('taking away what was just added gives the recipe back', () => {
    fc.assert(
      fc.property(arbitraryRecipe, (value) => {
        const start = validateRecipe(value);
        if (!start.ok) throw new Error('the arbitrary recipe is not valid');
        const { recipe } = start;
        const band = edits.nextBandName(recipe);
        const withBand = edits.addBand(recipe, { name: band, from: 1, to: 2, unit: 'eV' });
        expect(edits.removeBand(withBand, band)).toEqual({ ...recipe, bands: recipe.bands ?? [] });
        const pin = edits.nextPinName(recipe);
        const withPin = edits.addPin(recipe, { x: 0, y: 0 });
        expect(edits.removePin(withPin, pin)).toEqual({ ...recipe, pins: recipe.pins ?? [] });
      }),
    );
  });

  it('renaming a band there and back gives the recipe back', () => {
    fc.assert(
      fc.property(arbitraryRecipe, fc.nat(), (value, which) => {
        const start = validateRecipe(value);
        if (!start.ok) throw new Error('the arbitrary recipe is not valid');
        const { recipe } = start;
        const from = bandName(recipe, which);
        const there = edits.renameBand(recipe, from, 'no-other-band-has-this');
        expect(edits.renameBand(there, 'no-other-band-has-this', from)).toEqual(recipe);
      }),
    );
  });
});
