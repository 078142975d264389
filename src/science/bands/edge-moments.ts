/**
 * Moments of all channels below any channel edge: the nearest kept sum, plus or less the channels
 * between. The two edges used last are remembered, so that dragging one end of a band computes that end
 * only; what is remembered is what would be computed again, bit for bit.
 */
import type { CountsArray } from '../scan';
import type { BlockSums, KeptPlanes, LowPlanes } from './block-sums';
import { lowMoments, zeroNoData } from './moment-kernels';
import { type SlabData, writeVariances } from './slab-data';
import { type Tile, tileAt, tileChannels } from './tiled-counts';

export interface EdgeMoments {
  readonly counts: LowPlanes;
  /** null where variances are a line of the counts */
  readonly variances: LowPlanes | null;
  /** counts of the channels just below and just above the edge; 0 beyond the axis */
  readonly below: CountsArray;
  readonly above: CountsArray;
}

interface Slot {
  /** −1 while empty */
  k: number;
  /** tiles done so far */
  tiles: number;
  readonly edge: EdgeMoments;
}

/** An edge's moments, made tile by tile as they are needed: what was just made is still at hand. */
export interface EdgeInProgress {
  readonly moments: EdgeMoments;
  /** Makes the moments of a tile's pixels; tiles must be asked for in order, from the first. */
  prepare(index: number): void;
}

export class EdgeCache {
  readonly #data: SlabData;
  readonly #sums: BlockSums;
  /** the one used last comes last */
  #slots: readonly Slot[];
  readonly #run: Float64Array;
  readonly #partial: LowPlanes;
  readonly #variances: Float64Array;

  constructor(data: SlabData, sums: BlockSums) {
    const { tiled } = data;
    const { edges } = sums.layout;
    this.#data = data;
    this.#sums = sums;
    this.#slots = [emptySlot(data, sums), emptySlot(data, sums)];
    // No edge is farther from a kept sum than half a block.
    this.#run = new Float64Array((edges[0] + 1) * tiled.tilePixels);
    this.#variances = new Float64Array(sums.variances === null ? 0 : this.#run.length);
    this.#partial = lowPlanes(tiled.tilePixels);
  }

  get bytes(): number {
    return this.#slots.reduce((sum, { edge }) => {
      const planes = [...edge.counts, ...(edge.variances ?? []), edge.below, edge.above];
      return sum + planes.reduce((bytes, { byteLength }) => bytes + byteLength, 0);
    }, 0);
  }

  /** Moments of channels 0 … k − 1. Valid until the next but one call with another k. */
  at(k: number): EdgeInProgress {
    const [oldest, newest] = this.#slots;
    const known = this.#slots.find((slot) => slot.k === k);
    const slot = known ?? oldest;
    if (known === undefined) {
      slot.k = k;
      slot.tiles = 0;
    }
    this.#slots = slot === newest ? this.#slots : [newest, slot];
    const nearest = nearestEdge(this.#sums.layout.edges, k, () => true);
    return {
      moments: slot.edge,
      prepare: (index) => {
        if (index < slot.tiles) return;
        this.#computeTile(k, nearest, tileAt(this.#data.tiled, index), slot.edge);
        slot.tiles = index + 1;
      },
    };
  }

  #computeTile(k: number, nearest: Nearest, tile: Tile, edge: EdgeMoments): void {
    const { context, energies, tiled } = this.#data;
    copyChannel(this.#data, tile, k - 1, edge.below);
    copyChannel(this.#data, tile, k, edge.above);
    const isBelow = nearest.k <= k;
    const run = {
      values: this.#run,
      pixels: tile.pixels,
      k0: Math.min(k, nearest.k),
      k1: Math.max(k, nearest.k),
    };
    tileChannels(tiled, tile, run.k0, run.k1, run.values);
    const length = (run.k1 - run.k0) * run.pixels;
    const [p0, p1, p2] = this.#partial;
    if (edge.variances !== null && this.#sums.variances !== null) {
      writeVariances(run.values, length, context.noise, this.#variances);
      lowMoments({ ...run, values: this.#variances }, energies, p0, p1, p2);
      const kept = nearest.index < 0 ? null : this.#sums.variances[nearest.index];
      combine(kept, this.#partial, isBelow, tile, edge.variances);
    }
    if (!context.isUnsigned) zeroNoData(run.values, length);
    lowMoments(run, energies, p0, p1, p2);
    const kept = nearest.index < 0 ? null : this.#sums.counts[nearest.index];
    combine(kept, this.#partial, isBelow, tile, edge.counts);
  }
}

interface Nearest {
  /** channels below the kept sum's edge */
  readonly k: number;
  /** which kept sum; −1 for the empty one at the start of the axis */
  readonly index: number;
}

/** The kept edge nearest to k among those that fit, the lower of two. */
export function nearestEdge(
  edges: Int32Array,
  k: number,
  fits: (index: number) => boolean,
): Nearest {
  let nearest: Nearest = { k: 0, index: -1 };
  for (let index = 0; index < edges.length; index++) {
    if (fits(index) && Math.abs(edges[index] - k) < Math.abs(nearest.k - k)) {
      nearest = { k: edges[index], index };
    }
  }
  return nearest;
}

function combine(
  kept: KeptPlanes | null,
  partial: LowPlanes,
  isBelow: boolean,
  { first, pixels }: Tile,
  out: LowPlanes,
): void {
  for (let order = 0; order < 3; order++) {
    const base = kept?.[order] ?? null;
    const part = partial[order];
    const plane = out[order];
    if (base === null) {
      for (let p = 0; p < pixels; p++) plane[first + p] = part[p];
    } else if (isBelow) {
      for (let p = 0; p < pixels; p++) plane[first + p] = base[first + p] + part[p];
    } else {
      for (let p = 0; p < pixels; p++) plane[first + p] = base[first + p] - part[p];
    }
  }
}

/** Counts of channel k of a tile's pixels into a plane of the slab; 0 beyond the axis. */
function copyChannel({ tiled }: SlabData, tile: Tile, k: number, plane: CountsArray): void {
  const { first, pixels, offset } = tile;
  if (k < 0 || k >= tiled.nk) plane.fill(0, first, first + pixels);
  else plane.set(tiled.counts.subarray(offset + k * pixels, offset + (k + 1) * pixels), first);
}

function lowPlanes(pixels: number): [Float64Array, Float64Array, Float64Array] {
  return [new Float64Array(pixels), new Float64Array(pixels), new Float64Array(pixels)];
}

function emptySlot({ tiled }: SlabData, sums: BlockSums): Slot {
  const typeOfCounts = tiled.counts.constructor as new (length: number) => CountsArray;
  return {
    k: -1,
    tiles: 0,
    edge: {
      counts: lowPlanes(tiled.pixels),
      variances: sums.variances === null ? null : lowPlanes(tiled.pixels),
      below: new typeOfCounts(tiled.pixels),
      above: new typeOfCounts(tiled.pixels),
    },
  };
}
