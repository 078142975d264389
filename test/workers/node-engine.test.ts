/** The engine with real threads, running the worker as it is built. */
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { WorkerReplaced } from '../../workers/engine';
import { createInProcessEngine } from '../../workers/in-process-engine';
import { createNodeEngine, spawnThread } from '../../workers/node-engine';
import { createScanEngine } from '../../workers/pool';
import type { SpawnedWorker } from '../../workers/seat';
import { type BuiltWorker, buildWorker } from './built-worker';
import { engineContract, errorOf } from './engine.contract';
import { answersOf, makeScan, openMade } from './made-scan';

let built: BuiltWorker;
let folder: string;

beforeAll(async () => {
  built = await buildWorker();
  folder = mkdtempSync(join(tmpdir(), 'rimlight-node-engine-'));
});

afterAll(() => {
  built.remove();
  rmSync(folder, { recursive: true, force: true });
});

engineContract('an engine of threads', (workerCount) =>
  createNodeEngine({ workerCount, workerFile: built.file }),
);

describe('threads', () => {
  it('give the bits that one process gives, however many they are', async () => {
    const made = makeScan({ ny: 6, nx: 50 });
    const single = createInProcessEngine();
    const expected = await answersOf(await openMade(single, made));
    await single.close();
    for (const workerCount of [1, 2, 3]) {
      const engine = createNodeEngine({ workerCount, workerFile: built.file });
      expect(await answersOf(await openMade(engine, made))).toStrictEqual(expected);
      await engine.close();
    }
  });

  it('open a file by its path, and say when there is none', async () => {
    const made = makeScan();
    const path = join(folder, 'made.npz');
    if (made.inputs.scan.kind === 'memory') writeFileSync(path, made.inputs.scan.bytes);
    const engine = createNodeEngine({ workerCount: 2, workerFile: built.file });
    const scan = { kind: 'path' as const, name: 'made.npz', path };
    const open = await openMade(engine, { ...made, inputs: { scan, companions: [] } });
    expect(await open.spectrum({ y: 0, x: 0 })).toHaveLength(made.nk);
    const missing = { ...scan, path: join(folder, 'missing.npz') };
    const error = await errorOf(engine.inspect({ scan: missing, companions: [] }, {}));
    expect(error).toMatchObject({ kind: 'scan', where: missing.path });
    await engine.close();
  });

  it('take a Blob, as a page would give', async () => {
    const made = makeScan();
    const bytes = made.inputs.scan.kind === 'memory' ? made.inputs.scan.bytes : new Uint8Array();
    const blob = new Blob([Uint8Array.from(bytes)]);
    const engine = createNodeEngine({ workerCount: 1, workerFile: built.file });
    const scan = { kind: 'blob' as const, name: 'made.npz', blob };
    const open = await openMade(engine, { ...made, inputs: { scan, companions: [] } });
    expect(await open.spectrum({ y: 0, x: 0 })).toHaveLength(made.nk);
    await engine.close();
  });

  it('are replaced when they end by themselves, and nothing is lost', async () => {
    const threads: SpawnedWorker[] = [];
    const engine = createScanEngine({
      workerCount: 2,
      spawn: () => {
        const thread = spawnThread(built.file);
        threads.push(thread);
        return thread;
      },
    });
    const told: WorkerReplaced[] = [];
    engine.onWorkerReplaced((event) => told.push(event));
    const scan = await openMade(engine, makeScan());
    const before = await answersOf(scan);
    // Ended from outside, as a crash ends it: the pool did not ask for it.
    threads[0]?.terminate();
    expect(await answersOf(scan)).toStrictEqual(before);
    expect(told).toEqual([{ worker: 0, reason: expect.stringContaining('ended with code') }]);
    await engine.close();
  });

  it('that cannot start are reported', async () => {
    const workerFile = pathToFileURL(join(folder, 'no-such-worker.js'));
    const engine = createNodeEngine({ workerCount: 1, workerFile });
    const error = await errorOf(engine.inspect(makeScan().inputs, {}));
    expect(error).toMatchObject({ kind: 'fault' });
    expect(error.what).toContain('no-such-worker.js');
    await engine.close();
  });

  it('must be one or more', () => {
    expect(() => createNodeEngine({ workerCount: 0 })).toThrow(/workers are not possible/);
  });
});
