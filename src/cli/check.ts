/** `rimlight check`: is this recipe right? */
import { unbuiltBlocks } from '../recipe/executable';
import { formatProblem, recipeError } from '../recipe/problems';
import { parseRecipe } from '../recipe/validate';
import type { RunCommand } from './command';
import { done } from './exit-codes';
import { readRecipeText } from './recipe-file';

/** Prints every problem, one a line, and ends with the error; or says that there is none. */
export const runCheck: RunCommand = async ({ operands }, { print }) => {
  const [path = ''] = operands;
  const result = parseRecipe(await readRecipeText(path));
  if (!result.ok) {
    if (result.problems.length > 1) {
      for (const problem of result.problems) print(formatProblem(problem));
    }
    throw recipeError(result.problems, path);
  }
  print(`${path} is a valid recipe of format ${result.recipe.recipe}.`);
  for (const { path: place, title } of unbuiltBlocks(result.recipe)) {
    print(`This build cannot run ${title} yet (${place}).`);
  }
  return done;
};
