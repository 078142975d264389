/**
 * The recipe's condition block as a whole: steps planned one on the other's grid, then applied in their
 * order to rows of the scan, shared out or not. Results do not depend on how rows are shared out.
 */
import { assertUnreachable } from '../../errors';
import type { ActiveStep, ChainStep } from './chain-step';
import { type ConditionedSlab, type Grid, rowsOf } from './conditioned';
import type { SpikeList } from './despike';
import { planDespike } from './plan-despike';
import { planCalibrate, planOffset, planResponse } from './plan-detector';
import { planBinStep, planCropStep } from './plan-grid';
import { planAlignRows, planBaseline, planDenoise, planFarField } from './plan-signal';
import { PlannedReference, type SpectrumWay, type StepBefore } from './planned-reference';
import type { StepPlace } from './step-errors';
import {
  joinedRows,
  noState,
  type PlannedStep,
  type RowSpan,
  type StepMap,
  type StepReport,
  type StepState,
} from './step-plan';

export interface ChainPlan {
  /** those that are on, in order */
  readonly steps: readonly PlannedStep[];
  readonly before: Grid;
  /** after the last step */
  readonly after: Grid;
}

/**
 * Plans a chain; steps that are off are left out.
 *
 * @param grid - of the scan as recorded
 * @throws RimlightError 'recipe' - naming the first step that cannot be done: "condition[2], response"
 */
export function planChain(steps: readonly ChainStep[], grid: Grid): ChainPlan {
  const before: StepBefore[] = [];
  let present = grid;
  for (const [index, step] of steps.entries()) {
    if (step.isOff) continue;
    const place = `condition[${index}], ${step.step}`;
    const planned = planStep(step, present, { grid, before, place });
    before.push(planned);
    present = planned.planned.after;
  }
  return { steps: before.map(({ planned }) => planned), before: grid, after: present };
}

interface Context {
  /** as recorded */
  readonly grid: Grid;
  readonly before: readonly StepBefore[];
  readonly place: StepPlace;
}

function planStep(step: ActiveStep, grid: Grid, context: Context): StepBefore {
  const { place } = context;
  const plain = (planned: PlannedStep, spectrumWay: SpectrumWay | null = null): StepBefore => ({
    planned,
    spectrumWay,
  });
  const reference = (recorded: ConstructorParameters<typeof PlannedReference>[0]) =>
    new PlannedReference(recorded, context.grid, context.before, place);
  switch (step.step) {
    case 'despike':
      return plain(planDespike(step, grid, place));
    case 'offset': {
      if (typeof step.dark === 'number') return plain(planOffset(step.dark, grid, place));
      const dark = reference(step.dark);
      const way: SpectrumWay | null = dark.kind === 'cube' ? { kind: 'by-pixel' } : null;
      return plain(planOffset(dark, grid, place), way);
    }
    case 'response':
      return plain(planResponse(step, grid, place));
    case 'calibrate':
      return plain(planCalibrate(step, grid, place));
    case 'farfield':
      return plain(planFarField(step, reference(step.outside), grid, place));
    case 'baseline':
      return plain(planBaseline(step, grid, place));
    case 'denoise':
      return plain(planDenoise(step, grid, place));
    case 'align-rows':
      return plain(planAlignRows(step, grid, place));
    case 'crop': {
      const { planned, crop } = planCropStep(step, grid, place);
      return plain(planned, { kind: 'crop', crop });
    }
    case 'bin':
      return plain(planBinStep(step, grid, place), { kind: 'bin', options: step });
    default:
      return assertUnreachable(step);
  }
}

/** Rows one holder has at each place of a chain: before step 0, …, after the last. */
export interface SharedRows {
  /** those whose results are this holder's: over all holders, every row once */
  readonly own: readonly RowSpan[];
  /** those it must have, so that its own can be made */
  readonly needed: readonly RowSpan[];
}

/** What a holder of some rows of the recorded scan owns and needs along the chain. */
export function shareRows({ steps }: ChainPlan, recorded: RowSpan): SharedRows {
  const own = [recorded];
  for (const step of steps) own.push(step.rowsAfter(own[own.length - 1]));
  const needed = [own[own.length - 1]];
  for (let i = steps.length - 1; i >= 0; i--) {
    needed.unshift(joinedRows(own[i], steps[i].rowsFor(needed[0])));
  }
  return { own, needed };
}

