/**
 * A step of the chain as it is planned on a scan's grid, and what it needs of other rows, so that rows can be
 * shared out: workers, the app's preview of one pixel and the command line all go through this.
 */
import type { RowShifts } from './align-rows';
import type { ConditionedSlab, Grid } from './conditioned';
import type { GreatestValue, ScanComponents, SlabProducts } from './denoise';
import type { SpikeList } from './despike';
import type { ExactStep } from './exact-gram';
import type { FarFieldScale, WindowSums } from './farfield';
import type { NoiseScaling, RowVariances } from './noise-scaling';
import type { StepPlace } from './step-errors';

/** Rows y0 ≤ y < y1 of a grid; none where y0 ≥ y1. */
export interface RowSpan {
  readonly y0: number;
  readonly y1: number;
}

/**
 * What a pixel's result depends on. `pixel`: itself. `rows`: rows nearby, see `rowsFor`. `scan`: all of
 * it, through summaries of `rounds` rounds; once these are merged, on itself.
 */
export type Reach =
  | { readonly kind: 'pixel' }
  | { readonly kind: 'rows' /** on either side */; readonly halo: number }
  | { readonly kind: 'scan'; readonly rounds: number };

/** What merged summaries know of the whole scan; plain data. */
export type StepState =
  | { readonly kind: 'none' }
  | { readonly kind: 'scale'; readonly scale: FarFieldScale }
  | { readonly kind: 'shifts'; readonly shifts: RowShifts }
  | { readonly kind: 'scaling'; readonly scaling: NoiseScaling }
  | { readonly kind: 'fineness'; readonly scaling: NoiseScaling; readonly step: ExactStep }
  | { readonly kind: 'components'; readonly components: ScanComponents };

/** What one slab adds to that, in one round; plain data. */
export type StepSummary = { readonly y0: number } & (
  | { readonly kind: 'window'; readonly rows: readonly WindowSums[] }
  | { readonly kind: 'profiles'; readonly profiles: Float64Array }
  | { readonly kind: 'variances'; readonly rows: RowVariances }
  | { readonly kind: 'greatest'; readonly greatest: GreatestValue }
  | { readonly kind: 'products'; readonly products: SlabProducts }
);

/** How many of something each row had, by name; (rows) each. */
export type RowTally = Readonly<Record<string, Float64Array>>;

/** The same over the whole scan. */
export type Tally = Readonly<Record<string, number>>;

/** One value per pixel of the rows a step gave: what it changed, or found. */
export interface StepMap {
  /** "despike.count"; for the others the step's name and what is meant */
  readonly name: string;
  readonly unit: string;
  /** (rows × columns) */
  readonly values: Float64Array;
}

export interface StepResult {
  readonly slab: ConditionedSlab;
  readonly tally: RowTally;
  readonly maps: readonly StepMap[];
  /** of `despike`, so that each can be shown and given back */
  readonly spikes: SpikeList | null;
}

/** What a step did, in numbers. */
export interface StepReport {
  readonly place: StepPlace;
  /** "312 spikes in 287 px" */
  readonly line: string;
  /** whole sentences; empty as a rule */
  readonly warnings: readonly string[];
}

/** `before` is the grid it takes, `after` the grid it gives. */
export interface PlannedStep {
  readonly place: StepPlace;
  readonly reach: Reach;
  readonly before: Grid;
  readonly after: Grid;
  /** whether a dark or tip-out recording taken off later goes through this step as well: it speaks of the detector or the grid */
  readonly isOfDetector: boolean;
  /** rows of `before` that these rows of `after` need */
  rowsFor(rows: RowSpan): RowSpan;
  /** rows of `after` that belong to whoever owns these of `before`: owners of all rows own all rows */
  rowsAfter(rows: RowSpan): RowSpan;
  /** One slab's share of a round; `state` is that of the round before. @throws for a step without rounds */
  summarise(round: number, slab: ConditionedSlab, state: StepState): StepSummary;
  /** @param summaries - of all slabs, in any order */
  merge(round: number, summaries: readonly StepSummary[], state: StepState): StepState;
  /**
   * @param slab - rows of `before`: `rowsFor(rows)`, or more
   * @param rows - of `after`, to be given
   * @param state - of the last round
   */
  apply(slab: ConditionedSlab, rows: RowSpan, state: StepState): StepResult;
  report(tally: Tally, state: StepState): StepReport;
}

export const noState: StepState = { kind: 'none' };

/** Rows both spans share. */
export function sharedRows(a: RowSpan, b: RowSpan): RowSpan {
  return spanOf(Math.max(a.y0, b.y0), Math.min(a.y1, b.y1));
}

/** The least span over both; an empty one adds nothing. */
export function joinedRows(a: RowSpan, b: RowSpan): RowSpan {
  if (a.y1 <= a.y0) return b;
  if (b.y1 <= b.y0) return a;
  return { y0: Math.min(a.y0, b.y0), y1: Math.max(a.y1, b.y1) };
}

function spanOf(y0: number, y1: number): RowSpan {
  return y1 > y0 ? { y0, y1 } : { y0, y1: y0 };
}
