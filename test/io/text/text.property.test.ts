/** Any table reads back equal, however it is written and whatever the order of its rows. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Container } from '../../../src/io/container';
import { numbersOf, openText } from './open-text';

interface Style {
  readonly delimiter: string;
  readonly mark: string;
  readonly end: string;
  readonly isEndless: boolean;
  readonly isExponential: boolean;
}

const style: fc.Arbitrary<Style> = fc
  .record({
    delimiter: fc.constantFrom(',', ';', '\t', ' ', '   ', ' \t', ', ', ' ; '),
    mark: fc.constantFrom('.', ','),
    end: fc.constantFrom('\n', '\r\n', '\r'),
    isEndless: fc.boolean(),
    isExponential: fc.boolean(),
  })
  .filter(({ delimiter, mark }) => !(delimiter.startsWith(',') && mark === ','));

function written(value: number, { mark, isExponential }: Style): string {
  if (Number.isNaN(value)) return 'NaN';
  const text = isExponential ? value.toExponential(16) : String(value);
  return text.replace('.', mark);
}

const texts = (
  rows: readonly (readonly string[])[],
  { delimiter, end, isEndless }: Style,
): string => rows.map((cells) => cells.join(delimiter)).join(end) + (isEndless ? '' : end);

const open = (rows: readonly (readonly string[])[], how: Style): Promise<Container> =>
  openText(texts(rows, how), 'table.txt');

const value = fc.oneof(
  fc.integer({ min: 0, max: 70_000 }),
  fc.double({ noNaN: true, noDefaultInfinity: true, min: -1e6, max: 1e6 }),
);
const count = fc.oneof(
  { weight: 8, arbitrary: value },
  { weight: 1, arbitrary: fc.constant(Number.NaN) },
);
/** −0 is written as 0 */
const plain = (values: readonly number[]): number[] => values.map((one) => one + 0);

/** A scan of small size: positions, axis, counts by pixel; the order of its rows. */
const scan = fc
  .record({
    xs: fc.uniqueArray(fc.integer({ min: -50, max: 50 }), { minLength: 1, maxLength: 5 }),
    ys: fc.uniqueArray(fc.integer({ min: -50, max: 50 }), { minLength: 1, maxLength: 4 }),
    axis: fc.uniqueArray(fc.integer({ min: 1, max: 4000 }), { minLength: 2, maxLength: 6 }),
    scale: fc.constantFrom(1, 0.25, 0.1),
  })
  .chain(({ xs, ys, axis, scale }) =>
    fc.record({
      x: fc.constant([...xs].sort((a, b) => a - b).map((one) => one * scale)),
      y: fc.constant([...ys].sort((a, b) => a - b).map((one) => one * scale)),
      axis: fc.constant(axis.map((one) => one / 8)),
      counts: fc.array(count, {
        minLength: xs.length * ys.length * axis.length,
        maxLength: xs.length * ys.length * axis.length,
      }),
      order: fc.shuffledSubarray(
        Array.from({ length: xs.length * ys.length }, (_, i) => i),
        { minLength: xs.length * ys.length },
      ),
    }),
  )
  .filter(({ counts }) => counts.some((one) => !Number.isNaN(one)));

describe('one row per pixel', () => {
  it('gives the same cube for any order of rows, any separator and any decimal mark', async () => {
    await fc.assert(
      fc.asyncProperty(scan, style, async ({ x, y, axis, counts, order }, how) => {
        const nk = axis.length;
        const write = (one: number): string => written(one, how);
        const rows = order.map((pixel) => [
          write(x[pixel % x.length]),
          write(y[Math.floor(pixel / x.length)]),
          ...counts.slice(pixel * nk, (pixel + 1) * nk).map(write),
        ]);
        const file = await open([['x', 'y', ...axis.map(write)], ...rows], how);
        expect(file.entries[0]).toMatchObject({ path: 'counts', shape: [y.length, x.length, nk] });
        expect(await numbersOf(file, 'counts')).toEqual(plain(counts));
        expect(await numbersOf(file, 'axis')).toEqual(axis);
        expect(await numbersOf(file, 'x')).toEqual(plain(x));
        expect(await numbersOf(file, 'y')).toEqual(plain(y));
      }),
      { numRuns: 300 },
    );
  });
});

describe('long rows', () => {
  it('give the same cube for any order of points and any style', async () => {
    await fc.assert(
      fc.asyncProperty(scan, style, fc.boolean(), async (one, how, isAxisSlow) => {
        const { x, y, axis, counts, order } = one;
        const nk = axis.length;
        const cells = (pixel: number, k: number): string[] =>
          [
            x[pixel % x.length],
            y[Math.floor(pixel / x.length)],
            axis[k],
            counts[pixel * nk + k],
          ].map((number) => written(number, how));
        const rows = isAxisSlow
          ? axis.flatMap((_, k) => order.map((pixel) => cells(pixel, k)))
          : order.flatMap((pixel) => axis.map((_, k) => cells(pixel, k)));
        const names = ['x', 'y', 'raman_shift_cm1', 'counts'];
        const file = await open([names, ...rows], how);
        expect(file.entries[0]).toMatchObject({ path: 'counts', shape: [y.length, x.length, nk] });
        expect(await numbersOf(file, 'counts')).toEqual(plain(counts));
        expect(await numbersOf(file, 'axis')).toEqual(axis);
      }),
      { numRuns: 300 },
    );
  });
});

describe('columns', () => {
  it('read back equal', async () => {
    const table = fc.integer({ min: 2, max: 5 }).chain((columns) =>
      fc.array(fc.array(value, { minLength: columns, maxLength: columns }), {
        minLength: 2,
        maxLength: 12,
      }),
    );
    await fc.assert(
      fc.asyncProperty(table, style, async (rows, how) => {
        const names = rows[0].map((_, i) => `name${'abcde'[i]}`);
        const cells = rows.map((row) => row.map((one) => written(one, how)));
        const file = await open([names, ...cells], how);
        for (const [i, name] of names.entries()) {
          expect(await numbersOf(file, name)).toEqual(plain(rows.map((row) => row[i])));
        }
      }),
      { numRuns: 300 },
    );
  });
});
