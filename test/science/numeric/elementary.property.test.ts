import fc from 'fast-check';
import { expect, it } from 'vitest';
import {
  atan2,
  cbrt,
  cos,
  cosh,
  exp,
  expm1,
  hypot,
  log,
  log1p,
  pow,
  sin,
  sinh,
  tan,
  tanh,
} from '../../../src/science/numeric/elementary';

const within = (min: number, max: number) => fc.double({ min, max, noNaN: true });
const bits = new DataView(new ArrayBuffer(8));

/** The next double above a finite positive one. */
function nextUp(x: number): number {
  bits.setFloat64(0, x);
  bits.setBigInt64(0, bits.getBigInt64(0) + 1n);
  return bits.getFloat64(0);
}

const expectClose = (got: number, expected: number, relative: number) =>
  expect(Math.abs(got - expected)).toBeLessThanOrEqual(relative * Math.abs(expected) + 5e-324);

it('exp, log, cbrt and sinh never fall as their argument rises', () => {
  fc.assert(
    fc.property(within(1e-300, 700), (x) => {
      const next = nextUp(x);
      for (const call of [exp, expm1, log, log1p, cbrt]) {
        expect(call(next)).toBeGreaterThanOrEqual(call(x));
      }
      expect(exp(-next)).toBeLessThanOrEqual(exp(-x));
    }),
    { numRuns: 2000 },
  );
});

it('log undoes exp and exp undoes log', () => {
  fc.assert(
    fc.property(within(-700, 700), (x) => {
      // log turns a relative error of 2^-53 into an absolute one
      expect(Math.abs(log(exp(x)) - x)).toBeLessThanOrEqual(2.3e-16 * Math.max(1, Math.abs(x)));
      expectClose(exp(log(exp(x))), exp(x), 2.3e-16 * Math.max(2, Math.abs(x)));
      if (x > 1e-300) expectClose(log1p(expm1(Math.min(x, 5))), Math.min(x, 5), 6e-16);
    }),
    { numRuns: 2000 },
  );
});

it('sin² + cos² is 1 and tan is their quotient, at any finite angle', () => {
  fc.assert(
    fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (x) => {
      const s = sin(x);
      const c = cos(x);
      expect(Math.abs(s * s + c * c - 1)).toBeLessThan(6e-16);
      expectClose(tan(x), s / c, 6e-16);
      expect(sin(-x)).toBe(-s);
      expect(cos(-x)).toBe(c);
    }),
    { numRuns: 2000 },
  );
});

it('polar and Cartesian forms agree', () => {
  fc.assert(
    fc.property(within(-1e6, 1e6), within(-1e6, 1e6), (x, y) => {
      const r = hypot(x, y);
      const angle = atan2(y, x);
      expect(Math.abs(r * cos(angle) - x)).toBeLessThanOrEqual(1e-15 * r);
      expect(Math.abs(r * sin(angle) - y)).toBeLessThanOrEqual(1e-15 * r);
      expect(hypot(y, x)).toBe(r);
    }),
    { numRuns: 2000 },
  );
});

it('cosh² − sinh² is 1 and tanh is their quotient', () => {
  fc.assert(
    fc.property(within(-15, 15), (x) => {
      const s = sinh(x);
      const c = cosh(x);
      expect(Math.abs((c - s) * (c + s) - 1)).toBeLessThan(2e-15 * c * c);
      expectClose(tanh(x), s / c, 1.2e-15);
      expect(sinh(-x)).toBe(-s);
    }),
  );
});

it('powers follow their laws', () => {
  fc.assert(
    fc.property(within(1e-5, 1e5), within(-20, 20), (x, y) => {
      expectClose(pow(x, y) * pow(x, -y), 1, 7e-16);
      expectClose(pow(x, 3), x * x * x, 6e-16);
      expectClose(pow(cbrt(x), 3), x, 1e-15);
    }),
  );
});