/** One holder's rows, where a chain begins: `needed[0]` of the recorded scan. */
export interface ChainPart {
  readonly rows: SharedRows;
  readonly slab: ConditionedSlab;
}

/** What one step gave one holder: its own rows of maps, its own spikes and counts. */
export interface PartResult {
  readonly slab: ConditionedSlab;
  readonly tally: Readonly<Record<string, number>>;
  readonly maps: readonly StepMap[];
  readonly spikes: SpikeList | null;
}

/** One step on one holder's rows; `index` is its place in the chain. */
export function applyToPart(
  plan: ChainPlan,
  index: number,
  part: ChainPart,
  state: StepState,
): PartResult {
  const given = part.rows.needed[index + 1];
  const own = part.rows.own[index + 1];
  const { slab, tally, maps, spikes } = plan.steps[index].apply(part.slab, given, state);
  const from = own.y0 - slab.y0;
  const to = Math.max(from, own.y1 - slab.y0);
  const { nx } = slab.shape;
  const counts = Object.entries(tally).map(([name, rows]) => [
    name,
    rows.slice(from, to).reduce((sum, count) => sum + count, 0),
  ]);
  return {
    slab,
    tally: Object.fromEntries(counts),
    maps: maps.map((map) => ({ ...map, values: map.values.slice(from * nx, to * nx) })),
    spikes: spikes === null ? null : ownSpikes(spikes, own),
  };
}

/** One holder's share of a round of summaries: of its own rows only. */
export function summarisePart(
  plan: ChainPlan,
  index: number,
  part: ChainPart,
  round: number,
  state: StepState,
): ReturnType<PlannedStep['summarise']> {
  const { y0, y1 } = part.rows.own[index];
  return plan.steps[index].summarise(round, rowsOf(part.slab, y0, Math.max(y0, y1)), state);
}

/** Rounds of summaries a step needs; 0 for most. */
export function roundsOf({ reach }: PlannedStep): number {
  return reach.kind === 'scan' ? reach.rounds : 0;
}

export interface StepOutcome {
  readonly report: StepReport;
  readonly state: StepState;
  /** of each part, in the order of the parts */
  readonly maps: readonly (readonly StepMap[])[];
  readonly spikes: readonly (SpikeList | null)[];
}

export interface ChainOutcome {
  /** each part's own rows after the last step */
  readonly slabs: readonly ConditionedSlab[];
  readonly steps: readonly StepOutcome[];
}

/**
 * The whole chain on all parts, one after the other: what workers do side by side.
 *
 * @throws RimlightError 'recipe' - naming the step that cannot be done with these data
 */
export function runChain(plan: ChainPlan, given: readonly ChainPart[]): ChainOutcome {
  let parts = given;
  const steps: StepOutcome[] = [];
  plan.steps.forEach((step, index) => {
    let state: StepState = noState;
    for (let round = 0; round < roundsOf(step); round++) {
      const known = state;
      const summaries = parts.map((part) => summarisePart(plan, index, part, round, known));
      state = step.merge(round, summaries, known);
    }
    const results = parts.map((part) => applyToPart(plan, index, part, state));
    parts = parts.map((part, i) => ({ ...part, slab: results[i].slab }));
    steps.push({
      report: step.report(addedTallies(results.map(({ tally }) => tally)), state),
      state,
      maps: results.map(({ maps }) => maps),
      spikes: results.map(({ spikes }) => spikes),
    });
  });
  const last = plan.steps.length;
  const slabs = parts.map(({ slab, rows }) => {
    const { y0, y1 } = rows.own[last];
    return rowsOf(slab, y0, Math.max(y0, y1));
  });
  return { slabs, steps };
}

/** Counts of all parts together; whole numbers, so in any order. */
export function addedTallies(
  tallies: readonly Readonly<Record<string, number>>[],
): Readonly<Record<string, number>> {
  const sums: Record<string, number> = {};
  for (const tally of tallies) {
    for (const [name, count] of Object.entries(tally)) sums[name] = (sums[name] ?? 0) + count;
  }
  return sums;
}

function ownSpikes(spikes: SpikeList, own: RowSpan): SpikeList {
  const isOwn = (_: number, i: number): boolean => spikes.y[i] >= own.y0 && spikes.y[i] < own.y1;
  return {
    y: spikes.y.filter(isOwn),
    x: spikes.x.filter(isOwn),
    k: spikes.k.filter(isOwn),
    was: spikes.was.filter(isOwn),
  };
}
