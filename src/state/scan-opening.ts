/**
 * From a dropped file to a scan on screen: look, show what was guessed, let the user correct it,
 * then load. The scan on screen stays until the new one is whole.
 */
import type { OpenScan, ScanInputs, SourceHandle } from '../../workers/engine';
import { createLatestWins, type LatestWins } from '../../workers/latest-wins';
import { RimlightError } from '../errors';
import type { ScanChoices } from '../io/scan-choices';
import type { ScanPlan } from '../io/scan-plan';
import { setScanChoices } from '../recipe/edits';
import { mergeScanChoices } from '../recipe/merge-scan-choices';
import type { Recipe } from '../recipe/schema';
import type { ImportDraft } from './session-store';
import { startingRecipe } from './starting-recipe';
import type { Workbench } from './workbench';

/** One sheet at a time, so one limiter: the newest correction is looked at, older ones are dropped. */
const looking: LatestWins = createLatestWins();

/** Opens the import sheet on files the user gave; `recipe` is one dropped together with the scan. */
export function beginImport(
  workbench: Workbench,
  inputs: ScanInputs,
  recipe: Recipe | null = null,
): void {
  const choices: ScanChoices = recipe?.scan ?? {};
  workbench.session.setState({
    draft: {
      inputs,
      choices,
      recipe,
      inspection: null,
      preview: null,
      isLooking: true,
      isRevision: false,
    },
  });
  lookAtDraft(workbench);
}

/** Opens the sheet on the scan on screen, to correct how it was read. */
export function reviseImport(workbench: Workbench): void {
  const { scan } = workbench.session.getState();
  if (scan === null) return;
  const choices = workbench.recipe.getState().recipe.scan ?? {};
  workbench.session.setState({
    draft: {
      inputs: scan.inputs,
      choices,
      recipe: null,
      inspection: null,
      preview: null,
      isLooking: true,
      isRevision: true,
    },
  });
  lookAtDraft(workbench);
}

/** The user corrects a guess. */
export function stateChoices(workbench: Workbench, stated: ScanChoices): void {
  const { draft } = workbench.session.getState();
  if (draft === null) return;
  workbench.session.setState({
    draft: { ...draft, choices: mergeScanChoices(draft.choices, stated), isLooking: true },
  });
  lookAtDraft(workbench);
}

/** Files given to an open sheet: an axis, a height map. */
export function addCompanions(workbench: Workbench, files: readonly SourceHandle[]): void {
  const { draft } = workbench.session.getState();
  if (draft === null) return;
  const names = new Set(files.map((file) => file.name));
  const others = draft.inputs.companions.filter((file) => !names.has(file.name));
  const inputs = { ...draft.inputs, companions: [...others, ...files] };
  workbench.session.setState({ draft: { ...draft, inputs, isLooking: true } });
  lookAtDraft(workbench);
}

/** Takes a file given beside the scan away again. */
export function removeCompanion(workbench: Workbench, name: string): void {
  const { draft } = workbench.session.getState();
  if (draft === null) return;
  const companions = draft.inputs.companions.filter((file) => file.name !== name);
  const inputs = { ...draft.inputs, companions };
  workbench.session.setState({ draft: { ...draft, inputs, isLooking: true } });
  lookAtDraft(workbench);
}

export function cancelImport(workbench: Workbench): void {
  looking.clear();
  workbench.session.setState({ draft: null });
}

function lookAtDraft(workbench: Workbench): void {
  const { engine, session, notices } = workbench;
  const draft = session.getState().draft;
  if (draft === null) return;
  const isCurrent = (): boolean => {
    const now = session.getState().draft;
    return now !== null && now.inputs === draft.inputs && now.choices === draft.choices;
  };
  looking.run(
    async () => {
      const inspection = await engine.inspect(draft.inputs, draft.choices);
      if (!isCurrent()) return;
      const looked = { ...draft, inspection, isLooking: false };
      session.setState({ draft: { ...looked, preview: null } });
      if (inspection.plan === null) return;
      const preview = await engine.preview(draft.inputs, inspection.plan);
      if (isCurrent()) session.setState({ draft: { ...looked, preview } });
    },
    (error) => {
      if (!isCurrent()) return;
      notices.sayError(error);
      session.setState({ draft: null });
    },
  );
}

/** The draft once what was stated last has been looked at; null when the sheet is closed before. */
function lookedAtDraft({ session }: Workbench): Promise<ImportDraft | null> {
  return new Promise((resolve) => {
    const { draft } = session.getState();
    if (draft?.isLooking !== true) return resolve(draft);
    const leave = session.subscribe(({ draft: now }) => {
      if (now?.isLooking === true) return;
      leave();
      resolve(now);
    });
  });
}

/**
 * Accepts the sheet, with what was stated last: a number is taken over as its field is left, by the very
 * press on "Open". A revision becomes a recipe edit (and so can be undone); a new scan is loaded.
 */
