/** Moving the free parameters along a step: within bounds, with what is tied to them, and not too far at once. */
import { type FitLayout, type FitModel, followTies } from './fit-model';

/** The share of the step that moves no peak further than it is wide. */
export function stride(
  { strides }: FitModel,
  { free }: FitLayout,
  values: Float64Array,
  step: Float64Array,
): number {
  let share = 1;
  for (let i = 0; i < free.length; i++) {
    const widths = strides[free[i]];
    if (widths.length === 0) continue;
    let most = 0;
    for (let w = 0; w < widths.length; w++) most += Math.abs(values[widths[w]]);
    const length = Math.abs(step[i]);
    if (most > 0 && length * share > most) share = most / length;
  }
  return share;
}

/** @param to - (parameters) overwritten */
export function move(
  { plan, least, most }: FitModel,
  { free }: FitLayout,
  from: Float64Array,
  step: Float64Array,
  share: number,
  to: Float64Array,
): void {
  to.set(from);
  for (let i = 0; i < free.length; i++) {
    const index = free[i];
    to[index] = clip(from[index] + share * step[i], least[index], most[index]);
  }
  followTies(plan, to);
}

export function clip(value: number, least: number, most: number): number {
  return Math.min(Math.max(value, least), most);
}
