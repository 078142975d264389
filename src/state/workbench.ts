/** Everything the screen stands on, made once: the engine, the stores, and what keeps them in step. */
import type { ScanEngine } from '../../workers/engine';
import { emptyRecipe } from '../recipe/defaults';
import { type Crosshair, createCrosshair } from './crosshair';
import { createFitStore, type FitStore } from './fit-store';
import { followBands } from './follow-bands';
import { followFit } from './follow-fit';
import { followScanBlock } from './follow-scan-block';
import { followSpectra } from './follow-spectra';
import { createNotices, type Notices } from './notices';
import { createRecipeStore, type RecipeStore } from './recipe-store';
import { createResultsStore, type ResultsStore } from './results-store';
import { createSessionStore, type SessionStore } from './session-store';
import { createSpectraStore, type SpectraStore } from './spectra-store';
import { createViewStore, type ViewState, type ViewStore } from './view-store';

export interface Workbench {
  readonly engine: ScanEngine;
  readonly session: SessionStore;
  readonly recipe: RecipeStore;
  readonly view: ViewStore;
  readonly results: ResultsStore;
  readonly spectra: SpectraStore;
  readonly fit: FitStore;
  readonly crosshair: Crosshair;
  readonly notices: Notices;
}

/** @param savedView - view settings of the last visit */
export function createWorkbench(engine: ScanEngine, savedView: Partial<ViewState> = {}): Workbench {
  const workbench: Workbench = {
    engine,
    session: createSessionStore(),
    recipe: createRecipeStore(emptyRecipe('')),
    view: createViewStore(savedView),
    results: createResultsStore(),
    spectra: createSpectraStore(),
    fit: createFitStore(),
    crosshair: createCrosshair(),
    notices: createNotices(),
  };
  followBands(workbench);
  followSpectra(workbench);
  followFit(workbench);
  followScanBlock(workbench);
  engine.onWorkerReplaced(({ worker, reason }) => {
    workbench.notices.say('warning', `Worker ${worker + 1} stopped (${reason}) and was replaced.`, {
      hint: 'Its rows were read again; nothing is lost.',
    });
  });
  return workbench;
}
