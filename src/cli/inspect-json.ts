/** What `inspect --json` prints: a public form, so fields are only ever added. Named as in recipes, with their units. */
import type { Inspection } from '../io/scan-plan';
import type { ScanMeta } from '../science/scan';
import type { CountStatistics } from './count-statistics';

/** Plain data; a number that is none (NaN) becomes null in JSON. */
export function inspectionRecord(inspection: Inspection, statistics: CountStatistics | null) {
  const { fileName, format, plan, guesses, warnings, problems } = inspection;
  return {
    file: fileName,
    format,
    scan: plan === null ? null : scanRecord(plan.meta),
    guesses: guesses.map(({ field, label, source, evidence, alternatives }) => ({
      field,
      value: label,
      source,
      evidence,
      alternatives,
    })),
    // A complete scan block for a recipe: with it nothing is guessed.
    resolved: plan?.resolved ?? null,
    counts: statistics === null ? null : countRecord(statistics),
    warnings,
    problems: problems.map(({ kind, what, where, hint }) => ({ kind, what, where, hint })),
  };
}

/** The scan as `inspect` and the summary of `run` tell it. */
export function scanRecord({ shape, axis, x, y, laserEv, exposureS, noise, quantity }: ScanMeta) {
  const position = ({ label, unit, pitch }: ScanMeta['x']) => ({ label, unit, pitch });
  return {
    shape,
    axis: { from_eV: axis.centresEv[0], to_eV: axis.centresEv[axis.centresEv.length - 1] },
    x: position(x),
    y: position(y),
    laser_eV: laserEv,
    exposure_s: exposureS,
    noise: noise.kind,
    quantity,
  };
}

function countRecord(statistics: CountStatistics) {
  const { step, pixels, totals, lowest, highest, noDataValues, brightestEv } = statistics;
  return {
    pixels,
    step,
    per_channel: { lowest, highest },
    per_pixel: {
      lowest: totals.lowest,
      lower_quartile: totals.lowerQuartile,
      median: totals.median,
      upper_quartile: totals.upperQuartile,
      highest: totals.highest,
    },
    no_data_values: noDataValues,
    brightest_eV: brightestEv,
  };
}
