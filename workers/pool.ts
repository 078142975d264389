/**
 * The engine the app and the command line use: a scan's rows shared out over workers, results put
 * together. One more worker looks into files, so that hashing or previewing one scan does not hold up
 * the maps of another.
 */
import { cancelledError, RimlightError, throwIfAborted } from '../src/errors';
import type { ScanPlan } from '../src/io/scan-plan';
import { overviewOf, splitRows } from './assemble';
import type {
  CallOptions,
  OpenScan,
  RowRange,
  ScanEngine,
  ScanInputs,
  WorkerReplaced,
} from './engine';
import { createOpenScan, type SlabSeat } from './open-scan';
import { combineProgress } from './progress';
import { Seat, type Spawn } from './seat';

export interface EngineOptions {
  /** workers that hold slabs; a scan of fewer rows uses as many as it has rows */
  readonly workerCount: number;
  readonly spawn: Spawn;
}

/**
 * Starts the workers at once, so that they are ready when the first scan comes. `close` ends them.
 *
 * @throws RimlightError 'usage' - when the number of workers is not a whole number of at least one
 */
export function createScanEngine({ workerCount, spawn }: EngineOptions): ScanEngine {
  if (!Number.isInteger(workerCount) || workerCount < 1) {
    throw new RimlightError('usage', {
      what: `${workerCount} workers are not possible`,
      where: '',
      hint: 'Give a whole number of at least one.',
    });
  }
  return new Pool(workerCount, spawn);
}

class Pool implements ScanEngine {
  readonly workerCount: number;
  readonly #seats: readonly Seat[];
  readonly #fileSeat: Seat;
  readonly #listeners = new Set<(event: WorkerReplaced) => void>();
  #lastId = 0;
  #isClosed = false;

  constructor(workerCount: number, spawn: Spawn) {
    const seat = (worker: number): Seat =>
      new Seat(
        spawn,
        () => this.#newId(),
        (reason) => {
          for (const listener of this.#listeners) listener({ worker, reason });
        },
      );
    this.workerCount = workerCount;
    this.#seats = Array.from({ length: workerCount }, (_, worker) => seat(worker));
    this.#fileSeat = seat(workerCount);
  }

  inspect: ScanEngine['inspect'] = (inputs, choices, options = {}) =>
    this.#onFile(`looking at ${inputs.scan.name}`, options, (callId) =>
      this.#fileSeat.call((engine) => engine.inspect(callId, inputs, choices)),
    );

  preview: ScanEngine['preview'] = (inputs, plan, options = {}) =>
    this.#onFile(`looking at ${inputs.scan.name}`, options, (callId) =>
      this.#fileSeat.call((engine) => engine.preview(callId, inputs, plan)),
    );

  sha256: ScanEngine['sha256'] = (source, options = {}) =>
    this.#onFile(`hashing ${source.name}`, options, (callId, onProgress) =>
      this.#fileSeat.call((engine) => engine.sha256(callId, source, onProgress)),
    );

  async open(inputs: ScanInputs, plan: ScanPlan, options: CallOptions = {}): Promise<OpenScan> {
    const what = `opening ${inputs.scan.name}`;
    this.#assertOpen();
    throwIfAborted(options.signal, what);
    const scanId = this.#newId();
    const rows = splitRows(plan.meta.shape.ny, this.workerCount);
    const slabs = rows.map((range, index): SlabSeat => ({ seat: this.#seats[index], rows: range }));
    try {
      const overview = await this.#loadAll(scanId, inputs, plan, slabs, options);
      throwIfAborted(options.signal, what);
      return createOpenScan(scanId, plan, overview, slabs, () => this.#newId());
    } catch (error) {
      await Promise.allSettled(slabs.map(({ seat }) => seat.release(scanId)));
      throw options.signal?.aborted === true ? cancelledError(what) : error;
    }
  }

  onWorkerReplaced(listener: (event: WorkerReplaced) => void): () => void {
    this.#listeners.add(listener);
    return () => this.#listeners.delete(listener);
  }

  async close(): Promise<void> {
    this.#isClosed = true;
    this.#listeners.clear();
    for (const seat of [...this.#seats, this.#fileSeat]) seat.close(cancelledError('the work'));
  }

  /** Every slab, and the height map beside them; the first failure stops the others. */
  async #loadAll(
    scanId: number,
    inputs: ScanInputs,
    plan: ScanPlan,
    slabs: readonly SlabSeat[],
    { signal, onProgress }: CallOptions,
  ) {
    const callId = this.#newId();
    const lengthOf = ({ y0, y1 }: RowRange): number => y1 - y0;
    const progress = combineProgress(
      slabs.map(({ rows }) => lengthOf(rows)),
      onProgress,
    );
    const stop = (): void => {
      for (const { seat } of slabs) seat.cancel(callId);
      this.#fileSeat.cancel(callId);
    };
    const failures: unknown[] = [];
    const orStop = async <T>(work: Promise<T>): Promise<T | null> => {
      try {
        return await work;
      } catch (error) {
        if (failures.length === 0) stop();
        failures.push(error);
        return null;
      }
    };
    signal?.addEventListener('abort', stop);
    try {
      const loads = slabs.map(({ seat, rows }, index) =>
        orStop(seat.load({ callId, scanId, inputs, plan, rows, onProgress: progress.part(index) })),
      );
      const height =
        plan.height === null
          ? null
          : orStop(this.#fileSeat.call((engine) => engine.height(callId, inputs, plan)));
      const summaries = (await Promise.all(loads)).filter((summary) => summary !== null);
      const map = await height;
      if (failures.length > 0) throw failures[0];
      progress.finish();
      return overviewOf(plan.meta, summaries, map);
    } finally {
      progress.drop();
      signal?.removeEventListener('abort', stop);
    }
  }

  /** A call on the worker for files, stopped by the signal. */
  async #onFile<T>(
    what: string,
    { signal, onProgress }: CallOptions,
    work: (callId: number, onProgress: (share: number) => void) => Promise<T>,
  ): Promise<T> {
    this.#assertOpen();
    throwIfAborted(signal, what);
    const callId = this.#newId();
    const progress = combineProgress([1], onProgress);
    const stop = (): void => this.#fileSeat.cancel(callId);
    signal?.addEventListener('abort', stop);
    try {
      const result = await work(callId, progress.part(0));
      throwIfAborted(signal, what);
      progress.finish();
      return result;
    } finally {
      progress.drop();
      signal?.removeEventListener('abort', stop);
    }
  }

  #newId(): number {
    this.#lastId++;
    return this.#lastId;
  }

  #assertOpen(): void {
    if (!this.#isClosed) return;
    throw new RimlightError('fault', {
      what: 'the engine was closed',
      where: '',
      hint: 'Please report this.',
    });
  }
}
