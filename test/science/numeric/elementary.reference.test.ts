// Values from mpmath at 1400 bits (test/fixtures/numeric/make-elementary.py), a computation independent of ours.
import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import * as elementary from '../../../src/science/numeric/elementary';

const functions: Record<string, (...x: number[]) => number> = { ...elementary };

const table = JSON.parse(
  readFileSync(new URL('../../fixtures/numeric/elementary.json', import.meta.url), 'utf8'),
) as Record<string, number[][]>;

/** Spacing of doubles at a finite value. */
function ulp(value: number): number {
  const size = Math.max(Math.abs(value), 2 ** -1022);
  return 2 ** (exponentOf(size) - 52);
}

function exponentOf(size: number): number {
  const bits = new DataView(new ArrayBuffer(8));
  bits.setFloat64(0, size);
  return (bits.getUint16(0) >>> 4) - 1023;
}

function errorInUlps(got: number, nearest: number, rest: number): number {
  return Math.abs((got - nearest) / ulp(nearest) - rest);
}

/** Rests are kept to four decimals. */
const tableRounding = 5e-5;

/** The greatest errors stated in elementary.ts, ulp; where they differ, of subnormal results. */
const stated: Record<string, { normal: number; subnormal?: number }> = {
  exp: { normal: 0.512, subnormal: 0.75 },
  expm1: { normal: 0.531 },
  log: { normal: 0.5001 },
  log1p: { normal: 0.5001 },
  log10: { normal: 0.5001 },
  pow: { normal: 0.508, subnormal: 0.75 },
  sin: { normal: 0.78 },
  cos: { normal: 0.77 },
  tan: { normal: 0.98 },
  sinh: { normal: 1.59 },
  cosh: { normal: 1.02 },
  tanh: { normal: 1.4 },
  atan: { normal: 0.502 },
  atan2: { normal: 0.502 },
  cbrt: { normal: 0.5001 },
  hypot: { normal: 0.5001 },
};

describe.each(Object.keys(stated))('%s', (name) => {
  const call = functions[name]!;
  const rows = table[name]!;

  it('has a reference table of a few hundred values', () => {
    expect(rows.length).toBeGreaterThan(150);
  });

  it('keeps its stated greatest error', () => {
    for (const row of rows) {
      const [nearest, rest] = row.slice(-2) as [number, number];
      const got = call(...row.slice(0, -2));
      const { normal, subnormal = normal } = stated[name]!;
      const limit = Math.abs(nearest) < 2 ** -1022 ? subnormal : normal;
      const error = errorInUlps(got, nearest, rest);
      expect(error, `${name}(${row.slice(0, -2).join(', ')}) = ${got}`).toBeLessThanOrEqual(
        limit + tableRounding,
      );
    }
  });
});

describe('well-known values', () => {
  it.each([
    // ECMA-262, Value Properties of the Math Object
    ['e', elementary.exp(1), Math.E],
    ['ln 2', elementary.log(2), Math.LN2],
    ['ln 10', elementary.log(10), Math.LN10],
    ['log10 e', elementary.log10(Math.E), Math.LOG10E],
    // the double nearest to π/6 lies 3.6e-17 below it, so its sine lies 3e-17 below one half
    ['sin π/6', elementary.sin(0.5235987755982988), 0.49999999999999994],
    ['4 atan 1', 4 * elementary.atan(1), Math.PI],
    // sin 10^22, the classic trial of argument reduction: K. C. Ng, "Argument reduction for huge arguments" (1992)
    ['sin 1e22', elementary.sin(1e22), -0.8522008497671888],
    // the double nearest to a multiple of π/2: J.-M. Muller, Elementary Functions (from memory)
    ['cos worst', elementary.cos(6381956970095103 * 2 ** 797), -4.687165924254628e-19],
  ])('%s', (_, got, expected) => {
    expect(got).toBe(expected);
  });
});
