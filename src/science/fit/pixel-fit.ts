/** One spectrum's fit in full: values, errors, covariance, and each component's curve to draw. */
import { completeStarts } from './estimate-starts';
import { type FitModel, modelOnGrid } from './fit-model';
import { type FitPlan, type FitStatus, fitStatus } from './fit-plan';
import { type FitQuantity, qualityAt, startFromRecord } from './fit-record';
import { closeTolerance } from './fit-spectrum';
import { noSeeds, PixelFitter } from './pixel-fitter';

export interface FittedQuantity extends FitQuantity {
  readonly value: number;
  /** 1 σ; NaN at a bound and where the counts say nothing of it */
  readonly error: number;
}

export interface ComponentCurve {
  readonly name: string;
  /** false for an optional one the spectrum does not need; its curve is 0 */
  readonly isIn: boolean;
  /** (n) expected counts per channel */
  readonly counts: Float64Array;
}

export interface PixelFit {
  readonly plan: FitPlan;
  /** channels of the plan's window, eV */
  readonly centresEv: Float64Array;
  readonly status: FitStatus;
  readonly chi2r: number;
  readonly deviance: number;
  readonly iterations: number;
  readonly freeCount: number;
  /** of every component, in the recipe's order */
  readonly quantities: readonly FittedQuantity[];
  /** (parameters) of the plan; NaN where nothing was fitted */
  readonly values: Float64Array;
  readonly errors: Float64Array;
  /** (parameters, parameters); NaN where there is no error */
  readonly covariance: Float64Array;
  readonly curves: readonly ComponentCurve[];
  /** (n) sum of the curves, expected counts per channel */
  readonly total: Float64Array;
}

/**
 * Fits one spectrum as closely as numbers allow. Quick enough to follow a hand.
 *
 * @param counts - (n) of the fit's channels, NaN where there is no data
 * @param record - what is known of the fit, as a row of the maps; null: from the plan's starts, and where it has none
 * from the spectrum itself
 */
export function fitOne(
  model: FitModel,
  counts: Float64Array,
  record: Float64Array | null = null,
): PixelFit {
  const plan = completeStarts(model, counts);
  const complete = modelOnGrid(plan, model.grid);
  const fitter = new PixelFitter(complete);
  const seeds = record === null ? noSeeds : { ...noSeeds, rows: [record] };
  const row = fitter.fit(counts, seeds, closeTolerance);
  const { layout } = fitter;
  const size = plan.parameters.length;
  const status = row[qualityAt(layout, 'status')] as FitStatus;
  const values = new Float64Array(size).fill(Number.NaN);
  if (status !== fitStatus.notFitted) startFromRecord(layout, row, values, values);
  return {
    plan,
    centresEv: model.grid.centresEv,
    status,
    chi2r: row[qualityAt(layout, 'chi2r')],
    deviance: row[qualityAt(layout, 'deviance')],
    iterations: row[qualityAt(layout, 'iterations')],
    freeCount: row[qualityAt(layout, 'freeCount')],
    quantities: layout.quantities.map((quantity, i) => ({
      ...quantity,
      value: row[i],
      error: row[layout.quantities.length + i],
    })),
    values,
    errors: fitter.bestErrors.slice(),
    covariance: fitter.bestCovariance.slice(),
    ...curvesOf(complete, values),
  };
}

/** A component without values was left out. */
function curvesOf(
  { plan, grid, shapes }: FitModel,
  values: Float64Array,
): Pick<PixelFit, 'curves' | 'total'> {
  const total = new Float64Array(grid.centresEv.length);
  const curves = plan.components.map(({ name, first, count }, c) => {
    const counts = new Float64Array(total.length);
    const own = values.slice(first, first + count);
    const isIn = !own.some(Number.isNaN);
    if (isIn) shapes[c].evaluate(grid, own, counts, null);
    for (let k = 0; k < total.length; k++) total[k] += counts[k];
    return { name, isIn, counts };
  });
  return { curves, total };
}
