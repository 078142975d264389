/** One scan in every format, order, direction, unit and number type: the same axis and the same counts. */
import { describe, expect, it } from 'vitest';
import { recordAxis } from '../../src/science/axis';
import { readVariant } from './read-variant';
import { variants } from './scan-variants';
import { countsAt, nk, nx, ny, wavelengthsNm } from './variant-files';

const reference = recordAxis(wavelengthsNm, { kind: 'wavelength', unit: 'nm', medium: 'air' }, '');

describe('a scan gives the same axis and counts', () => {
  it.each(variants)('as $name', async (variant) => {
    const { plan, slab } = await readVariant(variant);
    const { meta } = plan;
    expect(meta.shape).toEqual(variant.pixel === undefined ? { ny, nx, nk } : { ny: 1, nx: 1, nk });
    for (let k = 0; k < nk; k++) {
      // wavelengths, energies and shifts are rounded to doubles on the way, nothing more
      expect(Math.abs(meta.axis.centresEv[k] - reference.energy.centresEv[k])).toBeLessThan(1e-13);
      expect(Math.abs(meta.axis.edgesEv[k] - reference.energy.edgesEv[k])).toBeLessThan(1e-13);
    }
    const expected: number[] = [];
    const rows = variant.pixel === undefined ? ny : 1;
    const columns = variant.pixel === undefined ? nx : 1;
    const [y0, x0] = variant.pixel ?? [0, 0];
    for (let y = y0; y < y0 + rows; y++) {
      for (let x = x0; x < x0 + columns; x++) {
        // channel 0 is the lowest energy, the longest wavelength
        for (let k = nk - 1; k >= 0; k--) expected.push(countsAt(y, x, k));
      }
    }
    expect([...slab.counts]).toEqual(expected);
    expect(meta.noise).toEqual({ kind: 'poisson' });
    if (variant.pitchNm !== undefined) {
      expect([meta.x.pitch, meta.y.pitch, meta.x.unit]).toEqual([...variant.pitchNm, 'nm']);
    }
  });
});
