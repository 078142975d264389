/** Starts that a recipe leaves out: peaks found in a spectrum one after the other, the highest first. */
import { exp } from '../numeric/elementary';
import type { FitGrid } from '../peaks/shape';
import { isPeak, shapeByName } from '../peaks/shape-by-name';
import { quantiles } from '../statistics/quantile';
import { ComponentChooser } from './chosen-fit';
import { type FitModel, followTies, modelOnGrid } from './fit-model';
import { type FitPlan, fitStatus, type PlannedComponent } from './fit-plan';
import { SpectrumFitter } from './fit-spectrum';
import { LinearStarts } from './linear-starts';

/** Two equal widths make a Voigt profile 1.6376 times as wide (Olivero and Longbothum 1977). */
const voigtPerEqualWidths = 1.6376;
/** A Fano line that leans, to either side of it. */
const startingQ = 3;
/** Luminescence from low to high energy: an interlayer exciton lies far below, localised states and trions just below the exciton. */
const roleOrder = ['interlayer', 'localised', 'trion', 'exciton'];

/**
 * The plan with a start for every centre, width and shape parameter; areas and levels keep theirs,
 * or none, and are solved for in each spectrum.
 *
 * What was left out is looked for in `spectrum` (the scan's mean) and then fitted to it.
 *
 * @param spectrum - (n) counts of the fit's channels, NaN where there is no data
 */
export function completeStarts({ plan, grid }: FitModel, spectrum: Float64Array): FitPlan {
  const found = foundPeaks(plan, grid, spectrum);
  const values = plan.components.flatMap((component, index) =>
    startsOf(plan, component, found[index]),
  );
  const guessed = withStarts(plan, values);
  const isMissing = guessed.parameters.map(
    ({ start, tie }, index) =>
      start !== null && tie === null && plan.parameters[index].start === null,
  );
  if (!isMissing.includes(true)) return guessed;
  const fitted = fittedStarts(modelOnGrid(guessed, grid), spectrum);
  return withStarts(
    plan,
    values.map((value, i) => (isMissing[i] && fitted !== null ? (fitted[i] ?? value) : value)),
  );
}

function withStarts(plan: FitPlan, values: readonly (number | null)[]): FitPlan {
  return {
    ...plan,
    parameters: plan.parameters.map((parameter, index) => {
      const value = values[index];
      const { start, min, max } = parameter;
      if (start !== null || value === null) return parameter;
      return { ...parameter, start: Math.min(Math.max(value, min), max) };
    }),
  };
}

/** Null where the spectrum cannot be fitted from there. */
function fittedStarts(model: FitModel, spectrum: Float64Array): Float64Array | null {
  const fitter = new SpectrumFitter(model);
  if (fitter.load(spectrum) <= model.plan.parameters.length) return null;
  const start = plannedStart(model.plan);
  new LinearStarts(model).fill(spectrum, start);
  const { values, status } = new ComponentChooser(fitter).fit(start);
  const isGood = status === fitStatus.converged || status === fitStatus.atBound;
  return isGood ? values : null;
}

/** (parameters) the plan's starts, 0 where there is none. */
export function plannedStart(plan: FitPlan): Float64Array {
  const values = Float64Array.from(plan.parameters, ({ start }) => start ?? 0);
  followTies(plan, values);
  return values;
}

interface FoundPeak {
  readonly centreEv: number;
  readonly fwhmEv: number;
}

/** By component; null for a background. */
function foundPeaks(
  plan: FitPlan,
  grid: FitGrid,
  spectrum: Float64Array,
): readonly (FoundPeak | null)[] {
  const hasFloor = plan.components.some(({ shape }) => !isPeak(shapeByName(shape)));
  const rest = smoothed(spectrum);
  const floor = hasFloor ? quantiles(rest, [0.05])[0] : 0;
  for (let k = 0; k < rest.length; k++) rest[k] -= floor;
  const isSought = (component: PlannedComponent): boolean =>
    startIn(plan, component, 'centre') === null;
  const order = [...plan.components.keys()].sort(
    (a, b) => Number(isSought(plan.components[a])) - Number(isSought(plan.components[b])),
  );
  const peaks: (FoundPeak | null)[] = plan.components.map(() => null);
  for (const index of order) {
    const component = plan.components[index];
    if (!isPeak(shapeByName(component.shape))) continue;
    const at = isSought(component)
      ? highest(plan, component, grid, rest)
      : channelOf(grid, startIn(plan, component, 'centre') ?? 0);
    const width = startIn(plan, component, 'fwhm') ?? halfWidth(grid, rest, at);
    peaks[index] = { centreEv: grid.centresEv[at], fwhmEv: width };
    takeAway(grid, rest, at, width);
  }
  return inOrderOfRoles(plan, peaks);
}

