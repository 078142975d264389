/** Components against SciPy and the published constants. */
import { describe, expect, it } from 'vitest';
import type { ConditionedSlab } from '../../../src/science/condition/conditioned';
import { rowsOf } from '../../../src/science/condition/conditioned';
import {
  findComponents,
  joinGreatest,
  keepComponents,
  type ScanComponents,
  summariseGreatest,
  summariseProducts,
  type WantedRank,
} from '../../../src/science/condition/denoise';
import {
  knownNoiseThreshold,
  medianOfNoise,
  unknownNoiseThreshold,
} from '../../../src/science/condition/hard-threshold';
import { planScaling, summariseVariances } from '../../../src/science/condition/noise-scaling';
import { createRandom } from '../../../src/science/numeric/random';
import { SymmetricEigen } from '../../../src/science/numeric/symmetric-eigen';
import { expected, farthest } from './expected';
import { noNoise, place, slabOf } from './made-conditioned';

function componentsOf(parts: readonly ConditionedSlab[], rank: WantedRank): ScanComponents {
  const { nk, nx } = parts[0].shape;
  const pixels = parts.reduce((sum, { shape }) => sum + shape.ny * nx, 0);
  const scaling = planScaling(parts.map(summariseVariances), { nk, pixels }, place);
  const step = joinGreatest(parts.map((part) => summariseGreatest(part, scaling)));
  const products = parts.map((part) => summariseProducts(part, scaling, step));
  const hasNoise = parts.every(({ variances }) => variances !== null);
  return findComponents(products, scaling, step, { rank, hasNoise }, place);
}

describe('Gavish & Donoho (2014)', () => {
  it('has 4/√3 for square matrices of known noise, 2.858 for unknown', () => {
    expect(knownNoiseThreshold(1)).toBeCloseTo(4 / Math.sqrt(3), 14);
    expect(unknownNoiseThreshold(1)).toBeCloseTo(2.858, 3);
  });

  it.each(expected.hardThresholds)(
    'has the thresholds of β = %d, the median by SciPy’s quad',
    (beta, known, median, unknown) => {
      expect(knownNoiseThreshold(beta)).toBeCloseTo(known, 12);
      expect(medianOfNoise(beta)).toBeCloseTo(median, 6);
      expect(unknownNoiseThreshold(beta)).toBeCloseTo(unknown, 6);
    },
  );
});

describe('eigenvalues', () => {
  it('of the second differences are 4 sin² (iπ/2(n + 1)), its vectors sines (textbook)', () => {
    const n = 30;
    const values = new Float64Array(n * n);
    for (let i = 0; i < n; i++) {
      values[i * n + i] = 2;
      if (i + 1 < n) values[i * n + i + 1] = values[(i + 1) * n + i] = -1;
    }
    const eigen = new SymmetricEigen({ n, values });
    const exact = Array.from(
      { length: n },
      (_, i) => 4 * Math.sin(((n - i) * Math.PI) / (2 * (n + 1))) ** 2,
    );
    expect(farthest(eigen.values, exact)).toBeLessThan(1e-13);
    const first = eigen.vectors(1)[0];
    const norm = Math.sqrt(2 / (n + 1));
    const sines = first.map((_, i) => norm * Math.abs(Math.sin(((i + 1) * n * Math.PI) / (n + 1))));
    expect(farthest(first.map(Math.abs), sines)).toBeLessThan(1e-12);
  });

  it('and vectors make up the matrix again, equal ones too', () => {
    const n = 12;
    const random = createRandom(2);
    const half = Float64Array.from({ length: 3 * n }, () => random.normal());
    const a = Float64Array.from({ length: n * n }, (_, at) => {
      const i = Math.floor(at / n);
      const j = at % n;
      // Rank 3 upon the unit matrix: nine eigenvalues are 1.
      return (
        (i === j ? 1 : 0) + [0, 1, 2].reduce((sum, r) => sum + half[r * n + i] * half[r * n + j], 0)
      );
    });
    const eigen = new SymmetricEigen({ n, values: a.slice() });
    const vectors = eigen.vectors(n);
    const again = a.map((_, at) => {
      const i = Math.floor(at / n);
      return vectors.reduce((sum, v, r) => sum + eigen.values[r] * v[i] * v[at % n], 0);
    });
    expect(farthest(again, a)).toBeLessThan(1e-11);
    for (let r = 3; r < n; r++) expect(eigen.values[r]).toBeCloseTo(1, 12);
  });

  it('of a zero matrix and of one row are known', () => {
    expect([...new SymmetricEigen({ n: 3, values: new Float64Array(9) }).values]).toEqual([
      0, 0, 0,
    ]);
    const one = new SymmetricEigen({ n: 1, values: Float64Array.of(5) });
    expect(one.values[0]).toBeCloseTo(5, 12);
    expect([...one.vectors(1)[0]]).toEqual([1]);
  });
});

