/** Statistics of a scan's counts for `inspect`: of every value where the scan is small, of thinned pixels where it is large. */
import type { ScanEngine, ScanInputs } from '../../workers/engine';
import type { ScanPlan } from '../io/scan-plan';
import { quantiles } from '../science/statistics/quantile';
import type { Context } from './command';
import { startProgress } from './progress';

/** Values up to which a scan is read whole, about 1 GB of 16-bit counts: some seconds of reading. */
const mostValues = 5e8;

export interface CountStatistics {
  /** 1: all pixels; n: one in every n rows and columns */
  readonly step: number;
  readonly pixels: number;
  /** counts in all channels of a pixel */
  readonly totals: Spread;
  /** lowest and highest value of any channel; null where only a part was read */
  readonly lowest: number | null;
  readonly highest: number | null;
  /** values that are missing (NaN); null where only a part was read */
  readonly noDataValues: number | null;
  /** photon energy of the highest channel of the mean spectrum, eV; null when there is none */
  readonly brightestEv: number | null;
}

export interface Spread {
  readonly lowest: number;
  readonly lowerQuartile: number;
  readonly median: number;
  readonly upperQuartile: number;
  readonly highest: number;
}

/** @throws RimlightError 'scan' when the file is damaged or holds no data; 'cancelled' when stopped */
export async function countStatistics(
  engine: ScanEngine,
  inputs: ScanInputs,
  plan: ScanPlan,
  context: Context,
): Promise<CountStatistics> {
  const { ny, nx, nk } = plan.meta.shape;
  const options = {
    signal: context.signal,
    onProgress: startProgress(context, `Reading ${plan.meta.name}`),
  };
  if (ny * nx * nk > mostValues) {
    const { step, totals, meanSpectrum } = await engine.preview(inputs, plan, options);
    const whole = { lowest: null, highest: null, noDataValues: null };
    return { step, ...pixelStatistics(plan, totals, meanSpectrum), ...whole };
  }
  const scan = await engine.open(inputs, plan, options);
  try {
    const { totals, meanSpectrum, minCounts, maxCounts, noDataValues } = scan.overview;
    return {
      step: 1,
      ...pixelStatistics(plan, totals.values, meanSpectrum),
      lowest: minCounts,
      highest: maxCounts,
      noDataValues,
    };
  } finally {
    await scan.release();
  }
}

function pixelStatistics(plan: ScanPlan, totals: Float64Array, meanSpectrum: Float64Array) {
  const [lowest, lowerQuartile, median, upperQuartile, highest] = quantiles(
    totals,
    [0, 0.25, 0.5, 0.75, 1],
  );
  return {
    pixels: totals.length,
    totals: { lowest, lowerQuartile, median, upperQuartile, highest },
    brightestEv: brightestEnergy(plan, meanSpectrum),
  };
}

function brightestEnergy(plan: ScanPlan, meanSpectrum: Float64Array): number | null {
  let brightest = -1;
  meanSpectrum.forEach((counts, k) => {
    if (counts > (brightest < 0 ? Number.NEGATIVE_INFINITY : meanSpectrum[brightest]))
      brightest = k;
  });
  return brightest < 0 ? null : plan.meta.axis.centresEv[brightest];
}
