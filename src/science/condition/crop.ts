/** A part of the scan: an interval of the axis, some columns, some rows. */
import type { PositionAxis } from '../scan';
import type { ConditionedArray, ConditionedSlab, Grid } from './conditioned';
import { type ChannelRange, channelsWithin } from './read-noise';
import { type StepPlace, stepError } from './step-errors';

/** Indices from … to, both included. */
export type IndexRange = readonly [number, number];

export interface CropOptions {
  /** eV, in any order; channels whose centre lies inside are kept; null: all */
  readonly axisEv: readonly [number, number] | null;
  readonly x: IndexRange | null;
  readonly y: IndexRange | null;
}

/** What is kept, first ≤ index < end. */
export interface Crop {
  readonly x: ChannelRange;
  readonly y: ChannelRange;
  readonly k: ChannelRange;
}

/** @throws RimlightError 'recipe' - when nothing would be left, or indices are not in the scan */
export function planCrop(options: CropOptions, grid: Grid, place: StepPlace): Crop {
  const { ny, nx, nk } = grid.shape;
  const k =
    options.axisEv === null
      ? { first: 0, end: nk }
      : channelsWithin(grid.axis, options.axisEv, place);
  if (k.end - k.first < 2) {
    throw stepError(
      place,
      'a single channel would be left, and a spectrum needs two at least',
      'Widen the interval of the axis.',
    );
  }
  return {
    x: indicesOf(options.x, nx, 'column', place),
    y: indicesOf(options.y, ny, 'row', place),
    k,
  };
}

function indicesOf(
  range: IndexRange | null,
  length: number,
  what: string,
  place: StepPlace,
): ChannelRange {
  if (range === null) return { first: 0, end: length };
  const [first, last] = range;
  const isInside = (index: number): boolean =>
    Number.isInteger(index) && index >= 0 && index < length;
  if (isInside(first) && isInside(last) && first <= last) return { first, end: last + 1 };
  throw stepError(
    place,
    `${what}s ${first} to ${last} are not in a scan of ${length}`,
    `Give first and last ${what}, from 0 to ${length - 1}.`,
  );
}

/** The grid that is left; positions and channel edges stay where they were. */
export function croppedGrid(grid: Grid, { x, y, k }: Crop): Grid {
  return {
    ...grid,
    shape: { ny: y.end - y.first, nx: x.end - x.first, nk: k.end - k.first },
    axis: {
      centresEv: grid.axis.centresEv.slice(k.first, k.end),
      edgesEv: grid.axis.edgesEv.slice(k.first, k.end + 1),
    },
    x: croppedPositions(grid.x, x),
    y: croppedPositions(grid.y, y),
  };
}

function croppedPositions(axis: PositionAxis, { first, end }: ChannelRange): PositionAxis {
  if (axis.values === null && first === 0) return axis;
  const at = (index: number): number => axis.values?.[index] ?? index * axis.pitch;
  return { ...axis, values: Float64Array.from({ length: end - first }, (_, i) => at(first + i)) };
}

/**
 * The rows of a slab that are kept, on the grid that is left.
 *
 * @returns with no rows (ny = 0) for a slab outside
 */
export function cropSlab(slab: ConditionedSlab, crop: Crop): ConditionedSlab {
  const { ny, nx, nk } = slab.shape;
  const { x, y, k } = crop;
  const from = Math.min(Math.max(y.first, slab.y0), slab.y0 + ny);
  const to = Math.max(from, Math.min(y.end, slab.y0 + ny));
  const shape = { ny: to - from, nx: x.end - x.first, nk: k.end - k.first };
  const cut = <T extends ConditionedArray | Uint8Array>(array: T): T => {
    const out = array.slice(0, shape.ny * shape.nx * shape.nk) as T;
    let at = 0;
    for (let row = from - slab.y0; row < to - slab.y0; row++) {
      for (let column = x.first; column < x.end; column++) {
        const start = (row * nx + column) * nk;
        out.set(array.subarray(start + k.first, start + k.end), at);
        at += shape.nk;
      }
    }
    return out;
  };
  const { background } = slab;
  return {
    ...slab,
    y0: Math.max(0, from - y.first),
    shape,
    axis: {
      centresEv: slab.axis.centresEv.slice(k.first, k.end),
      edgesEv: slab.axis.edgesEv.slice(k.first, k.end + 1),
    },
    counts: cut(slab.counts),
    variances: slab.variances === null ? null : cut(slab.variances),
    factor: slab.factor.slice(k.first, k.end),
    background:
      background.kind === 'channel'
        ? { kind: 'channel', values: background.values.slice(k.first, k.end) }
        : { kind: 'pixel', values: cut(background.values) },
    replaced: slab.replaced === null ? null : cut(slab.replaced),
  };
}
