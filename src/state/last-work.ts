/** Brings back the user's own scan and recipe of the last visit. */
import type { ScanInputs } from '../../workers/engine';
import type { Recipe } from '../recipe/schema';
import { openScan } from './scan-opening';
import type { Workbench } from './workbench';

/** @returns false, with a notice, when the kept file can no longer be read */
export async function openLastWork(
  workbench: Workbench,
  inputs: ScanInputs,
  recipe: Recipe,
): Promise<boolean> {
  try {
    const { plan, problems } = await workbench.engine.inspect(inputs, recipe.scan ?? {});
    if (plan === null) throw problems[0];
    return await openScan(workbench, { inputs, plan, url: null, recipeFor: () => recipe });
  } catch (error) {
    workbench.notices.sayError(error);
    return false;
  }
}
