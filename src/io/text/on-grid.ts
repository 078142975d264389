/** Points in the order of the file at the pixels of their grid. */
import type { CountsArray } from '../../science/scan';
import type { ElementType } from '../container';
import { arrayOfType } from '../dtype';
import type { Grid } from './grid';
import type { PixelStretch } from './streamed-cube';

/** Rows of nk values at their pixels; no data where the file has no row. */
export function onGrid(
  rows: Float64Array,
  nk: number,
  { x, y, pixelOf }: Grid,
  type: ElementType,
): CountsArray {
  const out = new arrayOfType[type](x.length * y.length * nk);
  if (type === 'float64') out.fill(Number.NaN);
  pixelOf.forEach((pixel, row) => {
    out.set(rows.subarray(row * nk, (row + 1) * nk), pixel * nk);
  });
  return out;
}

/** A stretch given by point numbers, with the lowest and highest pixel among them. */
export function inPixels(stretch: PixelStretch, grid: Grid | null): PixelStretch {
  if (grid === null) return stretch;
  const pixels = grid.pixelOf.subarray(stretch.lowest, stretch.highest + 1);
  return {
    ...stretch,
    lowest: pixels.reduce((low, pixel) => Math.min(low, pixel), pixels[0]),
    highest: pixels.reduce((high, pixel) => Math.max(high, pixel), pixels[0]),
  };
}
