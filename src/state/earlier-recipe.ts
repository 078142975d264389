/** When a scan is opened that was worked on before, offers the recipe it had then. */
import { loadRecipeFor, type WorkStorage } from './autosave';
import type { Workbench } from './workbench';

/** Watches for the hash of a newly opened scan; an edited recipe is never put aside without asking. */
export function offerEarlierRecipe(workbench: Workbench, storage: WorkStorage): () => void {
  const { session, recipe, notices } = workbench;
  let offered = 0;
  return session.subscribe(async (now, before) => {
    // What was kept for one scan is not offered over another.
    if (now.scanNumber !== before.scanNumber) notices.dismiss(offered);
    if (now.sha256 === null || now.sha256 === before.sha256) return;
    const { scanNumber, sha256 } = now;
    const found = await loadRecipeFor(storage, sha256).catch(() => null);
    const isCurrent = session.getState().scanNumber === scanNumber;
    if (found === null || !isCurrent || recipe.getState().past.length > 0) return;
    if (JSON.stringify(found.recipe) === JSON.stringify(recipe.getState().recipe)) return;
    const bringBack = (): void => recipe.edit('Bring back the earlier recipe', () => found.recipe);
    offered = notices.say('done', `${found.work.scanName} was open before.`, {
      hint: `Its recipe of ${found.work.savedAt.slice(0, 10)} is kept.`,
      action: { label: 'Bring it back', run: bringBack },
    });
  });
}
