import { describe, expect, it } from 'vitest';
import {
  conditionedFrom,
  detectedCounts,
  rowsOf,
  subtracted,
} from '../../../src/science/condition/conditioned';
import type { NoiseModel } from '../../../src/science/scan';
import { evenAxis, noNoise, poisson, slabOf, spectrumOf } from './made-conditioned';

const detector: NoiseModel = {
  kind: 'detector',
  detector: { electronsPerCount: 2, offsetCounts: 5, readNoiseE: 4, excessNoise: 1 },
};

describe('recorded rows', () => {
  it('are counts with the noise model’s variance, nothing replaced', () => {
    const slab = spectrumOf([4, 10, 20], detector);
    expect([...slab.counts]).toEqual([4, 10, 20]);
    // v = max(c − 5, 0)/2 + 4
    expect([...(slab.variances ?? [])]).toEqual([4, 6.5, 11.5]);
    expect(slab).toMatchObject({ replaced: null, isIndependent: true });
  });

  it('have no variance without a noise model', () => {
    expect(spectrumOf([1.5, 2], noNoise).variances).toBeNull();
  });

  it('lose infinite counts to no data', () => {
    const counts = Float64Array.of(1, Number.POSITIVE_INFINITY, Number.NaN);
    const shape = { ny: 1, nx: 1, nk: 3 };
    const slab = conditionedFrom({ y0: 0, shape, counts }, { axis: evenAxis(3), noise: poisson });
    expect([...slab.counts]).toEqual([1, Number.NaN, Number.NaN]);
    expect(slab.variances?.[1]).toBeNaN();
  });

  it('can be kept in half the memory', () => {
    expect(slabOf([1, 2], { ny: 1, nx: 1, nk: 2 }, poisson, 'float32').counts).toBeInstanceOf(
      Float32Array,
    );
  });
});

describe('what is subtracted', () => {
  it('moves to the background, so that the detected counts stay', () => {
    const slab = { ...spectrumOf([10, 20, 30]), factor: Float64Array.of(0.5, 0.25, 1) };
    const less = subtracted(slab, { kind: 'channel', values: Float64Array.of(1, 2, 3) });
    expect([...less.counts]).toEqual([9, 18, 27]);
    expect([...detectedCounts(less, 0, new Float64Array(3))]).toEqual([5, 5, 30]);
    expect(less.variances).toBe(slab.variances);
  });

  it('becomes a background of each pixel where it is one, on top of what was there', () => {
    const shape = { ny: 1, nx: 2, nk: 2 };
    const first = subtracted(slabOf([10, 20, 30, 40], shape), {
      kind: 'channel',
      values: Float64Array.of(1, 1),
    });
    const values = Float64Array.of(1, 2, 3, 4);
    const both = subtracted(first, { kind: 'pixel', values }, Float64Array.of(5, 6, 7, 8));
    expect([...both.counts]).toEqual([8, 17, 26, 35]);
    expect([...both.background.values]).toEqual([2, 3, 4, 5]);
    expect([...(both.variances ?? [])]).toEqual([15, 26, 37, 48]);
    expect([...detectedCounts(both, 1, new Float64Array(2))]).toEqual([30, 40]);
  });
});

it('takes rows out of a slab, each with its own background', () => {
  const shape = { ny: 3, nx: 1, nk: 2 };
  const slab = subtracted(slabOf([1, 2, 3, 4, 5, 6], shape), {
    kind: 'pixel',
    values: Float64Array.of(0, 0, 1, 1, 2, 2),
  });
  const row = rowsOf({ ...slab, y0: 10 }, 11, 12);
  expect(row.shape.ny).toBe(1);
  expect([...row.counts]).toEqual([2, 3]);
  expect([...row.background.values]).toEqual([1, 1]);
});
