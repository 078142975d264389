/** The recipe as a file: saved by the user, opened again on the scan on screen. */
import { setScanChoices } from '../recipe/edits';
import { mergeScanChoices } from '../recipe/merge-scan-choices';
import { formatProblem, recipeError } from '../recipe/problems';
import type { Recipe } from '../recipe/schema';
import { serialiseRecipe } from '../recipe/serialise';
import { parseRecipe } from '../recipe/validate';
import { sayUndoable } from './undoable';
import type { Workbench } from './workbench';

/** A text file to be handed to the user. */
export interface TextFile {
  readonly name: string;
  readonly text: string;
}

/** The recipe on screen as a file named after its scan. */
export function recipeFile({ recipe, session }: Workbench): TextFile {
  const scanName = session.getState().scan?.inputs.scan.name ?? 'scan';
  const stem = scanName.replace(/\.[^.]+$/, '');
  return { name: `${stem}.recipe.json`, text: serialiseRecipe(recipe.getState().recipe) };
}

/**
 * The recipe a file holds.
 *
 * @throws RimlightError 'recipe' - naming what is wrong with it, and where
 */
export function readRecipe(text: string, fileName: string): Recipe {
  const parsed = parseRecipe(text);
  if (!parsed.ok) throw recipeError(parsed.problems, fileName);
  return parsed.recipe;
}

/**
 * Puts an opened recipe on screen, as one edit that can be undone. What it does not state about the
 * scan stays as the scan on screen is read.
 */
export function openRecipe(workbench: Workbench, text: string, fileName: string): void {
  const { recipe, session, notices } = workbench;
  const parsed = parseRecipe(text);
  if (!parsed.ok) {
    const [first, ...others] = parsed.problems;
    const more =
      others.length === 0
        ? ''
        : ` There ${others.length === 1 ? 'is one more problem' : `are ${others.length} more problems`} in it.`;
    const hint = `Correct it in the file and open it again.${more}`;
    const what = first === undefined ? 'it is not a recipe' : formatProblem(first);
    notices.say('error', `${fileName} was not opened: ${what}`, { hint });
    return;
  }
  if (session.getState().scan === null) {
    notices.say('error', `${fileName} is a recipe, and there is no scan to use it on.`, {
      hint: 'Open a scan first, or drop both together.',
    });
    return;
  }
  const given = parsed.recipe;
  recipe.edit(`Open ${fileName}`, (before) => {
    const scan = mergeScanChoices(before.scan ?? {}, given.scan ?? {});
    return setScanChoices(given, scan);
  });
  sayUndoable(workbench, `${fileName} is in use.`);
}
