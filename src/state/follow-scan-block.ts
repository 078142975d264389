/**
 * Keeps the open scan in step with the recipe's `scan` block: when an edit, undo or an opened recipe
 * changes how the file is to be read, the file is read again that way.
 */
import { createLatestWins } from '../../workers/latest-wins';
import type { ScanChoices } from '../io/scan-choices';
import { openScan } from './scan-opening';
import type { Workbench } from './workbench';

export function followScanBlock(workbench: Workbench): () => void {
  const { engine, session, recipe, notices } = workbench;
  const reading = createLatestWins();
  let readAs = '';

  const textOf = (choices: ScanChoices | undefined): string => JSON.stringify(choices ?? {});

  const readAgain = (choices: ScanChoices): void => {
    const { scan } = session.getState();
    if (scan === null) return;
    const { inputs, url } = scan;
    reading.run(async () => {
      const inspection = await engine.inspect(inputs, choices);
      const problem = inspection.problems[0];
      if (inspection.plan === null) {
        if (problem !== undefined) throw problem;
        return;
      }
      await openScan(workbench, { inputs, plan: inspection.plan, url, recipeFor: null });
    }, notices.sayError);
  };

  const unsubscribers = [
    session.subscribe((now, before) => {
      if (now.scanNumber !== before.scanNumber) readAs = textOf(recipe.getState().recipe.scan);
    }),
    recipe.subscribe((now, before) => {
      if (now.recipe.scan === before.recipe.scan) return;
      // A reset comes with its scan; only edits of the document on screen ask for another reading.
      if (now.past.length === 0 && now.future.length === 0) return;
      const wanted = textOf(now.recipe.scan);
      if (wanted === readAs) return;
      readAs = wanted;
      readAgain(now.recipe.scan ?? {});
    }),
  ];
  return () => {
    for (const unsubscribe of unsubscribers) unsubscribe();
  };
}
