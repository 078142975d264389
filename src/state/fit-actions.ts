/** Fits every pixel with the recipe's model, maps filling in as pixels are done. */
import { mediumOf } from '../recipe/defaults';
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
  const { session, recipe, results, fit, notices } = workbench;
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
  const isCurrent = (): boolean => session.getState().scanNumber === scanNumber;
  const report = (share: number): void => {
    if (stopper.signal.aborted || !isCurrent()) return;
    session.setState({
      running: { label: 'Fitting', share, startedMs, stop: () => stopper.abort() },
    });
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
        results.put(asNew(maps));
      },
      ...previous,
    });
    if (!isCurrent()) return;
    results.put(asNew(scanFit.maps));
    fit.setState({ madeOf, scanFit });
  } catch (error) {
    notices.sayError(error);
  } finally {
    fit.setState({ isRunning: false });
    if (isCurrent()) session.setState({ running: null });
  }
}

/** The arrays are the same and fuller than before; a map of its own identity is drawn anew. */
function asNew(maps: readonly DerivedMap[]): readonly DerivedMap[] {
  return maps.map((map) => ({ ...map }));
}
