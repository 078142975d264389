/** Evenly spaced channels, and shapes evaluated on them. */
import type { FitGrid, Shape } from '../../../src/science/peaks/shape';
import { gridOf } from '../../../src/science/peaks/shape';

export function evenGrid(fromEv: number, toEv: number, count: number): FitGrid {
  const step = (toEv - fromEv) / count;
  const edgesEv = Float64Array.from({ length: count + 1 }, (_, k) => fromEv + k * step);
  const centresEv = Float64Array.from({ length: count }, (_, k) => fromEv + (k + 0.5) * step);
  return gridOf({ centresEv, edgesEv }, 0, count);
}

export function countsOf(shape: Shape, grid: FitGrid, values: readonly number[]): Float64Array {
  const counts = new Float64Array(grid.centresEv.length);
  shape.evaluate(grid, Float64Array.from(values), counts, null);
  return counts;
}

export function columnsOf(shape: Shape, grid: FitGrid, values: readonly number[]): Float64Array[] {
  const count = grid.centresEv.length;
  const columns = shape.parameters.map(() => new Float64Array(count));
  shape.evaluate(grid, Float64Array.from(values), new Float64Array(count), columns);
  return columns;
}

export const sum = (values: Float64Array): number =>
  values.reduce((total, value) => total + value, 0);
