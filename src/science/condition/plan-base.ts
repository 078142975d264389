/** What most steps' plans have in common. */
import { RimlightError } from '../../errors';
import type { ConditionedSlab, Grid } from './conditioned';
import type { StepPlace } from './step-errors';
import type { PlannedStep, StepResult } from './step-plan';

/** Parts of a plan that a step has to give itself. */
export type OwnParts = Pick<PlannedStep, 'apply' | 'report'> & Partial<PlannedStep>;

/** A step that depends on its own pixel and keeps the grid, but for what `own` says. */
export function planOf(place: StepPlace, before: Grid, own: OwnParts): PlannedStep {
  const noRounds = (): never => {
    throw new RimlightError('fault', {
      what: `${place} has no summaries`,
      where: '',
      hint: 'Please report this.',
    });
  };
  return {
    place,
    reach: { kind: 'pixel' },
    before,
    after: before,
    isOfDetector: false,
    rowsFor: (rows) => rows,
    rowsAfter: (rows) => rows,
    summarise: noRounds,
    merge: noRounds,
    ...own,
  };
}

/** A result that is a slab and nothing else. */
export function onlySlab(slab: ConditionedSlab): StepResult {
  return { slab, tally: {}, maps: [], spikes: null };
}

/** How many pixels of each row satisfy something; `values` is (rows × columns). */
export function rowCounts(
  values: Float64Array,
  nx: number,
  countOf: (value: number) => number,
): Float64Array {
  const rows = new Float64Array(values.length / nx);
  for (let pixel = 0; pixel < values.length; pixel++) {
    rows[Math.floor(pixel / nx)] += countOf(values[pixel]);
  }
  return rows;
}

/** "1 px", "2 px"; "1 row", "2 rows" */
export function counted(count: number, one: string, many = `${one}s`): string {
  return `${count} ${count === 1 ? one : many}`;
}
