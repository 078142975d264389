import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { shapeByName } from '../../../src/science/peaks/shape-by-name';
import { fwhmPerSigma, nearestPseudoVoigt, voigtFwhm } from '../../../src/science/peaks/widths';
import { countsOf, evenGrid, sum } from './made-grid';

/** SciPy 1.10, scipy.special.voigt_profile and scipy.stats.exponnorm; written by test/fixtures/peaks/make-peaks.py. */
const expected = JSON.parse(
  readFileSync(new URL('../../fixtures/peaks/peaks.expected.json', import.meta.url), 'utf8'),
) as Readonly<Record<string, readonly (readonly number[])[]>>;

/** Density of unit area at an energy: the counts of one very narrow channel over its width. */
function density(name: string, values: readonly number[], energyEv: number): number {
  const wide = 1e-6;
  const grid = evenGrid(energyEv - wide / 2, energyEv + wide / 2, 1);
  return (countsOf(shapeByName(name), grid, values)[0] as number) / wide;
}

describe('the Voigt profile', () => {
  it('agrees with SciPy', () => {
    const rows = expected.voigt ?? [];
    expect(rows.length).toBeGreaterThan(40);
    for (const [d = 0, sigma = 0, gamma = 0, wanted = 0] of rows) {
      const found = density('voigt', [1, 0, sigma * fwhmPerSigma, 2 * gamma], d);
      expect(Math.abs(found / wanted - 1)).toBeLessThan(1e-6);
    }
  });

  it('is a Gaussian and a Lorentzian at its ends', () => {
    const grid = evenGrid(1.9, 2.1, 200);
    const gaussian = countsOf(shapeByName('gaussian'), grid, [1000, 2, 0.02]);
    const almostGaussian = countsOf(shapeByName('voigt'), grid, [1000, 2, 0.02, 1e-9]);
    const lorentzian = countsOf(shapeByName('lorentzian'), grid, [1000, 2, 0.02]);
    const almostLorentzian = countsOf(shapeByName('voigt'), grid, [1000, 2, 1e-9, 0.02]);
    for (let k = 0; k < 200; k++) {
      expect(almostGaussian[k]).toBeCloseTo(gaussian[k] as number, 4);
      expect(almostLorentzian[k]).toBeCloseTo(lorentzian[k] as number, 4);
    }
  });

  it('is as wide as Olivero and Longbothum say, to 0.02 %', () => {
    for (const [g, l] of [
      [0.03, 0.01],
      [0.01, 0.01],
      [0.01, 0.04],
    ] as const) {
      const half = density('voigt', [1, 0, g, l], voigtFwhm(g, l) / 2);
      expect(Math.abs(half / density('voigt', [1, 0, g, l], 0) - 0.5)).toBeLessThan(3e-4);
    }
  });

  it('is as near to the pseudo-Voigt of Thompson, Cox and Hastings as SciPy finds it', () => {
    const { fwhm, eta } = nearestPseudoVoigt(0.02, 0.015);
    const height = density('voigt', [1, 0, 0.02, 0.015], 0);
    let greatest = 0;
    for (let step = 0; step < 120; step++) {
      const pseudo = density('pseudo-voigt', [1, 0, fwhm, eta], step * 5e-4);
      const off = Math.abs(pseudo - density('voigt', [1, 0, 0.02, 0.015], step * 5e-4));
      greatest = Math.max(greatest, off / height);
    }
    // scipy.special.voigt_profile against the relation's pseudo-Voigt on the same energies: 1.2592 %.
    expect(greatest).toBeCloseTo(0.0125915, 5);
    // At the ends it is exact: all Lorentzian, all Gaussian.
    expect(nearestPseudoVoigt(0, 1).eta).toBeCloseTo(1, 4);
    expect(nearestPseudoVoigt(1, 0)).toEqual({ fwhm: 1, eta: 0 });
  });
});

