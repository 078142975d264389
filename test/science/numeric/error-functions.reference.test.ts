import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { erf, erfc, erfcx } from '../../../src/science/numeric/error-functions';

/** SciPy 1.10, scipy.special; written by test/fixtures/peaks/make-peaks.py. */
const expected = JSON.parse(
  readFileSync(new URL('../../fixtures/peaks/peaks.expected.json', import.meta.url), 'utf8'),
) as Readonly<Record<string, readonly (readonly number[])[]>>;

const relative = (value: number, wanted: number): number =>
  Math.abs(value - wanted) / Math.max(Math.abs(wanted), 1e-300);

describe('the error functions', () => {
  for (const [name, call] of [
    ['erf', erf],
    ['erfc', erfc],
    ['erfcx', erfcx],
  ] as const) {
    it(`${name} agrees with SciPy to 4e-15 of its value`, () => {
      const rows = expected[name] ?? [];
      expect(rows.length).toBeGreaterThan(60);
      for (const [x = 0, wanted = 0] of rows) expect(relative(call(x), wanted)).toBeLessThan(4e-15);
    });
  }

  it('take the values of the handbook', () => {
    // Abramowitz and Stegun, table 7.1: erf 0.5 and erf 1; erfc 2 = 1 − 0.9953222650 of the table.
    expect(erf(0.5)).toBeCloseTo(0.5204998778, 10);
    expect(erf(1)).toBeCloseTo(0.8427007929, 10);
    expect(erfc(2)).toBeCloseTo(1 - 0.995322265, 10);
    expect(erf(-1)).toBe(-erf(1));
  });
});
