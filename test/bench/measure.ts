/** Times of repeated work, and the table they are printed in. */

/** Milliseconds of each of `times` runs, after some that only warm up. */
export async function timesOf(
  work: (run: number) => unknown,
  times: number,
  warmUp = 3,
): Promise<readonly number[]> {
  const measured: number[] = [];
  for (let run = -warmUp; run < times; run++) {
    const start = performance.now();
    await work(run < 0 ? times - run : run);
    if (run >= 0) measured.push(performance.now() - start);
  }
  return measured;
}

/**
 * Two kinds of work in turn, so that whatever else the machine does falls on both alike.
 *
 * @param often - how many times the second is done for each time of the first
 */
export async function timesInTurn(
  first: (run: number) => unknown,
  second: (run: number) => unknown,
  times: number,
  often: number,
): Promise<{ readonly first: readonly number[]; readonly second: readonly number[] }> {
  const measured = { first: [] as number[], second: [] as number[] };
  await timesOf(first, 1, 2);
  await timesOf(second, 1, 10);
  for (let run = 0; run < times; run++) {
    measured.first.push(...(await timesOf(() => first(run), 1, 0)));
    // The first after the other work finds the caches full of that.
    measured.second.push(...(await timesOf((i) => second(run * often + i), often, 1)));
  }
  return measured;
}

/** The value below which a share of the times lies. */
export function quantile(times: readonly number[], share: number): number {
  const sorted = [...times].sort((a, b) => a - b);
  return sorted[Math.min(sorted.length - 1, Math.floor(share * sorted.length))] ?? Number.NaN;
}

export const median = (times: readonly number[]): number => quantile(times, 0.5);

export interface Row {
  readonly what: string;
  readonly value: string;
  /** empty for a row that is only told */
  readonly goal: string;
  readonly isMet: boolean;
}

export function ms(time: number): string {
  return `${time.toFixed(time < 10 ? 2 : 1)} ms`;
}

/** A row that is told without a goal. */
export function told(what: string, value: string): Row {
  return { what, value, goal: '', isMet: true };
}

export function printTable(rows: readonly Row[]): void {
  const width = (of: (row: Row) => string): number =>
    Math.max(...rows.map((row) => of(row).length));
  const whatWidth = width(({ what }) => what);
  const valueWidth = width(({ value }) => value);
  const goalWidth = width(({ goal }) => goal);
  for (const { what, value, goal, isMet } of rows) {
    const verdict = goal === '' ? '' : isMet ? 'met' : 'NOT MET';
    console.log(
      `${what.padEnd(whatWidth)}  ${value.padStart(valueWidth)}  ${goal.padEnd(goalWidth)}  ${verdict}`.trimEnd(),
    );
  }
}
