/** Opening a scan is all or nothing: a failure or a stop leaves no slab behind and the scan before it usable. */
import { describe, expect, it } from 'vitest';
import { RimlightError } from '../../src/errors';
import { encodeNpy } from '../../src/io/write/npy';
import { type ToByteSource, withCompanions, withContainer } from '../../workers/file-access';
import { createScanEngine } from '../../workers/pool';
import { portableSource } from '../../workers/portable-source';
import { errorOf } from './engine.contract';
import { answersOf, makeScan, openMade, planOf } from './made-scan';
import { gate, type MortalWorkers, mortalWorkers } from './mortal-workers';

/** Loads that were not followed by as many releases, per worker. */
function leftBehind({ all }: MortalWorkers): readonly number[] {
  return all.map(({ called }) => {
    const count = (name: string): number => called.filter((one) => one === name).length;
    return count('load') - count('release');
  });
}

describe('a scan of which one slab cannot be loaded', () => {
  it('is not opened, says why, and leaves the scan before it as it was', async () => {
    const workers = mortalWorkers(portableSource, ({ core }, index) => {
      const { load } = core;
      core.load = (...call) => {
        const [, , { scan }] = call;
        if (index !== 1 || scan.name !== 'bad.npz') return load(...call);
        const where = 'bad.npz: rows 3 to 6';
        return Promise.reject(
          new RimlightError('scan', { what: 'damaged there', where, hint: 'Copy it again.' }),
        );
      };
    });
    const engine = createScanEngine({ workerCount: 2, spawn: workers.spawn });
    const scan = await openMade(engine, makeScan());
    const before = await answersOf(scan);
    const bad = makeScan({ seed: 4 });
    const inputs = { ...bad.inputs, scan: { ...bad.inputs.scan, name: 'bad.npz' } };
    const error = await errorOf(engine.open(inputs, scan.plan));
    expect(error).toMatchObject({
      kind: 'scan',
      what: 'damaged there',
      where: 'bad.npz: rows 3 to 6',
      hint: 'Copy it again.',
    });
    expect(leftBehind(workers).slice(0, 2)).toEqual([1, 1]);
    // The others need not go on.
    expect(workers.all[0].called).toContain('cancel');
    expect(await answersOf(scan)).toStrictEqual(before);
    await engine.close();
  });

  it('is not opened either when only its height map is missing', async () => {
    const workers = mortalWorkers();
    const engine = createScanEngine({ workerCount: 2, spawn: workers.spawn });
    const made = makeScan();
    const plan = await planOf(engine, made);
    const height = { file: 'height.npy', path: '', unitNm: 1, shiftPx: [0, 0] as const };
    const error = await errorOf(engine.open(made.inputs, { ...plan, height }));
    expect(error).toMatchObject({ kind: 'usage' });
    expect(error.what).toContain('height.npy');
    expect(leftBehind(workers).slice(0, 2)).toEqual([0, 0]);
    await engine.close();
  });
});

