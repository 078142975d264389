import { describe, expect, it } from 'vitest';
import { enteredNumber } from '../../../src/views/forms/entered-number';

describe('a number typed on the import sheet', () => {
  it.each([
    ['532', 532],
    [' 532.1 ', 532.1],
    ['532,1', 532.1],
    ['785.', 785],
    ['.5', 0.5],
    ['1e3', 1000],
    ['−302', -302],
    ['+3', 3],
  ])('is read from "%s"', (text, value) => {
    expect(enteredNumber(text, 'any')).toBe(value);
  });

  it.each(['', ' ', '-', '5 3 2', '532nm', '1,234.5', '1,2,3', '0x10', 'NaN', 'Infinity', '1e999'])(
    'is none in "%s"',
    (text) => {
      expect(enteredNumber(text, 'any')).toBeNull();
    },
  );

  it('keeps the rule of its field', () => {
    expect(enteredNumber('0', 'positive')).toBeNull();
    expect(enteredNumber('-1', 'positive')).toBeNull();
    expect(enteredNumber('0', 'not negative')).toBe(0);
    expect(enteredNumber('-0.1', 'not negative')).toBeNull();
    expect(enteredNumber('0.9', 'at least one')).toBeNull();
    expect(enteredNumber('1', 'at least one')).toBe(1);
  });
});
