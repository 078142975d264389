import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { isPeak, shapeByName, shapeNames } from '../../../src/science/peaks/shape-by-name';
import { columnsOf, countsOf, evenGrid } from './made-grid';

const between = (min: number, max: number) => fc.double({ min, max, noNaN: true });
/** Widths from a tenth of a channel to a third of the window of 80 channels of 5 meV. */
const width = between(-1.3, 2.1).map((power) => 0.005 * 10 ** (power - 0.1));

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
      case 'tail':
        return width;
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

describe.each(shapeNames.map((name) => [name]))('%s', (name) => {
  const shape = shapeByName(name);

  it('has the derivatives its counts have', () => {
    fc.assert(
      fc.property(arbitraryValues(name), (values) => {
        const columns = columnsOf(shape, grid, values);
        for (const [index, column] of columns.entries()) {
          // Five points, error of fourth order in the step.
          const parameter = shape.parameters[index]?.name ?? '';
          const isWidth = /fwhm|tail|decay/.test(parameter);
          const scale =
            parameter === 'centre'
              ? Math.min(...widthsOf(name, values))
              : Math.abs(values[index] as number);
          const step = Math.max(scale, isWidth ? 1e-9 : 1e-6) * 2e-3;
          const at = (by: number) =>
            countsOf(
              shape,
              grid,
              values.map((value, i) => (i === index ? value + by * step : value)),
            );
          const [m2, m1, p1, p2] = [at(-2), at(-1), at(1), at(2)];
          const largest = Math.max(...column.map(Math.abs));
          // Rounding of the counts, and what is cut from the wings, divided by the step.
          const floor = (3e-9 * Math.abs(values[0] as number)) / step;
          for (let k = 0; k < column.length; k++) {
            const numeric =
              ((m2[k] as number) -
                8 * (m1[k] as number) +
                8 * (p1[k] as number) -
                (p2[k] as number)) /
              (12 * step);
            expect(Math.abs(numeric - (column[k] as number))).toBeLessThanOrEqual(
              2e-4 * largest + floor,
            );
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
        for (const value of counts) expect(value).toBeGreaterThanOrEqual(0);
      }),
      { numRuns: 100 },
    );
  });
});

/** Energies over which a peak changes. */
function widthsOf(name: string, values: readonly number[]): number[] {
  const widths = shapeByName(name).parameters.flatMap((parameter, index) =>
    /fwhm/.test(parameter.name) ? [values[index] as number] : [],
  );
  return widths.length === 0 ? [1] : widths;
}
