/** Band maps of a slab, all quantities, at a cost that hardly depends on the band's width. */
import type { BandQuantity, EnergyBand } from './band';
import { type BandChannels, bandChannels } from './band-channels';
import { type BandPlan, planBand } from './band-plan';
import { type BandEdges, TileSums, type WantedSums } from './band-sums';
import { directBand } from './direct-band';
import { EdgeCache } from './edge-moments';
import { Magnitudes } from './magnitudes';
import type { MomentKernel } from './moment-kernel';
import type { SlabData } from './slab-data';
import { hasNoData } from './slab-survey';
import { TileFloor } from './tile-floor';
import { writeMedians } from './tile-median';
import {
  byDefinition,
  bySpan,
  type MapInProgress,
  type MomentInputs,
  writeCentroids,
  writeIntegrals,
  writeSpreads,
} from './tile-moments';
import { TilePeak } from './tile-peak';
import { hasMissing, pixelSpectrum, type Tile, tileAt, tileCount } from './tiled-counts';

/** One quantity of every pixel of the slab, (ny × nx). */
export interface QuantityMap {
  readonly quantity: BandQuantity;
  /** counts for `integral` and `peak`, eV for the others; NaN where there is no value */
  readonly values: Float64Array;
  /** one sigma; null without a noise model, and for `peak_at` */
  readonly errors: Float64Array | null;
}

/** A band on this scan, and the ways its sums are made. */
interface PlannedBand {
  readonly band: EnergyBand;
  /** for integral, centroid and median */
  readonly low: BandPlan;
  /** for the spread, whose fourth moments are kept at fewer edges */
  readonly high: BandPlan;
  /** channel by channel: what the other two are where the band is narrow */
  readonly span: BandPlan;
  /** null where both are summed channel by channel */
  readonly edges: BandEdges | null;
}

/**
 * Band maps by `directBand`'s definitions, from kept sums.
 *
 * Equal bits for equal pixel, band and scan: not depending on the slab's rows, on what was asked before,
 * or on which quantities are asked together. Against the definition: integrals of whole numbers are
 * exact but for the shares at the ends; other values to about 1e-12 of their scale, errors to about
 * 1e-11 (a spread's to 1e-9). Pixels where sums would lose more are computed by the definition itself.
 */
export class SlabBands {
  readonly data: SlabData;
  readonly #edges: EdgeCache | null;
  readonly #sums: TileSums;
  readonly #floor: TileFloor;
  readonly #magnitudes: Magnitudes | null;
  readonly #peak: TilePeak;
  readonly #spectrum: Float64Array;

  /** @param kernel - as the slab was prepared with; not to be used by others meanwhile */
  constructor(data: SlabData, kernel: MomentKernel) {
    this.data = data;
    this.#edges = data.sums === null ? null : new EdgeCache(data, data.sums, kernel);
    this.#sums = new TileSums(data, kernel);
    this.#floor = new TileFloor(data);
    this.#magnitudes = data.sums === null ? null : new Magnitudes(data, data.sums);
    this.#peak = new TilePeak(data);
    this.#spectrum = new Float64Array(data.tiled.nk);
  }

  /** Bytes kept beside the counts. */
  get sumsBytes(): number {
    return this.data.sumsBytes + (this.#edges?.bytes ?? 0);
  }

  /**
   * The maps asked for, in that order.
   *
   * @param withErrors - false leaves all errors out, as where counts turned out not to be counts
   */
  maps(
    band: EnergyBand,
    quantities: readonly BandQuantity[],
    withErrors = true,
  ): readonly QuantityMap[] {
    const { context, tiled } = this.data;
    const hasErrors = withErrors && context.noise.kind !== 'none';
    const maps = quantities.map(
      (quantity): MapInProgress => ({
        quantity,
        values: new Float64Array(tiled.pixels),
        errors: hasErrors && quantity !== 'peak_at' ? new Float64Array(tiled.pixels) : null,
        doubts: new Uint8Array(tiled.tilePixels),
      }),
    );
    const channels = bandChannels(context.axis, band);
    if (channels === null) {
      for (const { values, errors } of maps) {
        values.fill(Number.NaN);
        errors?.fill(Number.NaN);
      }
    } else {
      const planned = this.#plan(band, channels);
      for (let index = 0; index < tileCount(tiled); index++) {
        planned.edges?.from.prepare(index);
        planned.edges?.to.prepare(index);
        this.#writeTile(planned, tileAt(tiled, index), maps, hasErrors);
      }
    }
    return maps.map(({ quantity, values, errors }) => ({ quantity, values, errors }));
  }

  #plan(band: EnergyBand, channels: BandChannels): PlannedBand {
    const { context, sums } = this.data;
    const inside = channels.last - channels.first - 1;
    const planOf = (isSpan: boolean): BandPlan =>
      planBand(context.axis, channels, band.floor, isSpan, this.data);
    const span = planOf(true);
    if (sums === null || this.#edges === null || inside <= sums.layout.spanChannels) {
      return { band, low: span, high: span, span, edges: null };
    }
    const low = planOf(false);
    return {
      band,
      low,
      high: inside <= sums.layout.coarseSpanChannels ? span : low,
      span,
      edges: { from: this.#edges.at(channels.first + 1), to: this.#edges.at(channels.last) },
    };
  }

  #writeTile(
    planned: PlannedBand,
    tile: Tile,
    maps: readonly MapInProgress[],
    hasErrors: boolean,
  ): void {
    const { low, high } = planned;
    const of = (quantities: readonly BandQuantity[]): MapInProgress[] =>
      maps.filter(({ quantity }) => quantities.includes(quantity));
    const lows = of(['integral', 'centroid', 'median']);
    const spreads = of(['spread']);
    const peaks = of(['peak', 'peak_at']);
    for (const { doubts } of maps) doubts.fill(0);
    if (low === high) this.#writeGroup(planned, low, tile, [...lows, ...spreads], hasErrors);
    else {
      this.#writeGroup(planned, low, tile, lows, hasErrors);
      this.#writeGroup(planned, high, tile, spreads, hasErrors);
    }
    if (peaks.length > 0) {
      const floor = this.#floorOf(planned.span, tile);
      if (floor !== null)
        for (const map of peaks) this.#doubtMissing(map, planned.span, tile, null);
      this.#peak.write(planned.span, floor, tile, peaks);
    }
    this.#writeByDefinition(planned.band, tile, maps);
  }

