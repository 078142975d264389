/** Limits of colour scales: percentiles, numbers, what is typed, and which pairs are taken. */
import { describe, expect, it } from 'vitest';
import { orderedLimits, parseLimit, resolveLimits } from '../../src/science/limits';

const values = Float64Array.from({ length: 101 }, (_, i) => 10 * i);

describe('resolveLimits', () => {
  it('turns percentiles into values and leaves numbers as they are', () => {
    expect(resolveLimits(values, 'p2', 'p98')).toEqual({ low: 20, high: 980 });
    expect(resolveLimits(values, -7, 'p100')).toEqual({ low: -7, high: 1000 });
    expect(resolveLimits(values, 3, 4)).toEqual({ low: 3, high: 4 });
  });

  it('has no percentile of a map without values', () => {
    const none = Float64Array.of(Number.NaN);
    expect(resolveLimits(none, 'p1', 5)).toEqual({ low: Number.NaN, high: 5 });
  });
});

describe('parseLimit', () => {
  it.each([
    ['p2', 'p2'],
    [' P99.5 ', 'p99.5'],
    ['2 %', 'p2'],
    ['1.5%', 'p1.5'],
    ['1200', 1200],
    ['−3.5', -3.5],
    ['1,25', 1.25],
    ['2e-4', 2e-4],
  ])('reads "%s"', (text, limit) => {
    expect(parseLimit(text)).toBe(limit);
  });

  it.each(['', 'p', 'p101', 'p1.2.3', 'abc', '1200 counts', 'Infinity'])('refuses "%s"', (text) => {
    expect(parseLimit(text)).toBeNull();
  });
});

describe('orderedLimits', () => {
  it('stops the percentile that is moved before the other', () => {
    expect(orderedLimits({ low: 'p99.9', high: 'p50' }, 'low', null)).toEqual({
      low: 'p49.9',
      high: 'p50',
    });
    expect(orderedLimits({ low: 'p50', high: 'p3' }, 'high', null)).toEqual({
      low: 'p50',
      high: 'p50.1',
    });
    expect(orderedLimits({ low: 'p0', high: 'p0' }, 'low', null)).toEqual({
      low: 'p0',
      high: 'p0.1',
    });
    expect(orderedLimits({ low: 'p100', high: 'p100' }, 'high', null)).toEqual({
      low: 'p99.9',
      high: 'p100',
    });
  });

  it('refuses numbers that cross, among themselves or with a percentile', () => {
    expect(orderedLimits({ low: 5, high: 5 }, 'low', values)).toBeNull();
    expect(orderedLimits({ low: 500, high: 'p50' }, 'low', values)).toBeNull();
    expect(orderedLimits({ low: 499, high: 'p50' }, 'low', values)).not.toBeNull();
  });
});
