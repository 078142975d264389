/** Cells of text tables. */
import { describe, expect, it } from 'vitest';
import { cellNumber, hasThousandsSeparators } from '../../../src/io/text/cell';

describe('a cell is a number', () => {
  it.each([
    ['0', 0],
    ['00', 0],
    ['-0.5', -0.5],
    ['+3', 3],
    ['.5', 0.5],
    ['-.5', -0.5],
    ['7.', 7],
    [' 12 ', 12],
    ['5.997780e+002', 599.778],
    ['1.5D+03', 1500],
    ['-2.5d-2', -0.025],
    ['0e5', 0],
    ['0D+00', 0],
    ['1E5', 100_000],
    ['−4.5', -4.5],
    ['9007199254740993', 9007199254740992],
    ['0.1', 0.1],
    ['2.2250738585072014e-308', 2.2250738585072014e-308],
    ['5e-324', 5e-324],
  ])('%s', (text, value) => {
    expect(cellNumber(text, '.')).toBe(value);
  });

  it.each([
    ['-48,35', -48.35],
    ['120,0000', 120],
    [',5', 0.5],
    ['1,5E3', 1500],
    ['42', 42],
  ])('%s with a decimal comma', (text, value) => {
    expect(cellNumber(text, ',')).toBe(value);
  });
});

describe('a cell is no data', () => {
  it.each([
    ['', '  ', 'NA', 'n/a', '#N/A', 'NaN', 'nan', '-nan', 'NULL', 'None', '-', '--'],
    ['inf', '-inf', '+Inf', 'Infinity', '-Infinity', '1e999', '-1e999', '1.#QNAN', '-nan(ind)'],
  ])('when it is %j, %j, …', (...texts) => {
    for (const text of texts) {
      expect(cellNumber(text, '.')).toBeNaN();
      expect(cellNumber(text, ',')).toBeNaN();
    }
  });
});

describe('a cell is neither', () => {
  it('when it is a word, a date, another base, or has a second mark', () => {
    const texts = ['abc', '12 nm', '0x1f', '0b11', '0o7', '1e', 'e5', '1_000', '1n', '2024-01-02'];
    for (const text of [...texts, '12:30', '1.2.3', '1,5', '1,234.5', '--5', '.', '+', 'true']) {
      expect(cellNumber(text, '.'), text).toBeUndefined();
    }
    for (const text of ['1.5', '1,2,3', '1.234,5']) {
      expect(cellNumber(text, ','), text).toBeUndefined();
    }
  });
});

describe('thousands separators', () => {
  it('are told from decimals', () => {
    for (const text of ['1,234.5', '1.234,5', "1'234", '12 345', '1,234,567', '1.234.567,8']) {
      expect(hasThousandsSeparators(text), text).toBe(true);
    }
    for (const text of ['1,234', '1.234', '12345', '1234.5', '1,5', '']) {
      expect(hasThousandsSeparators(text), text).toBe(false);
    }
  });
});
