/**
 * Keeps the work through a reload or a crash: the recipe with its scan's name and hash after every
 * edit, the scan file itself while it is small enough, and every recipe under its scan's hash, so
 * that it comes back whenever that scan is opened again.
 */
import type { ScanInputs, SourceHandle } from '../../workers/engine';
import type { Recipe } from '../recipe/schema';
import { serialiseRecipe } from '../recipe/serialise';
import { parseRecipe } from '../recipe/validate';
import type { Workbench } from './workbench';

/** Key–value storage of the browser; tests give one in memory. */
export interface WorkStorage {
  get(key: string): Promise<unknown>;
  set(key: string, value: unknown): Promise<void>;
}

export interface SavedWork {
  readonly scanName: string;
  /** null when the scan was still being hashed */
  readonly sha256: string | null;
  readonly recipeText: string;
  readonly savedAt: string;
  /** where the page itself offered the scan; null for a file of the user's */
  readonly url: string | null;
}

const lastWorkKey = 'last-work';
const lastInputsKey = 'last-inputs';
const recipeKeyOf = (sha256: string): string => `recipe-${sha256}`;
/** Files up to here are kept for the next visit; larger ones are asked for again. */
const largestKeptBytes = 256 * 2 ** 20;
const waitMs = 300;

export function startAutosave(
  workbench: Workbench,
  storage: WorkStorage,
  now: () => Date,
): () => void {
  const { session, recipe, notices } = workbench;
  let timer: ReturnType<typeof setTimeout> | null = null;
  let hasFailed = false;

  const guarded = async (work: () => Promise<void>): Promise<void> => {
    try {
      await work();
    } catch {
      if (hasFailed) return;
      hasFailed = true;
      notices.say('warning', 'This browser does not keep the work for the next visit.', {
        hint: 'Save the recipe as a file before you leave.',
      });
    }
  };

  const save = async (): Promise<void> => {
    timer = null;
    const { scan, sha256 } = session.getState();
    if (scan === null) return;
    const work: SavedWork = {
      scanName: scan.inputs.scan.name,
      sha256,
      recipeText: serialiseRecipe(recipe.getState().recipe),
      savedAt: now().toISOString(),
      url: scan.url,
    };
    await storage.set(lastWorkKey, work);
    // A recipe nobody has touched must not take the place of the one kept from an earlier visit.
    const { past, future } = recipe.getState();
    const isTouched = past.length + future.length > 0;
    if (sha256 !== null && isTouched) await storage.set(recipeKeyOf(sha256), work);
  };

  const schedule = (): void => {
    timer ??= setTimeout(() => void guarded(save), waitMs);
  };

  const keepInputs = async (inputs: ScanInputs, url: string | null): Promise<void> => {
    const files = [inputs.scan, ...inputs.companions];
    const bytes = files.reduce((sum, file) => sum + sizeOf(file), 0);
    const isKept = url === null && bytes <= largestKeptBytes;
    await storage.set(lastInputsKey, isKept ? inputs : null);
  };

  const unsubscribers = [
    recipe.subscribe((state, before) => {
      if (state.recipe !== before.recipe) schedule();
    }),
    session.subscribe((state, before) => {
      if (state.sha256 !== before.sha256) schedule();
      if (state.scanNumber === before.scanNumber || state.scan === null) return;
      const { inputs, url } = state.scan;
      void guarded(() => keepInputs(inputs, url));
      schedule();
    }),
  ];
  return () => {
    if (timer !== null) clearTimeout(timer);
    for (const unsubscribe of unsubscribers) unsubscribe();
  };
}

/** What the last visit left; null when there is nothing or it cannot be read any more. */
export async function loadLastWork(storage: WorkStorage): Promise<{
  readonly work: SavedWork;
  readonly recipe: Recipe;
  readonly inputs: ScanInputs | null;
} | null> {
  const work = asSavedWork(await storage.get(lastWorkKey));
  if (work === null) return null;
  const parsed = parseRecipe(work.recipeText);
  if (!parsed.ok) return null;
  const kept = (await storage.get(lastInputsKey)) as ScanInputs | null | undefined;
  // A page closed as it opened another scan leaves that scan's file beside the work on this one.
  const isItsOwn = work.url === null && kept?.scan.name === work.scanName;
  return { work, recipe: parsed.recipe, inputs: isItsOwn ? kept : null };
}

/** The recipe last used on the scan of this hash; null when there is none. */
export async function loadRecipeFor(
  storage: WorkStorage,
  sha256: string,
): Promise<{ readonly work: SavedWork; readonly recipe: Recipe } | null> {
  const work = asSavedWork(await storage.get(recipeKeyOf(sha256)));
  if (work === null) return null;
  const parsed = parseRecipe(work.recipeText);
  return parsed.ok ? { work, recipe: parsed.recipe } : null;
}

function asSavedWork(value: unknown): SavedWork | null {
  if (typeof value !== 'object' || value === null) return null;
  const { recipeText, scanName } = value as Partial<SavedWork>;
  return typeof recipeText === 'string' && typeof scanName === 'string'
    ? (value as SavedWork)
    : null;
}

function sizeOf(source: SourceHandle): number {
  if (source.kind === 'blob') return source.blob.size;
  return source.kind === 'memory' ? source.bytes.byteLength : 0;
}
