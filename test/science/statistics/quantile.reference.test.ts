/**
 * Quantiles against NumPy 1.24.2, whose default method "linear" is definition 7 of Hyndman and Fan:
 *
 *   a = [2.5, -1.0, 7.25, np.nan, 3.0, 3.0, 11.5, 0.125, np.nan, 4.0]
 *   np.nanpercentile(a, [0, 1, 2, 25, 50, 75, 98, 99.5, 100]).tolist()
 *   np.nanpercentile((np.arange(10007) * 7919 % 10007) ** 1.5, [1, 50, 99.5]).tolist()
 */
import { describe, expect, it } from 'vitest';
import { quantiles } from '../../../src/science/statistics/quantile';

const few = Float64Array.of(2.5, -1, 7.25, Number.NaN, 3, 3, 11.5, 0.125, Number.NaN, 4);
const many = Float64Array.from({ length: 10007 }, (_, i) => ((i * 7919) % 10007) ** 1.5);

describe('quantiles', () => {
  it('are those of nanpercentile for a few values with gaps and ties', () => {
    const shares = [0, 0.01, 0.02, 0.25, 0.5, 0.75, 0.98, 0.995, 1];
    const expected = [
      -1, -0.92125, -0.8425, 1.90625, 3, 4.8125, 10.904999999999998, 11.35125, 11.5,
    ];
    const found = quantiles(few, shares);
    // 1e-14: the last bit of the interpolation
    expected.forEach((value, i) => {
      expect(Math.abs(found[i]! - value)).toBeLessThan(1e-14);
    });
  });

  it('are those of nanpercentile for ten thousand values in no order', () => {
    const expected = [1000.9022462639927, 353871.63636974356, 993402.775356468];
    quantiles(many, [0.01, 0.5, 0.995]).forEach((value, i) => {
      // 1e-12 relative: the powers differ in their last bits between libraries
      expect(Math.abs(value / expected[i]! - 1)).toBeLessThan(1e-12);
    });
  });
});
