import { describe, expect, it } from 'vitest';
import { logPoissonProbability } from '../../../src/science/numeric/poisson';

describe('logPoissonProbability', () => {
  // mpmath 1.3.0 at 200 bits: k ln m − m − ln Γ(k + 1)
  it.each([
    [0, 3.5, -3.5],
    [1, 0.001, -6.908755278982137],
    [3, 2.5, -1.5428872736055899],
    [15, 20, -2.9632872805310266],
    [16, 9.25, -4.3278832816913315],
    [100, 90, -3.7584085225369837],
    [1000, 1100.5, -9.108277521646992],
    [65535, 65000, -8.65982448057388],
    [1000000000, 1000012345, -11.35677033714503],
    [5, 1e-8, -96.89089547254387],
    [200, 3, -646.5095294587835],
  ])('k = %d at mean %d', (k, mean, expected) => {
    const error = Math.abs(logPoissonProbability(k, mean) - expected);
    expect(error).toBeLessThan(1e-14 * Math.max(1, Math.abs(expected)));
  });

  it('sums to one', () => {
    for (const mean of [0.3, 9, 250]) {
      let sum = 0;
      for (let k = 0; k < 1000; k++) sum += Math.exp(logPoissonProbability(k, mean));
      expect(Math.abs(sum - 1)).toBeLessThan(1e-13);
    }
  });

  it('allows no negative counts', () => {
    expect(logPoissonProbability(-1, 5)).toBe(-Infinity);
  });
});
