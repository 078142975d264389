import { describe, expect, it } from 'vitest';
import { affineVariance, countVariance, varianceLine } from '../../src/science/noise';
import type { NoiseModel } from '../../src/science/scan';

const detector = (offsetCounts: number): NoiseModel => ({
  kind: 'detector',
  detector: { electronsPerCount: 4, offsetCounts, readNoiseE: 6, excessNoise: 1.5 },
});

describe('the variance of counts', () => {
  it('is the counts themselves for Poisson counts (contract §4)', () => {
    expect(countVariance(17, { kind: 'poisson' })).toBe(17);
    expect(countVariance(0, { kind: 'poisson' })).toBe(0);
  });

  it('is F² max(c − offset, 0)/g + (read/g)² for a detector (reference values §7)', () => {
    // 1.5² · (300 − 100)/4 + (6/4)² = 112.5 + 2.25
    expect(countVariance(300, detector(100))).toBe(114.75);
    expect(countVariance(100, detector(100))).toBe(2.25);
    expect(countVariance(20, detector(100))).toBe(2.25);
  });

  it('is not known without a noise model, nor where there is no data', () => {
    expect(countVariance(5, { kind: 'none' })).toBeNaN();
    expect(countVariance(Number.NaN, { kind: 'poisson' })).toBeNaN();
    expect(countVariance(Number.NaN, detector(0))).toBeNaN();
  });

  it('counts electrons as Poisson events when nothing else adds noise', () => {
    // g electrons a count: counts c are g·c electrons, variance g·c electrons², so c/g counts².
    const plain = { electronsPerCount: 5, offsetCounts: 0, readNoiseE: 0, excessNoise: 1 };
    expect(countVariance(40, { kind: 'detector', detector: plain })).toBe(8);
  });
});

describe('the line of the variance', () => {
  it('is one over all counts where none can lie below the offset', () => {
    const affine = affineVariance(detector(-8), true);
    for (const counts of [0, 1, 500]) {
      expect((affine?.slope ?? 0) * counts + (affine?.constant ?? 0)).toBeCloseTo(
        countVariance(counts, detector(-8)),
        12,
      );
    }
    expect(affineVariance({ kind: 'poisson' }, false)).toEqual({ slope: 1, constant: 0 });
  });

  it('is bent where counts may lie below the offset', () => {
    expect(affineVariance(detector(10), true)).toBeNull();
    expect(affineVariance(detector(0), false)).toBeNull();
    expect(affineVariance({ kind: 'none' }, true)).toBeNull();
    expect(varianceLine({ kind: 'poisson' })).toEqual({ slope: 1, offset: 0, floor: 0 });
  });
});
