/** From text or a plain value to a recipe, or to everything that is wrong with it. */
import { parseJsonText } from './json-text';
import { type RecipeProblem, statedProblem, wrongValue } from './problems';
import { referenceProblems } from './references';
import { type Recipe, recipeFormat, recipeSchema } from './schema';
import { isRecord } from './schema-parts';
import { schemaProblems } from './schema-problems';
import { sizeProblems } from './size-limits';

export type RecipeResult =
  | { readonly ok: true; readonly recipe: Recipe }
  | { readonly ok: false; readonly problems: readonly RecipeProblem[] };

/**
 * Reads a recipe from its text.
 *
 * @param text - strict JSON; each field at most once in its object
 * @returns the recipe as written, nothing filled in; or every problem, each with its line and column,
 * in the order of the text. Text that is no JSON has one problem: the first place where it is not.
 */
export function parseRecipe(text: string): RecipeResult {
  const json = parseJsonText(text);
  if (!json.ok) return { ok: false, problems: [json.problem] };
  const result = validateRecipe(json.value);
  const found = result.ok ? [] : result.problems;
  if (found.length === 0 && json.problems.length === 0) return result;
  const placed = found.map((problem) => ({
    ...problem,
    position: placeOf(problem.path, json.positionOf),
  }));
  return { ok: false, problems: [...json.problems, ...placed].sort(byPosition) };
}

/**
 * Validates a plain value as a recipe: its schema, and what its parts say of each other.
 *
 * @returns the recipe as written, nothing filled in; or every problem. A document of a newer format
 * has that one problem, since the rest of it cannot be judged.
 */
export function validateRecipe(value: unknown): RecipeResult {
  const unfit = sizeProblems(value);
  if (unfit.length > 0) return { ok: false, problems: unfit };
  const whole = documentProblem(value);
  if (whole !== null) return { ok: false, problems: [whole] };
  const problems = [...schemaProblems(recipeSchema, value), ...referenceProblems(value)];
  if (problems.length > 0) return { ok: false, problems: withoutRepeats(problems) };
  return { ok: true, recipe: recipeSchema.parse(value) };
}

function documentProblem(value: unknown): RecipeProblem | null {
  if (!isRecord(value)) {
    return wrongValue({ path: [], value, expected: 'an object { … } with the field "recipe"' });
  }
  const { recipe } = value;
  if (typeof recipe === 'number' && Number.isInteger(recipe) && recipe > recipeFormat) {
    return statedProblem({
      path: ['recipe'],
      value: recipe,
      expected: String(recipeFormat),
      message: `this recipe is of format ${recipe} and was made by a newer version of the program; this one reads format ${recipeFormat}`,
      hint: 'Update the program, or save the recipe again in one that writes this format.',
    });
  }
  if (recipe !== undefined || looksLikeRecipe(value)) return null;
  return statedProblem({
    path: ['recipe'],
    value: undefined,
    expected: `${recipeFormat}, the format of the document`,
    message: 'this is no recipe: the field "recipe" is missing',
    hint: 'Give a recipe, a JSON document that begins with { "recipe": 1, … }.',
  });
}

/** Some other JSON document has none of a recipe's blocks; naming all its fields would help nobody. */
function looksLikeRecipe(value: Readonly<Record<string, unknown>>): boolean {
  return Object.keys(value).some(
    (key) => key !== 'title' && Object.hasOwn(recipeSchema.shape, key),
  );
}

/** A missing field has the place of the object that lacks it. */
function placeOf(
  path: string,
  positionOf: (path: string) => RecipeProblem['position'],
): RecipeProblem['position'] {
  let at = path;
  for (;;) {
    const position = positionOf(at);
    if (position !== null || at === '') return position;
    at = at.replace(/(?:^|\.)[^.[\]]*$|\[(?:\d+|"(?:[^"\\]|\\.)*")\]$/, '');
  }
}

function byPosition(a: RecipeProblem, b: RecipeProblem): number {
  const lines = (a.position?.line ?? 0) - (b.position?.line ?? 0);
  return lines !== 0 ? lines : (a.position?.column ?? 0) - (b.position?.column ?? 0);
}

/** A field told by the schema is not told again by a rule. */
function withoutRepeats(problems: readonly RecipeProblem[]): readonly RecipeProblem[] {
  const seen = new Set<string>();
  return problems.filter(({ path, message }) => {
    const key = `${path}\n${message}`;
    if (seen.has(key)) return false;
    seen.add(key);
    return true;
  });
}