  /** Quantities that stand on the same sums; pixels that lose digits by them once more, channel by channel. */
  #writeGroup(
    planned: PlannedBand,
    plan: BandPlan,
    tile: Tile,
    maps: readonly MapInProgress[],
    hasErrors: boolean,
  ): void {
    if (maps.length === 0) return;
    const hasSpread = maps.some(({ quantity }) => quantity === 'spread');
    const wanted = { variances: hasErrors, high: hasErrors && hasSpread };
    const edges = plan.isSpan ? null : planned.edges;
    const inputs = this.#sumUp(plan, edges, tile, wanted, false);
    for (const map of maps) this.#write(map, inputs, edges);
    if (plan.isSpan) return;
    const doubtful = maps.filter(({ doubts }) => doubts.includes(bySpan));
    if (doubtful.length === 0) return;
    const again = this.#sumUp(planned.span, null, tile, wanted, true);
    for (const map of doubtful) this.#write(map, again, null);
  }

  #write(map: MapInProgress, inputs: MomentInputs, edges: BandEdges | null): void {
    this.#doubtMissing(map, inputs.plan, inputs.tile, inputs);
    if (map.quantity === 'integral') writeIntegrals(inputs, map);
    else if (map.quantity === 'centroid') writeCentroids(inputs, map);
    else if (map.quantity === 'spread') writeSpreads(inputs, map);
    else writeMedians(this.data, inputs, edges, map);
  }

  #sumUp(
    plan: BandPlan,
    edges: BandEdges | null,
    tile: Tile,
    wanted: WantedSums,
    isRepeat: boolean,
  ): MomentInputs {
    this.#sums.compute(plan, edges, tile, wanted);
    const floor = this.#floorOf(plan, tile);
    if (floor !== null) this.#sums.takeFloor(floor, tile);
    return {
      plan,
      tile,
      sums: this.#sums,
      floor,
      magnitudes: plan.isSpan ? null : this.#magnitudes,
      isExact: this.data.context.isUnsigned,
      isRepeat,
    };
  }

  #floorOf(plan: BandPlan, tile: Tile): TileFloor | null {
    if (plan.floor === null) return null;
    this.#floor.read(plan, plan.floor, tile);
    return this.#floor;
  }

  /**
   * Missing channels: a line needs those at its ends and its weights assume all others, and a sum of 0
   * may be that of no channel at all.
   */
  #doubtMissing(
    { doubts }: MapInProgress,
    { channels, floor }: BandPlan,
    tile: Tile,
    inputs: MomentInputs | null,
  ): void {
    const { pixelFlags, tiled } = this.data;
    if (pixelFlags === null) return;
    for (let p = 0; p < tile.pixels; p++) {
      if ((pixelFlags[tile.first + p] & hasNoData) === 0) continue;
      if (inputs?.isRepeat && doubts[p] !== bySpan) continue;
      const isMissing =
        floor === null
          ? inputs?.sums.counts[0][p] === 0
          : hasMissing(tiled, tile, p, channels.first, channels.last);
      if (isMissing) doubts[p] = byDefinition;
    }
  }

  #writeByDefinition(band: EnergyBand, tile: Tile, maps: readonly MapInProgress[]): void {
    const { context, tiled } = this.data;
    const wanted = maps.filter(({ doubts }) => doubts.includes(byDefinition));
    for (let p = 0; p < tile.pixels && wanted.length > 0; p++) {
      if (!wanted.some(({ doubts }) => doubts[p] === byDefinition)) continue;
      const at = tile.first + p;
      const counts = pixelSpectrum(tiled, at, this.#spectrum);
      const direct = directBand(counts, context.axis, band, context.noise);
      for (const { quantity, values, errors, doubts } of wanted) {
        if (doubts[p] !== byDefinition) continue;
        values[at] = direct[quantity].value;
        if (errors !== null) errors[at] = direct[quantity].error;
      }
    }
  }
}
