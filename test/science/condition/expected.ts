/** What SciPy makes of the same numbers; see test/fixtures/condition/make-condition.py. */
import { readFileSync } from 'node:fs';

export interface ConditionExpected {
  readonly spectrum: readonly number[];
  readonly weights: readonly number[];
  readonly pchip: Readonly<Record<'x' | 'y' | 'at' | 'values', readonly number[]>>;
  readonly smoother: readonly { readonly lambda: number; readonly values: readonly number[] }[];
  readonly asls: readonly number[];
  readonly arpls: readonly number[];
  readonly snip: readonly number[];
  readonly polynomial: readonly number[];
  readonly calibration: readonly {
    readonly points: readonly (readonly [number, number])[];
    readonly degree: number;
    readonly residuals: readonly number[];
    readonly leaveOneOut: readonly number[];
    readonly at: readonly (readonly [number, number])[];
  }[];
  readonly savitzkyGolay: {
    readonly weights: readonly number[];
    readonly filtered: readonly number[];
  };
  readonly hardThresholds: readonly (readonly [number, number, number, number])[];
  readonly decomposition: {
    readonly counts: readonly (readonly number[])[];
    readonly singular: readonly number[];
    readonly rank3: readonly (readonly number[])[];
  };
}

export const expected: ConditionExpected = JSON.parse(
  readFileSync(
    new URL('../../fixtures/condition/condition.expected.json', import.meta.url),
    'utf8',
  ),
);

/** Greatest difference between two series, in size. */
export function farthest(a: ArrayLike<number>, b: ArrayLike<number>): number {
  if (a.length !== b.length) return Number.POSITIVE_INFINITY;
  let most = 0;
  for (let i = 0; i < a.length; i++) {
    const difference = Math.abs(a[i] - b[i]);
    if (!(difference <= most)) most = difference;
  }
  return most;
}
