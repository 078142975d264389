/**
 * Sums over all channels below chosen channel edges, for every pixel: the difference of two of them is
 * a band's sum, whatever its width. Zeroth to second moments of the counts (and of the variances, where
 * these are not a line of the counts) at every edge, third and fourth of the variances at fewer, and
 * the highest count between neighbouring edges.
 */
import type { CountsArray } from '../scan';
import { type BlockLayout, hasSmallTotals, isCoarse, type SumsNeed } from './block-layout';
import type { HighPlanes, LowPlanes, MomentKernel, TileRun } from './moment-kernel';
import type { Tile } from './tiled-counts';

/** Zeroth, first and second moment; the zeroth may be a 32-bit whole number. */
export type KeptPlanes = readonly [Float64Array | Uint32Array, Float64Array, Float64Array];

/** Moments with energies relative to the slab's reference. Entry b is of all channels below layout.edges[b]. */
export interface BlockSums {
  readonly layout: BlockLayout;
  readonly counts: readonly KeptPlanes[];
  /** null where variances are a line of the counts */
  readonly variances: readonly LowPlanes[] | null;
  /** of the variances, or of the counts where variances are a line of them; null between coarse edges */
  readonly high: readonly (HighPlanes | null)[];
  /** highest count from edge b − 1 to edge b, no data left out; the type's lowest, or −Infinity, where there is none */
  readonly highest: readonly CountsArray[];
  /** how many channels above edge b − 1 it lies, the first of equal ones */
  readonly highestAt: readonly Uint16Array[];
}

export function emptyBlockSums(
  layout: BlockLayout,
  need: SumsNeed,
  pixels: number,
  like: CountsArray,
): BlockSums {
  const blocks = Array.from(layout.edges);
  const plane = (): Float64Array => new Float64Array(pixels);
  const isSmall = hasSmallTotals(need);
  const counts = (): KeptPlanes => [isSmall ? new Uint32Array(pixels) : plane(), plane(), plane()];
  const typeOfCounts = like.constructor as new (length: number) => CountsArray;
  return {
    layout,
    counts: blocks.map(counts),
    variances: need.hasOwnVariance
      ? blocks.map((): LowPlanes => [plane(), plane(), plane()])
      : null,
    high: blocks.map((_, b): HighPlanes | null =>
      isCoarse(layout, b) ? [plane(), plane()] : null,
    ),
    highest: blocks.map(() => new typeOfCounts(pixels)),
    highestAt: blocks.map(() => new Uint16Array(pixels)),
  };
}

export function blockSumsBytes({ counts, variances, high, highest, highestAt }: BlockSums): number {
  const all = [counts, variances ?? [], high.filter((pair) => pair !== null)].flat(2);
  return [...all, ...highest, ...highestAt].reduce((sum, { byteLength }) => sum + byteLength, 0);
}

/**
 * A running sum of blocks for the pixels of a tile, kept with its rounding error, so that the sums at
 * the far end of the axis are as exact as at its start.
 *
 * @see A. Neumaier, Rundungsfehleranalyse einiger Verfahren zur Summation endlicher Summen, ZAMM 54, 39 (1974)
 */
export class RunningSum {
  readonly #sum: Float64Array;
  readonly #error: Float64Array;

  constructor(pixels: number) {
    this.#sum = new Float64Array(pixels);
    this.#error = new Float64Array(pixels);
  }

  reset(): void {
    this.#sum.fill(0);
    this.#error.fill(0);
  }

  /** Adds one value a pixel, and writes the sums so far to `plane` from `first`. */
  add(
    values: Float64Array,
    pixels: number,
    plane: Float64Array | Uint32Array | null,
    first: number,
  ): void {
    const sum = this.#sum;
    const error = this.#error;
    for (let p = 0; p < pixels; p++) {
      const before = sum[p];
      const value = values[p];
      const after = before + value;
      error[p] +=
        Math.abs(before) >= Math.abs(value) ? before - after + value : value - after + before;
      sum[p] = after;
      if (plane !== null) plane[first + p] = after + error[p];
    }
  }
}

/** Fills block sums tile by tile. */
export class BlockSumsInProgress {
  readonly sums: BlockSums;
  readonly #energies: Float64Array;
  readonly #kernel: MomentKernel;
  readonly #best: Float64Array;
  readonly #counts: readonly RunningSum[];
  readonly #variances: readonly RunningSum[];
  readonly #high: readonly RunningSum[];

  /** @param energies - (nk) relative to the reference */
  constructor(sums: BlockSums, energies: Float64Array, kernel: MomentKernel, tilePixels: number) {
    const running = (count: number): RunningSum[] =>
      Array.from({ length: count }, () => new RunningSum(tilePixels));
    this.sums = sums;
    this.#energies = energies;
    this.#kernel = kernel;
    this.#best = new Float64Array(tilePixels);
    this.#counts = running(3);
    this.#variances = running(3);
    this.#high = running(2);
  }

  startTile(): void {
    for (const sum of [...this.#counts, ...this.#variances, ...this.#high]) sum.reset();
  }

  /** The highest counts of a block; no data is NaN in `values`, the run's channels. */
  addHighest(
    block: number,
    { first }: Tile,
    { pixels, k0, k1 }: TileRun,
    values: Float64Array,
  ): void {
    const place = this.sums.highestAt[block];
    const best = this.#best;
    best.fill(Number.NEGATIVE_INFINITY, 0, pixels);
    let at = 0;
    for (let k = k0; k < k1; k++) {
      for (let p = 0; p < pixels; p++) {
        const v = values[at++];
        if (v > best[p]) {
          best[p] = v;
          place[first + p] = k - k0;
        }
      }
    }
    this.sums.highest[block].set(best.subarray(0, pixels), first);
  }

  /** Counts of a block from the kernel's input; no data as 0. */
  addCounts(block: number, tile: Tile, run: TileRun): void {
    this.#addLow(this.sums.counts[block], this.#counts, run, tile);
    if (this.sums.variances === null) this.#addHigh(block, run, tile);
  }

  /** Variances likewise, where they are no line of the counts. */
  addVariances(block: number, tile: Tile, run: TileRun): void {
    if (this.sums.variances === null) return;
    this.#addLow(this.sums.variances[block], this.#variances, run, tile);
    this.#addHigh(block, run, tile);
  }

  #addLow(kept: KeptPlanes, running: readonly RunningSum[], run: TileRun, { first }: Tile): void {
    for (const [order, moment] of this.#kernel.low(run, this.#energies).entries()) {
      running[order].add(moment, run.pixels, kept[order], first);
    }
  }

  #addHigh(block: number, run: TileRun, { first }: Tile): void {
    const kept = this.sums.high[block];
    for (const [order, moment] of this.#kernel.high(run, this.#energies).entries()) {
      this.#high[order].add(moment, run.pixels, kept?.[order] ?? null, first);
    }
  }
}