describe('the tailed peak', () => {
  it('agrees with SciPy’s exponentially modified Gaussian, mirrored', () => {
    const rows = expected.tailed ?? [];
    expect(rows.length).toBeGreaterThan(50);
    for (const [d = 0, sigma = 0, tail = 0, wanted = 0] of rows) {
      // Beyond its reach the peak is cut: less than 1e-9 of its height is left there.
      if (wanted < 1e-8) continue;
      const found = density('tailed', [1, 0, sigma * fwhmPerSigma, tail], d);
      expect(Math.abs(found - wanted)).toBeLessThan(2e-6 * wanted + 1e-9);
    }
  });

  it('becomes the Gaussian as its tail vanishes, through every ratio of widths', () => {
    const sigma = 0.02 / fwhmPerSigma;
    const gaussian = density('gaussian', [1, 2, 0.02], 2.003);
    let before = Number.POSITIVE_INFINITY;
    for (const ratio of [10, 1, 0.1, 0.02, 0.0101, 0.0099, 0.001, 1e-5, 1e-9]) {
      const off = Math.abs(density('tailed', [1, 2, 0.02, sigma * ratio], 2.003) / gaussian - 1);
      expect(off).toBeLessThanOrEqual(Math.max(before, 1e-6));
      before = off;
    }
    expect(before).toBeLessThan(1e-6);
  });

  it('is a one-sided exponential where the Gaussian vanishes', () => {
    // At one tail's length below the centre: exp(−1)/tail.
    expect(density('tailed', [1, 2, 1e-5, 0.03], 1.97)).toBeCloseTo(Math.exp(-1) / 0.03, 6);
    expect(density('tailed', [1, 2, 1e-5, 0.03], 2.01)).toBe(0);
  });
});

describe('every peak', () => {
  it.each([
    ['gaussian', [5000, 2, 0.02]],
    ['gaussian', [5000, 2.0013, 0.0004]],
    ['tailed', [5000, 2.05, 0.02, 0.03]],
    ['tailed', [5000, 2.0507, 0.0006, 0.01]],
    ['lorentzian', [5000, 2, 0.004]],
    ['voigt', [5000, 2.0011, 0.0005, 0.0003]],
    ['pseudo-voigt', [5000, 2, 0.004, 0.5]],
  ] as const)('%s holds its area, narrow or wide against the channels', (name, values) => {
    const grid = evenGrid(1.5, 2.5, 1000);
    const total = sum(countsOf(shapeByName(name), grid, values));
    // A Lorentzian's wings hold 2/π × half width/distance beyond the window.
    const beyond = /lorentz|voigt/.test(name) ? 4e-3 : 1e-7;
    expect(Math.abs(total / 5000 - 1)).toBeLessThan(beyond);
  });

  it('of two widths around the switch between formulas has counts without a step', () => {
    const grid = evenGrid(1.99, 2.01, 20);
    const width = (0.001 / 0.1) * fwhmPerSigma;
    const below = countsOf(shapeByName('gaussian'), grid, [1e6, 2.0002, width * (1 - 1e-9)]);
    const above = countsOf(shapeByName('gaussian'), grid, [1e6, 2.0002, width * (1 + 1e-9)]);
    const height = Math.max(...above);
    for (let k = 0; k < 20; k++) {
      expect(Math.abs((below[k] as number) - (above[k] as number))).toBeLessThan(1e-6 * height);
    }
  });
});

describe('the Fano line', () => {
  it('is a Lorentzian for large |q|, and a dip of its mirror for q = 0', () => {
    const grid = evenGrid(1.9, 2.1, 100);
    const lorentzian = countsOf(shapeByName('lorentzian'), grid, [1000, 2, 0.01]);
    const sharp = countsOf(shapeByName('fano'), grid, [1000, 2, 0.01, 1e9]);
    const dip = countsOf(shapeByName('fano'), grid, [1000, 2, 0.01, 0]);
    for (let k = 0; k < 100; k++) {
      expect(sharp[k]).toBeCloseTo(lorentzian[k] as number, 5);
      expect(dip[k]).toBeCloseTo(-(lorentzian[k] as number), 9);
    }
  });

  it('vanishes with the continuum at ε = −q and is highest at ε = 1/q (Fano 1961)', () => {
    const [half, q] = [0.005, 2];
    // (q + ε)²/(1 + ε²) − 1 is −1 at ε = −q and q² at ε = 1/q.
    const scale = 1 / (Math.PI * half * (q * q + 1));
    expect(density('fano', [1, 2, 2 * half, q], 2 - q * half)).toBeCloseTo(-scale, 3);
    expect(density('fano', [1, 2, 2 * half, q], 2 + half / q)).toBeCloseTo(q * q * scale, 3);
  });
});
