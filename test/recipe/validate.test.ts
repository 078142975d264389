/** What passes, what is refused, and what is said of it. */
import { describe, expect, it } from 'vitest';
import { type RecipeProblem, recipeError } from '../../src/recipe/problems';
import { parseRecipe, validateRecipe } from '../../src/recipe/validate';
import { contractRecipe } from './contract-recipe';
import { problemsOf, set, spoiled } from './spoiled-recipe';

describe('the example of the contract', () => {
  it('is valid and comes back as it was written', () => {
    expect(validateRecipe(contractRecipe)).toEqual({ ok: true, recipe: contractRecipe });
    const read = parseRecipe(JSON.stringify(contractRecipe, null, 2));
    expect(read).toEqual({ ok: true, recipe: contractRecipe });
  });

  it('needs nothing but its format', () => {
    expect(problemsOf({ recipe: 1 })).toEqual([]);
  });

  it.each([
    ['a uniform axis', { scan: { axis: { from: 1.8, to: 2.1, kind: 'energy', unit: 'eV' } } }],
    ['axis values', { scan: { axis: { values: [500, 501, 502.5] } } }],
    ['an axis file', { scan: { axis: { file: 'axis.npy' } } }],
    ['a height inside the scan file', { scan: { height: { data: '/height' } } }],
    ['a pitch that is no length, downwards', { scan: { pixel: { x: -0.5, y: 1, unit: 'V' } } }],
    ['a step that is off', { condition: [{ step: 'despike', off: true }] }],
    [
      'a far field scale to be found',
      { condition: [{ step: 'farfield', file: 'a.npy', scale: 'fit', window: [1.9, 2] }] },
    ],
    ['a rank to be found', { condition: [{ step: 'denoise', method: 'svd', rank: 'auto' }] }],
    [
      'a map of a despike step',
      {
        condition: [{ step: 'despike' }],
        blend: { mode: 'screen', channels: [{ source: 'despike.count', colour: '#FFFFFF' }] },
      },
    ],
    ['a band whose ends run downwards', { bands: [{ name: 'a', from: 2, to: 1.9, unit: 'eV' }] }],
    ['a negative shift', { bands: [{ name: 'anti', from: -430, to: -405, unit: 'cm-1' }] }],
    [
      'an error map in the blend',
      {
        bands: [{ name: 'a', from: 1, to: 2, unit: 'eV' }],
        blend: {
          mode: 'additive',
          channels: [{ source: 'band.a.centroid.err', colour: '#010203' }],
        },
      },
    ],
    [
      'pins of one and two letters',
      {
        pins: [
          { name: 'A', x: 12, y: 16, label: 'flat' },
          { name: 'AB', x: 0, y: 0 },
        ],
      },
    ],
    ['a mask by runs', { regions: [{ name: 'm', shape: 'mask', nx: 3, ny: 2, rle: [0, 4, 2] }] }],
    [
      'an ellipse',
      { regions: [{ name: 'm', shape: 'ellipse', x: 3.5, y: 2, rx: 2, ry: 1, angle: 30 }] },
    ],
    [
      'a polygon',
      {
        regions: [
          {
            name: 'm',
            shape: 'polygon',
            points: [
              [0, 0],
              [4, 0],
              [0, 4],
            ],
          },
        ],
      },
    ],
    ['a place for an editor to find the schema', { $schema: './recipe.schema.json' }],
  ])('accepts %s', (_, blocks) => {
    expect(problemsOf({ recipe: 1, ...blocks })).toEqual([]);
  });

  it('accepts ties, and shapes with all their parameters', () => {
    const told = spoiled((recipe) => {
      const { components } = recipe.model;
      set(components[2], { centre: { tie: { to: 'exciton.centre', plus: -0.09 } } });
      set(components[3], { fwhm: { tie: { to: 'tail.fwhm', times: 1 }, unit: 'cm-1' } });
      components.push(
        ...([
          { name: 'pv', shape: 'pseudo-voigt', area: 100, eta: { start: 0.5, fixed: true } },
          { name: 'v', shape: 'voigt', fwhm_g: 0.01, fwhm_l: { start: 0.01, min: 0 } },
          { name: 'f', shape: 'fano', q: -2, centre: { start: 600, unit: 'nm' } },
          { name: 'd', shape: 'decay', level: 10, decay: 0.1 },
        ] as never[]),
      );
    });
    expect(told).toEqual([]);
  });
});

