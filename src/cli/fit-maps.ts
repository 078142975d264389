/** The recipe's model fitted to every pixel of an open scan, for `run`. */
import type { OpenScan, ScanFit } from '../../workers/engine';
import { throwIfAborted } from '../errors';
import { mediumOf } from '../recipe/defaults';
import { planFit } from '../recipe/plan-fit';
import type { Recipe } from '../recipe/schema';

export interface FitOptions {
  readonly signal: AbortSignal;
  readonly onProgress: (share: number) => void;
}

/**
 * Null for a recipe without a model.
 *
 * @throws RimlightError 'recipe' - when the model cannot be fitted to this scan; 'cancelled' - when
 * stopped: a run leaves no half results
 */
export async function fitModel(
  scan: OpenScan,
  recipe: Recipe,
  options: FitOptions,
): Promise<ScanFit | null> {
  if (recipe.model === undefined) return null;
  const { axis, noise, laserEv } = scan.overview.meta;
  const plan = planFit(recipe.model, { axis, noise, laserEv, medium: mediumOf(recipe) });
  const fit = await scan.fit(plan, options);
  throwIfAborted(options.signal, 'the fit');
  return fit;
}

/** What the summary says of it: pixels by status, in the words of the contract. */
export function fitRecord({ statusCounts, plan }: ScanFit) {
  const [not_fitted, converged, at_bound, not_converged, too_dim] = statusCounts;
  return {
    noise: plan.noise.kind === 'uniform' ? 'uniform' : plan.noise.line,
    free_parameters: plan.parameters.filter(({ isFixed, tie }) => !isFixed && tie === null).length,
    channels: plan.endChannel - plan.firstChannel,
    status: { not_fitted, converged, at_bound, not_converged, too_dim },
  };
}
