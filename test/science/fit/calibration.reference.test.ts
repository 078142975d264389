/**
 * Whether the fit's errors are honest: pulls, coverage and variance on Poisson spectra of known truth. The
 * Cramér–Rao bound of a Gaussian of N counts without background is σ/√N for its centre, σ/√(2N) for σ and √N for
 * its area (H. Cramér, Mathematical Methods of Statistics, 1946; from memory).
 */
import { describe, expect, it } from 'vitest';
import { PixelFitter } from '../../../src/science/fit/pixel-fitter';
import {
  drawSpectrum,
  expectedCounts,
  type MadeComponent,
  makeModel,
  uniformAxis,
} from './made-spectra';

interface Calibration {
  readonly name: string;
  readonly values: Float64Array;
  readonly errors: Float64Array;
  readonly truth: number;
}

/** Fits `runs` drawn spectra; one entry for each parameter. */
function calibrate(components: readonly MadeComponent[], runs: number): readonly Calibration[] {
  const made = makeModel(uniformAxis(128, 1.9, 2.1), components);
  const expected = expectedCounts(made);
  const fitter = new PixelFitter(made.model);
  const { quantities } = fitter.layout;
  const parameters = quantities.flatMap(({ parameter, name }, at) =>
    parameter < 0 ? [] : [{ at, name, truth: made.truth[parameter] }],
  );
  const rows = Array.from({ length: runs }, (_, i) =>
    fitter.fit(drawSpectrum(expected, 11, i)).slice(),
  );
  for (const row of rows) expect([1, 2]).toContain(row[fitter.layout.qualityOffset + 1]);
  return parameters.map(({ at, name, truth }) => ({
    name,
    truth,
    values: Float64Array.from(rows, (row) => row[at]),
    errors: Float64Array.from(rows, (row) => row[quantities.length + at]),
  }));
}

const peak = (area: number): MadeComponent => ({
  name: 'peak',
  shape: 'gaussian',
  parameters: [
    { truth: area, start: null },
    { truth: 2.003, start: 1.998, min: 1.9, max: 2.1 },
    { truth: 0.03, start: 0.036, min: 1e-4, max: 0.5 },
  ],
});
const floor = (level: number): MadeComponent => ({
  name: 'floor',
  shape: 'flat',
  parameters: [{ truth: level, start: null }],
});

const rms = (values: Float64Array): number =>
  Math.sqrt(values.reduce((sum, value) => sum + value * value, 0) / values.length);

function spread(values: Float64Array): number {
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
  return rms(values.map((value) => value - mean));
}

describe.each([100, 400, 5000])('peaks of %i counts on a background', (area) => {
  const calibrations = calibrate([floor(0.5 + area / 2000), peak(area)], 4000);

  it.each(calibrations)('$name: pulls are centred, one wide, and cover 68 %', (one) => {
    const { values, errors, truth } = one;
    const pulls = values.map((value, i) => (value - truth) / errors[i]).sort();
    const at = (share: number): number => pulls[Math.floor(share * pulls.length)];
    expect(Math.abs(at(0.5))).toBeLessThan(0.1);
    const width = (at(0.8413) - at(0.1587)) / 2;
    expect(width).toBeGreaterThan(0.9);
    expect(width).toBeLessThan(1.1);
    const coverage = pulls.filter((pull) => Math.abs(pull) < 1).length / pulls.length;
    expect(coverage).toBeGreaterThan(0.64);
    expect(coverage).toBeLessThan(0.72);
  });
});

describe('a bright Gaussian without background', () => {
  it('scatters no more than the bound of Cramér and Rao allows, within 5 % of the variance', () => {
    const counts = 3000;
    const sigma = 0.03 / (2 * Math.sqrt(2 * Math.log(2)));
    const [area, centre, fwhm] = calibrate([peak(counts)], 6000);
    const bound = [
      [area, Math.sqrt(counts)],
      [centre, sigma / Math.sqrt(counts)],
      [fwhm, 0.03 / Math.sqrt(2 * counts)],
    ] as const;
    for (const [{ values, errors }, expected] of bound) {
      expect((spread(values) / expected) ** 2).toBeGreaterThan(0.95);
      expect((spread(values) / expected) ** 2).toBeLessThan(1.05);
      expect(rms(errors) / expected).toBeCloseTo(1, 1.7);
    }
  });
});
