/**
 * The sums of one band for the pixels of one tile: of counts and of variances, times powers of energy.
 * Two ways to the same sums: channel by channel, or from moments below the band's two ends.
 */
import type { BandPlan } from './band-plan';
import { type EndPair, scale, sumOnce, sumTwice } from './between-edges';
import { isCoarse } from './block-layout';
import type { BlockSums } from './block-sums';
import { type EdgeInProgress, type EdgeMoments, nearestEdge } from './edge-moments';
import { type HighPlanes, type LowPlanes, type MomentKernel, zeroNoData } from './moment-kernel';
import { type SlabData, writeVariances } from './slab-data';
import type { TileFloor } from './tile-floor';
import { type Tile, tileChannels } from './tiled-counts';

/** Moments below the first whole channel and below the last channel, for bands summed by difference. */
export interface BandEdges {
  readonly from: EdgeInProgress;
  readonly to: EdgeInProgress;
}

/** Which sums are wanted beside those of the counts. */
export interface WantedSums {
  readonly variances: boolean;
  /** third and fourth moments of the variances */
  readonly high: boolean;
}

/** Sums for one tile; every plane has one value per pixel. */
export class TileSums {
  /** Σ f c eʲ, j = 0 … 2; less the floor once it is taken */
  readonly counts: LowPlanes;
  /** Σ f² v eʲ, j = 0 … 4, of the counts as recorded */
  readonly variances: readonly Float64Array[];
  /** |Σ f c| and the floor's share of it together: what rounding of `counts` is measured by */
  readonly gross: Float64Array;
  readonly #data: SlabData;
  readonly #kernel: MomentKernel;
  /** the band's first and last channel: counts, and what their variances are made from */
  readonly #ends: readonly Float64Array[];
  readonly #weighed: readonly Float64Array[];
  readonly #partial: HighPlanes;

  constructor(data: SlabData, kernel: MomentKernel) {
    const plane = (): Float64Array => new Float64Array(data.tiled.tilePixels);
    this.#data = data;
    this.#kernel = kernel;
    this.counts = [plane(), plane(), plane()];
    this.variances = [plane(), plane(), plane(), plane(), plane()];
    this.gross = plane();
    this.#ends = [plane(), plane()];
    this.#weighed = data.sums?.variances == null ? this.#ends : [plane(), plane()];
    this.#partial = [plane(), plane()];
  }

  /** @param edges - null for a band summed channel by channel */
  compute(plan: BandPlan, edges: BandEdges | null, tile: Tile, wanted: WantedSums): void {
    if (edges === null) this.#bySpan(plan, tile, wanted);
    else this.#byEdges(plan, edges, tile, wanted);
    if (wanted.variances) this.#alongLine(plan, tile.pixels, wanted.high ? 5 : 3);
  }

  /** Takes the line under the band from the sums of counts. */
  takeFloor(floor: TileFloor, { pixels }: Tile): void {
    for (let p = 0; p < pixels; p++) {
      this.gross[p] = Math.abs(this.counts[0][p]) + Math.abs(floor.taken(p, 0));
      for (let order = 0; order < 3; order++) this.counts[order][p] -= floor.taken(p, order);
    }
  }

