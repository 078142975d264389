/** The emitted JSON Schema: complete, explained, the same every time, and of one mind with validation. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { recipeJsonSchema } from '../../src/recipe/json-schema';
import { validateRecipe } from '../../src/recipe/validate';
import { arbitraryRecipe } from './arbitrary-recipe';
import { contractRecipe } from './contract-recipe';
import { satisfies } from './json-schema-check';

const schema = recipeJsonSchema();

/** Every field of the schema, as "bands[].unit", with its own schema. */
function fieldsOf(
  node: unknown,
  path = '',
  seen: readonly unknown[] = [],
): [string, Record<string, unknown>][] {
  if (typeof node !== 'object' || node === null || seen.includes(node)) return [];
  const one = node as Record<string, unknown>;
  const inside = [...seen, node];
  const reference = /^#\/\$defs\/(.+)$/.exec(String(one.$ref))?.[1];
  const target = reference && (schema.$defs as Record<string, unknown>)[reference];
  const own = Object.entries((one.properties ?? {}) as Record<string, Record<string, unknown>>);
  return [
    ...own.flatMap(([name, field]): [string, Record<string, unknown>][] => {
      const at = path === '' ? name : `${path}.${name}`;
      return [[at, field], ...fieldsOf(field, at, inside)];
    }),
    ...(['anyOf', 'oneOf', 'prefixItems'] as const).flatMap((keyword) =>
      ((one[keyword] ?? []) as unknown[]).flatMap((branch) => fieldsOf(branch, path, inside)),
    ),
    ...fieldsOf(one.items, `${path}[]`, inside),
    ...fieldsOf(target, path, inside),
  ];
}

const fields = fieldsOf(schema);

describe('the JSON Schema of the recipe', () => {
  it('is plain JSON and the same every time', () => {
    expect(JSON.parse(JSON.stringify(schema))).toEqual(schema);
    expect(JSON.stringify(recipeJsonSchema())).toBe(JSON.stringify(schema));
    expect(schema.$schema).toBe('https://json-schema.org/draft/2020-12/schema');
  });

  it('explains every field', () => {
    const silent = fields.filter(([, field]) => {
      const target = /^#\/\$defs\/(.+)$/.exec(String(field.$ref))?.[1];
      const meant = target
        ? (schema.$defs as Record<string, Record<string, unknown>>)[target]
        : field;
      return typeof (field.description ?? meant.description) !== 'string';
    });
    expect(silent.map(([path]) => path)).toEqual([]);
    expect(fields.length).toBeGreaterThan(150);
  });

  it('refuses fields it does not know, at every level', () => {
    const open: string[] = [];
    const visit = (node: unknown, path: string): void => {
      if (typeof node !== 'object' || node === null) return;
      const one = node as Record<string, unknown>;
      if (one.properties !== undefined && one.additionalProperties !== false) open.push(path);
      for (const [key, child] of Object.entries(one)) visit(child, `${path}/${key}`);
    };
    visit(schema, '');
    expect(open).toEqual([]);
  });

  it('has the fields and words the public relies on', () => {
    const words = new Map<string, Set<unknown>>();
    for (const [path, field] of fields) {
      const forms = [field, ...((field.anyOf ?? []) as Record<string, unknown>[])];
      const known = words.get(path) ?? new Set();
      for (const form of forms) {
        for (const word of (form.enum ?? []) as unknown[]) known.add(word);
        if ('const' in form) known.add(form.const);
      }
      words.set(path, known);
    }
    const lines = [...words].map(([path, known]) =>
      known.size === 0 ? path : `${path} = ${[...known].join(' | ')}`,
    );
    expect(`${lines.sort().join('\n')}\n`).toMatchSnapshot();
  });

  it('accepts what validation accepts', () => {
    expect(satisfies(schema, contractRecipe)).toBe(true);
    fc.assert(
      fc.property(arbitraryRecipe, (value) => {
        expect(validateRecipe(value).ok).toBe(true);
        expect(satisfies(schema, value)).toBe(true);
      }),
      { numRuns: 200 },
    );
  });

  it('is of one mind with validation on any value put in any place, rules across fields apart', () => {
    const junk = fc.constantFrom<unknown>(
      null,
      true,
      'x',
      '',
      'p50',
      -1,
      0,
      0.5,
      1e12,
      [],
      [1, 2],
      [2, 2],
      {},
      { eV: 1 },
      { start: 1 },
    );
    let refused = 0;
    fc.assert(
      fc.property(arbitraryRecipe, fc.nat(), junk, (value, which, replacement) => {
        const document = structuredClone(value);
        const places = placesIn(document);
        const [holder, key] = places[which % places.length];
        (holder as Record<string | number, unknown>)[key] = replacement;
        const result = validateRecipe(document);
        const isSatisfied = satisfies(schema, document);
        if (!isSatisfied) {
          refused++;
          expect(result.ok).toBe(false);
        }
        if (result.ok) expect(isSatisfied).toBe(true);
        const isAboutTypes =
          !result.ok &&
          result.problems.some(({ message }) =>
            /expected (text in double quotes|a number|true or false|an object|a list \[)$/.test(
              message,
            ),
          );
        if (isAboutTypes) expect(isSatisfied).toBe(false);
      }),
      { numRuns: 1000 },
    );
    expect(refused).toBeGreaterThan(300);
  });

  it.each<[string, unknown]>([
    ['two sources of an offset', { condition: [{ step: 'offset', counts: 1, file: 'a' }] }],
    ['no source of an offset', { condition: [{ step: 'offset' }] }],
    ['an empty crop', { condition: [{ step: 'crop', unit: 'eV' }] }],
    ['an empty bin', { condition: [{ step: 'bin' }] }],
    ['half a uniform axis', { scan: { axis: { from: 1 } } }],
    ['a mask with size but no runs', { regions: [{ name: 'a', shape: 'mask', nx: 1, ny: 1 }] }],
    [
      'a gauge of zero',
      {
        bands: [{ name: 'a', from: 1, to: 2, unit: 'eV' }],
        strain: {
          pl: { source: 'band.a.centroid', unstrained: { eV: 2 }, gauge_meV_per_percent: 0 },
        },
      },
    ],
    [
      'a percentile above 100',
      {
        blend: {
          mode: 'additive',
          channels: [{ source: 'scan.total', colour: '#000000', high: 'p101' }],
        },
      },
    ],
    [
      'both kinds of unstrained',
      {
        bands: [{ name: 'a', from: 1, to: 2, unit: 'eV' }],
        regions: [],
        strain: {
          pl: {
            source: 'band.a.centroid',
            unstrained: { eV: 2, region: 'flat' },
            gauge_meV_per_percent: 1,
          },
        },
      },
    ],
    [
      'a voigt width beside its parts',
      { model: { components: [{ name: 'v', shape: 'voigt', fwhm: 1, fwhm_g: 1 }] } },
    ],
    ['a newer format', { recipe: 2 }],
  ])('refuses %s, as validation does', (_, blocks) => {
    const document = { recipe: 1, ...(blocks as object) };
    expect(satisfies(schema, document)).toBe(false);
    expect(validateRecipe(document).ok).toBe(false);
  });
});

type Place = [holder: object, key: string | number];

function placesIn(value: unknown): Place[] {
  if (typeof value !== 'object' || value === null) return [];
  return Object.entries(value).flatMap(([key, entry]): Place[] => [
    [value, key],
    ...placesIn(entry),
  ]);
}
