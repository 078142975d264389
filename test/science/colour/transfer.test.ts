/** Transfer curves, worked by hand and there and back. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { planTransfer } from '../../../src/science/colour/transfer';

describe('planTransfer', () => {
  it('gives shares between the limits and clips beyond', () => {
    const { shareOf } = planTransfer('linear', { low: 10, high: 20 });
    expect([5, 10, 12.5, 20, 99].map(shareOf)).toEqual([0, 0, 0.25, 1, 1]);
    expect(shareOf(Number.NaN)).toBeNaN();
  });

  it('takes the root of the share for counts', () => {
    const { shareOf, valueAt } = planTransfer('sqrt', { low: 0, high: 400 });
    expect([0, 100, 400].map(shareOf)).toEqual([0, 0.5, 1]);
    expect(valueAt(0.5)).toBe(100);
  });

  it('takes equal steps for equal factors on a logarithmic scale', () => {
    const { shareOf, valueAt } = planTransfer('log', { low: 1, high: 10_000 });
    for (const [value, share] of [
      [1, 0],
      [10, 0.25],
      [100, 0.5],
      [10_000, 1],
    ] as const)
      expect(shareOf(value)).toBeCloseTo(share, 14);
    expect(valueAt(0.75)).toBeCloseTo(1000, 9);
  });

  it('spans three decades where the low limit has no logarithm', () => {
    const { shareOf } = planTransfer('log', { low: -5, high: 1000 });
    expect([-5, 0, 1].map(shareOf)).toEqual([0, 0, 0]);
    expect(shareOf(10)).toBeCloseTo(1 / 3, 14);
  });

  it('is linear where no limit has a logarithm', () => {
    expect(planTransfer('log', { low: -4, high: 0 }).shareOf(-1)).toBe(0.75);
  });

  it('is turned round where low lies above high', () => {
    const { shareOf } = planTransfer('linear', { low: 20, high: 10 });
    expect([20, 12.5, 10, 5].map((value) => Math.abs(shareOf(value)))).toEqual([0, 0.75, 1, 1]);
  });

  it('is a step where the limits are equal', () => {
    const { shareOf } = planTransfer('linear', { low: 3, high: 3 });
    expect([2, 3, 4].map(shareOf)).toEqual([0, 0, 1]);
    expect(shareOf(Number.NaN)).toBeNaN();
  });

  it('comes back from share to value, on every curve', () => {
    const transfer = fc.constantFrom('linear', 'sqrt', 'log') as fc.Arbitrary<
      'linear' | 'sqrt' | 'log'
    >;
    const share = fc.double({ min: 0, max: 1, noNaN: true });
    const low = fc.double({ min: 0.1, max: 100, noNaN: true });
    const span = fc.double({ min: 0.1, max: 1e5, noNaN: true });
    fc.assert(
      fc.property(transfer, share, low, span, (kind, wanted, from, by) => {
        const curve = planTransfer(kind, { low: from, high: from + by });
        // 1e-6: near zero the root enlarges rounding
        expect(Math.abs(curve.shareOf(curve.valueAt(wanted)) - wanted)).toBeLessThan(1e-6);
      }),
    );
  });
});
