/**
 * Bands against the contract's formulas in exact fractions, computed by a program of its own
 * (test/fixtures/bands/make-bands.py).
 */
import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { type BandQuantity, bandQuantities } from '../../../src/science/bands/band';
import { directBand } from '../../../src/science/bands/direct-band';
import { tilePixelsFor } from '../../../src/science/bands/tiled-counts';
import type { Detector, NoiseModel } from '../../../src/science/scan';
import { createMomentKernel } from '../../../workers/kernel/moment-kernel';
import { axisOf, poisson, slabBands } from './made-slab';

interface Expected {
  readonly detector: Detector;
  readonly centresEv: readonly number[];
  readonly spectra: readonly (readonly number[])[];
  readonly cases: readonly {
    readonly spectrum: number;
    readonly noise: 'poisson' | 'detector';
    readonly from: number;
    readonly to: number;
    readonly expected: Readonly<Record<BandQuantity, readonly [number, number | null]>>;
  }[];
}

const file = new URL('../../fixtures/bands/bands.expected.json', import.meta.url);
const { detector, centresEv, spectra, cases } = JSON.parse(readFileSync(file, 'utf8')) as Expected;
const axis = axisOf(Float64Array.from(centresEv));
const noiseOf = (kind: 'poisson' | 'detector'): NoiseModel =>
  kind === 'poisson' ? poisson : { kind, detector };

/** Rounding of sums of some hundred terms, and of a difference of squares for centroid and spread. */
const allowed = 1e-11;

describe('exact fractions', () => {
  it('are a set of some size', () => {
    expect(cases.length).toBe(30);
  });

  it('agree with the definition', () => {
    for (const { spectrum, noise, from, to, expected } of cases) {
      const band = { fromEv: from, toEv: to, floor: 'none' as const };
      const found = directBand(spectra[spectrum] ?? [], axis, band, noiseOf(noise));
      for (const name of bandQuantities) {
        const [value, error] = expected[name];
        expect(Math.abs(found[name].value / value - 1)).toBeLessThan(allowed);
        if (error === null) expect(found[name].error).toBeNaN();
        else expect(Math.abs(found[name].error / error - 1)).toBeLessThan(allowed);
      }
    }
  });

  it('agree with the maps made from kept sums', () => {
    const nk = centresEv.length;
    const counts = Uint16Array.from(spectra.flat());
    const shape = { ny: 1, nx: spectra.length, nk };
    for (const kind of ['poisson', 'detector'] as const) {
      const kernel = createMomentKernel(tilePixelsFor(nk), nk);
      const noise = noiseOf(kind);
      const slab = slabBands({ counts, shape, axis, noise, type: 'uint16', kernel });
      expect(slab.data.sums).not.toBeNull();
      for (const { spectrum, from, to, expected } of cases.filter((one) => one.noise === kind)) {
        const band = { fromEv: from, toEv: to, floor: 'none' as const };
        for (const { quantity, values, errors } of slab.maps(band, bandQuantities)) {
          const [value, error] = expected[quantity];
          expect(Math.abs(values[spectrum] / value - 1)).toBeLessThan(allowed);
          if (error === null) expect(errors).toBeNull();
          else expect(Math.abs((errors?.[spectrum] ?? 0) / error - 1)).toBeLessThan(1e-9);
        }
      }
    }
  });
});
