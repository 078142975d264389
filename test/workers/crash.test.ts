/** What a crashed worker leaves behind: a replacement with the same rows, and a user who was told. */
import { describe, expect, it } from 'vitest';
import { RimlightError } from '../../src/errors';
import type { WorkerReplaced } from '../../workers/engine';
import { createScanEngine } from '../../workers/pool';
import { portableSource } from '../../workers/portable-source';
import { errorOf } from './engine.contract';
import { answersOf, makeScan, openMade, planOf } from './made-scan';
import { gate, mortalWorkers } from './mortal-workers';

const band = { fromEv: 1.84, toEv: 1.93, floor: 'none' as const };
const request = { band, quantities: ['integral', 'centroid'] as const };

describe('a worker that dies while idle', () => {
  it('is replaced, its rows are loaded again, listeners are told, and no bit changes', async () => {
    const workers = mortalWorkers();
    const engine = createScanEngine({ workerCount: 2, spawn: workers.spawn });
    const told: WorkerReplaced[] = [];
    const unsubscribe = engine.onWorkerReplaced((event) => told.push(event));
    const scan = await openMade(engine, makeScan());
    const before = await answersOf(scan);
    workers.all[1].die('out of memory');
    expect(await answersOf(scan)).toStrictEqual(before);
    expect(told).toEqual([{ worker: 1, reason: 'out of memory' }]);
    expect(workers.all).toHaveLength(4);
    expect(workers.all[3].called).toContain('load');
    unsubscribe();
    workers.all[0].die('again');
    expect(await answersOf(scan)).toStrictEqual(before);
    expect(told).toHaveLength(1);
    await engine.close();
  });

  it('takes no scan with it that was released', async () => {
    const workers = mortalWorkers();
    const engine = createScanEngine({ workerCount: 1, spawn: workers.spawn });
    const first = await openMade(engine, makeScan());
    const second = await openMade(engine, makeScan({ seed: 2 }));
    await first.release();
    workers.all[0].die('gone');
    await second.bandMaps(request);
    expect(workers.all[2].called.filter((name) => name === 'load')).toHaveLength(1);
    await engine.close();
  });
});

describe('a call under which the worker dies', () => {
  it('is made once more and gives what it would have given', async () => {
    const workers = mortalWorkers();
    const engine = createScanEngine({ workerCount: 2, spawn: workers.spawn });
    const scan = await openMade(engine, makeScan());
    const before = await scan.bandMaps(request);
    const reached = gate();
    workers.all[0].core.bandMaps = () => {
      reached.open();
      return new Promise(() => undefined);
    };
    const interrupted = scan.bandMaps(request);
    await reached.passed;
    workers.all[0].die('crashed');
    expect(await interrupted).toStrictEqual(before);
    await engine.close();
  });

  it('fails when the replacement dies too, and works again afterwards', async () => {
    const reached = [gate(), gate()];
    let held = 0;
    const workers = mortalWorkers(portableSource, ({ core }, index) => {
      if (index !== 2) return;
      core.bandMaps = () => {
        reached[1]?.open();
        return new Promise(() => undefined);
      };
    });
    const engine = createScanEngine({ workerCount: 1, spawn: workers.spawn });
    const scan = await openMade(engine, makeScan());
    workers.all[0].core.bandMaps = () => {
      held++;
      reached[0]?.open();
      return new Promise(() => undefined);
    };
    const failing = errorOf(scan.bandMaps(request));
    await reached[0]?.passed;
    workers.all[0].die('first');
    await reached[1]?.passed;
    workers.all[2].die('second');
    const error = await failing;
    expect(error.kind).toBe('fault');
    expect(error.what).toContain('second');
    expect(held).toBe(1);
    expect(await scan.bandMaps(request)).toHaveLength(2);
    await engine.close();
  });

  it('does not disturb the opening of a scan, whose progress still only rises to 1', async () => {
    const reached = gate();
    const workers = mortalWorkers(portableSource, ({ core }, index) => {
      if (index !== 1) return;
      core.load = (_callId, _scanId, _inputs, _plan, _rows, onProgress) => {
        onProgress(0.5);
        reached.open();
        return new Promise(() => undefined);
      };
    });
    const engine = createScanEngine({ workerCount: 2, spawn: workers.spawn });
    const made = makeScan();
    const plan = await planOf(engine, made);
    const shares: number[] = [];
    const opening = engine.open(made.inputs, plan, { onProgress: (share) => shares.push(share) });
    await reached.passed;
    workers.all[1].die('crashed');
    const scan = await opening;
    expect(shares).toEqual([...shares].sort((a, b) => a - b));
    expect(shares.at(-1)).toBe(1);
    expect(await scan.bandMaps(request)).toHaveLength(2);
    await engine.close();
  });
});

describe('a worker that cannot even start', () => {
  it('is reported, and not started again without end', async () => {
    const workers = mortalWorkers();
    let started = 0;
    const engine = createScanEngine({
      workerCount: 1,
      spawn: () => {
        started++;
        const worker = workers.spawn();
        return {
          ...worker,
          onDeath: (listener) => void Promise.resolve().then(() => listener('no such script')),
        };
      },
    });
    const error = await errorOf(engine.inspect(makeScan().inputs, {}));
    expect(error.kind).toBe('fault');
    expect(error.what).toContain('no such script');
    expect(started).toBeLessThan(6);
    await engine.close();
  });
});

describe('rows that cannot be loaded again', () => {
  it('are reported as what they are, once asked for; other scans go on', async () => {
    let isGone = false;
    const made = makeScan();
    const other = makeScan({ seed: 3 });
    const workers = mortalWorkers(async (handle) => {
      if (isGone && handle.name === made.inputs.scan.name) {
        throw new RimlightError('scan', {
          what: 'it is gone',
          where: handle.name,
          hint: 'Find it.',
        });
      }
      return portableSource(handle);
    });
    const engine = createScanEngine({ workerCount: 1, spawn: workers.spawn });
    const scan = await openMade(engine, made);
    const kept = await openMade(engine, {
      ...other,
      inputs: { ...other.inputs, scan: { ...other.inputs.scan, name: 'kept.npz' } },
    });
    isGone = true;
    workers.all[0].die('crashed');
    expect(await errorOf(scan.bandMaps(request))).toMatchObject({
      kind: 'scan',
      what: 'it is gone',
    });
    expect(await errorOf(scan.spectrum({ y: 0, x: 0 }))).toMatchObject({ what: 'it is gone' });
    expect(await kept.bandMaps(request)).toHaveLength(2);
    await engine.close();
  });
});
