import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { isPeak, shapeByName, shapeNames } from '../../../src/science/peaks/shape-by-name';
import { columnsOf, countsOf, evenGrid } from './made-grid';

const between = (min: number, max: number) => fc.double({ min, max, noNaN: true });
/** Widths from a tenth of a channel to a third of the window of 80 channels of 5 meV. */
const width = between(-1.3, 2.1).map((power) => 0.005 * 10 ** (power - 0.1));
/** Tails from far below to far above every width. */
const tail = between(-6, 1).map((power) => 10 ** power);

/** Values of a shape's parameters, somewhere a fit may go. */
function arbitraryValues(name: string): fc.Arbitrary<number[]> {
  const parameters = shapeByName(name).parameters.map((parameter) => {
    switch (parameter.name) {
      case 'area':
        return between(1, 1e5);
      case 'centre':
        return between(1.85, 2.15);
      case 'fwhm':
      case 'fwhm_g':
      case 'fwhm_l':
        return width;
      case 'tail':
        return tail;
      case 'eta':
        return between(0, 1);
      case 'q':
        return fc.oneof(between(-30, -0.2), between(0.2, 30));
      case 'decay':
        return fc.oneof(between(0.05, 3), between(-3, -0.05));
      default:
        return fc.oneof(between(-500, -1e-3), between(1e-3, 500));
    }
  });
  return fc.tuple(...parameters);
}

const grid = evenGrid(1.8, 2.2, 80);

/** Weights of the differences f(h) − f(−h), f(2h) − f(−2h), f(3h) − f(−3h), over 60h: error of sixth order. */
const sixPoints = [45, -9, 1] as const;
/** Step of the difference, as a share of what the counts change over; its sixth power is the error. */
const stepShare = 4e-3;
/**
 * Errors the difference itself may have, as a share of the area: what is cut from the wings of a Gaussian or a
 * tail as its span moves, and steps between formulas; both are stated in `peaks/`.
 */
const cutShare = 3e-9;

describe.each(shapeNames.map((name) => [name]))('%s', (name) => {
  const shape = shapeByName(name);

  it('has the derivatives its counts have', () => {
    fc.assert(
      fc.property(arbitraryValues(name), (values) => {
        const columns = columnsOf(shape, grid, values);
        for (const [index, column] of columns.entries()) {
          const step = stepShare * scaleOf(name, values, index);
          const at = (by: number) => countsOf(shape, grid, replaced(values, index, by * step));
          const odd = sixPoints.map((_, i) => ({ after: at(i + 1), before: at(-i - 1) }));
          const largest = Math.max(...column.map(Math.abs));
          const floor = (cutShare * Math.abs(values[0]!)) / step;
          for (let k = 0; k < column.length; k++) {
            let numeric = 0;
            for (const [i, weight] of sixPoints.entries()) {
              numeric += (weight * (odd[i]!.after[k]! - odd[i]!.before[k]!)) / (60 * step);
            }
            expect(Math.abs(numeric - column[k]!)).toBeLessThanOrEqual(1e-7 * largest + floor);
          }
        }
      }),
      { numRuns: 60 },
    );
  });

  it('gives finite counts everywhere, with and without derivatives the same', () => {
    fc.assert(
      fc.property(arbitraryValues(name), (values) => {
        const counts = countsOf(shape, grid, values);
        for (const value of counts) expect(Number.isFinite(value)).toBe(true);
        const again = new Float64Array(80);
        const columns = shape.parameters.map(() => new Float64Array(80));
        shape.evaluate(grid, Float64Array.from(values), again, columns);
        expect(again).toEqual(counts);
        if (!isPeak(shape) || name === 'fano') return;
        // Rounding of the closed forms, where nothing is left of the peak.
        for (const value of counts) expect(value).toBeGreaterThanOrEqual(-1e-14 * values[0]!);
      }),
      { numRuns: 100 },
    );
  });

  it('touches no channel outside its span', () => {
    fc.assert(
      fc.property(arbitraryValues(name), (values) => {
        const counts = new Float64Array(80).fill(7);
        const columns = shape.parameters.map(() => new Float64Array(80).fill(-3));
        const { first, end } = shape.evaluate(grid, Float64Array.from(values), counts, columns);
        for (let k = 0; k < 80; k++) {
          if (k >= first && k < end) continue;
          expect(counts[k]).toBe(7);
          for (const column of columns) expect(column[k]).toBe(-3);
        }
      }),
      { numRuns: 50 },
    );
  });

  if (!isPeak(shape)) return;

  it.each([
    ['in the middle of a channel', 2.0025],
    ['on an edge', 2],
    ['outside the window', 2.5],
  ])('is finite with widths of 0, its centre %s', (_, middle) => {
    const values = shape.parameters.map(({ name: parameter, unit }) => {
      if (parameter === 'centre') return middle;
      return unit === 'eV' ? 0 : 1000;
    });
    for (const value of countsOf(shape, grid, values)) expect(value).not.toBeNaN();
    for (const column of columnsOf(shape, grid, values)) {
      for (const value of column) expect(value).not.toBeNaN();
    }
  });
});

function replaced(values: readonly number[], index: number, by: number): number[] {
  return values.map((value, i) => (i === index ? value + by : value));
}

/** What the counts change over when a parameter moves: its own size; for the centre the least width. */
function scaleOf(name: string, values: readonly number[], index: number): number {
  if (shapeByName(name).parameters[index]?.name !== 'centre') {
    return Math.max(Math.abs(values[index]!), 1e-3 * (index === 0 ? 1 : 1e-3));
  }
  const widths = shapeByName(name).parameters.flatMap((parameter, i) =>
    /fwhm/.test(parameter.name) ? [values[i]!] : [],
  );
  return Math.max(Math.min(...widths), 1e-4);
}
