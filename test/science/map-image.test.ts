/** Maps as pictures: ends, gaps, transfer. */
import { describe, expect, it } from 'vitest';
import { colourScale } from '../../src/science/colour/colour-scales';
import { mapImage } from '../../src/science/map-image';

/** Four entries: 10, 20, 30, 40 in red. */
const table = Uint8Array.from([10, 0, 0, 20, 0, 0, 30, 0, 0, 40, 0, 0]);
const reds = (picture: Uint8ClampedArray) => [...picture].filter((_, i) => i % 4 === 0);
const opacities = (picture: Uint8ClampedArray) => [...picture].filter((_, i) => i % 4 === 3);

describe('mapImage', () => {
  it('takes the nearest entry, and the end ones beyond the limits', () => {
    const values = Float64Array.of(-1, 0, 1, 1.4, 1.6, 3, 99);
    const limits = { low: 0, high: 3 };
    const picture = mapImage({ values, table, limits, transfer: 'linear' });
    expect(reds(picture)).toEqual([10, 10, 20, 20, 30, 40, 40]);
    expect(opacities(picture).every((opacity) => opacity === 255)).toBe(true);
  });

  it('is transparent where there is no value', () => {
    const values = Float64Array.of(Number.NaN, 1);
    const picture = mapImage({ values, table, limits: { low: 0, high: 3 }, transfer: 'sqrt' });
    expect([...picture]).toEqual([0, 0, 0, 0, 30, 0, 0, 255]);
  });

  it('is transparent all over where a map without values has no limits', () => {
    const limits = { low: Number.NaN, high: Number.NaN };
    const values = Float64Array.of(Number.NaN, Number.NaN);
    expect(opacities(mapImage({ values, table, limits, transfer: 'linear' }))).toEqual([0, 0]);
  });

  it('shows the ends of a real scale at the limits', () => {
    const viridis = colourScale('viridis').table;
    const limits = { low: 5, high: 500 };
    const picture = mapImage({
      values: Float64Array.of(5, 500),
      table: viridis,
      limits,
      transfer: 'log',
    });
    expect([...picture]).toEqual([...viridis.subarray(0, 3), 255, ...viridis.subarray(-3), 255]);
  });
});
