/** A plan on its channels: shapes, grid, and which parameters are free for any choice of components. */
import { type FitGrid, gridOf, type Shape } from '../peaks/shape';
import { shapeByName } from '../peaks/shape-by-name';
import type { EnergyAxis } from '../scan';
import type { FitPlan } from './fit-plan';

export interface FitModel {
  readonly plan: FitPlan;
  readonly grid: FitGrid;
  /** by component */
  readonly shapes: readonly Shape[];
  /** bounds of each parameter, those of the ones tied to it included; by parameter */
  readonly least: Float64Array;
  readonly most: Float64Array;
  /** by parameter: the widths, of the same component, whose sum is the most it may move in one step; empty for no limit */
  readonly strides: readonly (readonly number[])[];
  /** by component, whether it is in; every one */
  readonly everything: readonly boolean[];
}

/** Which parameters move when only some components are in. */
export interface FitLayout {
  readonly isIn: readonly boolean[];
  /** parameters with a value of their own that an included component depends on */
  readonly free: Int32Array;
  /** parameters of included components whose derivative counts, and for each the free one it follows, and how steeply */
  readonly used: Int32Array;
  readonly owner: Int32Array;
  readonly slope: Float64Array;
  /** nothing tied: `used` and `free` are the same */
  readonly isPlain: boolean;
}

/**
 * @param axis - of the whole scan; the plan says which of its channels are fitted
 */
export function createFitModel(plan: FitPlan, axis: EnergyAxis): FitModel {
  return modelOnGrid(plan, gridOf(axis, plan.firstChannel, plan.endChannel));
}

/** The same on channels of one's own. */
export function modelOnGrid(plan: FitPlan, grid: FitGrid): FitModel {
  const { parameters, components } = plan;
  const least = Float64Array.from(parameters, ({ min }) => min);
  const most = Float64Array.from(parameters, ({ max }) => max);
  for (const { min, max, tie } of parameters) {
    if (tie === null || tie.times === 0) continue;
    const ends = [(min - tie.plus) / tie.times, (max - tie.plus) / tie.times];
    least[tie.to] = Math.max(least[tie.to], Math.min(...ends));
    most[tie.to] = Math.min(most[tie.to], Math.max(...ends));
  }
  return {
    plan,
    grid,
    shapes: components.map(({ shape }) => shapeByName(shape)),
    least,
    most,
    strides: components.flatMap(({ first, count }) => stridesOf(plan, first, count)),
    everything: components.map(() => true),
  };
}

const widthNames: readonly string[] = ['fwhm', 'fwhm_g', 'fwhm_l', 'tail'];

/** A centre moves by the widths of its peak at most, a width by itself: further on, the parabola knows nothing of the peak. */
function stridesOf({ parameters }: FitPlan, first: number, count: number): readonly number[][] {
  const own = Array.from({ length: count }, (_, i) => first + i);
  const widths = own.filter((index) => widthNames.includes(parameters[index].name));
  return own.map((index) => {
    if (parameters[index].name === 'centre') return widths;
    return parameters[index].name === 'decay' || widths.includes(index) ? [index] : [];
  });
}

/** @param isIn - by component, whether it is in */
export function createLayout({ plan }: FitModel, isIn: readonly boolean[]): FitLayout {
  const { components, parameters } = plan;
  const included = components.flatMap(({ first, count }, index) =>
    isIn[index] ? Array.from({ length: count }, (_, i) => first + i) : [],
  );
  const followed = (index: number): { root: number; times: number } => {
    const { tie } = parameters[index];
    return tie === null ? { root: index, times: 1 } : { root: tie.to, times: tie.times };
  };
  const used = included.filter((index) => {
    const { root, times } = followed(index);
    return !parameters[root].isFixed && times !== 0;
  });
  const roots = [...new Set(used.map((index) => followed(index).root))].sort((a, b) => a - b);
  return {
    isIn,
    free: Int32Array.from(roots),
    used: Int32Array.from(used),
    owner: Int32Array.from(used, (index) => roots.indexOf(followed(index).root)),
    slope: Float64Array.from(used, (index) => followed(index).times),
    isPlain: used.every((index) => parameters[index].tie === null),
  };
}

/** Sets every tied parameter from the one it follows. */
export function followTies({ parameters }: FitPlan, values: Float64Array): void {
  for (let index = 0; index < parameters.length; index++) {
    const { tie } = parameters[index];
    if (tie !== null) values[index] = tie.times * values[tie.to] + tie.plus;
  }
}
