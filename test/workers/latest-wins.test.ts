import { describe, expect, it } from 'vitest';
import { createLatestWins } from '../../workers/latest-wins';
import { gate } from './mortal-workers';

const noError = (error: unknown): void => {
  throw error;
};
/** Lets every promise that can go on do so. */
const settle = (): Promise<void> => new Promise((resolve) => setImmediate(resolve));

describe('a latest-wins limiter', () => {
  it('starts a task at once when none is in flight', () => {
    let isStarted = false;
    createLatestWins().run(async () => {
      isStarted = true;
    }, noError);
    expect(isStarted).toBe(true);
  });

  it('keeps one in flight and only the newest waiting', async () => {
    const limiter = createLatestWins();
    const first = gate();
    const started: number[] = [];
    const task =
      (number: number, until = Promise.resolve()) =>
      async (): Promise<void> => {
        started.push(number);
        await until;
      };
    limiter.run(task(1, first.passed), noError);
    for (const number of [2, 3, 4]) limiter.run(task(number), noError);
    await settle();
    expect(started).toEqual([1]);
    first.open();
    await settle();
    expect(started).toEqual([1, 4]);
  });

  it('drops the waiting task when cleared, and goes on after', async () => {
    const limiter = createLatestWins();
    const first = gate();
    const started: number[] = [];
    limiter.run(() => first.passed, noError);
    limiter.run(async () => void started.push(2), noError);
    limiter.clear();
    first.open();
    await settle();
    expect(started).toEqual([]);
    limiter.run(async () => void started.push(3), noError);
    expect(started).toEqual([3]);
  });

  it('tells a task’s own error to its own listener and runs the next', async () => {
    const limiter = createLatestWins();
    const first = gate();
    const told: unknown[] = [];
    let isNextRun = false;
    limiter.run(
      async () => {
        await first.passed;
        throw new Error('failed');
      },
      (error) => told.push(error),
    );
    limiter.run(async () => {
      isNextRun = true;
    }, noError);
    first.open();
    await settle();
    expect(told).toEqual([new Error('failed')]);
    expect(isNextRun).toBe(true);
  });
});
