/** A slab made ready for bands: counts in tiles, sums at block edges, and what is known of each pixel. */
import { type AffineVariance, affineVariance, varianceLine } from '../noise';
import type { CountsArray, EnergyAxis, NoiseModel, Slab } from '../scan';
import { blockLayout } from './block-layout';
import { type BlockSums, BlockSumsInProgress, blockSumsBytes, emptyBlockSums } from './block-sums';
import { type MomentKernel, zeroNoData } from './moment-kernel';
import { type SlabSurvey, SurveyInProgress } from './slab-survey';
import {
  type Tile,
  type TiledCounts,
  tileAt,
  tileChannels,
  tileCount,
  tilePixelsFor,
  turnTile,
} from './tiled-counts';

/** What is the same for every slab of a scan, so that its results do not depend on how rows are shared out. */
export interface SlabContext {
  readonly axis: EnergyAxis;
  readonly noise: NoiseModel;
  /** bytes a channel takes in memory, at least, by the element type of the file */
  readonly bytesPerChannel: number;
  /** whether every number is there, whole and not negative, by the element type of the file */
  readonly isUnsigned: boolean;
  /** the highest number that element type holds */
  readonly mostCounts: number;
}

export interface SlabData {
  readonly context: SlabContext;
  readonly tiled: TiledCounts;
  /** null where variances need their own sums, and without a noise model */
  readonly affine: AffineVariance | null;
  /** centres relative to `referenceEv`, eV, (nk) */
  readonly energies: Float64Array;
  /** the middle of the axis: small energies make small rounding errors */
  readonly referenceEv: number;
  /** `hasNoData`, `hasNegative` of each pixel; null where neither can be */
  readonly pixelFlags: Uint8Array | null;
  /** Σ |c| of each pixel, to judge rounding by; null where that is the total */
  readonly pixelScale: Float64Array | null;
  /** null for scans of few channels */
  readonly sums: BlockSums | null;
  /** bytes of sums, flags and scales */
  readonly sumsBytes: number;
  readonly survey: SlabSurvey;
}

/** Channels converted at a time where there are no blocks. */
const runChannels = 64;

/**
 * Prepares a slab in one pass, tile by tile. Takes over its counts: their order is changed in place,
 * and infinities become no data.
 *
 * A generator, so that its caller can pause between tiles: yields the share done, 0 to 1.
 *
 * @param kernel - for tiles of `tilePixelsFor` this many channels
 */
export function* prepareSlab(
  slab: Slab,
  context: SlabContext,
  kernel: MomentKernel,
): Generator<number, SlabData> {
  const { ny, nx, nk } = slab.shape;
  const tilePixels = tilePixelsFor(nk);
  const tiled: TiledCounts = { counts: slab.counts, pixels: ny * nx, nk, tilePixels };
  const { centresEv, edgesEv } = context.axis;
  const referenceEv = (edgesEv[0] + edgesEv[nk]) / 2;
  const energies = centresEv.map((centre) => centre - referenceEv);
  const affine = affineVariance(context.noise, context.isUnsigned);
  const hasOwnVariance = affine === null && context.noise.kind !== 'none';
  const need = { nk, hasOwnVariance, ...context };
  const layout = blockLayout(need);
  const survey = new SurveyInProgress(slab.shape, context.isUnsigned);
  const blocks =
    layout === null
      ? null
      : new BlockSumsInProgress(
          emptyBlockSums(layout, need, tiled.pixels, slab.counts),
          energies,
          kernel,
          tilePixels,
        );
  const edges = layout?.edges ?? plainEdges(nk);
  const pass = new TilePass(tiled, context, { survey, blocks, edges, kernel });
  for (let index = 0; index < tileCount(tiled); index++) {
    pass.prepare(tileAt(tiled, index));
    yield (index + 1) / tileCount(tiled);
  }
  const { pixelFlags, pixelScale } = survey;
  const sums = blocks?.sums ?? null;
  return {
    context,
    tiled,
    affine,
    energies,
    referenceEv,
    pixelFlags,
    pixelScale,
    sums,
    sumsBytes:
      (sums === null ? 0 : blockSumsBytes(sums)) +
      (pixelFlags?.byteLength ?? 0) +
      (pixelScale?.byteLength ?? 0),
    survey: survey.done(),
  };
}

function plainEdges(nk: number): Int32Array {
  const runs = Math.ceil(nk / runChannels);
  return Int32Array.from({ length: runs }, (_, run) => Math.min(nk, (run + 1) * runChannels));
}

interface PassParts {
  readonly survey: SurveyInProgress;
  readonly blocks: BlockSumsInProgress | null;
  readonly edges: Int32Array;
  readonly kernel: MomentKernel;
}

/** What is done to each tile. */
class TilePass {
  readonly #tiled: TiledCounts;
  readonly #context: SlabContext;
  readonly #parts: PassParts;
  readonly #spare: CountsArray;

  constructor(tiled: TiledCounts, context: SlabContext, parts: PassParts) {
    this.#tiled = tiled;
    this.#context = context;
    this.#parts = parts;
    this.#spare = tiled.counts.slice(0, tiled.tilePixels * tiled.nk);
  }

  prepare(tile: Tile): void {
    const { survey, blocks, edges, kernel } = this.#parts;
    const isFloat = dropInfinities(this.#tiled, tile);
    turnTile(this.#tiled, tile, this.#spare);
    blocks?.startTile();
    for (let block = 0; block < edges.length; block++) {
      const k0 = block === 0 ? 0 : edges[block - 1];
      const run = { pixels: tile.pixels, k0, k1: edges[block] };
      const length = (run.k1 - run.k0) * run.pixels;
      const counts = tileChannels(this.#tiled, tile, run.k0, run.k1);
      const values = kernel.fill(counts);
      survey.add(tile, run, values);
      if (blocks === null) continue;
      blocks.addHighest(block, tile, run, values);
      if (blocks.sums.variances !== null) {
        writeVariances(values, length, this.#context.noise, values);
        blocks.addVariances(block, tile, run);
        kernel.fill(counts);
      }
      if (isFloat) zeroNoData(values, length);
      blocks.addCounts(block, tile, run);
    }
  }
}

/** Variances of counts as `countVariance` gives them; no data as 0. In place where `out` is `counts`. */
export function writeVariances(
  counts: Float64Array,
  length: number,
  noise: NoiseModel,
  out: Float64Array,
): void {
  if (noise.kind === 'none') return;
  const { slope, offset, floor } = varianceLine(noise);
  for (let i = 0; i < length; i++) {
    const above = counts[i] - offset;
    out[i] = Number.isNaN(above) ? 0 : above < 0 ? floor : slope * above + floor;
  }
}

/** Whether the counts are floating, after making infinite ones no data. */
function dropInfinities({ counts, nk }: TiledCounts, { offset, pixels }: Tile): boolean {
  if (!(counts instanceof Float32Array) && !(counts instanceof Float64Array)) return false;
  for (let i = offset; i < offset + pixels * nk; i++) {
    if (Math.abs(counts[i]) === Number.POSITIVE_INFINITY) counts[i] = Number.NaN;
  }
  return true;
}
