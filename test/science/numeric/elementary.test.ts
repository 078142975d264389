import { describe, expect, it } from 'vitest';
import * as elementary from '../../../src/science/numeric/elementary';

const { exp, expm1, log, log1p, log10, pow, sin, cos, tan, atan, atan2 } = elementary;
const { sinh, cosh, tanh, cbrt, hypot } = elementary;

const functions: Record<string, (...x: number[]) => number> = { ...elementary };
const oneArgument = [
  'exp',
  'expm1',
  'log',
  'log1p',
  'log10',
  'sin',
  'cos',
  'tan',
  'sinh',
  'cosh',
  'tanh',
  'atan',
  'cbrt',
] as const;

describe('edge cases are those of Math (ECMA-262, Function Properties of the Math Object)', () => {
  const special = [NaN, 0, -0, Infinity, -Infinity, -1, 1];

  it.each(oneArgument)('%s at NaN, signed zeros, infinities and whole numbers', (name) => {
    for (const x of special) {
      const ours = functions[name]!(x);
      const theirs = Math[name](x);
      if (Number.isFinite(theirs) && theirs !== 0 && Math.abs(theirs) !== 1) {
        expect(Math.abs(ours / theirs - 1), `${name}(${x})`).toBeLessThan(1e-15);
      } else expect(ours, `${name}(${x})`).toBe(theirs);
    }
  });

  it('pow at every pair of special values', () => {
    const values = [NaN, 0, -0, 1, -1, 2, -2, 3, -3, 0.5, -0.5, 2.5, Infinity, -Infinity];
    for (const x of [...values, 1e300, -1e300, 5e-324]) {
      for (const y of [
        ...values,
        1e300,
        -1e300,
        9007199254740991,
        -9007199254740992,
        2251799813685247.5,
      ]) {
        const theirs = x ** y;
        const ours = pow(x, y);
        if (Number.isFinite(theirs) && theirs !== 0) {
          expect(Math.abs(ours / theirs - 1), `${x} to ${y}`).toBeLessThan(1e-15);
        } else expect(ours, `${x} to ${y}`).toBe(theirs);
      }
    }
  });

  it('atan2 at every pair of special values', () => {
    const values = [NaN, 0, -0, 1, -1, Infinity, -Infinity, 5e-324, -5e-324, 1e308];
    for (const y of values) {
      for (const x of values) {
        const theirs = Math.atan2(y, x);
        const ours = atan2(y, x);
        if (theirs === 0 || Number.isNaN(theirs)) expect(ours, `${y}, ${x}`).toBe(theirs);
        else expect(Math.abs(ours / theirs - 1), `${y}, ${x}`).toBeLessThan(1e-15);
      }
    }
  });

  it('hypot puts infinity before NaN and keeps away from overflow', () => {
    expect(hypot(NaN, -Infinity)).toBe(Infinity);
    expect(hypot(NaN, 1)).toBe(NaN);
    expect(hypot(-0, 0)).toBe(0);
    expect(hypot(3e300, 4e300)).toBe(5e300);
    expect(hypot(3 * 5e-324, 4 * 5e-324)).toBe(5 * 5e-324);
    expect(hypot(2, 3, 6)).toBe(7);
    expect(hypot(1.7e308, 1.7e308)).toBe(Infinity);
  });
});

describe('ends of the range', () => {
  it('exp overflows and underflows where the true value does', () => {
    expect(exp(709.782712893384)).toBe(1.7976931348622732e308);
    expect(exp(709.7827128933841)).toBe(Infinity);
    expect(exp(-745.1332191019411)).toBe(5e-324);
    // ln 2^-1075 lies between the two
    expect(exp(-745.1332191019412)).toBe(0);
    expect(exp(-708.5)).toBeGreaterThan(0);
    expect(expm1(710)).toBe(Infinity);
    expect(expm1(-800)).toBe(-1);
  });

  it('log reaches the smallest and largest doubles', () => {
    expect(log(5e-324)).toBe(-744.4400719213812);
    expect(log(1.7976931348623157e308)).toBe(709.782712893384);
    expect(log(-1e-300)).toBe(NaN);
    expect(log1p(-1.0000000000000002)).toBe(NaN);
    expect(log1p(5e-324)).toBe(5e-324);
  });

  it('the hyperbolic functions overflow late', () => {
    expect(cosh(710.4)).toBeLessThan(Infinity);
    expect(sinh(-710.4)).toBeGreaterThan(-Infinity);
    expect(cosh(710.5)).toBe(Infinity);
    expect(sinh(-710.5)).toBe(-Infinity);
    expect(tanh(30)).toBe(1);
    expect(tanh(-30)).toBe(-1);
  });

  it('small arguments pass through unchanged', () => {
    for (const x of [5e-324, -1e-310, 1e-20]) {
      for (const call of [sin, tan, sinh, tanh, atan, expm1, log1p]) expect(call(x)).toBe(x);
      expect(cos(x)).toBe(1);
    }
  });
});

describe('exact cases stay exact', () => {
  it('log10 of powers of ten', () => {
    for (let n = -307; n <= 308; n++) expect(log10(Number(`1e${n}`))).toBe(n);
  });

  it('cube roots of cubes', () => {
    for (let n = 1; n < 2000; n++) expect(cbrt(-n * n * n)).toBe(-n);
  });

  it('whole powers that are doubles', () => {
    for (let n = -1074; n <= 1023; n++) expect(pow(2, n)).toBe(2 ** n);
    for (let n = 0; n <= 22; n++) expect(pow(10, n)).toBe(Number(`1e${n}`));
    for (let n = 0; n <= 33; n++) expect(pow(-3, n)).toBe(Number((-3n) ** BigInt(n)));
  });

  it('square root as a power', () => {
    for (let n = 0; n < 1000; n++) expect(pow(n * n, 0.5)).toBe(n);
  });
});
