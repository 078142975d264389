/** A fit of the whole scan: nodes of all workers first, put together and handed to all of them, then their rows. */
import { throwIfAborted } from '../src/errors';
import { completeStarts } from '../src/science/fit/estimate-starts';
import { createFitModel } from '../src/science/fit/fit-model';
import { nodesInRows } from '../src/science/fit/fit-order';
import { type FitPlan, fitStatus } from '../src/science/fit/fit-plan';
import { qualityAt, recordLayout } from '../src/science/fit/fit-record';
import type { EnergyAxis } from '../src/science/scan';
import { quantiles } from '../src/science/statistics/quantile';
import type {
  FitKnown,
  FitOptions,
  FitTile,
  Pixel,
  RowRange,
  ScanFit,
  ScanOverview,
  WorkerEngine,
} from './engine';
import { FitPlanes, recordOfMaps } from './fit-maps';
import type { SlabSeat } from './open-scan';

export interface ScanToFit {
  readonly scanId: number;
  readonly overview: ScanOverview;
  readonly slabs: readonly SlabSeat[];
  readonly newCallId: () => number;
}

type OnTile = (tile: FitTile) => Promise<void>;
/** One worker's part of a call. */
type Part = (
  engine: WorkerEngine,
  callId: number,
  known: FitKnown,
  onTile: OnTile,
) => Promise<boolean>;

/**
 * Fits every pixel.
 *
 * @throws RimlightError 'cancelled' - when it was stopped before it began; later a stop gives what is done
 */
export async function fitScan(
  scan: ScanToFit,
  asked: FitPlan,
  options: FitOptions,
): Promise<ScanFit> {
  const { overview, scanId } = scan;
  throwIfAborted(options.signal, `fitting ${overview.meta.name}`);
  const run = new FitRun(scan, asked, options);
  const { plan } = run;
  const hasNodes = await run.each((engine, callId, known, onTile) =>
    engine.fitNodes(callId, scanId, plan, known, onTile),
  );
  if (!hasNodes) return run.result(false);
  const { records, usualChi2r } = run.nodes();
  const isWhole = await run.each((engine, callId, known, onTile) =>
    engine.fitRows(callId, scanId, plan, records, usualChi2r, known, onTile),
  );
  return run.result(isWhole);
}

/** One run over the scan, and what has come of it. */
class FitRun {
  readonly plan: FitPlan;
  readonly #scan: ScanToFit;
  readonly #options: FitOptions;
  readonly #planes: FitPlanes;
  readonly #isDone: Uint8Array;
  readonly #maps: ScanFit['maps'];
  #done = 0;

  constructor(scan: ScanToFit, asked: FitPlan, options: FitOptions) {
    const { meta, meanSpectrum } = scan.overview;
    const model = createFitModel(asked, meta.axis);
    const mean = meanSpectrum.slice(asked.firstChannel, asked.endChannel);
    this.plan = completeStarts(model, mean);
    this.#scan = scan;
    this.#options = options;
    this.#planes = new FitPlanes(recordLayout(model), meta.shape);
    this.#isDone = new Uint8Array(meta.shape.ny * meta.shape.nx);
    this.#maps = this.#planes.maps(asked, meta.quantity);
    if (options.previous !== undefined) this.#takeOver(options.previous);
  }

  /** Every worker's part at once; the signal stops them all. @returns whether none was stopped */
  async each(part: Part): Promise<boolean> {
    const { slabs, scanId, newCallId } = this.#scan;
    const { signal } = this.#options;
    const callId = newCallId();
    const stop = (): void => {
      for (const { seat } of slabs) seat.cancel(callId);
    };
    signal?.addEventListener('abort', stop);
    try {
      if (signal?.aborted === true) return false;
      const parts = await Promise.all(
        slabs.map(({ seat, rows }) =>
          seat.callOn(scanId, (engine) => part(engine, callId, this.#knownOf(rows), this.#take)),
        ),
      );
      return parts.every((isWhole) => isWhole);
    } catch (error) {
      stop();
      throw error;
    } finally {
      signal?.removeEventListener('abort', stop);
    }
  }

  /** The nodes' rows of numbers, and the reduced χ² of most of them. */
  nodes(): { readonly records: Float64Array; readonly usualChi2r: number } {
    const { shape } = this.#scan.overview.meta;
    const { layout } = this.#planes;
    const pixels = nodesInRows(shape, 0, shape.ny).map(({ y, x }) => y * shape.nx + x);
    const records = this.#planes.records(pixels);
    const [chi2rAt, statusAt] = [qualityAt(layout, 'chi2r'), qualityAt(layout, 'status')];
    const chi2r = pixels.flatMap((_, i) => {
      const status = records[i * layout.length + statusAt];
      const isFit = status === fitStatus.converged || status === fitStatus.atBound;
      return isFit ? [records[i * layout.length + chi2rAt]] : [];
    });
    const [usualChi2r] = quantiles(Float64Array.from(chi2r), [0.5]);
    return { records, usualChi2r };
  }

  result(isWhole: boolean): ScanFit {
    const statusCounts = new Array<number>(5).fill(0);
    for (const status of this.#planes.statuses) statusCounts[status]++;
    if (isWhole) this.#options.onProgress?.(1);
    return {
      plan: this.plan,
      maps: this.#maps,
      deviance: this.#planes.plane('deviance'),
      freeCount: this.#planes.plane('freeCount'),
      statusCounts,
      isWhole,
    };
  }

  readonly #take = async ({ pixels, records }: FitTile): Promise<void> => {
    this.#planes.put(pixels, records);
    for (const pixel of pixels) {
      // A worker that crashed sends its pixels again.
      if (this.#isDone[pixel] === 0) this.#done++;
      this.#isDone[pixel] = 1;
    }
    this.#options.onMaps?.(this.#maps, pixels);
    const share = this.#done / this.#isDone.length;
    if (share < 1) this.#options.onProgress?.(share);
  };

  #takeOver({ maps, deviance, freeCount }: ScanFit): void {
    const { layout } = this.#planes;
    const [deviances, freeCounts] = [qualityAt(layout, 'deviance'), qualityAt(layout, 'freeCount')];
    for (let pixel = 0; pixel < this.#isDone.length; pixel++) {
      const record = recordOfMaps(layout, maps, pixel);
      if (record[qualityAt(layout, 'status')] === fitStatus.notFitted) continue;
      record[deviances] = deviance.values[pixel];
      record[freeCounts] = freeCount.values[pixel];
      this.#planes.put(Int32Array.of(pixel), record);
      this.#isDone[pixel] = 1;
      this.#done++;
    }
  }

  /** What is fitted of some rows; null where nothing is. */
  #knownOf({ y0, y1 }: RowRange): FitKnown {
    const { nx } = this.#scan.overview.meta.shape;
    const isAny = this.#isDone.subarray(y0 * nx, y1 * nx).includes(1);
    if (!isAny || this.#options.previous === undefined) return null;
    return this.#planes.records(Array.from({ length: (y1 - y0) * nx }, (_, i) => y0 * nx + i));
  }
}

/** The values of a fit at one pixel, as another fit of it begins with. */
export function startOfPixel(
  { maps, plan }: ScanFit,
  axis: EnergyAxis,
  { y, x }: Pixel,
): Float64Array {
  const nx = maps[0]?.nx ?? 0;
  return recordOfMaps(recordLayout(createFitModel(plan, axis)), maps, y * nx + x);
}