export async function acceptImport(workbench: Workbench): Promise<void> {
  const accepted = workbench.session.getState().draft;
  const draft = await lookedAtDraft(workbench);
  const plan = draft?.inspection?.plan ?? null;
  if (draft === null || plan === null) return;
  // Not the sheet of another file that came meanwhile, nor one accepted by an earlier press.
  if (draft.inputs.scan !== accepted?.inputs.scan) return;
  if (workbench.session.getState().draft !== draft) return;
  workbench.session.setState({ draft: null });
  if (draft.isRevision) {
    const { scan } = workbench.session.getState();
    if (scan !== null) workbench.session.setState({ scan: { ...scan, inputs: draft.inputs } });
    workbench.recipe.edit('Correct how the scan is read', (recipe) =>
      setScanChoices(recipe, plan.resolved),
    );
    return;
  }
  const base = draft.recipe;
  await openScan(workbench, {
    inputs: draft.inputs,
    plan,
    url: null,
    recipeFor: (open) =>
      base === null
        ? startingRecipe(open.overview, plan.resolved)
        : setScanChoices(base, plan.resolved),
  });
}

/** Opens a scan the page itself offers (the demo, or `rimlight serve SCAN`) without a sheet, unless something is missing. */
export async function openOffered(
  workbench: Workbench,
  inputs: ScanInputs,
  recipe: Recipe | null,
  url: string,
): Promise<void> {
  const inspection = await workbench.engine.inspect(inputs, recipe?.scan ?? {});
  if (inspection.plan === null) {
    beginImport(workbench, inputs, recipe);
    return;
  }
  const plan = inspection.plan;
  await openScan(workbench, {
    inputs,
    plan,
    url,
    recipeFor: (open) =>
      recipe === null
        ? startingRecipe(open.overview, plan.resolved)
        : setScanChoices(recipe, plan.resolved),
  });
}

interface OpenRequest {
  readonly inputs: ScanInputs;
  readonly plan: ScanPlan;
  readonly url: string | null;
  /** null keeps the recipe on screen and its history */
  readonly recipeFor: ((open: OpenScan) => Recipe) | null;
}

/** Loads the slabs with progress and a way to stop; on failure or stop the scan on screen stays. */
export async function openScan(workbench: Workbench, request: OpenRequest): Promise<boolean> {
  const { engine, session, recipe, results, view, notices } = workbench;
  const stopper = new AbortController();
  session.getState().running?.stop();
  const label = `Opening ${request.inputs.scan.name}`;
  const startedMs = performance.now();
  const stop = (): void => stopper.abort();
  let isOver = false;
  const report = (share: number): void => {
    if (stopper.signal.aborted || isOver) return;
    session.setState({ running: { label, share, startedMs, stop } });
  };
  report(0);
  let unplaced: OpenScan | null = null;
  try {
    const open = await engine.open(request.inputs, request.plan, {
      signal: stopper.signal,
      onProgress: report,
    });
    unplaced = open;
    isOver = true;
    // Stopped as it was done: what stopped it goes first.
    stopper.signal.throwIfAborted();
    const before = session.getState();
    const { overview } = open;
    if (request.recipeFor !== null) {
      recipe.reset(request.recipeFor(open));
      view.setState({ energyRange: null });
    }
    // After the recipe: maps of the old scan that the new recipe asks for by the same names must not stay.
    results.clear();
    results.put([
      { name: 'scan.total', unit: overview.meta.quantity, ...overview.totals, errors: null },
      ...(overview.height === null
        ? []
        : [{ name: 'scan.height', unit: 'nm', ...overview.height, errors: null }]),
    ]);
    session.setState({
      scan: { open, inputs: request.inputs, url: request.url },
      scanNumber: before.scanNumber + 1,
      sha256: null,
      running: null,
    });
    unplaced = null;
    await before.scan?.open.release();
    void hashInBackground(workbench, request.inputs.scan);
    return true;
  } catch (error) {
    isOver = true;
    await unplaced?.release();
    // A later opening may be running by now; its progress is not this one's to end.
    if (session.getState().running?.stop === stop) session.setState({ running: null });
    if (!stopper.signal.aborted) notices.sayError(error);
    return false;
  }
}

async function hashInBackground(workbench: Workbench, source: SourceHandle): Promise<void> {
  const { engine, session, notices } = workbench;
  const { scanNumber } = session.getState();
  try {
    const sha256 = await engine.sha256(source);
    if (session.getState().scanNumber === scanNumber) session.setState({ sha256 });
  } catch (error) {
    notices.sayError(error);
  }
}

/** Which of the files given together is the scan: the largest; the others are its companions. */
export function asInputs(files: readonly { handle: SourceHandle; size: number }[]): ScanInputs {
  const [largest, ...others] = [...files].sort((a, b) => b.size - a.size);
  if (largest === undefined) {
    throw new RimlightError('usage', {
      what: 'no scan file was given',
      where: '',
      hint: 'Drop a scan file (HDF5, npy, npz, TIFF, text or JCAMP-DX).',
    });
  }
  return { scan: largest.handle, companions: others.map(({ handle }) => handle) };
}
