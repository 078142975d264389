/** What `inspect --json` prints: fields are only ever added. */
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
    /** a complete `scan` block for a recipe: with it nothing is guessed */
    resolved: plan?.resolved ?? null,
    counts: statistics,
    warnings,
    problems: problems.map(({ kind, what, where, hint }) => ({ kind, what, where, hint })),
  };
}

function scanRecord({ shape, axis, x, y, laserEv, exposureS, noise, quantity }: ScanMeta) {
  const position = ({ label, unit, pitch }: ScanMeta['x']) => ({ label, unit, pitch });
  return {
    shape,
    axis: { fromEv: axis.centresEv[0], toEv: axis.centresEv.at(-1) },
    x: position(x),
    y: position(y),
    laserEv,
    exposureS,
    noise: noise.kind,
    quantity,
  };
}
