import { expect, it } from 'vitest';
import { fallingStep } from '../../../src/science/numeric/logistic';

it('is 1/(1 + eˣ) to 4e-10, and 1 and 0 far away', () => {
  for (let x = -40; x <= 40; x += 0.00713) {
    expect(Math.abs(fallingStep(x) - 1 / (1 + Math.exp(x)))).toBeLessThan(4e-10);
  }
  expect([
    fallingStep(-1e9),
    fallingStep(Number.POSITIVE_INFINITY),
    fallingStep(Number.NaN),
  ]).toEqual([1, 0, Number.NaN]);
});
