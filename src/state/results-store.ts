/** Maps computed from the scan and the recipe, by their contract names. */
import { createStore, type StoreApi } from 'zustand/vanilla';
import type { DerivedMap } from '../science/scan';

export interface ResultsState {
  /** what is known now; a map being recomputed keeps its last values until the new ones are whole */
  readonly maps: ReadonlyMap<string, DerivedMap>;
  /** names of bands whose maps are behind the recipe */
  readonly pending: ReadonlySet<string>;
}

export interface ResultsStore extends StoreApi<ResultsState> {
  /** Sets some maps at once; one notification. */
  put(maps: readonly DerivedMap[]): void;
  remove(isStale: (name: string) => boolean): void;
  setPending(band: string, isPending: boolean): void;
  clear(): void;
}

export function createResultsStore(): ResultsStore {
  const store = createStore<ResultsState>(() => ({ maps: new Map(), pending: new Set() }));
  return Object.assign(store, {
    put(maps: readonly DerivedMap[]): void {
      const next = new Map(store.getState().maps);
      for (const map of maps) next.set(map.name, map);
      store.setState({ maps: next });
    },
    remove(isStale: (name: string) => boolean): void {
      const kept = [...store.getState().maps].filter(([name]) => !isStale(name));
      if (kept.length < store.getState().maps.size) store.setState({ maps: new Map(kept) });
    },
    setPending(band: string, isPending: boolean): void {
      const { pending } = store.getState();
      if (pending.has(band) === isPending) return;
      const next = new Set(pending);
      if (isPending) next.add(band);
      else next.delete(band);
      store.setState({ pending: next });
    },
    clear(): void {
      store.setState({ maps: new Map(), pending: new Set() });
    },
  });
}