  #bySpan(plan: BandPlan, tile: Tile, wanted: WantedSums): void {
    const { context, affine, tiled } = this.#data;
    const { first, last, firstShare, lastShare } = plan.channels;
    const { pixels } = tile;
    const run = { pixels, k0: first, k1: last + 1 };
    const length = (run.k1 - first) * pixels;
    const counts = tileChannels(tiled, tile, first, run.k1);
    const shareEnds = (values: Float64Array): void => {
      scale(values, 0, pixels, firstShare);
      if (last > first) scale(values, length - pixels, length, lastShare);
    };
    if (wanted.variances && affine === null) {
      const values = this.#kernel.fill(counts);
      writeVariances(values, length, context.noise, values);
      // Shares enter squared.
      shareEnds(values);
      shareEnds(values);
      this.#keep(this.#kernel.low(run, plan.energies), this.variances, pixels, 0);
      if (wanted.high) this.#keep(this.#kernel.high(run, plan.energies), this.variances, pixels, 3);
    }
    const values = this.#kernel.fill(counts);
    if (!context.isUnsigned) zeroNoData(values, length);
    shareEnds(values);
    this.#keep(this.#kernel.low(run, plan.energies), this.counts, pixels, 0);
    if (!wanted.variances || affine === null) return;
    // Squared, not taken from the sums above: a difference would lose a small share's digits.
    shareEnds(values);
    this.#keep(this.#kernel.low(run, plan.energies), this.variances, pixels, 0);
    if (wanted.high) this.#keep(this.#kernel.high(run, plan.energies), this.variances, pixels, 3);
  }

  /** The kernel's results are overwritten by its next. */
  #keep(
    results: readonly Float64Array[],
    planes: readonly Float64Array[],
    pixels: number,
    from: number,
  ): void {
    for (const [order, result] of results.entries()) {
      planes[from + order].set(result.subarray(0, pixels));
    }
  }

  #byEdges(plan: BandPlan, edges: BandEdges, tile: Tile, wanted: WantedSums): void {
    const { firstShare, lastShare, first, last } = plan.channels;
    const from = edges.from.moments;
    const to = edges.to.moments;
    this.#readEnds(from, to, tile);
    const shares = { first: firstShare, last: lastShare };
    const squares = { first: firstShare * firstShare, last: lastShare * lastShare };
    const energies = { first: plan.energies[first], last: plan.energies[last] };
    const between = { below: from.counts, above: to.counts, energies, tile };
    if (from.variances === null || to.variances === null) {
      sumTwice(between, this.#ends, shares, this.counts, squares, this.variances);
    } else {
      sumOnce(between, this.#ends, shares, this.counts);
      const varying = { ...between, below: from.variances, above: to.variances };
      if (wanted.variances) sumOnce(varying, this.#weighed, squares, this.variances);
    }
    if (wanted.high) this.#highByEdges(plan, tile, squares);
  }

  /** No data as 0. */
  #readEnds(from: EdgeMoments, to: EdgeMoments, { first, pixels }: Tile): void {
    const { context } = this.#data;
    const [counts, lastCounts] = this.#ends;
    counts.set(from.below.subarray(first, first + pixels));
    lastCounts.set(to.above.subarray(first, first + pixels));
    if (this.#weighed !== this.#ends) {
      writeVariances(counts, pixels, context.noise, this.#weighed[0]);
      writeVariances(lastCounts, pixels, context.noise, this.#weighed[1]);
    }
    if (context.isUnsigned) return;
    zeroNoData(counts, pixels);
    zeroNoData(lastCounts, pixels);
  }

  #highByEdges({ channels, energies }: BandPlan, tile: Tile, squares: EndPair): void {
    const { sums } = this.#data;
    if (sums === null) return;
    const [, , , third, fourth] = this.variances;
    const [low3, low4] = this.#partial;
    const [first, last] = this.#weighed;
    this.#highBelow(sums, channels.last, tile, third, fourth);
    this.#highBelow(sums, channels.first + 1, tile, low3, low4);
    const e1 = energies[channels.first];
    const e2 = energies[channels.last];
    const cube1 = squares.first * e1 * e1 * e1;
    const cube2 = squares.last * e2 * e2 * e2;
    for (let p = 0; p < tile.pixels; p++) {
      third[p] = third[p] - low3[p] + (first[p] * cube1 + last[p] * cube2);
      fourth[p] = fourth[p] - low4[p] + (first[p] * cube1 * e1 + last[p] * cube2 * e2);
    }
  }

  /** Third and fourth moments of channels 0 … k − 1. */
  #highBelow(
    sums: BlockSums,
    k: number,
    tile: Tile,
    third: Float64Array,
    fourth: Float64Array,
  ): void {
    const { tiled, context, energies } = this.#data;
    const { layout } = sums;
    const { first, pixels } = tile;
    const nearest = nearestEdge(layout.edges, k, (index) => isCoarse(layout, index));
    const k0 = Math.min(k, nearest.k);
    const k1 = Math.max(k, nearest.k);
    const length = (k1 - k0) * pixels;
    const values = this.#kernel.fill(tileChannels(tiled, tile, k0, k1));
    if (sums.variances !== null) writeVariances(values, length, context.noise, values);
    else if (!context.isUnsigned) zeroNoData(values, length);
    const [partial3, partial4] = this.#kernel.high({ pixels, k0, k1 }, energies);
    const [kept3, kept4] = (nearest.index < 0 ? null : sums.high[nearest.index]) ?? [null, null];
    const sign = nearest.k <= k ? 1 : -1;
    for (let p = 0; p < pixels; p++) {
      third[p] = (kept3 === null ? 0 : kept3[first + p]) + sign * partial3[p];
      fourth[p] = (kept4 === null ? 0 : kept4[first + p]) + sign * partial4[p];
    }
  }

  /** From sums of counts to sums of variances, where these are a line of them. */
  #alongLine({ shareSquares }: BandPlan, pixels: number, orders: number): void {
    const { affine } = this.#data;
    if (affine === null || (affine.slope === 1 && affine.constant === 0)) return;
    for (let order = 0; order < orders; order++) {
      const plane = this.variances[order];
      const added = affine.constant * shareSquares[order];
      for (let p = 0; p < pixels; p++) plane[p] = affine.slope * plane[p] + added;
    }
  }
}
