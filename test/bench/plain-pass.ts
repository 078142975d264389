/** What a band is held against: one plain pass that sums each pixel's channels, alone or in threads. */
import { isMainThread, parentPort, Worker, workerData } from 'node:worker_threads';
import { cubeShape, syntheticCounts } from './synthetic-cube';

/** Counts of each pixel in all channels: one loop, nothing else. */
export function plainTotals(counts: Uint16Array, nk: number, totals: Float64Array): void {
  let at = 0;
  for (let pixel = 0; pixel < totals.length; pixel++) {
    let sum = 0;
    for (const end = at + nk; at < end; at++) sum += counts[at];
    totals[pixel] = sum;
  }
}

interface PlainData {
  readonly plainRows: number;
}

/** Whether this program runs as one of the threads below; then it has done its work. */
export function servesPlainPass(): boolean {
  const data: unknown = workerData;
  if (isMainThread || parentPort === null || !isPlainData(data)) return false;
  const port = parentPort;
  const counts = syntheticCounts(data.plainRows);
  const totals = new Float64Array(data.plainRows * cubeShape.nx);
  port.on('message', () => {
    plainTotals(counts, cubeShape.nk, totals);
    port.postMessage(totals.slice());
  });
  port.postMessage('ready');
  return true;
}

function isPlainData(data: unknown): data is PlainData {
  return typeof data === 'object' && data !== null && 'plainRows' in data;
}

export interface PlainThreads {
  /** One pass over the whole cube, shared out. */
  pass(): Promise<void>;
  close(): Promise<void>;
}

export async function startPlainThreads(program: URL, threads: number): Promise<PlainThreads> {
  const workers = Array.from({ length: threads }, () => {
    const data: PlainData = { plainRows: Math.ceil(cubeShape.ny / threads) };
    return new Worker(program, { workerData: data });
  });
  const answers = (): Promise<unknown> =>
    Promise.all(workers.map((worker) => new Promise((resolve) => worker.once('message', resolve))));
  await answers();
  return {
    pass: async () => {
      const answered = answers();
      for (const worker of workers) worker.postMessage('pass');
      await answered;
    },
    close: async () => {
      await Promise.all(workers.map((worker) => worker.terminate()));
    },
  };
}
