/** The model's peaks where they start on the open scan, in eV, for handles on the spectrum. */
import type { Recipe } from '../recipe/schema';
import { planOf } from './fit-actions';
import type { CurrentScan } from './session-store';

export interface PlacedPeak {
  readonly name: string;
  readonly centreEv: number;
  /** null where the width is estimated from the data */
  readonly fwhmEv: number | null;
}

/** Peaks whose centre is stated; none while the model cannot be fitted (that is told by the fit). */
export function placedPeaks(recipe: Recipe, scan: CurrentScan): readonly PlacedPeak[] {
  try {
    const plan = planOf(recipe, scan);
    if (plan === null) return [];
    return plan.components.flatMap(({ name, first, count }) => {
      const own = plan.parameters.slice(first, first + count);
      const startOf = (wanted: string): number | null =>
        own.find((parameter) => parameter.name === wanted)?.start ?? null;
      const centreEv = startOf('centre');
      if (centreEv === null) return [];
      return [{ name, centreEv, fwhmEv: startOf('fwhm') ?? startOf('fwhm_g') }];
    });
  } catch {
    return [];
  }
}
