/** What passes, what is refused, and what is said of it. */
import { describe, expect, it } from 'vitest';
import { formatProblem, type RecipeProblem, recipeError } from '../../src/recipe/problems';
import { parseRecipe, validateRecipe } from '../../src/recipe/validate';
import { contractCopy, contractRecipe, type Spoilable } from './contract-recipe';

function problemsOf(value: unknown): readonly RecipeProblem[] {
  const result = validateRecipe(value);
  return result.ok ? [] : result.problems;
}

/** The contract's recipe with one thing changed. */
function spoiled(change: (recipe: Spoilable) => void): readonly RecipeProblem[] {
  const recipe = contractCopy();
  change(recipe);
  return problemsOf(recipe);
}

const set = (target: unknown, fields: Record<string, unknown>): void => {
  Object.assign(target as object, fields);
};

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

describe('one thing wrong', () => {
  it.each<[string, (recipe: Spoilable) => void, Partial<RecipeProblem>]>([
    ['an unknown block', (r) => set(r, { bnads: [] }), { path: 'bnads', nearest: 'bands' }],
    [
      'an unknown field',
      (r) => set(r.bands[1], { flor: 'ends' }),
      { path: 'bands[1].flor', nearest: 'floor', value: 'ends' },
    ],
    [
      'American spelling',
      (r) => set(r.blend.channels[0], { color: '#ffffff' }),
      { path: 'blend.channels[0].color', nearest: 'colour' },
    ],
    [
      'a unit in the wrong capitals',
      (r) => set(r.bands[1], { unit: 'EV' }),
      {
        path: 'bands[1].unit',
        value: 'EV',
        nearest: 'eV',
        expected: '"eV", "meV", "nm" or "cm-1"',
      },
    ],
    [
      'a number in quotes',
      (r) => set(r.bands[0], { from: '1.865' }),
      { path: 'bands[0].from', expected: 'a number, without quotes' },
    ],
    [
      'a missing field',
      (r) => {
        Reflect.deleteProperty(r.bands[0], 'to');
      },
      { path: 'bands[0].to', value: undefined, expected: 'a number' },
    ],
    [
      'a band without width',
      (r) => set(r.bands[0], { from: 1.9, to: 1.9 }),
      { path: 'bands[0].to' },
    ],
    [
      'an energy below zero',
      (r) => set(r.bands[0], { from: -1 }),
      { path: 'bands[0].from', expected: 'a number above 0' },
    ],
    ['a name with a dot', (r) => set(r.bands[1], { name: 'A.1' }), { path: 'bands[1].name' }],
    [
      'a name taken in other capitals',
      (r) => set(r.bands[1], { name: 'TAIL' }),
      { path: 'bands[1].name' },
    ],
    [
      'a misspelled step',
      (r) => set(r.condition[0], { step: 'despyke' }),
      { path: 'condition[0].step', nearest: 'despike' },
    ],
    [
      'a threshold of zero',
      (r) => set(r.condition[0], { threshold: 0 }),
      { path: 'condition[0].threshold', expected: 'a number above 0' },
    ],
    [
      'an offset from two sources',
      (r) => set(r.condition[1], { file: 'dark.npy' }),
      { path: 'condition[1].file' },
    ],
    [
      'too few points for the degree',
      (r) => set(r.condition[3], { degree: 3 }),
      { path: 'condition[3].points', expected: 'at least 4 points for degree 3' },
    ],
    [
      'two points at one place',
      (r) =>
        set(r.condition[3], {
          points: [
            [1, 2],
            [1, 3],
          ],
        }),
      { path: 'condition[3].points[1][0]' },
    ],
    [
      'a point that is no pair',
      (r) =>
        set(r.condition[3], {
          points: [
            [1, 2, 3],
            [2, 2],
          ],
        }),
      { path: 'condition[3].points[0]' },
    ],
    [
      'a misspelled word beside numbers',
      (r) => set(r.condition[6], { rank: 'atuo' }),
      { path: 'condition[6].rank', nearest: 'auto' },
    ],
    [
      'a half pixel',
      (r) => set(r.condition[8], { x: [0, 9.5] }),
      { path: 'condition[8].x[1]', expected: 'a whole number' },
    ],
    [
      'an empty bin',
      (r) => {
        (r.condition as unknown[])[9] = { step: 'bin' };
      },
      { path: 'condition[9].k' },
    ],
    [
      'an axis from two sources',
      (r) => set(r.scan.axis, { file: 'axis.npy' }),
      { path: 'scan.axis.file' },
    ],
    ['half a uniform axis', (r) => set(r.scan, { axis: { from: 1 } }), { path: 'scan.axis.to' }],
    [
      'a unit that does not fit the kind',
      (r) => set(r.scan.axis, { unit: 'eV' }),
      { path: 'scan.axis.unit' },
    ],
    ['an axis twice in the order', (r) => set(r.scan, { order: 'yyk' }), { path: 'scan.order' }],
    [
      'a unit under another spelling',
      (r) => set(r.scan.pixel, { unit: 'µm' }),
      { path: 'scan.pixel.unit', nearest: 'um' },
    ],
    ['a pitch of zero', (r) => set(r.scan.pixel, { x: 0 }), { path: 'scan.pixel.x' }],
    [
      'a list one too short',
      (r) => set(r.scan.height, { shift_px: [1] }),
      { path: 'scan.height.shift_px' },
    ],
    [
      'bounds the wrong way round',
      (r) => set(r.model.components[1].centre, { min: 2.1 }),
      { path: 'model.components[1].centre.max' },
    ],
    [
      'a start out of its bounds',
      (r) => set(r.model.components[1].centre, { start: 2.5 }),
      { path: 'model.components[1].centre.start', expected: 'a number from 1.97 to 2.04' },
    ],
    [
      'a fixed value that is not given',
      (r) => set(r.model.components[1], { fwhm: { fixed: true } }),
      { path: 'model.components[1].fwhm.start' },
    ],
    [
      'a width below zero',
      (r) => set(r.model.components[2], { fwhm: -0.05 }),
      { path: 'model.components[2].fwhm' },
    ],
    [
      'a parameter of another shape',
      (r) => set(r.model.components[1], { tail: 0.03 }),
      { path: 'model.components[1].tail' },
    ],
    [
      'a share above one',
      (r) => set(r.model.components[1], { shape: 'pseudo-voigt', eta: 1.5 }),
      { path: 'model.components[1].eta' },
    ],
    [
      'a tie to nothing',
      (r) => set(r.model.components[2], { centre: { tie: { to: 'exciton.center' } } }),
      { path: 'model.components[2].centre.tie.to', nearest: 'exciton.centre' },
    ],
    [
      'an empty model',
      (r) => {
        set(r.model, { components: [] });
        Reflect.deleteProperty(r, 'strain');
      },
      { path: 'model.components' },
    ],
    [
      'seven channels',
      (r) => set(r.blend, { channels: Array(7).fill(r.blend.channels[0]) }),
      { path: 'blend.channels', expected: 'a list of at most 6 entries' },
    ],
    [
      'a colour by name',
      (r) => set(r.blend.channels[0], { colour: 'red' }),
      { path: 'blend.channels[0].colour' },
    ],
    [
      'a percentile above 100',
      (r) => set(r.blend.channels[0], { high: 'p101' }),
      { path: 'blend.channels[0].high' },
    ],
    [
      'limits the wrong way round',
      (r) => set(r.blend.channels[0], { low: 5, high: 3 }),
      { path: 'blend.channels[0].high' },
    ],
    [
      'a low percentile above the high default',
      (r) =>
        set(r.blend, { channels: [{ source: 'scan.total', colour: '#ffffff', low: 'p99.9' }] }),
      { path: 'blend.channels[0].low' },
    ],
    [
      'no gamma',
      (r) => set(r.blend.channels[0], { gamma: 0 }),
      { path: 'blend.channels[0].gamma' },
    ],
    [
      'a map of a band that is not there',
      (r) => set(r.blend.channels[0], { source: 'band.tial.integral' }),
      { path: 'blend.channels[0].source', nearest: 'band.tail.integral' },
    ],
    [
      'a map of no pattern',
      (r) => set(r.features, { source: 'scan.hieght' }),
      { path: 'features.source', nearest: 'scan.height' },
    ],
    [
      'a parameter the component does not report',
      (r) => set(r.blend.channels[0], { source: 'fit.exciton.needed' }),
      { path: 'blend.channels[0].source' },
    ],
    [
      'an error map of a map without one',
      (r) => set(r.blend.channels[0], { source: 'scan.height.err' }),
      { path: 'blend.channels[0].source', nearest: 'scan.height' },
    ],
    [
      'a region that is not there',
      (r) => set(r.strain.raman, { unstrained: { region: 'falt' } }),
      { path: 'strain.raman.unstrained.region', nearest: 'flat' },
    ],
    [
      'strain from counts',
      (r) => set(r.strain.pl, { source: 'band.tail.integral' }),
      { path: 'strain.pl.source' },
    ],
    [
      'strain from strain',
      (r) => set(r.strain.pl, { source: 'strain.raman' }),
      { path: 'strain.pl.source' },
    ],
    [
      'a gauge of zero',
      (r) => set(r.strain.pl, { gauge_meV_per_percent: 0 }),
      { path: 'strain.pl.gauge_meV_per_percent' },
    ],
    [
      'an unstrained energy in the wrong capitals',
      (r) => set(r.strain.pl, { unstrained: { ev: 2 } }),
      { path: 'strain.pl.unstrained.ev', nearest: 'eV' },
    ],
    [
      'a ratio no material has',
      (r) => set(r.strain.height, { poisson: 0.6 }),
      { path: 'strain.height.poisson' },
    ],
    [
      'a uniaxial state without its ratio',
      (r) => {
        set(r.strain.raman, { state: 'uniaxial' });
        Reflect.deleteProperty(r.strain.raman, 'poisson');
      },
      { path: 'strain.raman.poisson' },
    ],
    [
      'a small letter for a pin',
      (r) => set(r, { pins: [{ name: 'a', x: 0, y: 0 }] }),
      { path: 'pins[0].name' },
    ],
    [
      'a pin twice',
      (r) =>
        set(r, {
          pins: [
            { name: 'A', x: 0, y: 0 },
            { name: 'A', x: 1, y: 0 },
          ],
        }),
      { path: 'pins[1].name' },
    ],
    [
      'a pin off the scan',
      (r) => set(r, { pins: [{ name: 'A', x: -1, y: 0 }] }),
      { path: 'pins[0].x' },
    ],
    [
      'a mask of the wrong size',
      (r) => set(r, { regions: [{ name: 'flat', shape: 'mask', nx: 3, ny: 3, rle: [4, 4] }] }),
      { path: 'regions[0].rle' },
    ],
    [
      'a mask without size',
      (r) => set(r, { regions: [{ name: 'flat', shape: 'mask', nx: 3, rle: [9] }] }),
      { path: 'regions[0].ny' },
    ],
    [
      'an endless number',
      (r) => set(r.scan, { exposure_s: Number.POSITIVE_INFINITY }),
      { path: 'scan.exposure_s', expected: 'a finite number' },
    ],
    [
      'a field left undefined',
      (r) => set(r.bands[0], { floor: undefined }),
      { path: 'bands[0].floor' },
    ],
  ])('is told of %s, and nothing else', (_, change, expected) => {
    const told = spoiled(change);
    expect(told.map(formatProblem)).toHaveLength(1);
    expect(told[0]).toMatchObject(expected);
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

describe('the error of a recipe', () => {
  it('says the first problem with its place and the word meant, and how many more there are', () => {
    const result = parseRecipe(
      '{ "recipe": 1,\n  "bands": [{ "name": "a", "from": 1, "to": 2, "unit": "ev", "flor": 1 }] }',
    );
    if (result.ok) throw new Error('passes');
    const error = recipeError(result.problems, 'tent.json');
    expect(error.kind).toBe('recipe');
    expect(error.message).toBe(
      'unit is "ev"; expected "eV", "meV", "nm" or "cm-1", and 1 more problem (tent.json: bands[0].unit, line 2, column 56). Did you mean "eV"?',
    );
  });

  it('shows each problem on one line', () => {
    const [problem] = problemsOf({ recipe: 1, bands: [{ name: 'a', from: 1, to: 2, unit: 'nn' }] });
    expect(formatProblem(problem)).toBe(
      'bands[0].unit: unit is "nn"; expected "eV", "meV", "nm" or "cm-1"; did you mean "nm"?',
    );
  });
});
