import { readFileSync } from 'node:fs';
import { expect, it } from 'vitest';
import { shapeByName } from '../../../src/science/peaks/shape-by-name';
import { countsOf, evenGrid } from './made-grid';

/**
 * Shares of single channels by mpmath 1.3, convolutions by numerical integration; written by
 * test/fixtures/peaks/make-channels.py.
 */
const expected = JSON.parse(
  readFileSync(new URL('../../fixtures/peaks/channels.expected.json', import.meta.url), 'utf8'),
) as Readonly<Record<string, readonly (readonly number[])[]>>;

/** Greatest errors as shares of the highest channel: stated in `peaks/`, the Gaussian's from its series. */
it.each([
  ['gaussian', 2e-7],
  ['lorentzian', 1e-13],
  ['pseudo-voigt', 2e-7],
  ['voigt', 1e-8],
  ['tailed', 1e-9],
  ['fano', 1e-12],
] as const)(
  '%s peaks give a channel the integral, narrow or wide, near or far: to %g of the height',
  (name, tolerance) => {
    const rows = expected[name] ?? [];
    expect(rows.length).toBeGreaterThan(20);
    for (const row of rows) {
      const parameters = row.slice(0, -3);
      const [low = 0, high = 0, wanted = 0] = row.slice(-3);
      const values = [1, 0, ...parameters];
      const found = countsOf(shapeByName(name), evenGrid(low, high, 1), values)[0]!;
      // As narrow channels around the peak as this one.
      const around = countsOf(shapeByName(name), evenGrid(-40.5, 40.5, 81), values);
      const height = Math.max(...around.map(Math.abs));
      expect(Math.abs(found - wanted) / height, `${parameters} in ${low} … ${high}`).toBeLessThan(
        tolerance,
      );
    }
  },
);
