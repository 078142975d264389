/** Numbers survive being written and read. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { cellNumber } from '../../../src/io/text/cell';

const finite = fc.double({ noNaN: true, noDefaultInfinity: true });

describe('any double', () => {
  it('is the same after it was written with a point, a comma, or seventeen digits', () => {
    fc.assert(
      fc.property(finite, (value) => {
        expect(cellNumber(String(value), '.')).toBe(value === 0 ? 0 : value);
        expect(cellNumber(String(value).replace('.', ','), ',')).toBe(value === 0 ? 0 : value);
        expect(cellNumber(value.toExponential(16), '.')).toBe(value === 0 ? 0 : value);
        expect(cellNumber(value.toExponential(16).replace('e', 'D'), '.')).toBe(
          value === 0 ? 0 : value,
        );
      }),
    );
  });

  it('is what Number() says wherever a text is read as a number', () => {
    fc.assert(
      fc.property(fc.string({ unit: fc.constantFrom(...'0123456789.eE+-x ') }), (text) => {
        const value = cellNumber(text, '.');
        if (value === undefined || Number.isNaN(value)) return;
        expect(value).toBe(Number(text));
      }),
    );
  });
});
