import { describe, expect, it } from 'vitest';
import { timeLeft } from '../../../src/views/shell/time-left';

describe('the time left of a run', () => {
  it('is what the rest takes at the pace so far', () => {
    expect(timeLeft(0.5, 400)).toBe('0.4 s left');
    expect(timeLeft(0.25, 10_000)).toBe('30 s left');
    expect(timeLeft(0.1, 20_000)).toBe('3 min left');
  });

  it('is not told before enough is done, nor at the end', () => {
    expect(timeLeft(0, 5000)).toBe('');
    expect(timeLeft(0.01, 5000)).toBe('');
    expect(timeLeft(1, 5000)).toBe('');
    expect(timeLeft(Number.NaN, 5000)).toBe('');
  });

  it('has no gap between its units', () => {
    expect(timeLeft(0.5, 9_960)).toBe('10 s left');
    expect(timeLeft(0.5, 99_600)).toBe('2 min left');
  });
});
