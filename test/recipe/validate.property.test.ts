/** Laws of validation: what is valid passes whole, and one spoiled place is told at that place. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { parseJsonText } from '../../src/recipe/json-text';
import { formatPath } from '../../src/recipe/problems';
import { serialiseRecipe } from '../../src/recipe/serialise';
import { parseRecipe, validateRecipe } from '../../src/recipe/validate';
import { arbitraryRecipe } from './arbitrary-recipe';

type Path = (string | number)[];

/** Every field of every object in the value, with its path. */
function fieldsIn(value: unknown, path: Path = []): Path[] {
  if (Array.isArray(value))
    return value.flatMap((entry, index) => fieldsIn(entry, [...path, index]));
  if (typeof value !== 'object' || value === null) return [];
  return Object.entries(value).flatMap(([key, entry]) => [
    [...path, key],
    ...fieldsIn(entry, [...path, key]),
  ]);
}

function parentOf(document: unknown, path: Path): Record<string, unknown> {
  return path
    .slice(0, -1)
    .reduce((at, part) => (at as Record<string | number, unknown>)[part], document) as Record<
    string,
    unknown
  >;
}

describe('a valid recipe', () => {
  it('passes, and is returned as it was written', () => {
    fc.assert(
      fc.property(arbitraryRecipe, (value) => {
        const result = validateRecipe(value);
        expect(result).toEqual({ ok: true, recipe: value });
      }),
      { numRuns: 300 },
    );
  });

  it('comes back equal from its text', () => {
    fc.assert(
      fc.property(arbitraryRecipe, (value) => {
        const first = validateRecipe(value);
        if (!first.ok) throw new Error('the arbitrary recipe is not valid');
        const text = serialiseRecipe(first.recipe);
        const second = parseRecipe(text);
        if (!second.ok) throw new Error(`its own text is refused: ${text}`);
        expect(second.recipe).toEqual(first.recipe);
        expect(serialiseRecipe(second.recipe)).toBe(text);
      }),
      { numRuns: 300 },
    );
  });
});

describe('one spoiled place', () => {
  it('a field under another name is told at its path, with the name meant when it is near', () => {
    fc.assert(
      fc.property(arbitraryRecipe, fc.nat(), fc.nat(), (value, which, where) => {
        const fields = fieldsIn(value).filter((path) => path.length > 1);
        fc.pre(fields.length > 0);
        const path = fields[which % fields.length];
        const key = String(path.at(-1));
        const at = where % (key.length + 1);
        const wrong = `${key.slice(0, at)}~${key.slice(at)}`;
        const document = structuredClone(value);
        const parent = parentOf(document, path);
        parent[wrong] = parent[key];
        delete parent[key];
        const result = validateRecipe(document);
        if (result.ok) throw new Error(`nothing is told of ${formatPath(path)} as ${wrong}`);
        const problem = result.problems.find(
          (one) => one.path === formatPath([...path.slice(0, -1), wrong]),
        );
        expect(problem?.message).toContain(`unknown field "${wrong}"`);
        if (key.length >= 4) expect(problem?.nearest).toBe(key);
      }),
      { numRuns: 500 },
    );
  });

  it('a value of no sense there is told at its path or above it', () => {
    fc.assert(
      fc.property(arbitraryRecipe, fc.nat(), (value, which) => {
        const fields = fieldsIn(value);
        const path = fields[which % fields.length];
        const document = structuredClone(value);
        parentOf(document, path)[String(path.at(-1))] = null;
        const result = validateRecipe(document);
        if (result.ok) throw new Error(`null passes at ${formatPath(path)}`);
        const told = result.problems.map((one) => one.path);
        const above = path.map((_, end) => formatPath(path.slice(0, end + 1)));
        expect(told.some((one) => above.includes(one))).toBe(true);
      }),
      { numRuns: 500 },
    );
  });

  it('whatever is given, an answer comes back and every problem can be read', () => {
    fc.assert(
      fc.property(
        fc.anything({ withBigInt: true, withDate: true, withMap: true, maxDepth: 5 }),
        (value) => {
          for (const document of [value, { recipe: 1, bands: value }, { recipe: 1, scan: value }]) {
            const result = validateRecipe(document);
            if (result.ok) continue;
            expect(result.problems.length).toBeGreaterThan(0);
            for (const { path, expected, message } of result.problems) {
              expect(typeof path).toBe('string');
              expect(expected).not.toBe('');
              expect(message).not.toBe('');
            }
          }
        },
      ),
      { numRuns: 500 },
    );
  });
});

describe('JSON text', () => {
  it('is read to the value the language itself reads', () => {
    fc.assert(
      fc.property(fc.jsonValue({ maxDepth: 5 }), fc.nat({ max: 3 }), (value, indent) => {
        const text = JSON.stringify(value, null, indent);
        const result = parseJsonText(text);
        expect(result.ok && result.value).toEqual(JSON.parse(text));
      }),
      { numRuns: 500 },
    );
  });

  it('spoiled by one character, is refused exactly where the language refuses it', () => {
    const spoilers = [
      '',
      ',',
      '"',
      '}',
      ']',
      '{',
      ':',
      '0',
      '-',
      '.',
      'e',
      '\\',
      '\n',
      "'",
      't',
      ' ',
    ];
    fc.assert(
      fc.property(
        fc.jsonValue({ maxDepth: 4 }),
        fc.nat(),
        fc.constantFrom(...spoilers),
        fc.nat({ max: 1 }),
        (value, place, spoiler, cut) => {
          const text = JSON.stringify(value);
          const at = place % (text.length + 1);
          const spoiled = text.slice(0, at) + spoiler + text.slice(at + cut);
          const result = parseJsonText(spoiled);
          let own: unknown;
          let isJson = true;
          try {
            own = JSON.parse(spoiled);
          } catch {
            isJson = false;
          }
          expect(result.ok).toBe(isJson);
          // Equal keys in one object are told as a problem of their own.
          if (result.ok && result.problems.length === 0) expect(result.value).toEqual(own);
        },
      ),
      { numRuns: 2000 },
    );
  });
});
