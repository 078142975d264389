/** Far field, baseline, components and row shifts in a chain: what speaks of the signal. */
import { formatMeasured, formatSignificant } from '../format';
import { findRowShifts, moveRows, type RowShifts, rowProfiles } from './align-rows';
import { createBaselineFinder, subtractBaseline } from './baseline';
import type { StepOf } from './chain-step';
import { type Grid, rowsOf } from './conditioned';
import {
  findComponents,
  joinGreatest,
  keepComponents,
  type ScanComponents,
  summariseGreatest,
  summariseProducts,
} from './denoise';
import {
  assertScale,
  type FarFieldScale,
  fitScale,
  subtractFarField,
  subtractFarFieldByPixel,
  summariseWindow,
} from './farfield';
import { planScaling, summariseVariances } from './noise-scaling';
import { counted, onlySlab, planOf, rowCounts } from './plan-base';
import type { PlannedReference } from './planned-reference';
import { type ChannelRange, channelsWithin } from './read-noise';
import { type StepPlace, stepError } from './step-errors';
import type { PlannedStep, StepState, StepSummary } from './step-plan';
import { inOrder, stateOf, summaryOf } from './step-state';

/** @throws RimlightError 'recipe' - for a scale below 0, or to be fitted without a window */
export function planFarField(
  step: StepOf<'farfield'>,
  outside: PlannedReference,
  grid: Grid,
  place: StepPlace,
): PlannedStep {
  if (typeof step.scale === 'number') {
    assertScale(step.scale, place);
    return farFieldOfScale({ scale: step.scale, error: 0 }, outside, grid, place);
  }
  if (step.window === null) {
    throw stepError(
      place,
      'a scale can only be fitted in a window where nothing but far field is seen',
      'Give two energies in eV as "window", or the scale as a number.',
    );
  }
  const range = channelsWithin(grid.axis, step.window, place);
  if (step.scale === 'fit-pixels') return farFieldByPixel(range, outside, grid, place);
  return planOf(place, grid, {
    reach: { kind: 'scan', rounds: 1 },
    summarise: (_, slab) => {
      const rows = summariseWindow(slab, outside.at(spanOfSlab(slab)), range);
      return { kind: 'window', y0: slab.y0, rows };
    },
    merge: (_, summaries) => {
      const rows = inOrder(summaries).flatMap((part) => summaryOf(part, 'window').rows);
      return { kind: 'scale', scale: fitScale(rows, place) };
    },
    apply: (slab, rows, state) => {
      const { scale } = stateOf(state, 'scale');
      return onlySlab(subtractFarField(rowsOf(slab, rows.y0, rows.y1), outside.at(rows), scale));
    },
    report: (_, state) => {
      const { scale } = stateOf(state, 'scale');
      const shown = formatMeasured(scale.scale, Number.isNaN(scale.error) ? null : scale.error, '');
      return {
        place,
        line: `${outside.name} × ${shown}, fitted`,
        warnings: scale.scale === 0 ? [nothingTaken] : [],
      };
    },
  });
}

const nothingTaken =
  'The scale came out as 0: nothing was taken off. Check the window and the offset.';

function farFieldOfScale(
  scale: FarFieldScale,
  outside: PlannedReference,
  grid: Grid,
  place: StepPlace,
): PlannedStep {
  return planOf(place, grid, {
    apply: (slab, rows) =>
      onlySlab(subtractFarField(rowsOf(slab, rows.y0, rows.y1), outside.at(rows), scale)),
    report: () => ({ place, line: `${outside.name} × ${scale.scale}`, warnings: [] }),
  });
}

function farFieldByPixel(
  range: ChannelRange,
  outside: PlannedReference,
  grid: Grid,
  place: StepPlace,
): PlannedStep {
  return planOf(place, grid, {
    apply: (slab, rows) => {
      const own = rowsOf(slab, rows.y0, rows.y1);
      const { slab: left, scales } = subtractFarFieldByPixel(own, outside.at(rows), range);
      return {
        slab: left,
        tally: {
          zero: rowCounts(scales, own.shape.nx, (scale) => (scale === 0 ? 1 : 0)),
          unknown: rowCounts(scales, own.shape.nx, (scale) => (Number.isNaN(scale) ? 1 : 0)),
        },
        maps: [{ name: 'farfield.scale', unit: '', values: scales }],
        spikes: null,
      };
    },
    report: ({ zero, unknown }) => ({
      place,
      line: `${outside.name}, scale fitted at each pixel; 0 in ${zero} px`,
      warnings:
        unknown === 0
          ? []
          : [`In ${unknown} px the window holds no counts of the far field: no data there.`],
    }),
  });
}

/** @throws RimlightError 'recipe' - see `createBaselineFinder` */
export function planBaseline(step: StepOf<'baseline'>, grid: Grid, place: StepPlace): PlannedStep {
  const finder = createBaselineFinder(step, grid.axis, place);
  return planOf(place, grid, {
    apply: (slab, { y0, y1 }) => {
      const { slab: left, totals, status } = subtractBaseline(rowsOf(slab, y0, y1), finder);
      const { nx } = slab.shape;
      return {
        slab: left,
        tally: {
          unsettled: rowCounts(status, nx, (value) => (value === 1 ? 1 : 0)),
          empty: rowCounts(status, nx, (value) => (value === 2 ? 1 : 0)),
        },
        maps: [{ name: 'baseline.total', unit: 'counts', values: totals }],
        spikes: null,
      };
    },
    report: ({ unsettled, empty }) => ({
      place,
      line:
        `${step.method} off every pixel` +
        (empty === 0 ? '' : `, none in ${empty} px without data`) +
        (unsettled === 0 ? '' : `; ${unsettled} px had not settled`),
      warnings: [],
    }),
  });
}

