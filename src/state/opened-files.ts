/** Files the user gave, sorted: a recipe, a scan, what goes with it. */
import type { SourceHandle } from '../../workers/engine';
import { ensureRimlightError } from '../errors';
import { openRecipe, readRecipe } from './recipe-files';
import { addCompanions, asInputs, beginImport } from './scan-opening';
import type { Workbench } from './workbench';

/** The part of a browser's File that opening needs. */
export type GivenFile = Blob & { readonly name: string };

/** A recipe longer than this is none, bytes. */
const longestRecipe = 32 * 2 ** 20;

/**
 * Opens what was dropped or picked: a recipe alone goes onto the scan on screen; anything else opens
 * the import sheet, with the recipe if one came along; files given to an open sheet join it.
 */
export async function openFiles(workbench: Workbench, files: readonly GivenFile[]): Promise<void> {
  try {
    const recipes = files.filter(isRecipeFile);
    const others = files.filter((file) => !isRecipeFile(file));
    const [recipeFile] = recipes;
    const text = recipeFile === undefined ? null : await recipeFile.text();
    if (others.length === 0) {
      if (recipeFile !== undefined && text !== null) openRecipe(workbench, text, recipeFile.name);
      return;
    }
    const recipe =
      recipeFile === undefined || text === null ? null : readRecipe(text, recipeFile.name);
    if (workbench.session.getState().draft !== null && recipe === null) {
      addCompanions(workbench, others.map(asHandle));
      return;
    }
    const sized = others.map((file) => ({ handle: asHandle(file), size: file.size }));
    beginImport(workbench, asInputs(sized), recipe);
  } catch (error) {
    workbench.notices.sayError(ensureRimlightError(error));
  }
}

function asHandle(file: GivenFile): SourceHandle {
  return { kind: 'blob', name: file.name, blob: file };
}

function isRecipeFile({ name, size }: GivenFile): boolean {
  return /\.json$/i.test(name) && size <= longestRecipe;
}
