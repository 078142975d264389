/** Fits every pixel with the recipe's model, maps filling in as pixels are done. */
import { mediumOf } from '../recipe/defaults';
import { offeredMaps } from '../recipe/offered-maps';
import { planFit } from '../recipe/plan-fit';
import type { Recipe } from '../recipe/schema';
import type { FitPlan } from '../science/fit/fit-plan';
import type { DerivedMap } from '../science/scan';
import type { CurrentScan } from './session-store';
import type { Workbench } from './workbench';

/** What a fit depends on: the scan as opened, and the model. */
export function fitKey(scanNumber: number, { model, scan }: Recipe): string {
  return JSON.stringify([scanNumber, scan?.axis?.medium ?? null, model ?? null]);
}

/**
 * The fit the recipe asks for on a scan; null without a model.
 *
 * @throws RimlightError 'recipe' - when the model cannot be fitted to this scan
 */
export function planOf(recipe: Recipe, scan: CurrentScan): FitPlan | null {
  if (recipe.model === undefined) return null;
  const { axis, noise, laserEv } = scan.open.overview.meta;
  return planFit(recipe.model, { axis, noise, laserEv, medium: mediumOf(recipe) });
}

/** Maps are drawn again this often while they fill up, ms: each drawing costs a frame. */
const drawnEveryMs = 120;

/** Fits all pixels; what is done stays when it is stopped, and the next call goes on from there. */
export async function runFit(workbench: Workbench): Promise<void> {
  const { session, recipe, fit, notices } = workbench;
  const { scan, scanNumber, running } = session.getState();
  // A scan being read again is left to it: stopping that would take the recipe back.
  if (scan === null || running !== null) return;
  const document = recipe.getState().recipe;
  const madeOf = fitKey(scanNumber, document);
  const before = fit.getState();
  const isSame = before.madeOf === madeOf && before.scanFit?.isWhole === false;
  const previous = isSame ? { previous: before.scanFit } : {};
  const stopper = new AbortController();
  const startedMs = performance.now();
  const stop = (): void => stopper.abort();
  const isCurrent = (): boolean => session.getState().scanNumber === scanNumber;
  const report = (share: number): void => {
    if (stopper.signal.aborted || !isCurrent()) return;
    session.setState({ running: { label: 'Fitting', share, startedMs, stop } });
  };
  let drawnAtMs = 0;
  try {
    const plan = planOf(document, scan);
    if (plan === null) return;
    report(0);
    fit.setState({ isRunning: true });
    const scanFit = await scan.open.fit(plan, {
      signal: stopper.signal,
      onProgress: report,
      onMaps: (maps) => {
        if (!isCurrent() || performance.now() - drawnAtMs < drawnEveryMs) return;
        drawnAtMs = performance.now();
        putFitMaps(workbench, maps);
      },
      ...previous,
    });
    if (!isCurrent()) return;
    putFitMaps(workbench, scanFit.maps);
    fit.setState({ madeOf, scanFit });
  } catch (error) {
    notices.sayError(error);
  } finally {
    fit.setState({ isRunning: false });
    // A scan may be opening by now; its progress is not the fit's to end.
    if (session.getState().running?.stop === stop) session.setState({ running: null });
  }
}

/** Shows the maps of a fit, but those of components the recipe no longer has: the model may have changed while it ran. */
export function putFitMaps({ recipe, results }: Workbench, maps: readonly DerivedMap[]): void {
  const offered = new Set(offeredMaps(recipe.getState().recipe).map(({ name }) => name));
  // The arrays are the same and fuller than before; a map of its own identity is drawn anew.
  results.put(maps.filter(({ name }) => offered.has(name)).map((map) => ({ ...map })));
}
