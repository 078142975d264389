/** Remembers how the user likes the screen: theme, colour scale. */
import { initialView, type ViewState, type ViewStore } from '../state/view-store';

const key = 'rimlight-view';
const remembered = ['theme', 'colourScale', 'transfer', 'logCounts'] as const;

/** Settings of the last visit; what is missing, damaged or unknown falls back to the usual ones. */
export function recallView(): Partial<ViewState> {
  try {
    const saved: unknown = JSON.parse(localStorage.getItem(key) ?? '{}');
    if (typeof saved !== 'object' || saved === null) return {};
    const known = new Map<string, unknown>(Object.entries(saved));
    const entries = remembered
      .filter((field) => typeof known.get(field) === typeof initialView[field])
      .map((field) => [field, known.get(field)]);
    return Object.fromEntries(entries) as Partial<ViewState>;
  } catch {
    return {};
  }
}

/** Writes them down whenever one changes. */
export function rememberView(view: ViewStore): void {
  view.subscribe((now, before) => {
    if (remembered.every((field) => now[field] === before[field])) return;
    const kept = Object.fromEntries(remembered.map((field) => [field, now[field]]));
    try {
      localStorage.setItem(key, JSON.stringify(kept));
    } catch {
      // A browser that keeps nothing still works; only the look is forgotten.
    }
  });
}
