/** The pool over message channels in one process: same code and same messages as with threads. */
import { describe, expect, it } from 'vitest';
import { createInProcessEngine } from '../../workers/in-process-engine';
import { engineContract, errorOf } from './engine.contract';
import { answersOf, makeScan, openMade } from './made-scan';

engineContract('an engine in one process', (workerCount) => createInProcessEngine({ workerCount }));

describe('the number of workers', () => {
  it('changes no bit of any answer', async () => {
    const made = makeScan({ ny: 5, nx: 60 });
    const answers: unknown[] = [];
    for (const workerCount of [1, 2, 3, 8]) {
      const engine = createInProcessEngine({ workerCount });
      answers.push(await answersOf(await openMade(engine, made)));
      await engine.close();
    }
    for (const answer of answers) expect(answer).toStrictEqual(answers[0]);
  });

  it('must be one or more', () => {
    for (const workerCount of [0, -1, 1.5, Number.NaN]) {
      expect(() => createInProcessEngine({ workerCount })).toThrow(/workers are not possible/);
    }
  });
});

describe('a scan whose values turn out not to be counts', () => {
  it('has no errors, and says why', async () => {
    const engine = createInProcessEngine();
    const made = makeScan({ type: 'float64' });
    const scan = await openMade(engine, made);
    expect(scan.overview.warnings).toEqual([]);
    await scan.release();
    const plan = { ...scan.plan };
    const changed = makeScan({
      type: 'float64',
      change: (counts) => {
        counts[1234] = -3;
      },
    });
    // The plan of the first file: as if its detection had not seen the value below zero.
    const other = await engine.open(changed.inputs, plan);
    expect(other.overview.meta.noise).toEqual({ kind: 'none' });
    expect(other.overview.warnings).toHaveLength(1);
    expect(other.overview.warnings[0]).toContain('-3');
    const band = { fromEv: 1.81, toEv: 1.9, floor: 'none' as const };
    const [integral] = await other.bandMaps({ band, quantities: ['integral'] });
    expect(integral?.errors).toBeNull();
    await engine.close();
  });
});

describe('a closed engine', () => {
  it('ends what is under way and answers no more', async () => {
    const engine = createInProcessEngine();
    const made = makeScan();
    const scan = await openMade(engine, made);
    const hashing = errorOf(engine.sha256(made.inputs.scan));
    await engine.close();
    expect(await hashing).toMatchObject({ kind: 'cancelled' });
    expect(await errorOf(engine.inspect(made.inputs, {}))).toMatchObject({ kind: 'fault' });
    expect(await errorOf(scan.spectrum({ y: 0, x: 0 }))).toMatchObject({ kind: 'cancelled' });
  });
});

describe('a path', () => {
  it('is refused where there are no paths', async () => {
    const engine = createInProcessEngine();
    const scan = { kind: 'path' as const, name: 'a.h5', path: '/nowhere/a.h5' };
    const error = await errorOf(engine.inspect({ scan, companions: [] }, {}));
    expect(error).toMatchObject({ kind: 'usage', where: '/nowhere/a.h5' });
    await engine.close();
  });
});
