/**
 * Keeps the open scan in step with the recipe's `scan` block: when an edit, undo or an opened recipe
 * changes how the file is to be read, the file is read again that way.
 */
import { createLatestWins } from '../../workers/latest-wins';
import { canonicalJson } from '../recipe/canonical-json';
import type { Recipe } from '../recipe/schema';
import { openScan } from './scan-opening';
import type { Workbench } from './workbench';

export function followScanBlock(workbench: Workbench): () => void {
  const { engine, session, recipe, notices } = workbench;
  const reading = createLatestWins();
  /** what was asked for last, and how the scan on screen was read */
  let asked = '';
  let shown: Recipe['scan'];

  const readAgain = (choices: Recipe['scan']): void => {
    const { scan } = session.getState();
    if (scan === null) return;
    const { inputs, url } = scan;
    const attempt = async (): Promise<void> => {
      const { plan, problems } = await engine.inspect(inputs, choices ?? {});
      if (plan === null) throw problems[0] ?? new Error(`${inputs.scan.name} cannot be read so`);
      if (await openScan(workbench, { inputs, plan, url, recipeFor: null })) shown = choices;
      else takeBack(choices);
    };
    reading.run(attempt, (error) => {
      takeBack(choices);
      notices.sayError(error);
    });
  };

  /** The recipe says how the scan on screen is read, also where another reading failed or was stopped. */
  const takeBack = (choices: Recipe['scan']): void => {
    const { recipe: now, past, future } = recipe.getState();
    if (textOf(now.scan) !== textOf(choices)) return;
    asked = textOf(shown);
    if (past.length > 0 && textOf(past.at(-1)?.recipe.scan) === asked) recipe.undo();
    else if (future.length > 0 && textOf(future[0]?.recipe.scan) === asked) recipe.redo();
    else recipe.edit('Read the scan as before', (document) => withScan(document, shown));
  };

  const unsubscribers = [
    session.subscribe((now, before) => {
      if (now.scanNumber === before.scanNumber) return;
      // A document without history came with its scan; otherwise it is the scan that was read again.
      const { recipe: document, past, future } = recipe.getState();
      if (past.length + future.length > 0) return;
      shown = document.scan;
      asked = textOf(shown);
    }),
    recipe.subscribe((now, before) => {
      if (now.recipe.scan === before.recipe.scan) return;
      if (now.past.length + now.future.length === 0) return;
      const wanted = textOf(now.recipe.scan);
      if (wanted === asked) return;
      asked = wanted;
      readAgain(now.recipe.scan);
    }),
  ];
  return () => {
    for (const unsubscribe of unsubscribers) unsubscribe();
  };
}

function textOf(choices: Recipe['scan']): string {
  return canonicalJson(choices ?? {});
}

function withScan(recipe: Recipe, scan: Recipe['scan']): Recipe {
  const { scan: _, ...others } = recipe;
  return scan === undefined ? others : { ...others, scan };
}
