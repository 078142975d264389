/** The highest channel of a band for one tile's pixels: whole blocks by their kept maxima, channels at the ends. */
import { countVariance } from '../noise';
import type { BandPlan } from './band-plan';
import { leastLeft } from './floor-line';
import type { SlabData } from './slab-data';
import type { TileFloor } from './tile-floor';
import type { MapInProgress } from './tile-moments';
import { type Tile, tileChannels } from './tiled-counts';

/** NaN for a pixel without data in the band. */
export class TilePeak {
  readonly #data: SlabData;
  readonly #best: Float64Array;
  /** channel of the best so far */
  readonly #where: Int32Array;
  #run = new Float64Array(0);

  constructor(data: SlabData) {
    this.#data = data;
    this.#best = new Float64Array(data.tiled.tilePixels);
    this.#where = new Int32Array(data.tiled.tilePixels);
  }

  /**
   * @param floor - of this tile; null for floor "none"
   * @param maps - of `peak` and `peak_at`
   */
  write(plan: BandPlan, floor: TileFloor | null, tile: Tile, maps: readonly MapInProgress[]): void {
    const { axis, noise } = this.#data.context;
    const { first, last } = plan.channels;
    this.#best.fill(Number.NEGATIVE_INFINITY);
    if (floor === null) this.#search(first, last, tile);
    else this.#takeChannels(first, last + 1, tile, floor);
    for (let p = 0; p < tile.pixels; p++) {
      const at = tile.first + p;
      const best = this.#best[p];
      const k = this.#where[p];
      const isThere = best !== Number.NEGATIVE_INFINITY;
      for (const { quantity, values, errors } of maps) {
        if (!isThere) values[at] = Number.NaN;
        else values[at] = quantity === 'peak' ? best : axis.centresEv[k];
        if (errors === null) continue;
        const variance = floor === null ? countVariance(best, noise) : floor.netVariance(p, k);
        errors[at] = isThere ? Math.sqrt(variance) : Number.NaN;
      }
    }
  }

  /** Through the band upwards, so that the first of equal channels stays. */
  #search(first: number, last: number, tile: Tile): void {
    const edges = this.#data.sums?.layout.edges ?? new Int32Array(0);
    let k = first;
    for (let block = 0; block < edges.length && k <= last; block++) {
      const start = block === 0 ? 0 : edges[block - 1];
      if (edges[block] <= k) continue;
      if (start === k && edges[block] <= last + 1) this.#takeBlock(block, start, tile);
      else this.#takeChannels(k, Math.min(edges[block], last + 1), tile, null);
      k = edges[block];
    }
    if (k <= last) this.#takeChannels(k, last + 1, tile, null);
  }

  #takeBlock(block: number, start: number, tile: Tile): void {
    const highest = this.#data.sums?.highest[block];
    const places = this.#data.sums?.highestAt[block];
    if (highest === undefined || places === undefined) return;
    for (let p = 0; p < tile.pixels; p++) {
      const value = highest[tile.first + p];
      if (value > this.#best[p]) {
        this.#best[p] = value;
        this.#where[p] = start + places[tile.first + p];
      }
    }
  }

  #takeChannels(k0: number, k1: number, tile: Tile, floor: TileFloor | null): void {
    const { pixels } = tile;
    const length = (k1 - k0) * pixels;
    if (this.#run.length < length) this.#run = new Float64Array(length);
    const run = this.#run;
    run.set(tileChannels(this.#data.tiled, tile, k0, k1));
    if (floor !== null) floor.subtractFrom(run, k0, k1);
    for (let p = 0; p < pixels; p++) {
      // Counts alike but for rounding are equal: the first stays.
      const least = floor === null ? 0 : leastLeft(floor.endCounts(p));
      let best = this.#best[p];
      let where = this.#where[p];
      let at = p;
      for (let k = k0; k < k1; k++) {
        if (run[at] - best > least) {
          best = run[at];
          where = k;
        }
        at += pixels;
      }
      this.#best[p] = best;
      this.#where[p] = where;
    }
  }
}
