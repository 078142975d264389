import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { tailedFwhm, tailedSummit, wholeFwhm } from '../../../src/science/peaks/whole-width';

/** SciPy 1.10, scipy.stats.exponnorm and scipy.optimize; written by test/fixtures/peaks/make-peaks.py. */
const { tailed_width: rows = [] } = JSON.parse(
  readFileSync(new URL('../../fixtures/peaks/peaks.expected.json', import.meta.url), 'utf8'),
) as Readonly<Record<string, readonly (readonly number[])[]>>;

describe('a tailed peak', () => {
  it('is highest and as wide as SciPy finds it, also with a tail far longer than the Gaussian', () => {
    expect(rows.length).toBe(4);
    for (const [fwhm = 0, tail = 0, summit = 0, whole = 0] of rows) {
      // A minimiser finds a place to the square root of a double's digits only.
      expect(Math.abs(tailedSummit(fwhm, tail) - summit)).toBeLessThan(1e-7 * fwhm);
      expect(Math.abs(tailedFwhm(fwhm, tail) / whole - 1)).toBeLessThan(1e-12);
    }
  });

  it('is as wide as its Gaussian without a tail, as an exponential without a Gaussian', () => {
    expect(tailedFwhm(0.05, 0)).toBeCloseTo(0.05, 15);
    expect(tailedSummit(0.05, 0)).toBe(0);
    expect(tailedFwhm(0, 0.03)).toBeCloseTo(0.03 * Math.LN2, 10);
  });
});

it('gives each shape its width as a whole', () => {
  expect(wholeFwhm('gaussian', [1, 2, 0.03])).toBe(0.03);
  // Olivero and Longbothum 1977 for two equal widths: 0.5346 + √1.2166.
  expect(wholeFwhm('voigt', [1, 2, 1, 1])).toBeCloseTo(0.5346 + Math.sqrt(1.2166), 14);
  expect(wholeFwhm('tailed', [1, 2, 0.05, 0.03])).toBe(tailedFwhm(0.05, 0.03));
});
