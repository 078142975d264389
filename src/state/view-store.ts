/** What only changes the look: never in the recipe, never undone, remembered from visit to visit. */
import { createStore, type StoreApi } from 'zustand/vanilla';

export type Theme = 'dark' | 'light';

/** What the settings column shows. */
export type Selection =
  | { readonly kind: 'lead' }
  | { readonly kind: 'blend' }
  | { readonly kind: 'band'; readonly name: string }
  | { readonly kind: 'model' }
  | { readonly kind: 'component'; readonly name: string };

/** A limit of a colour scale: "p2" (percentile of the map) or a number in the map's unit. */
export type Limit = number | `p${number}`;

export interface ViewState {
  readonly theme: Theme;
  /** contract name of the map in the lead pane; it falls back to scan.total when it no longer exists */
  readonly leadMap: string;
  readonly leadLow: Limit;
  readonly leadHigh: Limit;
  readonly colourScale: string;
  readonly transfer: 'linear' | 'sqrt' | 'log';
  /** energies shown, eV, ascending; null for the whole axis */
  readonly energyRange: readonly [number, number] | null;
  readonly logCounts: boolean;
  /** photon energy under the cursor on the spectrum; null elsewhere */
  readonly cursorEv: number | null;
  readonly selection: Selection;
  /** the next click on the spectrum adds a peak to the model */
  readonly isAddingPeak: boolean;
}

export const initialView: ViewState = {
  theme: 'dark',
  leadMap: 'scan.total',
  leadLow: 'p2',
  leadHigh: 'p98',
  colourScale: 'viridis',
  transfer: 'linear',
  energyRange: null,
  logCounts: false,
  cursorEv: null,
  selection: { kind: 'blend' },
  isAddingPeak: false,
};

export type ViewStore = StoreApi<ViewState>;

export function createViewStore(saved: Partial<ViewState> = {}): ViewStore {
  return createStore<ViewState>(() => ({ ...initialView, ...saved }));
}
