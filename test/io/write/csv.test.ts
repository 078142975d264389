import fc from 'fast-check';
import Papa from 'papaparse';
import { describe, expect, it } from 'vitest';
import { csvPieces, encodeCsv } from '../../../src/io/write/csv';

describe('a table', () => {
  it('has one line of names and one per row; no value is an empty field', () => {
    const text = encodeCsv([
      { name: 'y', values: Int32Array.of(0, 0, 1) },
      { name: 'band.tail.centroid', values: [1.9, Number.NaN, 0.1 + 0.2] },
      { name: 'big', values: [1e300, Number.POSITIVE_INFINITY, -0] },
    ]);
    expect(text).toBe('y,band.tail.centroid,big\n0,1.9,1e+300\n0,,inf\n1,0.30000000000000004,-0\n');
  });

  it('quotes texts that need it', () => {
    const text = encodeCsv([{ name: 'region, name', values: ['a "rim"', ' b', 'c\nd', 'e'] }]);
    expect(text).toBe('"region, name"\n"a ""rim"""\n" b"\n"c\nd"\ne\n');
  });

  it('without rows is its line of names', () => {
    expect(encodeCsv([{ name: 'a', values: [] }])).toBe('a\n');
  });

  it('with columns of different lengths is a fault', () => {
    const columns = [
      { name: 'a', values: [1] },
      { name: 'b', values: [1, 2] },
    ];
    expect(() => encodeCsv(columns)).toThrow('column b has 2 rows where the first has 1');
  });

  it('comes in pieces that make the whole', () => {
    const values = Float64Array.from({ length: 2500 }, (_, i) => i / 7);
    const pieces = [...csvPieces([{ name: 'a', values }])];
    expect(pieces).toHaveLength(4);
    expect(pieces.join('')).toBe(encodeCsv([{ name: 'a', values }]));
  });

  it('reads back as the same doubles, and the same texts', () => {
    fc.assert(
      fc.property(
        fc.array(fc.tuple(fc.double(), fc.string()), { minLength: 1, maxLength: 50 }),
        (rows) => {
          const text = encodeCsv([
            { name: 'number', values: rows.map(([number]) => number) },
            { name: 'text', values: rows.map(([, name]) => name) },
          ]);
          const { data } = Papa.parse<string[]>(text.slice(0, -1), {
            newline: '\n',
            delimiter: ',',
          });
          const read = data.slice(1).map(([number, name]) => {
            const value = number === '' ? Number.NaN : Number(number.replace('inf', 'Infinity'));
            return [value, name];
          });
          expect(read).toEqual(rows);
        },
      ),
    );
  });
});