describe('several things wrong', () => {
  it('are all told: in the schema, across fields and between blocks', () => {
    const told = spoiled((recipe) => {
      set(recipe.bands[0], { unit: 'ev', from: 1, to: 1 });
      set(recipe.condition[5], { step: 'basline', smothness: 5, method: 'asl' });
      set(recipe.blend.channels[0], { source: 'fit.excitn.centre', low: 9, high: 8 });
      set(recipe.strain.raman, { state: 'biaxal' });
    });
    expect(told.map(({ path }) => path).sort()).toEqual([
      'bands[0].to',
      'bands[0].unit',
      'blend.channels[0].high',
      'blend.channels[0].source',
      'condition[5].method',
      'condition[5].smothness',
      'condition[5].step',
      'strain.raman.state',
    ]);
  });

  it('a circle of ties is told at each of its ties', () => {
    const told = spoiled((recipe) => {
      const { components } = recipe.model;
      set(components[1], { centre: { tie: { to: 'tail.centre' } } });
      set(components[2], { centre: { tie: { to: 'A1.centre', plus: 0.1 } } });
      set(components[3], { centre: { tie: { to: 'exciton.centre' } } });
    });
    expect(told.map(({ path }) => path)).toEqual([
      'model.components[1].centre.tie.to',
      'model.components[2].centre.tie.to',
      'model.components[3].centre.tie.to',
    ]);
  });

  it('a component whose shape is misspelled does not make its maps unknown', () => {
    const told = spoiled((recipe) => set(recipe.model.components[1], { shape: 'gaussain' }));
    expect(told.map(({ path, nearest }) => [path, nearest])).toEqual([
      ['model.components[1].shape', 'gaussian'],
    ]);
  });
});

describe('a document as a whole', () => {
  it('of a newer format has that one problem', () => {
    const told = problemsOf({ recipe: 2, bnads: 1 });
    expect(told).toHaveLength(1);
    expect(told[0]).toMatchObject({ path: 'recipe', value: 2 });
    expect(told[0].message).toContain('newer version');
    expect(recipeError(told).hint).toContain('Update the program');
  });

  it.each([[[]], ['text'], [null], [{ name: 'package', version: '1.0.0' }]])(
    'that is no recipe, %j, has that one problem',
    (value) => {
      expect(problemsOf(value)).toHaveLength(1);
    },
  );

  it('too large, too deep or turning back on itself is refused at once', () => {
    let deep: unknown = [];
    for (let level = 0; level < 100_000; level++) deep = [deep];
    const round: Record<string, unknown> = { recipe: 1 };
    round.scan = round;
    const started = performance.now();
    expect(problemsOf({ recipe: 1, bands: deep })[0].message).toContain('nested deeper');
    expect(problemsOf(round)[0].message).toContain('contains itself');
    expect(problemsOf({ recipe: 1, bands: new Array(1e6).fill({}) })[0].path).toBe('bands');
    expect(problemsOf({ recipe: 1, scan: new Map() })[0].path).toBe('scan');
    expect(performance.now() - started).toBeLessThan(2000);
  });

  it('of thousands of wrong entries is told of all of them without a wait', () => {
    const many = (entry: (n: number) => unknown): unknown[] =>
      Array.from({ length: 9_999 }, (_, n) => entry(n));
    const started = performance.now();
    const told = problemsOf({
      recipe: 1,
      bands: many((n) => ({ name: `b${n}`, from: 1, to: 2, unit: 'eV' })),
      condition: many(() => ({ step: 'dspike', a: 1, b: 2 })),
      model: {
        components: many((n) => ({
          name: `c${n}`,
          shape: 'line',
          level: { tie: { to: 'x.level' } },
        })),
      },
      blend: {
        mode: 'screen',
        channels: many(() => ({ source: 'band.x.integral', colour: '#000000' })),
      },
    });
    expect(told.length).toBeGreaterThan(29_997);
    expect(Math.max(...told.map(({ message }) => message.length))).toBeLessThan(500);
    expect(performance.now() - started).toBeLessThan(5_000);
  });

  it('takes an axis of 200 000 values, and tells the first that is no number', () => {
    const values: unknown[] = Array.from({ length: 200_000 }, (_, k) => 500 + k / 1000);
    expect(problemsOf({ recipe: 1, scan: { axis: { values } } })).toEqual([]);
    values[150_000] = 'x';
    expect(problemsOf({ recipe: 1, scan: { axis: { values } } })).toMatchObject([
      { path: 'scan.axis.values[150000]' },
    ]);
  });
});

