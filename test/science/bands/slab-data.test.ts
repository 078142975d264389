/** What preparing a slab finds, and how its counts are read back. */
import { describe, expect, it } from 'vitest';
import { maskedRowSums } from '../../../src/science/bands/row-sums';
import {
  pixelSpectrum,
  tileAt,
  tileCount,
  tilePixelsFor,
} from '../../../src/science/bands/tiled-counts';
import { createRandom } from '../../../src/science/numeric/random';
import { gratingAxis, poisson, prepared, type SlabParts, slabBands } from './made-slab';

/** More pixels than a tile has, in rows that end within tiles. */
const shape = { ny: 7, nx: 83, nk: 70 };

function madeParts(type: 'uint16' | 'float64', change?: (counts: Float64Array) => void): SlabParts {
  const random = createRandom(3);
  const drawn = Float64Array.from({ length: shape.ny * shape.nx * shape.nk }, () =>
    random.poisson(9),
  );
  change?.(drawn);
  const counts = type === 'uint16' ? Uint16Array.from(drawn) : drawn;
  return { counts, shape, axis: gratingAxis(shape.nk), noise: poisson, type };
}

describe('counts in tiles', () => {
  it('have the same spectra as before', () => {
    for (const type of ['uint16', 'float64'] as const) {
      const parts = madeParts(type);
      const { tiled } = prepared(parts);
      expect(tileCount(tiled)).toBeGreaterThan(1);
      const { nk } = shape;
      for (let pixel = 0; pixel < shape.ny * shape.nx; pixel++) {
        const spectrum = pixelSpectrum(tiled, pixel, new Float64Array(nk));
        expect(spectrum).toEqual(
          Float64Array.from(parts.counts.subarray(pixel * nk, (pixel + 1) * nk)),
        );
      }
    }
  });

  it('cover every pixel once', () => {
    const { tiled } = prepared(madeParts('uint16'));
    let next = 0;
    for (let index = 0; index < tileCount(tiled); index++) {
      const { first, pixels, offset } = tileAt(tiled, index);
      expect(first).toBe(next);
      expect(offset).toBe(next * shape.nk);
      next += pixels;
    }
    expect(next).toBe(shape.ny * shape.nx);
  });

  it('are small where there are many channels, and never less than three pixels', () => {
    expect(tilePixelsFor(64)).toBe(252);
    expect(tilePixelsFor(1024)).toBe(252);
    expect(tilePixelsFor(100_000)).toBe(3);
    for (const nk of [1, 50, 2000, 5000, 20_000, 1e6]) expect(tilePixelsFor(nk) % 3).toBe(0);
  });
});

describe('the survey of a slab', () => {
  it('gives totals, sums along rows, extremes', () => {
    const parts = madeParts('uint16');
    const { survey, pixelFlags } = prepared(parts);
    const { ny, nx, nk } = shape;
    for (let y = 0; y < ny; y++) {
      for (let k = 0; k < nk; k += 9) {
        let sum = 0;
        for (let x = 0; x < nx; x++) sum += parts.counts[(y * nx + x) * nk + k];
        expect(survey.rowSums[y * nk + k]).toBe(sum);
        expect(survey.rowPixels[y * nk + k]).toBe(nx);
      }
    }
    for (let pixel = 0; pixel < ny * nx; pixel++) {
      let total = 0;
      for (let k = 0; k < nk; k++) total += parts.counts[pixel * nk + k];
      expect(survey.totals[pixel]).toBe(total);
    }
    expect(survey.minCounts).toBe(Math.min(...parts.counts));
    expect(survey.maxCounts).toBe(Math.max(...parts.counts));
    expect(survey).toMatchObject({ noDataValues: 0, isWholeNumbers: true });
    expect(pixelFlags).toBeNull();
  });

  it('leaves out no data, counts it, and takes infinities for it', () => {
    const { nk } = shape;
    const parts = madeParts('float64', (counts) => {
      counts[3] = Number.NaN;
      counts[5] = Number.POSITIVE_INFINITY;
      counts[6] = Number.NEGATIVE_INFINITY;
      counts.fill(Number.NaN, 2 * nk, 3 * nk);
      counts[10 * nk] = -2.5;
    });
    const { survey, tiled } = prepared(parts);
    expect(survey.noDataValues).toBe(3 + nk);
    expect(survey.totals[2]).toBeNaN();
    const first = Array.from(parts.counts.subarray(0, nk)).filter(Number.isFinite);
    expect(survey.totals[0]).toBe(first.reduce((sum, c) => sum + c, 0));
    expect(survey.rowPixels[3]).toBe(shape.nx - 2);
    expect(survey.rowPixels[4]).toBe(shape.nx - 1);
    expect(survey).toMatchObject({ minCounts: -2.5, isWholeNumbers: false });
    expect(pixelSpectrum(tiled, 0, new Float64Array(nk))[5]).toBeNaN();
  });

  it('says which whole numbers are whole, in any type', () => {
    expect(prepared(madeParts('float64')).survey.isWholeNumbers).toBe(true);
  });
});

describe('sums of masked pixels', () => {
  it('are those of each row, no data left out', () => {
    const { ny, nx, nk } = shape;
    const parts = madeParts('float64', (counts) => {
      counts[(nx + 4) * nk + 7] = Number.NaN;
    });
    const mask = Uint8Array.from({ length: ny * nx }, (_, pixel) => (pixel % 4 === 3 ? 1 : 0));
    mask[nx + 4] = 1;
    const { sums, pixels } = maskedRowSums(prepared(parts).tiled, nx, mask);
    for (let y = 0; y < ny; y++) {
      for (let k = 0; k < nk; k++) {
        let sum = 0;
        let count = 0;
        for (let x = 0; x < nx; x++) {
          const value = parts.counts[(y * nx + x) * nk + k];
          if (mask[y * nx + x] === 0 || Number.isNaN(value)) continue;
          sum += value;
          count++;
        }
        expect(sums[y * nk + k]).toBe(sum);
        expect(pixels[y * nk + k]).toBe(count);
      }
    }
  });
});

describe('band maps where channels are missing', () => {
  it('are NaN for a pixel whose band has no data, and 0 for one without counts', () => {
    const { nk } = shape;
    const parts = madeParts('float64', (counts) => {
      counts.fill(Number.NaN, nk, 2 * nk);
      counts.fill(0, 2 * nk, 3 * nk);
    });
    const { edgesEv } = parts.axis;
    const band = { fromEv: edgesEv[10] ?? 0, toEv: edgesEv[50] ?? 0, floor: 'none' as const };
    const [integral, peak] = slabBands(parts).maps(band, ['integral', 'peak']);
    expect(integral?.values[1]).toBeNaN();
    expect(peak?.values[1]).toBeNaN();
    expect(integral?.values[2]).toBe(0);
    expect(peak?.values[2]).toBe(0);
    expect(integral?.values[0]).toBeGreaterThan(0);
  });
});
