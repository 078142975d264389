import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { erf, erfc, erfcx } from '../../../src/science/numeric/error-functions';
import { faddeeva } from '../../../src/science/numeric/faddeeva';

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
    it(`${name} agrees with SciPy to 2e-13 of its value`, () => {
      const rows = expected[name] ?? [];
      expect(rows.length).toBeGreaterThan(60);
      for (const [x = 0, wanted = 0] of rows) expect(relative(call(x), wanted)).toBeLessThan(2e-13);
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

describe('the Faddeeva function', () => {
  it('agrees with SciPy to 1e-10 of its modulus in the upper half plane', () => {
    const rows = expected.wofz ?? [];
    expect(rows.length).toBeGreaterThan(400);
    const out = new Float64Array(2);
    for (const [x = 0, y = 0, real = 0, imaginary = 0] of rows) {
      faddeeva(x, y, out);
      const off = Math.hypot((out[0] as number) - real, (out[1] as number) - imaginary);
      expect(off / Math.hypot(real, imaginary)).toBeLessThan(1e-10);
    }
  });

  it('takes the values of the handbook', () => {
    // Abramowitz and Stegun, table 7.9: w(0) = 1, w(i) = 0.427584, w(1 + i) = 0.304744 + 0.208219 i.
    const out = new Float64Array(2);
    faddeeva(0, 0, out);
    expect([...out]).toEqual([1, 0]);
    faddeeva(0, 1, out);
    expect(out[0]).toBeCloseTo(0.427584, 6);
    faddeeva(1, 1, out);
    expect(out[0]).toBeCloseTo(0.304744, 6);
    expect(out[1]).toBeCloseTo(0.208219, 6);
  });
});