describe('text', () => {
  const first = (text: string): RecipeProblem => {
    const result = parseRecipe(text);
    if (result.ok) throw new Error(`passes: ${text}`);
    return result.problems[0];
  };

  it.each([
    ['nothing', '', 1, 1],
    ['a comma at the end', '{\n  "recipe": 1,\n}', 3, 1],
    ['a missing comma', '{ "recipe": 1\n  "title": "a" }', 2, 3],
    ['a comment', '{\n  "recipe": 1 // format\n}', 2, 15],
    ['single quotes', "{ 'recipe': 1 }", 1, 3],
    ['an open quote', '{ "title": "a\n" }', 1, 14],
    ['an open object', '{ "recipe": 1', 1, 14],
    ['a number JSON does not know', '{ "recipe": 01 }', 1, 13],
    ['more than one document', '{ "recipe": 1 } {}', 1, 17],
    ['a bad escape', '{ "title": "a\\x" }', 1, 12],
  ])('with %s is refused at its place', (_, text, line, column) => {
    const problem = first(text);
    expect(problem.position).toEqual({ line, column });
    expect(problem.message).toMatch(/^this is no valid JSON: /);
  });

  it('with the same field twice is refused, and the rest is still looked at', () => {
    const result = parseRecipe('{ "recipe": 1,\n "bands": [],\n "bands": [],\n "titel": "" }');
    expect(
      !result.ok && result.problems.map(({ path, position }) => [path, position?.line]),
    ).toEqual([
      ['bands', 3],
      ['titel', 4],
    ]);
  });

  it('has every problem placed by line and column, in the order of the text', () => {
    const text = [
      '{',
      '  "recipe": 1,',
      '  "bands": [',
      '    { "name": "a", "from": 1, "unit": "ev" },',
      '    { "nam": "b", "from": 1, "to": 2, "unit": "eV" }',
      '  ]',
      '}',
    ].join('\n');
    const result = parseRecipe(text);
    expect(
      !result.ok &&
        result.problems.map(({ path, position }) => [path, position?.line, position?.column]),
    ).toEqual([
      ['bands[0].to', 4, 5],
      ['bands[0].unit', 4, 39],
      ['bands[1].name', 5, 5],
      ['bands[1].nam', 5, 14],
    ]);
  });

  it('with a byte order mark is read', () => {
    expect(parseRecipe('\uFEFF{ "recipe": 1 }').ok).toBe(true);
  });

  it('refuses a field named after the prototype like any other unknown field', () => {
    expect(first('{ "recipe": 1, "__proto__": { "bands": 1 } }')).toMatchObject({
      path: '__proto__',
    });
    expect(first('{ "recipe": 1, "constructor": 1 }')).toMatchObject({ path: 'constructor' });
  });

  it('of 100 MB, or nested a million deep, does not hang', () => {
    const started = performance.now();
    expect(first('x'.repeat(100 * 2 ** 20)).message).toContain('100 MB');
    expect(first(`{"recipe":1,"bands":${'['.repeat(1_000_000)}`).message).toContain(
      'nested deeper',
    );
    expect(performance.now() - started).toBeLessThan(2000);
  });
});
