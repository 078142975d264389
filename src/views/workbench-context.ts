/** Hands the workbench to the views, and the hooks by which they read its stores. */
import { createContext, useContext, useSyncExternalStore } from 'react';
import { useStore } from 'zustand';
import type { Recipe } from '../recipe/schema';
import type { Pixel } from '../state/crosshair';
import type { ResultsState } from '../state/results-store';
import type { SessionState } from '../state/session-store';
import type { SpectraState } from '../state/spectra-store';
import type { ViewState } from '../state/view-store';
import type { Workbench } from '../state/workbench';

export const WorkbenchContext = createContext<Workbench | null>(null);

export function useWorkbench(): Workbench {
  const workbench = useContext(WorkbenchContext);
  if (workbench === null) throw new Error('a view was drawn outside the workbench');
  return workbench;
}

export function useRecipe<T>(select: (recipe: Recipe) => T): T {
  return useStore(useWorkbench().recipe, (state) => select(state.recipe));
}

export function useSession<T>(select: (session: SessionState) => T): T {
  return useStore(useWorkbench().session, select);
}

export function useView<T>(select: (view: ViewState) => T): T {
  return useStore(useWorkbench().view, select);
}

export function useResults<T>(select: (results: ResultsState) => T): T {
  return useStore(useWorkbench().results, select);
}

export function useSpectra<T>(select: (spectra: SpectraState) => T): T {
  return useStore(useWorkbench().spectra, select);
}

/** The pixel under the crosshair; for text that follows it (canvases subscribe by themselves). */
export function useCrosshair(): Pixel | null {
  const { crosshair } = useWorkbench();
  return useSyncExternalStore(crosshair.subscribe, crosshair.get);
}
