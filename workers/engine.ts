/**
 * The engine's two interfaces and the plain data that cross them, nothing else.
 * `WorkerEngine` is what one worker offers (over comlink); `ScanEngine` is the pool of them that the
 * app and the command line use. Neither knows whether it runs in a browser or in Node.
 */

import type { ScanChoices } from '../src/io/scan-choices';
import type { Inspection, Preview, ScanPlan } from '../src/io/scan-plan';
import type { BandQuantity, EnergyBand } from '../src/science/bands/band';
import type { FitPlan } from '../src/science/fit/fit-plan';
import type { PixelFit } from '../src/science/fit/pixel-fit';
import type { DerivedMap, PixelMap, ScanMeta } from '../src/science/scan';

/** A file a worker can open by itself; a Blob crosses without its bytes being copied. */
export type SourceHandle =
  | { readonly kind: 'blob'; readonly name: string; readonly blob: Blob }
  | { readonly kind: 'path'; readonly name: string; readonly path: string }
  | { readonly kind: 'memory'; readonly name: string; readonly bytes: Uint8Array };

/** The scan file, and the files its recipe may name: an axis, a height map, a dark spectrum. */
export interface ScanInputs {
  readonly scan: SourceHandle;
  readonly companions: readonly SourceHandle[];
}

/** Rows y0 ≤ y < y1. */
export interface RowRange {
  readonly y0: number;
  readonly y1: number;
}

export interface Pixel {
  readonly y: number;
  readonly x: number;
}

export interface BandRequest {
  readonly band: EnergyBand;
  readonly quantities: readonly BandQuantity[];
}

/** One quantity over the rows asked for; errors null where there is no noise model or no error is defined. */
export interface BandMap {
  readonly quantity: BandQuantity;
  readonly values: Float64Array;
  readonly errors: Float64Array | null;
}

/** Fitted pixels, as they come. */
export interface FitTile {
  /** numbers of the pixels on the whole scan, y × nx + x */
  readonly pixels: Int32Array;
  /** one row for each, as `recordLayout` says */
  readonly records: Float64Array;
}

/** Rows of fitted pixels of a worker's rows, (rows × nx × record length), status 0 where there is none; null for nothing. */
export type FitKnown = Float64Array | null;

/** What a worker says of the slab it has just loaded. */
export interface SlabSummary {
  readonly rows: RowRange;
  /** bytes of counts, and of the block sums beside them */
  readonly countsBytes: number;
  readonly sumsBytes: number;
  /** (rows × nx) counts in all channels */
  readonly totals: Float64Array;
  /** (rows × nk) each row's spectra summed in x order, skipping no data; summed in row order they give the scan's mean, whatever the number of workers */
  readonly rowSums: Float64Array;
  /** (rows × nk) how many pixels of the row had data there */
  readonly rowPixels: Uint32Array;
  readonly minCounts: number;
  readonly maxCounts: number;
  readonly noDataValues: number;
  readonly isWholeNumbers: boolean;
}

/**
 * Offered by each worker. `callId` names a call so that `cancel` can stop it: long calls look between
 * blocks of pixels. Progress comes as a share, 0 to 1, through one proxied callback per call.
 */
export interface WorkerEngine {
  inspect(callId: number, inputs: ScanInputs, choices: ScanChoices): Promise<Inspection>;
  preview(callId: number, inputs: ScanInputs, plan: ScanPlan): Promise<Preview>;
  sha256(
    callId: number,
    source: SourceHandle,
    onProgress: (share: number) => void,
  ): Promise<string>;
  load(
    callId: number,
    scanId: number,
    inputs: ScanInputs,
    plan: ScanPlan,
    rows: RowRange,
    onProgress: (share: number) => void,
  ): Promise<SlabSummary>;
  /** The whole height map of the scan, nm, shifted as the plan says; not a slab. */
  height(callId: number, inputs: ScanInputs, plan: ScanPlan): Promise<PixelMap>;
  /** @param withErrors - false where counts turned out not to be counts, so that there is no noise model */
  bandMaps(scanId: number, request: BandRequest, withErrors: boolean): Promise<readonly BandMap[]>;
  /** (nk) counts of one pixel of this worker's rows. */
  spectrum(scanId: number, pixel: Pixel): Promise<Float64Array>;
  /** Per-row sums over the pixels of `mask` (rows × nx, 1 = take), and how many, as in SlabSummary. */
  maskedRowSums(
    scanId: number,
    mask: Uint8Array,
  ): Promise<{ readonly sums: Float64Array; readonly pixels: Uint32Array }>;
  /**
   * Fits the nodes in this worker's rows (`fit-order.ts`), but for those known; tiles come as they are done, all of them
   * before it resolves.
   *
   * @returns false when it was stopped
   */
  fitNodes(
    callId: number,
    scanId: number,
    plan: FitPlan,
    known: FitKnown,
    onTile: (tile: FitTile) => Promise<void>,
  ): Promise<boolean>;
  /**
   * The same for the other pixels.
   *
   * @param nodes - rows of all of the scan's nodes
   * @param usualChi2r - reduced χ² of most nodes
   */
  fitRows(
    callId: number,
    scanId: number,
    plan: FitPlan,
    nodes: Float64Array,
    usualChi2r: number,
    known: FitKnown,
    onTile: (tile: FitTile) => Promise<void>,
  ): Promise<boolean>;
  release(scanId: number): Promise<void>;
  cancel(callId: number): Promise<void>;
}

