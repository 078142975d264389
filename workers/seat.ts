/**
 * One place in the pool and whoever sits there: a worker, and after it crashed its replacement with the
 * same slabs. A call interrupted by a crash is made once more.
 */
import type { Endpoint } from 'comlink';
import { ensureRimlightError, RimlightError } from '../src/errors';
import type { ScanPlan } from '../src/io/scan-plan';
import type { RowRange, ScanInputs, SlabSummary, WorkerEngine } from './engine';
import { connectEngine } from './wire-engine';

/** A running worker, as an environment starts it. */
export interface SpawnedWorker {
  readonly endpoint: Endpoint;
  /** Told at most once, when the worker ends or fails by itself. */
  onDeath(listener: (reason: string) => void): void;
  terminate(): void;
}

export type Spawn = () => SpawnedWorker;

/** What a replacement has to load again. */
interface Holding {
  readonly inputs: ScanInputs;
  readonly plan: ScanPlan;
  readonly rows: RowRange;
}

export interface LoadRequest extends Holding {
  readonly callId: number;
  readonly scanId: number;
  readonly onProgress: (share: number) => void;
}

/** Thrown to the seat itself when its worker dies under a call. */
class WorkerDied extends Error {}

/** A worker with the calls it has not answered. */
class Sitter {
  readonly engine: WorkerEngine;
  /** has its slabs and answered a call: worth replacing at once when it dies */
  isProven = false;
  readonly #worker: SpawnedWorker;
  readonly #unanswered = new Set<(error: Error) => void>();
  #end: Error | null = null;

  constructor(worker: SpawnedWorker, onDeath: (death: WorkerDied) => void) {
    this.#worker = worker;
    this.engine = connectEngine(worker.endpoint).engine;
    worker.onDeath((reason) => {
      if (this.#end !== null) return;
      const death = new WorkerDied(reason);
      this.stop(death);
      onDeath(death);
    });
  }

  call<T>(work: (engine: WorkerEngine) => Promise<T>): Promise<T> {
    return new Promise((resolve, reject) => {
      if (this.#end !== null) {
        reject(this.#end);
        return;
      }
      this.#unanswered.add(reject);
      work(this.engine)
        .then(resolve, reject)
        .finally(() => this.#unanswered.delete(reject));
    });
  }

  /** Ends the worker; calls without an answer, and later ones, reject. */
  stop(error: Error): void {
    if (this.#end !== null) return;
    this.#end = error;
    this.#worker.terminate();
    for (const reject of this.#unanswered) reject(error);
    this.#unanswered.clear();
  }
}

export class Seat {
  readonly #spawn: Spawn;
  readonly #newCallId: () => number;
  readonly #onReplaced: (reason: string) => void;
  readonly #holdings = new Map<number, Holding>();
  /** scans that could not be loaded again, and why */
  readonly #lost = new Map<number, RimlightError>();
  /** the worker, once its slabs are loaded; rejects with WorkerDied where there is none */
  #present: Promise<Sitter>;
  /** the same at once, for what must not wait: a stop */
  #newest: Sitter;
  #isClosed = false;

  constructor(spawn: Spawn, newCallId: () => number, onReplaced: (reason: string) => void) {
    this.#spawn = spawn;
    this.#newCallId = newCallId;
    this.#onReplaced = onReplaced;
    this.#newest = this.#seatOne();
    this.#present = Promise.resolve(this.#newest);
  }

  /**
   * Makes a call; once more when the worker dies under it.
   *
   * @throws RimlightError 'fault' - when it dies again; what the call itself throws
   */
  async call<T>(work: (engine: WorkerEngine) => Promise<T>): Promise<T> {
    try {
      return await this.#callOnce(work);
    } catch (error) {
      if (!(error instanceof WorkerDied)) throw error;
    }
    try {
      return await this.#callOnce(work);
    } catch (error) {
      throw error instanceof WorkerDied ? diedAgain(error) : error;
    }
  }

  /** The same for a scan that was loaded here. */
  async callOn<T>(scanId: number, work: (engine: WorkerEngine) => Promise<T>): Promise<T> {
    return this.call((engine) => {
      const lost = this.#lost.get(scanId);
      return lost === undefined ? work(engine) : Promise.reject(lost);
    });
  }

  /** Loads a slab, which a replacement will then load too. */
  async load(request: LoadRequest): Promise<SlabSummary> {
    const { callId, scanId, inputs, plan, rows, onProgress } = request;
    const summary = await this.call((engine) =>
      engine.load(callId, scanId, inputs, plan, rows, onProgress),
    );
    this.#holdings.set(scanId, { inputs, plan, rows });
    return summary;
  }

  async release(scanId: number): Promise<void> {
    this.#holdings.delete(scanId);
    this.#lost.delete(scanId);
    await this.call((engine) => engine.release(scanId));
  }

  /** Passes on a stop, without waiting; a worker that is gone has stopped already. */
  cancel(callId: number): void {
    this.#newest.call((engine) => engine.cancel(callId)).catch(() => undefined);
  }

  close(error: RimlightError): void {
    this.#isClosed = true;
    this.#holdings.clear();
    this.#newest.stop(error);
  }

  async #callOnce<T>(work: (engine: WorkerEngine) => Promise<T>): Promise<T> {
    const sitter = await this.#sitter();
    const answer = await sitter.call(work);
    sitter.isProven = true;
    return answer;
  }

  /** The worker; where there is none, because the last one died before it did anything, another is tried. */
  async #sitter(): Promise<Sitter> {
    const present = this.#present;
    try {
      return await present;
    } catch (error) {
      if (this.#isClosed || !(error instanceof WorkerDied)) throw error;
      if (this.#present === present) this.#replace(error.message);
      return this.#present;
    }
  }

  #seatOne(): Sitter {
    const sitter: Sitter = new Sitter(this.#spawn(), (death) => {
      if (this.#isClosed) return;
      // One that never did anything would only be followed by others like it, without end.
      if (sitter.isProven) this.#replace(death.message);
      else this.#setPresent(Promise.reject(death));
    });
    return sitter;
  }

  #replace(reason: string): void {
    const sitter = this.#seatOne();
    this.#newest = sitter;
    this.#setPresent(this.#reload(sitter));
    this.#onReplaced(reason);
  }

  #setPresent(present: Promise<Sitter>): void {
    this.#present = present;
    // Whoever calls next is told.
    present.catch(() => undefined);
  }

  async #reload(sitter: Sitter): Promise<Sitter> {
    for (const [scanId, { inputs, plan, rows }] of [...this.#holdings]) {
      const callId = this.#newCallId();
      try {
        await sitter.call((engine) =>
          engine.load(callId, scanId, inputs, plan, rows, () => undefined),
        );
      } catch (error) {
        if (error instanceof WorkerDied) throw error;
        this.#holdings.delete(scanId);
        this.#lost.set(scanId, ensureRimlightError(error));
      }
    }
    return sitter;
  }
}

function diedAgain(cause: WorkerDied): RimlightError {
  return new RimlightError(
    'fault',
    {
      what: `a worker stopped twice under the same call: ${cause.message}`,
      where: '',
      hint: 'Close other programs if memory is short, or open a smaller part of the scan.',
    },
    { cause },
  );
}
