/**
 * The recipe and its history. Every change that moves a number goes through `edit`, so undo steps
 * through all of them; nothing here knows React or the engine.
 */
import { createStore, type StoreApi } from 'zustand/vanilla';
import type { Recipe } from '../recipe/schema';

/** One step of the history: the recipe before or after, and the edit between, in words. */
interface Version {
  readonly recipe: Recipe;
  /** "Move band tail": what undoing takes back */
  readonly label: string;
}

export interface RecipeState {
  /** what is on screen now */
  readonly recipe: Recipe;
  /** oldest first; empty when nothing can be undone */
  readonly past: readonly Version[];
  /** next first; empty when nothing can be redone */
  readonly future: readonly Version[];
  /** edits of one gesture (a drag) carry the same name and are one undo step; null between gestures */
  readonly gesture: string | null;
}

export interface RecipeStore extends StoreApi<RecipeState> {
  /** Applies one change; within a `gesture` only the first call makes an undo step. */
  edit(label: string, change: (recipe: Recipe) => Recipe, gesture?: string): void;
  endGesture(): void;
  undo(): void;
  redo(): void;
  /** A new document, its history empty. */
  reset(recipe: Recipe): void;
}

const historyLimit = 500;

export function createRecipeStore(initial: Recipe): RecipeStore {
  const store = createStore<RecipeState>(() => fresh(initial));
  return Object.assign(store, {
    edit(label: string, change: (recipe: Recipe) => Recipe, gesture?: string): void {
      const { recipe, past, gesture: running } = store.getState();
      const next = change(recipe);
      if (next === recipe) return;
      const continues = gesture !== undefined && gesture === running;
      store.setState({
        recipe: next,
        past: continues ? past : [...past, { recipe, label }].slice(-historyLimit),
        future: [],
        gesture: gesture ?? null,
      });
    },
    endGesture(): void {
      if (store.getState().gesture !== null) store.setState({ gesture: null });
    },
    undo(): void {
      const { recipe, past, future } = store.getState();
      const last = past.at(-1);
      if (last === undefined) return;
      store.setState({
        recipe: last.recipe,
        past: past.slice(0, -1),
        future: [{ recipe, label: last.label }, ...future],
        gesture: null,
      });
    },
    redo(): void {
      const { recipe, past, future } = store.getState();
      const [next, ...rest] = future;
      if (next === undefined) return;
      store.setState({
        recipe: next.recipe,
        past: [...past, { recipe, label: next.label }],
        future: rest,
        gesture: null,
      });
    },
    reset(recipe: Recipe): void {
      store.setState(fresh(recipe));
    },
  });
}

function fresh(recipe: Recipe): RecipeState {
  return { recipe, past: [], future: [], gesture: null };
}
