import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { faddeeva, faddeevaJet } from '../../../src/science/numeric/faddeeva';

/** mpmath 1.3 at 60 digits; written by test/fixtures/peaks/make-faddeeva.py. */
const rows = JSON.parse(
  readFileSync(new URL('../../fixtures/peaks/faddeeva.expected.json', import.meta.url), 'utf8'),
) as readonly (readonly number[])[];

const jetAt = (x: number, y: number): Float64Array => {
  const out = new Float64Array(6);
  faddeevaJet(x, y, out);
  return out;
};

const relative = (value: number, wanted: number): number =>
  wanted === 0 ? Math.abs(value) : Math.abs(value / wanted - 1);

describe('the Faddeeva function', () => {
  it('has its real and its imaginary part right to 3e-12 of each, also close to the real axis', () => {
    expect(rows.length).toBeGreaterThan(700);
    const out = new Float64Array(2);
    for (const [x = 0, y = 0, real = 0, imaginary = 0] of rows) {
      faddeeva(x, y, out);
      expect(relative(out[0]!, real), `Re w(${x} + ${y}i)`).toBeLessThan(3e-12);
      expect(relative(out[1]!, imaginary), `Im w(${x} + ${y}i)`).toBeLessThan(3e-12);
    }
  });

  it.each([
    ['itself', 0, 5e-15],
    ['its first derivative', 1, 2e-13],
    ['its second derivative', 2, 5e-12],
  ] as const)('has %s right relative to its modulus', (_, order, tolerance) => {
    for (const row of rows) {
      const [x = 0, y = 0] = row;
      const [real, imaginary] = [row[2 + 2 * order]!, row[3 + 2 * order]!];
      const out = jetAt(x, y);
      const off = Math.hypot(out[2 * order]! - real, out[2 * order + 1]! - imaginary);
      expect(off / Math.hypot(real, imaginary), `at ${x} + ${y}i`).toBeLessThan(tolerance);
    }
  });

  it('agrees with scipy.special.wofz (SciPy 1.10) to 1e-13 of its modulus', () => {
    const { wofz = [] } = JSON.parse(
      readFileSync(new URL('../../fixtures/peaks/peaks.expected.json', import.meta.url), 'utf8'),
    ) as Readonly<Record<string, readonly (readonly number[])[]>>;
    expect(wofz.length).toBeGreaterThan(400);
    for (const [x = 0, y = 0, real = 0, imaginary = 0] of wofz) {
      const out = jetAt(x, y);
      const off = Math.hypot(out[0]! - real, out[1]! - imaginary);
      expect(off / Math.hypot(real, imaginary)).toBeLessThan(1e-13);
    }
  });

  it('gives the same with and without derivatives', () => {
    const out = new Float64Array(2);
    for (const [x = 0, y = 0] of rows) {
      faddeeva(x, y, out);
      expect([...out]).toEqual([...jetAt(x, y).subarray(0, 2)]);
    }
  });

  it('takes the values of the handbook', () => {
    // Abramowitz and Stegun, table 7.9, from memory: w(i) = 0.427584, w(1 + i) = 0.304744 + 0.208219 i.
    expect([...jetAt(0, 0).subarray(0, 2)]).toEqual([1, 0]);
    expect(jetAt(0, 1)[0]).toBeCloseTo(0.427584, 6);
    expect(jetAt(1, 1)[0]).toBeCloseTo(0.304744, 6);
    expect(jetAt(1, 1)[1]).toBeCloseTo(0.208219, 6);
  });

  it('gives the function of Dawson on the real axis', () => {
    // Im w(x) = 2/√π D(x); Abramowitz and Stegun, table 7.5, from memory: D(1) = 0.5380795069, D(2) = 0.3013403889.
    const perDawson = Math.sqrt(Math.PI) / 2;
    expect(jetAt(1, 0)[1]! * perDawson).toBeCloseTo(0.5380795069, 10);
    expect(jetAt(2, 0)[1]! * perDawson).toBeCloseTo(0.3013403889, 10);
    expect(jetAt(3, 0)[0]).toBeCloseTo(Math.exp(-9), 18);
  });
});
