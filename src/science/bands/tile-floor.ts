/** The line under a band with floor "ends", for the pixels of one tile. */
import { countVariance } from '../noise';
import type { BandPlan, FloorTerms } from './band-plan';
import { zeroNoData } from './moment-kernel';
import { type SlabData, writeVariances } from './slab-data';
import { type Tile, tileChannels } from './tiled-counts';

const mostEnds = 3;

export class TileFloor {
  readonly #data: SlabData;
  /** (ends, pixels) counts, then variances, of the channels of each end */
  readonly #left: Float64Array;
  readonly #right: Float64Array;
  readonly #leftVariances: Float64Array;
  readonly #rightVariances: Float64Array;
  /** (pixels) counts of each end's channels together */
  readonly #leftCounts: Float64Array;
  readonly #rightCounts: Float64Array;
  #at: { readonly plan: BandPlan; readonly floor: FloorTerms; readonly tile: Tile } | null = null;

  constructor(data: SlabData) {
    const planes = (count: number): Float64Array => new Float64Array(count * data.tiled.tilePixels);
    this.#data = data;
    this.#left = planes(mostEnds);
    this.#right = planes(mostEnds);
    this.#leftVariances = planes(mostEnds);
    this.#rightVariances = planes(mostEnds);
    this.#leftCounts = planes(1);
    this.#rightCounts = planes(1);
  }

  /** Reads the ends of a tile's pixels; no data as 0. */
  read(plan: BandPlan, floor: FloorTerms, tile: Tile): void {
    const { first, last } = plan.channels;
    const { ends } = floor;
    const { pixels } = tile;
    this.#at = { plan, floor, tile };
    this.#readEnd(tile, first, ends, this.#left, this.#leftVariances);
    this.#readEnd(tile, last + 1 - ends, ends, this.#right, this.#rightVariances);
    for (let p = 0; p < pixels; p++) {
      let left = 0;
      let right = 0;
      for (let at = p; at < ends * pixels; at += pixels) {
        left += this.#left[at];
        right += this.#right[at];
      }
      this.#leftCounts[p] = left;
      this.#rightCounts[p] = right;
    }
  }

  /** Σ f line eʲ of one pixel. */
  taken(pixel: number, order: number): number {
    if (this.#at === null) return 0;
    const { leftTerms, rightTerms } = this.#at.floor;
    return (
      this.#leftCounts[pixel] * leftTerms[order] + this.#rightCounts[pixel] * rightTerms[order]
    );
  }

  /** |counts| of the channels of both ends. */
  endCounts(pixel: number): number {
    return Math.abs(this.#leftCounts[pixel]) + Math.abs(this.#rightCounts[pixel]);
  }

  /** Counts of the line at channel k. */
  lineAt(pixel: number, k: number): number {
    if (this.#at === null) return 0;
    const { leftWeights, rightWeights } = this.#at.floor;
    return this.#leftCounts[pixel] * leftWeights[k] + this.#rightCounts[pixel] * rightWeights[k];
  }

  /** Takes the line from channels k0 ≤ k < k1, (channels, pixels). */
  subtractFrom(run: Float64Array, k0: number, k1: number): void {
    if (this.#at === null) return;
    const { floor, tile } = this.#at;
    const { pixels } = tile;
    let at = 0;
    for (let k = k0; k < k1; k++) {
      const left = floor.leftWeights[k];
      const right = floor.rightWeights[k];
      for (let p = 0; p < pixels; p++) {
        run[at++] -= this.#leftCounts[p] * left + this.#rightCounts[p] * right;
      }
    }
  }

  /**
   * What the line adds to the variance of Σ f (c − line) q(e), q(e) = a0 + a1 e + a2 e², beyond
   * Σ f² v q²: its own variance, less what it shares with the end channels.
   */
  extraVariance(pixel: number, a0: number, a1: number, a2: number): number {
    if (this.#at === null) return 0;
    const { plan, floor, tile } = this.#at;
    const { pixels } = tile;
    const { first, last, firstShare, lastShare } = plan.channels;
    const { ends, leftTerms: left, rightTerms: right } = floor;
    const byLeft = a0 * left[0] + a1 * left[1] + a2 * left[2];
    const byRight = a0 * right[0] + a1 * right[1] + a2 * right[2];
    let sum = 0;
    for (let i = 0; i < ends; i++) {
      const e1 = plan.energies[first + i];
      const q1 = (i === 0 ? firstShare : 1) * (a0 + a1 * e1 + a2 * (e1 * e1));
      sum += byLeft * (byLeft - 2 * q1) * this.#leftVariances[i * pixels + pixel];
      const e2 = plan.energies[last + 1 - ends + i];
      const q2 = (i === ends - 1 ? lastShare : 1) * (a0 + a1 * e2 + a2 * (e2 * e2));
      sum += byRight * (byRight - 2 * q2) * this.#rightVariances[i * pixels + pixel];
    }
    return sum;
  }

  /** Variance of the counts of channel k less the line there. */
  netVariance(pixel: number, k: number): number {
    if (this.#at === null) return Number.NaN;
    const { plan, floor, tile } = this.#at;
    const { first, last } = plan.channels;
    const left = floor.leftWeights[k];
    const right = floor.rightWeights[k];
    let isEnd = false;
    let sum = 0;
    for (let i = 0; i < floor.ends; i++) {
      const isLeft = first + i === k;
      const isRight = last + 1 - floor.ends + i === k;
      isEnd ||= isLeft || isRight;
      const byLeft = (isLeft ? 1 : 0) - left;
      const byRight = (isRight && first < last ? 1 : 0) - right;
      sum += byLeft * byLeft * this.#leftVariances[i * tile.pixels + pixel];
      sum += byRight * byRight * this.#rightVariances[i * tile.pixels + pixel];
    }
    if (isEnd) return sum;
    const counts = this.#data.tiled.counts[tile.offset + k * tile.pixels + pixel];
    return sum + countVariance(counts, this.#data.context.noise);
  }

  #readEnd(
    tile: Tile,
    k: number,
    ends: number,
    counts: Float64Array,
    variances: Float64Array,
  ): void {
    const { tiled, context } = this.#data;
    const length = ends * tile.pixels;
    counts.set(tileChannels(tiled, tile, k, k + ends));
    writeVariances(counts, length, context.noise, variances);
    if (!context.isUnsigned) zeroNoData(counts, length);
  }
}