export interface CallOptions {
  readonly signal?: AbortSignal;
  readonly onProgress?: (share: number) => void;
}

/** What is known of a scan as soon as it is open, beyond its counts. */
export interface ScanOverview {
  readonly meta: ScanMeta;
  readonly totals: PixelMap;
  readonly height: PixelMap | null;
  /** (nk) mean over all pixels, no data left out */
  readonly meanSpectrum: Float64Array;
  readonly countsBytes: number;
  readonly sumsBytes: number;
  readonly minCounts: number;
  readonly maxCounts: number;
  readonly noDataValues: number;
  /** what only the whole cube could tell, one sentence each */
  readonly warnings: readonly string[];
}

export type { PixelFit };

/** A model fitted to every pixel, or to as many as there was time for. */
export interface ScanFit {
  /** as asked, with a start for every centre and width */
  readonly plan: FitPlan;
  /** by their names in the contract, in the recipe's order; the arrays fill up while the fit runs */
  readonly maps: readonly DerivedMap[];
  /** −2 ln L beside that of a perfect fit, Σ r² for uniform noise; free parameters that were not at a bound */
  readonly deviance: PixelMap;
  readonly freeCount: PixelMap;
  /** pixels of each status, 0 to 4 */
  readonly statusCounts: readonly number[];
  /** false where it was stopped; handed back as `previous`, it goes on */
  readonly isWhole: boolean;
}

export interface FitOptions extends CallOptions {
  /** Told of the maps, the same arrays each time, and which pixels are new in them. */
  readonly onMaps?: (maps: readonly DerivedMap[], pixels: Int32Array) => void;
  /** a fit of the same plan that was stopped: its pixels are kept */
  readonly previous?: ScanFit;
}

/** One open scan, spread over the pool's workers. */
export interface OpenScan {
  readonly plan: ScanPlan;
  readonly overview: ScanOverview;
  /** Whole maps of one band, in the order asked. */
  bandMaps(request: BandRequest, options?: CallOptions): Promise<readonly BandMap[]>;
  spectrum(pixel: Pixel): Promise<Float64Array>;
  /**
   * Fits every pixel: nodes of a coarse grid first, then the rest. What is missing of the plan's starts
   * is estimated from the mean spectrum. Does not depend on the number of workers. A stop keeps what is done.
   */
  fit(plan: FitPlan, options?: FitOptions): Promise<ScanFit>;
  /**
   * One pixel's fit in full, close to the minimum; from a fit of the scan's values there, where one is given.
   */
  fitPixel(plan: FitPlan, pixel: Pixel, from?: ScanFit): Promise<PixelFit>;
  /** Mean spectrum of the pixels of `mask` (ny × nx, 1 = take); NaN where none had data. */
  meanSpectrum(mask: Uint8Array): Promise<Float64Array>;
  release(): Promise<void>;
}

/** A worker that crashed was replaced and its rows were loaded again; said to the user. */
export interface WorkerReplaced {
  readonly worker: number;
  readonly reason: string;
}

export interface ScanEngine {
  readonly workerCount: number;
  inspect(inputs: ScanInputs, choices: ScanChoices, options?: CallOptions): Promise<Inspection>;
  preview(inputs: ScanInputs, plan: ScanPlan, options?: CallOptions): Promise<Preview>;
  sha256(source: SourceHandle, options?: CallOptions): Promise<string>;
  /** Loads every slab; rejects, leaving nothing behind, when one cannot be loaded. */
  open(inputs: ScanInputs, plan: ScanPlan, options?: CallOptions): Promise<OpenScan>;
  onWorkerReplaced(listener: (event: WorkerReplaced) => void): () => void;
  close(): Promise<void>;
}