describe('the decomposition', () => {
  const { counts, singular, rank3 } = expected.decomposition;
  const slab = slabOf(counts.flat(), { ny: 8, nx: 5, nk: 24 });

  it('has SciPy’s singular values of counts over noise', () => {
    // The products are kept in steps of 2⁻¹⁶ of the noise.
    expect(farthest(componentsOf([slab], 3).singular, singular)).toBeLessThan(1e-3);
  });

  it('keeps what SciPy’s three components keep', () => {
    const { slab: kept } = keepComponents(slab, componentsOf([slab], 3));
    expect(farthest(kept.counts, rank3.flat())).toBeLessThan(0.01);
    expect(kept.isIndependent).toBe(false);
    expect(kept.variances).toBe(slab.variances);
  });

  it('is the same to the last bit however the rows are shared out', () => {
    const whole = componentsOf([slab], 'auto');
    for (const cuts of [
      [0, 1, 8],
      [0, 3, 4, 8],
      [0, 1, 2, 3, 4, 5, 6, 7, 8],
    ]) {
      const parts = cuts.slice(1).map((end, i) => rowsOf(slab, cuts[i], end));
      expect(componentsOf(parts, 'auto')).toEqual(whole);
    }
  });
});

describe('the rank by itself', () => {
  const nk = 60;
  const shape = { ny: 30, nx: 30, nk };
  const mixed = (bands: readonly number[]): Float64Array =>
    Float64Array.from({ length: 900 * nk }, (_, at) => {
      const pixel = Math.floor(at / nk);
      const k = at % nk;
      const mean = bands.reduce((sum, centre, i) => {
        const weight = 100 * (1 + Math.sin(pixel * (0.01 + 0.017 * i) + i));
        return sum + weight * Math.exp(-((k - centre) ** 2) / 40);
      }, 20);
      return createRandom(11, at).poisson(mean);
    });

  it('is the number of spectra mixed, floor included, with known noise', () => {
    const components = componentsOf([slabOf(mixed([15, 30, 45]), shape)], 'auto');
    expect(components.rank).toBe(4);
    // The rest is noise: singular values up to √900 (1 + √(60/900)).
    expect(components.singular[4]).toBeLessThan(1.05 * 30 * (1 + Math.sqrt(60 / 900)));
  });

  it('is the same with unknown noise that is everywhere alike', () => {
    const even = Float64Array.from({ length: 900 * nk }, (_, at) => {
      const pixel = Math.floor(at / nk);
      const signal = 40 * (1 + Math.sin(pixel / 50)) * Math.exp(-(((at % nk) - 30) ** 2) / 40);
      return signal + 3 * createRandom(12, at).normal();
    });
    expect(componentsOf([slabOf(even, shape, noNoise)], 'auto').rank).toBe(1);
  });

  it('brings counts nearer to the truth, and what it removes is noise', () => {
    const truth = mixed([15, 30, 45]).map((_, at) => {
      const pixel = Math.floor(at / nk);
      return [15, 30, 45].reduce((sum, centre, i) => {
        const weight = 100 * (1 + Math.sin(pixel * (0.01 + 0.017 * i) + i));
        return sum + weight * Math.exp(-(((at % nk) - centre) ** 2) / 40);
      }, 20);
    });
    const slab = slabOf(mixed([15, 30, 45]), shape);
    const { slab: kept, removed } = keepComponents(slab, componentsOf([slab], 'auto'));
    const error = (values: ArrayLike<number>): number =>
      truth.reduce((sum, value, at) => sum + (values[at] - value) ** 2, 0);
    expect(error(kept.counts)).toBeLessThan(0.15 * error(slab.counts));
    const mean = removed.reduce((sum, value) => sum + value, 0) / removed.length;
    expect(mean).toBeGreaterThan(0.85);
    expect(mean).toBeLessThan(1.05);
  });
});

describe('gaps and refusals', () => {
  const { counts } = expected.decomposition;
  const shape = { ny: 8, nx: 5, nk: 24 };

  it('leaves pixels with a gap as they are, and channels without data', () => {
    const slab = slabOf(counts.flat(), shape);
    for (let pixel = 0; pixel < 40; pixel++) slab.counts[pixel * 24 + 23] = Number.NaN;
    slab.counts[3 * 24 + 5] = Number.NaN;
    const components = componentsOf([slab], 2);
    expect(components.pixels).toBe(39);
    expect(components.scaling.channels).toHaveLength(23);
    const { slab: kept, removed } = keepComponents(slab, components);
    expect(kept.counts.subarray(72, 96)).toEqual(slab.counts.subarray(72, 96));
    expect(removed[3]).toBeNaN();
    expect(kept.counts[23]).toBeNaN();
  });

  it('refuses scans without counts, and more components than there can be', () => {
    expect(() => componentsOf([slabOf(new Float64Array(960), shape)], 'auto')).toThrow(
      'counts in half of the pixels',
    );
    expect(() => componentsOf([slabOf(counts.flat(), shape)], 25)).toThrow('25 components');
    expect(() => componentsOf([slabOf(counts.flat(), shape)], 0)).toThrow(place);
  });
});
