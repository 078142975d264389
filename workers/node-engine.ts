/** The engine in Node: worker threads, one for each core. */
import { availableParallelism } from 'node:os';
import { Worker } from 'node:worker_threads';
import type { ScanEngine } from './engine';
import { nodeEndpoint } from './node-endpoint';
import { createScanEngine } from './pool';
import type { SpawnedWorker } from './seat';

export interface NodeEngineOptions {
  /** one for each core where it is left out */
  readonly workerCount?: number;
  /** the built worker; beside the program's own file where it is left out */
  readonly workerFile?: URL;
}

/** Its threads keep the program running until `close`. */
export function createNodeEngine({
  workerCount = availableParallelism(),
  workerFile = new URL(/* @vite-ignore */ './node-worker.js', import.meta.url),
}: NodeEngineOptions = {}): ScanEngine {
  return createScanEngine({ workerCount, spawn: () => spawnThread(workerFile) });
}

/** One worker thread of the built file. */
export function spawnThread(workerFile: URL): SpawnedWorker {
  const worker = new Worker(workerFile);
  return {
    endpoint: nodeEndpoint(worker),
    onDeath: (listener) => {
      let isTold = false;
      const tell = (reason: string): void => {
        if (!isTold) listener(reason);
        isTold = true;
      };
      worker.on('error', (error) => tell(error instanceof Error ? error.message : String(error)));
      worker.on('messageerror', () => tell('a message could not be read'));
      worker.on('exit', (code) => tell(`it ended with code ${code}`));
    },
    terminate: () => void worker.terminate(),
  };
}
