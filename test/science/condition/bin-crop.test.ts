import { describe, expect, it } from 'vitest';
import {
  assertBin,
  binnedGrid,
  binRemainder,
  binSlab,
  binSpectrum,
} from '../../../src/science/condition/bin';
import { detectedCounts, subtracted } from '../../../src/science/condition/conditioned';
import { croppedGrid, cropSlab, planCrop } from '../../../src/science/condition/crop';
import { divideByResponse } from '../../../src/science/condition/response';
import { countVariance } from '../../../src/science/noise';
import type { NoiseModel } from '../../../src/science/scan';
import { gridOf, place, slabOf, spectrumOf } from './made-conditioned';

const shape = { ny: 3, nx: 3, nk: 4 };
const counts = Float64Array.from({ length: 36 }, (_, i) => i);

describe('bins', () => {
  it('sum counts and variances of columns, rows and channels, and drop the remainder', () => {
    const slab = binSlab(slabOf(counts, shape), { x: 2, y: 2, k: 2 });
    expect(slab.shape).toEqual({ ny: 1, nx: 1, nk: 2 });
    // Pixels (0,0) 0–3, (0,1) 4–7, (1,0) 12–15, (1,1) 16–19.
    expect([...slab.counts]).toEqual([
      0 + 1 + 4 + 5 + 12 + 13 + 16 + 17,
      2 + 3 + 6 + 7 + 14 + 15 + 18 + 19,
    ]);
    expect([...(slab.variances ?? [])]).toEqual([...slab.counts]);
    expect(binRemainder(gridOf(shape), { x: 2, y: 2, k: 2 })).toEqual({ x: 1, y: 1, k: 0 });
  });

  it('keep the noise model true to sums: n offsets, √n read noises', () => {
    const noise: NoiseModel = {
      kind: 'detector',
      detector: { electronsPerCount: 2, offsetCounts: 5, readNoiseE: 4, excessNoise: 1 },
    };
    const slab = binSlab(
      slabOf(
        counts.map((c) => c + 10),
        shape,
        noise,
      ),
      { x: 3, y: 1, k: 2 },
    );
    for (let i = 0; i < slab.counts.length; i++) {
      expect(slab.variances?.[i]).toBeCloseTo(countVariance(slab.counts[i], slab.noise), 10);
    }
  });

  it('hand on what was detected, where channels of a bin have one factor', () => {
    const divided = divideByResponse(slabOf(counts, shape), Float64Array.of(0.5, 0.5, 0.25, 0.25));
    const less = subtracted(divided, { kind: 'channel', values: Float64Array.of(1, 2, 3, 4) });
    const slab = binSlab(less, { x: 1, y: 3, k: 2 });
    expect([...detectedCounts(slab, 0, new Float64Array(2))]).toEqual([
      0 + 1 + 12 + 13 + 24 + 25,
      2 + 3 + 14 + 15 + 26 + 27,
    ]);
  });

  it('have no data where a channel has none, and are guesses where one is', () => {
    const slab = slabOf(counts, shape);
    slab.counts[1] = Number.NaN;
    const replaced = new Uint8Array(36);
    replaced[3] = 1;
    const binned = binSlab({ ...slab, replaced }, { x: 1, y: 1, k: 2 });
    expect(binned.counts[0]).toBeNaN();
    expect([...(binned.replaced ?? [])].slice(0, 4)).toEqual([0, 1, 0, 0]);
  });

  it('of a spectrum that stands for all pixels count it for each of them', () => {
    const binned = binSpectrum(spectrumOf([1, 2, 3, 4]), { x: 2, y: 3, k: 2 });
    expect([...binned.counts]).toEqual([18, 42]);
    expect([...(binned.variances ?? [])]).toEqual([3 * 36, 7 * 36]);
  });

  it('lie in the middle of what was summed, between its outer edges', () => {
    const grid = gridOf(shape);
    const binned = binnedGrid(grid, { x: 2, y: 1, k: 2 });
    expect([...binned.axis.edgesEv]).toEqual([
      grid.axis.edgesEv[0],
      grid.axis.edgesEv[2],
      grid.axis.edgesEv[4],
    ]);
    expect([...(binned.x.values ?? [])]).toEqual([5]);
    expect(binned.x.pitch).toBe(20);
    expect(binned.y).toBe(grid.y);
  });

  it.each([
    { x: 0, y: 1, k: 1 },
    { x: 1, y: 4, k: 1 },
    { x: 1, y: 1, k: 1.5 },
    { x: 1, y: 1, k: 3 },
  ])('are refused as %o', (options) => {
    expect(() => assertBin(options, gridOf(shape), place)).toThrow(place);
  });
});

describe('a crop', () => {
  const grid = gridOf(shape);

  it('keeps channels whose centre lies inside, pixels from first to last', () => {
    const crop = planCrop({ axisEv: [1.8011, 1.7995], x: [1, 2], y: [2, 2] }, grid, place);
    const slab = cropSlab(slabOf(counts, shape), crop);
    expect(slab.shape).toEqual({ ny: 1, nx: 2, nk: 2 });
    expect([...slab.counts]).toEqual([28, 29, 32, 33]);
    expect(slab.y0).toBe(0);
    const left = croppedGrid(grid, crop);
    expect([...(left.x.values ?? [])]).toEqual([10, 20]);
    expect(left.axis.edgesEv).toEqual(grid.axis.edgesEv.slice(0, 3));
  });

  it('of a slab elsewhere leaves no row', () => {
    const crop = planCrop({ axisEv: null, x: null, y: [0, 1] }, grid, place);
    const part = { ...slabOf(counts.subarray(24), { ny: 1, nx: 3, nk: 4 }), y0: 2 };
    expect(cropSlab(part, crop).shape.ny).toBe(0);
  });

  it('carries factor, background and marks along', () => {
    const slab = subtracted(
      {
        ...slabOf(counts, shape),
        factor: Float64Array.of(1, 2, 3, 4),
        replaced: new Uint8Array(36).fill(1),
      },
      { kind: 'pixel', values: counts },
    );
    const cropped = cropSlab(
      slab,
      planCrop({ axisEv: [1.801, 1.8025], x: [0, 0], y: [0, 0] }, grid, place),
    );
    expect([...cropped.factor]).toEqual([2, 3]);
    expect([...cropped.background.values]).toEqual([2, 6]);
    expect([...(cropped.replaced ?? [])]).toEqual([1, 1]);
  });

  it.each([
    ['no channel', { axisEv: [2, 3] as const, x: null, y: null }],
    ['single channel', { axisEv: [1.8, 1.8005] as const, x: null, y: null }],
    ['columns 1 to 3', { axisEv: null, x: [1, 3] as const, y: null }],
    ['rows 2 to 1', { axisEv: null, x: null, y: [2, 1] as const }],
  ])('is refused with %s', (words, options) => {
    expect(() => planCrop(options, grid, place)).toThrow(words);
  });
});
