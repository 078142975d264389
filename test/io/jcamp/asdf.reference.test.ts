/**
 * The compressed forms of JCAMP-DX against the worked examples of the standard: R. S. McDonald,
 * P. A. Wilks, Appl. Spectrosc. 42, 151 (1988). The examples and Table VII are from memory; the long
 * one carries its own check value, which an error in either would not meet.
 */
import { describe, expect, it } from 'vitest';
import { readOrdinateLine } from '../../../src/io/jcamp/asdf';

const ordinates = (text: string): readonly number[] => readOrdinateLine(text, 'here').ordinates;

describe('the forms of one series (from memory of the standard)', () => {
  const series = [1, 2, 3, 3, 2, 1, 0, -1, -2, -3];

  it.each([
    ['FIX', '400 1 2 3 3 2 1 0 -1 -2 -3'],
    ['PAC', '400+1+2+3+3+2+1+0-1-2-3'],
    ['SQZ', '400ABCCBA@abc'],
    ['SQZ with DUP', '400ABCTBA@abc'],
    ['DIF', '400AJJ%jjjjjj'],
    ['DIF with DUP', '400AJT%jX'],
  ])('%s', (_, text) => {
    expect(ordinates(text)).toEqual(series);
    expect(readOrdinateLine(text, 'here').abscissa).toBe(400);
  });
});

describe('the letters of Table VII (from memory)', () => {
  it('squeeze the leading digit and its sign', () => {
    expect(ordinates('0@ABCDEFGHIabcdefghi')).toEqual([
      0, 1, 2, 3, 4, 5, 6, 7, 8, 9, -1, -2, -3, -4, -5, -6, -7, -8, -9,
    ]);
    expect(ordinates('0A0B12c345@5')).toEqual([10, 212, -3345, 5]);
  });

  it('stand for differences', () => {
    const steps = [0, 1, 2, 3, 4, 5, 6, 7, 8, 9, -1, -2, -3, -4, -5, -6, -7, -8, -9];
    const sums = steps.map((_, i) => steps.slice(0, i + 1).reduce((sum, step) => sum + step, 0));
    expect(ordinates('0@%JKLMNOPQRjklmnopqr')).toEqual([0, ...sums]);
    expect(ordinates('0A0J5k07')).toEqual([10, 25, 25 - 207]);
  });

  it('repeat the value before, or the difference before', () => {
    const repeats = [...'STUVWXYZs'].map((letter) => ordinates(`0E${letter}`).length);
    expect(repeats).toEqual([1, 2, 3, 4, 5, 6, 7, 8, 9]);
    expect(ordinates('0AS0')).toEqual(Array.from({ length: 10 }, () => 1));
    expect(ordinates('0AJU')).toEqual([1, 2, 3, 4]);
  });
});

describe('the long example (from memory, met by its own check value)', () => {
  const first = '599.860@VKT%TLkj%J%KLJ%njKjL%kL%jJULJ%kLK1%lLMNPNPRLJ0QTOJ1P';
  const second = '700.158A28';

  it('ends in differences whose sum is the check on the next line', () => {
    const line = readOrdinateLine(first, 'here');
    expect(line.endsInDifference).toBe(true);
    expect(line.abscissa).toBe(599.86);
    expect(line.ordinates.slice(0, 12)).toEqual([0, 0, 0, 0, 2, 4, 4, 4, 7, 5, 4, 4]);
    expect(line.ordinates.at(-1)).toBe(128);
    expect(readOrdinateLine(second, 'here').ordinates).toEqual([128]);
    // 4 cm⁻¹ resolution: points 1.9288 cm⁻¹ apart, as the two abscissae then say too
    expect((700.158 - 599.86) / (line.ordinates.length - 1)).toBeCloseTo(1.9288, 4);
  });
});

describe('free numbers', () => {
  it('end at blanks, commas and signs, and E with a sign is an exponent (section 5.3)', () => {
    expect(ordinates('1 .34,66E-2')).toEqual([0.34, 0.66]);
    expect(ordinates('1 1.5E+03 -2.5E-01 +.5 7.')).toEqual([1500, -0.25, 0.5, 7]);
    expect(ordinates('5.99860E+02 1')).toEqual([1]);
    expect(readOrdinateLine('5.99860E+02 1', 'here').abscissa).toBe(599.86);
  });

  it('are followed by squeezed ones where E has no sign', () => {
    expect(ordinates('1 2E3')).toEqual([2, 53]);
    expect(ordinates('400E3e2')).toEqual([53, -52]);
    expect(ordinates('400 2.5E3')).toEqual([2500]);
  });

  it('are told how finely they were written', () => {
    expect(readOrdinateLine('599.860 1', 'here').resolution).toBe(0.001);
    expect(readOrdinateLine('599 1', 'here').resolution).toBe(1);
    expect(readOrdinateLine('5.99E+02 1', 'here').resolution).toBe(1);
  });

  it('may be lost', () => {
    expect(ordinates('1 5 ? 6?7')).toEqual([5, Number.NaN, 6, Number.NaN, 7]);
    expect(ordinates('1A?TB')).toEqual([1, Number.NaN, Number.NaN, 2]);
  });
});

describe('a line is refused', () => {
  it.each([
    ['1 5 x', 'is no part of a JCAMP-DX table'],
    ['words', 'is no part of a JCAMP-DX table'],
    ['1 T', 'is no part of a JCAMP-DX table'],
    ['1 5 ! 6', 'is no part of a JCAMP-DX table'],
    ['1J', 'a difference follows no value'],
    ['1 ?J', 'a difference follows no value'],
    ['1AZ99999999', 'more than 1048576 values'],
  ])('%s', (text, what) => {
    expect(() => readOrdinateLine(text, 'here')).toThrow(what);
  });
});
