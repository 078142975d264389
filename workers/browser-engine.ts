/** The engine in a page: Web Workers, one for each core. */
import type { ScanEngine } from './engine';
import { createScanEngine } from './pool';
import type { SpawnedWorker } from './seat';

/** @param workerCount - one for each core where it is left out */
export function createBrowserEngine(workerCount = navigator.hardwareConcurrency): ScanEngine {
  return createScanEngine({ workerCount: Math.max(1, workerCount), spawn: spawnWebWorker });
}

function spawnWebWorker(): SpawnedWorker {
  const worker = new Worker(new URL('./browser-worker.ts', import.meta.url), { type: 'module' });
  return {
    endpoint: worker,
    onDeath: (listener) => {
      let isTold = false;
      const tell = (reason: string): void => {
        if (!isTold) listener(reason);
        isTold = true;
      };
      worker.addEventListener('error', (event) => {
        event.preventDefault();
        tell(event.message || 'it could not be started, or ran out of memory');
      });
      worker.addEventListener('messageerror', () => tell('a message could not be read'));
    },
    terminate: () => worker.terminate(),
  };
}
