/** The engine without threads: the same pool and the same messages, all in one process. For tests, and where there are no workers. */
import type { ScanEngine } from './engine';
import { createEngineCore } from './engine-core';
import type { ToByteSource } from './file-access';
import { createScanEngine } from './pool';
import { portableSource } from './portable-source';
import type { SpawnedWorker } from './seat';
import { serveEngine } from './wire-engine';

export interface InProcessOptions {
  readonly workerCount?: number;
  readonly toByteSource?: ToByteSource;
}

export function createInProcessEngine({
  workerCount = 1,
  toByteSource = portableSource,
}: InProcessOptions = {}): ScanEngine {
  return createScanEngine({ workerCount, spawn: () => spawnInProcess(toByteSource) });
}

/** A core at the other end of a message channel; it never dies by itself. */
export function spawnInProcess(toByteSource: ToByteSource = portableSource): SpawnedWorker {
  const { port1, port2 } = new MessageChannel();
  serveEngine(createEngineCore(toByteSource), port1);
  return {
    endpoint: port2,
    onDeath: () => undefined,
    terminate: () => {
      port1.close();
      port2.close();
    },
  };
}
