/** The door of every edit: a part of a recipe is checked before it goes in. */
import type * as z from 'zod';
import { formatPath, joinPaths, type PathParts, recipeError, wrongValue } from './problems';
import { type DeepReadonly, isRecord } from './schema-parts';
import { schemaProblems } from './schema-problems';

/**
 * The value as a part of a recipe.
 *
 * @param path - where it will stand, named in the error
 * @throws RimlightError 'recipe' - when it does not fit the part's schema
 */
export function ensureFits<T>(
  schema: z.ZodType<T>,
  value: unknown,
  path: PathParts,
): DeepReadonly<T> {
  const problems = schemaProblems(schema, value);
  if (problems.length > 0) {
    const at = formatPath(path);
    throw recipeError(
      problems.map((problem) => ({ ...problem, path: joinPaths(at, problem.path) })),
    );
  }
  return value as DeepReadonly<T>;
}

/**
 * @param except - the entry that is being renamed
 * @throws RimlightError 'recipe' - when another entry has the name, in capitals or not
 */
export function assertNameIsFree(
  entries: readonly unknown[] | undefined,
  name: string,
  path: PathParts,
  except?: string,
): void {
  const taken = (entries ?? [])
    .map((entry) => (isRecord(entry) ? entry.name : undefined))
    .find(
      (other) =>
        typeof other === 'string' && other !== except && other.toLowerCase() === name.toLowerCase(),
    );
  if (taken === undefined) return;
  const expected = `another name; "${String(taken)}" is taken`;
  throw recipeError([wrongValue({ path, value: name, expected })]);
}