/** @throws RimlightError 'recipe' - while merging: see `planScaling` and `findComponents` */
export function planDenoise(step: StepOf<'denoise'>, grid: Grid, place: StepPlace): PlannedStep {
  const hasNoise = grid.noise.kind !== 'none';
  const { ny, nx, nk } = grid.shape;
  return planOf(place, grid, {
    reach: { kind: 'scan', rounds: 3 },
    summarise: (round, slab, state): StepSummary => {
      const { y0 } = slab;
      if (round === 0) return { kind: 'variances', y0, rows: summariseVariances(slab) };
      if (round === 1) {
        const { scaling } = stateOf(state, 'scaling');
        return { kind: 'greatest', y0, greatest: summariseGreatest(slab, scaling) };
      }
      const { scaling, step: fineness } = stateOf(state, 'fineness');
      return { kind: 'products', y0, products: summariseProducts(slab, scaling, fineness) };
    },
    merge: (round, summaries, state): StepState => {
      const parts = inOrder(summaries);
      if (round === 0) {
        const rows = parts.map((part) => summaryOf(part, 'variances').rows);
        return { kind: 'scaling', scaling: planScaling(rows, { nk, pixels: ny * nx }, place) };
      }
      if (round === 1) {
        const { scaling } = stateOf(state, 'scaling');
        const greatest = parts.map((part) => summaryOf(part, 'greatest').greatest);
        return { kind: 'fineness', scaling, step: joinGreatest(greatest) };
      }
      const { scaling, step: fineness } = stateOf(state, 'fineness');
      const products = parts.map((part) => summaryOf(part, 'products').products);
      const wanted = { rank: step.rank, hasNoise };
      return {
        kind: 'components',
        components: findComponents(products, scaling, fineness, wanted, place),
      };
    },
    apply: (slab, { y0, y1 }, state) => {
      const { components } = stateOf(state, 'components');
      const { slab: kept, removed } = keepComponents(rowsOf(slab, y0, y1), components);
      const left = rowCounts(removed, nx, (value) => (Number.isNaN(value) ? 1 : 0));
      const map = { name: 'denoise.removed', unit: '', values: removed };
      return { slab: kept, tally: { left }, maps: [map], spikes: null };
    },
    report: ({ left }, state) => ({
      place,
      line: denoiseLine(stateOf(state, 'components').components, left),
      warnings: [
        'Channels and pixels share their noise now: errors of fits after it are not independent.',
      ],
    }),
  });
}

function denoiseLine({ rank, singular, suggestedRank }: ScanComponents, left: number): string {
  const kept = `${rank} of ${counted(singular.length, 'component')} kept`;
  const rest = left === 0 ? '' : `; ${left} px with gaps left as they are`;
  return `${kept}, ${suggestedRank} stand above the noise${rest}`;
}

/** @throws RimlightError 'recipe' - while merging: see `findRowShifts` */
export function planAlignRows(
  { maxShiftPx }: StepOf<'align-rows'>,
  grid: Grid,
  place: StepPlace,
): PlannedStep {
  return planOf(place, grid, {
    reach: { kind: 'scan', rounds: 1 },
    summarise: (_, slab) => ({ kind: 'profiles', y0: slab.y0, profiles: rowProfiles(slab) }),
    merge: (_, summaries) => {
      const { ny, nx } = grid.shape;
      const profiles = new Float64Array(ny * nx);
      for (const part of summaries)
        profiles.set(summaryOf(part, 'profiles').profiles, part.y0 * nx);
      return { kind: 'shifts', shifts: findRowShifts(profiles, grid.shape, maxShiftPx, place) };
    },
    apply: (slab, { y0, y1 }, state) => {
      const { shiftsPx } = stateOf(state, 'shifts').shifts;
      const rows = rowsOf(slab, y0, y1);
      return onlySlab(liesWell(shiftsPx) ? rows : moveRows(rows, shiftsPx));
    },
    report: (_, state) => alignReport(stateOf(state, 'shifts').shifts, place),
  });
}

function liesWell(shiftsPx: Float64Array): boolean {
  return shiftsPx.every((shift) => shift === 0);
}

function alignReport(shifts: RowShifts, place: StepPlace): ReturnType<PlannedStep['report']> {
  const { shiftsPx, serpentinePx, unsureRows, limitedRows } = shifts;
  if (liesWell(shiftsPx)) {
    return { place, line: 'rows lie well: none moved', warnings: [] };
  }
  const most = shiftsPx.reduce((far, shift) => Math.max(far, Math.abs(shift)), 0);
  const warnings = [
    'Neighbouring pixels share their noise now: errors of fits after it are not independent.',
  ];
  if (limitedRows > 0) {
    warnings.push(`${counted(limitedRows, 'row')} would have moved farther than allowed.`);
  }
  if (2 * unsureRows > shiftsPx.length) {
    warnings.push(`${unsureRows} rows do not resemble the one before enough to be aligned.`);
  }
  return {
    place,
    line: `rows moved by up to ${formatSignificant(most, 2)} px; odd against even rows ${formatSignificant(serpentinePx, 2)} px`,
    warnings,
  };
}

function spanOfSlab(slab: { readonly y0: number; readonly shape: { readonly ny: number } }): {
  readonly y0: number;
  readonly y1: number;
} {
  return { y0: slab.y0, y1: slab.y0 + slab.shape.ny };
}
