/** A workbench without a scan, for actions that only change recipe and view. */

import type { Recipe } from '../../src/recipe/schema';
import type { DerivedMap } from '../../src/science/scan';
import { createWorkbench, type Workbench } from '../../src/state/workbench';
import type { ScanEngine } from '../../workers/engine';

const engine: Pick<ScanEngine, 'onWorkerReplaced'> = { onWorkerReplaced: () => () => undefined };

export function idleWorkbench(recipe: Omit<Recipe, 'recipe'>): Workbench {
  const workbench = createWorkbench(engine as ScanEngine);
  workbench.recipe.reset({ recipe: 1, ...recipe });
  return workbench;
}

/** A row of values as a map. */
export function rowMap(name: string, values: readonly number[]): DerivedMap {
  return {
    name,
    unit: 'counts',
    ny: 1,
    nx: values.length,
    values: Float64Array.from(values),
    errors: null,
  };
}