describe('a stop', () => {
  it('during reading is heard between reads, and leaves nothing behind', async () => {
    const started = gate();
    const mayRead = gate();
    let isHeld = false;
    const slow: ToByteSource = async (handle) => {
      const source = await portableSource(handle);
      if (!isHeld) return source;
      return {
        name: source.name,
        size: source.size,
        origin: source.origin,
        read: async (from, to) => {
          started.open();
          await mayRead.passed;
          return source.read(from, to);
        },
      };
    };
    const workers = mortalWorkers(slow);
    const engine = createScanEngine({ workerCount: 2, spawn: workers.spawn });
    const made = makeScan();
    const plan = await planOf(engine, made);
    isHeld = true;
    const stopper = new AbortController();
    const opening = errorOf(engine.open(made.inputs, plan, { signal: stopper.signal }));
    await started.passed;
    stopper.abort();
    mayRead.open();
    expect(await opening).toMatchObject({ kind: 'cancelled' });
    for (const worker of workers.all.slice(0, 2)) expect(worker.called).toContain('cancel');
    isHeld = false;
    const scan = await engine.open(made.inputs, plan);
    expect(await scan.spectrum({ y: 0, x: 0 })).toHaveLength(made.nk);
    await engine.close();
  });

  it('while sums are made is heard between blocks of pixels', async () => {
    // Three times as many values as are summed up between two looks at the messages.
    const shape = [12, 512, 2048];
    const counts = new Uint16Array(12 * 512 * 2048).map((_, i) => i % 1000);
    const bytes = encodeNpy(counts, shape);
    const scan = { kind: 'memory' as const, name: 'large.npy', bytes };
    const inputs = { scan, companions: [] };
    const axis = { from: 1.8, to: 2.2, kind: 'energy' as const, unit: 'eV' };
    let isLoaded = false;
    const workers = mortalWorkers(portableSource, ({ core }) => {
      const { load } = core;
      core.load = async (...call) => {
        const summary = await load(...call);
        isLoaded = true;
        return summary;
      };
    });
    const engine = createScanEngine({ workerCount: 1, spawn: workers.spawn });
    const { plan } = await engine.inspect(inputs, { axis });
    if (plan === null) throw new Error('no plan');
    const stopper = new AbortController();
    const shares: number[] = [];
    const opening = engine.open(inputs, plan, {
      signal: stopper.signal,
      onProgress: (share) => {
        shares.push(share);
        // Reading is the first 0.65.
        if (share > 0.66) stopper.abort();
      },
    });
    expect(await errorOf(opening)).toMatchObject({ kind: 'cancelled' });
    expect(isLoaded).toBe(false);
    expect(shares.at(-1)).toBeLessThan(1);
    await engine.close();
  });

  it('ends a hash under way', async () => {
    const workers = mortalWorkers();
    const engine = createScanEngine({ workerCount: 1, spawn: workers.spawn });
    const bytes = new Uint8Array(5 << 20);
    const stopper = new AbortController();
    const shares: number[] = [];
    const hashing = engine.sha256(
      { kind: 'memory', name: 'long.bin', bytes },
      {
        signal: stopper.signal,
        onProgress: (share) => {
          shares.push(share);
          stopper.abort();
        },
      },
    );
    expect(await errorOf(hashing)).toMatchObject({ kind: 'cancelled' });
    expect(shares.at(-1)).toBeLessThan(1);
    await engine.close();
  });
});

describe('a file', () => {
  const handle = makeScan().inputs.scan;

  it('is read no further once stopped, and closed', async () => {
    const stopper = new AbortController();
    let isClosed = false;
    const watched: ToByteSource = async (one) => ({
      ...(await portableSource(one)),
      close: () => {
        isClosed = true;
      },
    });
    const use = withContainer(watched, handle, stopper.signal, async (container) => {
      const [entry] = container.entries;
      stopper.abort();
      return container.read(
        entry.path,
        entry.shape.map(() => 0),
        entry.shape,
      );
    });
    expect(await errorOf(use)).toMatchObject({ kind: 'cancelled' });
    expect(isClosed).toBe(true);
  });

  it('beside the scan that cannot be opened is left out with a word', async () => {
    const junk = { kind: 'memory' as const, name: 'junk.h5', bytes: Uint8Array.of(1, 2, 3) };
    const { signal } = new AbortController();
    const found = await withCompanions(portableSource, [junk, handle], signal, async (opened) => ({
      names: opened.companions.map(({ name }) => name),
      warnings: opened.warnings,
    }));
    expect(found.names).toEqual([handle.name]);
    expect(found.warnings).toEqual([expect.stringMatching(/^junk\.h5 is left out: .+/)]);
  });
});

describe('progress callbacks', () => {
  it('are let go of after their call', async () => {
    const workers = mortalWorkers();
    const engine = createScanEngine({ workerCount: 1, spawn: workers.spawn });
    const made = makeScan();
    const before = openPorts();
    for (let i = 0; i < 5; i++) {
      await engine.sha256(made.inputs.scan, { onProgress: () => undefined });
    }
    await until(() => openPorts() <= before);
    expect(openPorts()).toBeLessThanOrEqual(before);
    await engine.close();
  });
});

/** Message ports that keep Node from ending. */
function openPorts(): number {
  return process.getActiveResourcesInfo().filter((kind) => kind === 'MessagePort').length;
}

/** Lets the event loop turn until something holds, at most a thousand times. */
async function until(holds: () => boolean): Promise<void> {
  for (let turn = 0; turn < 1000 && !holds(); turn++) {
    await new Promise((resolve) => setImmediate(resolve));
  }
}