/** Peaks that were sought anywhere are handed to their roles in order of energy. */
function inOrderOfRoles(
  plan: FitPlan,
  peaks: readonly (FoundPeak | null)[],
): readonly (FoundPeak | null)[] {
  const open = plan.components.flatMap((component, index) => {
    const rank = roleOrder.indexOf(component.role ?? '');
    return rank >= 0 && startIn(plan, component, 'centre') === null ? [{ index, rank }] : [];
  });
  const sorted = open
    .map(({ index }) => peaks[index])
    .sort((a, b) => (a?.centreEv ?? 0) - (b?.centreEv ?? 0));
  const ranked = [...open].sort((a, b) => a.rank - b.rank);
  const given = [...peaks];
  for (const [i, { index }] of ranked.entries()) given[index] = sorted[i];
  return given;
}

function startIn(plan: FitPlan, { first, count }: PlannedComponent, name: string): number | null {
  for (let i = first; i < first + count; i++) {
    const { tie, start } = plan.parameters[i];
    if (plan.parameters[i].name !== name) continue;
    if (tie === null) return start;
    const other = plan.parameters[tie.to].start;
    return other === null ? null : tie.times * other + tie.plus;
  }
  return null;
}

/** By parameter: null for areas and levels, which each spectrum solves for. */
function startsOf(
  plan: FitPlan,
  { first, count }: PlannedComponent,
  peak: FoundPeak | null,
): readonly (number | null)[] {
  return Array.from({ length: count }, (_, i) => {
    const { name, start, min, max } = plan.parameters[first + i];
    if (start !== null) return start;
    switch (name) {
      case 'centre':
        return peak?.centreEv ?? null;
      case 'fwhm':
        return peak?.fwhmEv ?? null;
      case 'fwhm_g':
      case 'fwhm_l':
        return peak === null ? null : peak.fwhmEv / voigtPerEqualWidths;
      case 'tail':
        return peak === null ? null : peak.fwhmEv / 2;
      case 'eta':
        return (min + max) / 2;
      case 'q':
        return startingQ;
      case 'decay':
        return min > 0 ? Math.min(max, 50 * min) : max / 200;
      default:
        return null;
    }
  });
}

/** Means over five channels, ends over fewer; no data counts as its neighbours. */
function smoothed(spectrum: Float64Array): Float64Array {
  return spectrum.map((_, k) => {
    let sum = 0;
    let count = 0;
    for (let i = Math.max(0, k - 2); i <= Math.min(spectrum.length - 1, k + 2); i++) {
      if (Number.isNaN(spectrum[i])) continue;
      sum += spectrum[i];
      count++;
    }
    return count === 0 ? 0 : sum / count;
  });
}

function highest(
  plan: FitPlan,
  { first, count }: PlannedComponent,
  { centresEv }: FitGrid,
  rest: Float64Array,
): number {
  let [min, max] = [Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY];
  for (const parameter of plan.parameters.slice(first, first + count)) {
    if (parameter.name === 'centre') ({ min, max } = parameter);
  }
  let best = -1;
  for (let k = 0; k < rest.length; k++) {
    if (centresEv[k] < min || centresEv[k] > max) continue;
    if (best < 0 || rest[k] > rest[best]) best = k;
  }
  return Math.max(0, best);
}

function channelOf({ centresEv }: FitGrid, energyEv: number): number {
  let best = 0;
  for (let k = 1; k < centresEv.length; k++) {
    if (Math.abs(centresEv[k] - energyEv) < Math.abs(centresEv[best] - energyEv)) best = k;
  }
  return best;
}

/** Twice the way to half the height on the steeper side; three channels at least, a third of the window at most. */
function halfWidth(
  { centresEv, widthsEv, edgesEv }: FitGrid,
  rest: Float64Array,
  at: number,
): number {
  const half = rest[at] / 2;
  let up = at;
  while (up < rest.length - 1 && rest[up] > half) up++;
  let down = at;
  while (down > 0 && rest[down] > half) down--;
  const ways = [centresEv[up] - centresEv[at], centresEv[at] - centresEv[down]];
  const reached = ways.filter((way, side) => way > 0 && rest[side === 0 ? up : down] <= half);
  const width = reached.length === 0 ? Number.POSITIVE_INFINITY : 2 * Math.min(...reached);
  const most = (edgesEv[edgesEv.length - 1] - edgesEv[0]) / 3;
  return Math.max(3 * widthsEv[at], Math.min(width, most));
}

function takeAway({ centresEv }: FitGrid, rest: Float64Array, at: number, fwhmEv: number): void {
  const height = rest[at];
  for (let k = 0; k < rest.length; k++) {
    const z = (centresEv[k] - centresEv[at]) / fwhmEv;
    rest[k] -= height * exp(-4 * Math.LN2 * z * z);
  }
}
