/**
 * Moments of all channels below any channel edge: the nearest kept sum, plus or less the channels
 * between. The two edges used last are remembered, so that dragging one end of a band computes that end
 * only; what is remembered is what would be computed again, bit for bit.
 */
import type { CountsArray } from '../scan';
import type { BlockSums, KeptPlanes } from './block-sums';
import { type LowPlanes, type MomentKernel, zeroNoData } from './moment-kernel';
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
  readonly #kernel: MomentKernel;

  constructor(data: SlabData, sums: BlockSums, kernel: MomentKernel) {
    this.#data = data;
    this.#sums = sums;
    this.#slots = [emptySlot(data, sums), emptySlot(data, sums)];
    this.#kernel = kernel;
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
    const k0 = Math.min(k, nearest.k);
    const run = { pixels: tile.pixels, k0, k1: Math.max(k, nearest.k) };
    const length = (run.k1 - k0) * run.pixels;
    const counts = tileChannels(tiled, tile, k0, run.k1);
    if (edge.variances !== null && this.#sums.variances !== null) {
      const values = this.#kernel.fill(counts);
      writeVariances(values, length, context.noise, values);
      const kept = nearest.index < 0 ? null : this.#sums.variances[nearest.index];
      combine(kept, this.#kernel.low(run, energies), isBelow, tile, edge.variances);
    }
    const values = this.#kernel.fill(counts);
    if (!context.isUnsigned) zeroNoData(values, length);
    const kept = nearest.index < 0 ? null : this.#sums.counts[nearest.index];
    combine(kept, this.#kernel.low(run, energies), isBelow, tile, edge.counts);
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

/** Kept sums and the channels between: added where these lie above the kept edge, else taken away. */
function combine(
  kept: KeptPlanes | null,
  [part0, part1, part2]: LowPlanes,
  isBelow: boolean,
  tile: Tile,
  [out0, out1, out2]: LowPlanes,
): void {
  if (kept === null) {
    for (let p = 0; p < tile.pixels; p++) {
      out0[tile.first + p] = part0[p];
      out1[tile.first + p] = part1[p];
      out2[tile.first + p] = part2[p];
    }
    return;
  }
  const sign = isBelow ? 1 : -1;
  combineZeroth(kept[0], part0, sign, tile, out0);
  combineHigher(kept[1], part1, sign, tile, out1);
  combineHigher(kept[2], part2, sign, tile, out2);
}

/** Two functions for one sum: each then sees one type of array only, and is compiled for it. */
function combineZeroth(
  kept: Float64Array | Uint32Array,
  part: Float64Array,
  sign: number,
  { first, pixels }: Tile,
  out: Float64Array,
): void {
  for (let p = 0; p < pixels; p++) out[first + p] = kept[first + p] + sign * part[p];
}

function combineHigher(
  kept: Float64Array,
  part: Float64Array,
  sign: number,
  { first, pixels }: Tile,
  out: Float64Array,
): void {
  for (let p = 0; p < pixels; p++) out[first + p] = kept[first + p] + sign * part[p];
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
