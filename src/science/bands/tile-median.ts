/** The half-count energy of one tile's pixels: the block by its kept sums, then the channel within it. */
import type { BandPlan } from './band-plan';
import type { BandEdges } from './band-sums';
import { leastLeft } from './floor-line';
import { trusted } from './magnitudes';
import type { SlabData } from './slab-data';
import { hasNegative } from './slab-survey';
import type { TileFloor } from './tile-floor';
import {
  byDefinition,
  bySpan,
  errorOf,
  type MapInProgress,
  type MomentInputs,
} from './tile-moments';
import type { Tile } from './tiled-counts';

/**
 * Medians of a band.
 *
 * Where counts, or counts less the floor, may be negative, the running sum can cross N/2 more than
 * once: the first crossing counts, and the band is gone through channel by channel.
 *
 * @param edges - null for a band summed channel by channel
 */
export function writeMedians(
  data: SlabData,
  inputs: MomentInputs,
  edges: BandEdges | null,
  { values, errors, doubts }: MapInProgress,
): void {
  const { pixelFlags, context } = data;
  const { edgesEv } = context.axis;
  const { plan, tile, sums, floor, magnitudes, isExact, isRepeat } = inputs;
  const [integrals] = sums.counts;
  const [variances] = sums.variances;
  const search = new MedianSearch(data, plan, edges, tile, floor);
  for (let p = 0; p < tile.pixels; p++) {
    if (isRepeat && doubts[p] !== bySpan) continue;
    const at = tile.first + p;
    const integral = integrals[p];
    values[at] = Number.NaN;
    if (errors !== null) errors[at] = Number.NaN;
    const scale = magnitudes?.counts[at] ?? 0;
    if (!isExact && scale > 0 && !(Math.abs(integral) > trusted * scale)) {
      if (doubts[p] === 0) doubts[p] = bySpan;
      continue;
    }
    const least = leastLeft(floor === null ? integral : sums.gross[p]);
    if (!(integral > (floor === null ? 0 : least))) continue;
    const isRising =
      floor === null && (pixelFlags === null || (pixelFlags[at] & hasNegative) === 0);
    if (!search.find(p, integral / 2, least, isRising)) {
      doubts[p] = byDefinition;
      continue;
    }
    const { k, share } = search;
    const fromEv = Math.max(edgesEv[k], plan.channels.fromEv);
    const toEv = Math.min(edgesEv[k + 1], plan.channels.toEv);
    values[at] = fromEv + share * (toEv - fromEv);
    if (errors === null) continue;
    const extra = floor === null ? 0 : floor.extraVariance(p, 1, 0, 0);
    errors[at] = (0.5 * errorOf(variances[p], extra)) / densityAround(data, inputs, p, k);
  }
}

/** Finds the channel in which the running sum reaches a number of counts. */
class MedianSearch {
  /** the channel found, and how far into its covered part the median lies, 0 to 1 */
  k = 0;
  share = 0;
  readonly #counts: SlabData['tiled']['counts'];
  readonly #plan: BandPlan;
  readonly #tile: Tile;
  readonly #floor: TileFloor | null;
  /** sums of all counts below the band's first whole channel; null where none are kept */
  readonly #below: Float64Array | null;
  /** kept sums of counts at channel edges inside the band, ascending */
  readonly #edges: readonly number[];
  readonly #sums: readonly (Float64Array | Uint32Array)[];

  constructor(
    data: SlabData,
    plan: BandPlan,
    edges: BandEdges | null,
    tile: Tile,
    floor: TileFloor | null,
  ) {
    const { first, last } = plan.channels;
    const kept = edges === null ? null : data.sums;
    const inside = Array.from(kept?.layout.edges ?? [], (edge, index) => ({ edge, index })).filter(
      ({ edge }) => edge > first + 1 && edge <= last,
    );
    this.#counts = data.tiled.counts;
    this.#plan = plan;
    this.#tile = tile;
    this.#floor = floor;
    this.#below = edges?.from.moments.counts[0] ?? null;
    this.#edges = inside.map(({ edge }) => edge);
    this.#sums = inside.flatMap(({ index }) => (kept === null ? [] : [kept.counts[index][0]]));
  }

  /**
   * False where rounding hides the crossing.
   *
   * @param least - counts too few to decide whether the running sum touches N/2
   */
  find(pixel: number, half: number, least: number, isRising: boolean): boolean {
    const reached = half - least;
    const { first, last, firstShare, lastShare } = this.#plan.channels;
    const atFirst = this.#net(pixel, first) * firstShare;
    if (atFirst >= reached) return this.#found(first, half, 0, atFirst);
    const start = isRising ? this.#lastBelow(this.#tile.first + pixel, reached - atFirst) : -1;
    let running = atFirst + (start < 0 ? 0 : this.#between(start, this.#tile.first + pixel));
    for (let k = start < 0 ? first + 1 : this.#edges[start]; k <= last; k++) {
      const counts = this.#net(pixel, k);
      const here = k === last ? counts * lastShare : counts;
      if (running + here >= reached) return this.#found(k, half, running, here);
      running += here;
    }
    return false;
  }

  /** Counts of a channel less the floor; no data as 0. */
  #net(pixel: number, k: number): number {
    const counts = this.#counts[this.#tile.offset + k * this.#tile.pixels + pixel];
    if (this.#floor !== null) return counts - this.#floor.lineAt(pixel, k);
    return Number.isNaN(counts) ? 0 : counts;
  }

  #found(k: number, half: number, running: number, here: number): boolean {
    this.k = k;
    this.share = Math.min(1, (half - running) / here);
    return true;
  }

  /** Counts of whole channels of the band below edge number `index`. */
  #between(index: number, at: number): number {
    return this.#sums[index][at] - (this.#below?.[at] ?? 0);
  }

  /** The last edge below which fewer than `counts` lie; −1 for none. */
  #lastBelow(at: number, counts: number): number {
    let low = -1;
    let high = this.#edges.length - 1;
    while (low < high) {
      const middle = (low + high + 1) >> 1;
      if (this.#between(middle, at) < counts) low = middle;
      else high = middle - 1;
    }
    return low;
  }
}

/** Counts per eV, less the floor, from the five channels around k (fewer at the axis' ends); NaN where they hold none. */
function densityAround(
  { tiled, context }: SlabData,
  { tile, floor }: MomentInputs,
  pixel: number,
  k: number,
): number {
  const { edgesEv } = context.axis;
  let sum = 0;
  let widthEv = 0;
  for (let near = Math.max(0, k - 2); near <= Math.min(tiled.nk - 1, k + 2); near++) {
    const counts = tiled.counts[tile.offset + near * tile.pixels + pixel];
    if (Number.isNaN(counts)) continue;
    sum += floor === null ? counts : counts - floor.lineAt(pixel, near);
    widthEv += edgesEv[near + 1] - edgesEv[near];
  }
  const least = floor === null ? 0 : leastLeft(floor.endCounts(pixel));
  return sum > least ? sum / widthEv : Number.NaN;
}
