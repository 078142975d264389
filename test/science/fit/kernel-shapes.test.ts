/** The kernels' own shapes beside those of `peaks/`, which are held to published values. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { createPlainFitKernel } from '../../../src/science/fit/fit-kernel';
import { angle, exponential, logarithm } from '../../../src/science/fit/kernel-elementary';
import { shapeEvaluator } from '../../../src/science/fit/kernel-evaluate';
import { atan2, exp, log } from '../../../src/science/numeric/elementary';
import { createRandom } from '../../../src/science/numeric/random';
import { gridOf } from '../../../src/science/peaks/shape';
import { shapeByName } from '../../../src/science/peaks/shape-by-name';
import { uniformAxis } from './made-spectra';

describe('elementary functions of the kernels', () => {
  it('are as near to the careful ones as they say', () => {
    const random = createRandom(5);
    const worst = { exp: 0, log: 0, angle: 0 };
    const note = (name: keyof typeof worst, got: number, want: number): void => {
      worst[name] = Math.max(worst[name], Math.abs(got / want - 1));
    };
    for (let i = 0; i < 100_000; i++) {
      const x = 690 * (2 * random.uniform() - 1);
      note('exp', exponential(x), exp(x));
      const y = exp(x);
      // Near 1 the logarithm is small and its error, in units of 1, is what matters.
      if (Math.abs(y - 1) > 0.5) note('log', logarithm(y), log(y));
      const [a, b] = [random.uniform(), 2 * random.uniform() - 1];
      note('angle', angle(a, b), atan2(a, b));
    }
    expect(worst.exp).toBeLessThan(4e-16);
    expect(worst.log).toBeLessThan(3e-16);
    expect(worst.angle).toBeLessThan(5e-14);
    expect(logarithm(1)).toBe(0);
    const near = 1 + 1e-9;
    expect(Math.abs(logarithm(near) / log(near) - 1)).toBeLessThan(3e-16);
  });
});

const grid = gridOf(uniformAxis(200, 1.9, 2.1), 0, 200);

/** Values a fit may come by, in the order of the shape's parameters; peaks stand in the window, so that their height is in view. */
const values: Readonly<Record<string, fc.Arbitrary<number[]>>> = {
  flat: fc.tuple(fc.double({ min: -10, max: 10, noNaN: true })),
  line: fc.tuple(fc.integer({ min: -9, max: 9 }), fc.integer({ min: -100, max: 100 })),
  parabola: fc.tuple(
    fc.integer({ min: -9, max: 9 }),
    fc.integer({ min: -100, max: 100 }),
    fc.integer({ min: -100, max: 100 }),
  ),
  decay: fc.tuple(
    fc.integer({ min: 1, max: 100 }),
    fc.double({ min: 0.01, max: 10, noNaN: true }).map((length) => length),
  ),
  gaussian: fc.tuple(
    fc.integer({ min: -500, max: 500 }).filter((area) => area !== 0),
    fc.double({ min: 1.9, max: 2.1, noNaN: true }),
    fc.double({ min: 5e-4, max: 0.3, noNaN: true }),
  ),
  lorentzian: fc.tuple(
    fc.integer({ min: 1, max: 500 }),
    fc.double({ min: 1.9, max: 2.1, noNaN: true }),
    fc.double({ min: 1e-5, max: 0.3, noNaN: true }),
  ),
  'pseudo-voigt': fc.tuple(
    fc.integer({ min: 1, max: 500 }),
    fc.double({ min: 1.92, max: 2.08, noNaN: true }),
    fc.double({ min: 5e-4, max: 0.3, noNaN: true }),
    fc.double({ min: 0, max: 1, noNaN: true }),
  ),
};

describe.each(Object.entries(values))('%s of the kernels', (name, arbitrary) => {
  it('has the counts and derivatives of the careful one', () => {
    const shape = shapeByName(name);
    const size = shape.parameters.length;
    const kernel = createPlainFitKernel(grid, size);
    const evaluate = shapeEvaluator(shape, 0, kernel);
    // Of a pseudo-Voigt's Gaussian the careful one takes two terms where channels are narrow, ours the whole integral.
    const tolerance = name === 'pseudo-voigt' ? 1e-6 : 2e-10;
    fc.assert(
      fc.property(arbitrary, (list) => {
        const own = Float64Array.from(list);
        kernel.model.fill(0);
        for (const column of kernel.columns)
          if (size > 1 && name !== 'line' && name !== 'parabola') column.fill(0);
        evaluate(own, true);
        const counts = new Float64Array(200);
        const columns = shape.parameters.map(() => new Float64Array(200));
        shape.evaluate(grid, own, counts, columns);
        expectAlike(kernel.model, counts, tolerance);
        for (const [i, column] of columns.entries()) {
          expectAlike(kernel.columns[i], column, tolerance);
        }
      }),
      { numRuns: 200 },
    );
  });
});

/** @param tolerance - of the greatest */
function expectAlike(got: Float64Array, want: Float64Array, tolerance: number): void {
  const most = want.reduce((top, value) => Math.max(top, Math.abs(value)), 1e-30);
  for (let k = 0; k < want.length; k++) {
    expect(Math.abs(got[k] - want[k]) / most).toBeLessThan(tolerance);
  }
}
