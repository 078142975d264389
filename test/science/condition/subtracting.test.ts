/** Offset and far field: what is subtracted, and what its noise does. */
import { describe, expect, it } from 'vitest';
import { detectedCounts } from '../../../src/science/condition/conditioned';
import {
  assertScale,
  fitScale,
  nearFieldContrast,
  subtractFarField,
  subtractFarFieldByPixel,
  summariseWindow,
} from '../../../src/science/condition/farfield';
import { assertOffset, subtractDark, subtractOffset } from '../../../src/science/condition/offset';
import {
  channelsWithin,
  estimateDark,
  summariseDark,
} from '../../../src/science/condition/read-noise';
import {
  assertReferenceShape,
  hasRecordedNoise,
  type ReferenceRecording,
} from '../../../src/science/condition/reference-recording';
import { createRandom } from '../../../src/science/numeric/random';
import { evenAxis, gridOf, noNoise, place, slabOf, spectrumOf } from './made-conditioned';

const shape = { ny: 2, nx: 1, nk: 3 };
const slab = slabOf([10, 20, 30, 40, 50, 60], shape);
const cube = (counts: readonly number[], noise = slab.noise): ReferenceRecording => ({
  kind: 'cube',
  rows: slabOf(counts, shape, noise),
  name: 'out.npy',
});
const spectrum = (counts: readonly number[], noise = slab.noise): ReferenceRecording => ({
  kind: 'spectrum',
  rows: spectrumOf(counts, noise),
  name: 'out.npy',
});

describe('an offset', () => {
  it('that is a number leaves the variance', () => {
    const less = subtractOffset(slab, 5);
    expect([...less.counts]).toEqual([5, 15, 25, 35, 45, 55]);
    expect([...(less.variances ?? [])]).toEqual([10, 20, 30, 40, 50, 60]);
    expect([...detectedCounts(less, 1, new Float64Array(3))]).toEqual([40, 50, 60]);
  });

  it('that was recorded brings its own noise, unless it has none', () => {
    const less = subtractDark(slab, cube([1, 2, 3, 4, 5, 6]));
    expect([...less.counts]).toEqual([9, 18, 27, 36, 45, 54]);
    expect([...(less.variances ?? [])]).toEqual([11, 22, 33, 44, 55, 66]);
    expect([...(subtractDark(slab, spectrum([1.5, 2, 3], noNoise)).variances ?? [])]).toEqual([
      10, 20, 30, 40, 50, 60,
    ]);
  });

  it('has noise where it is whole numbers', () => {
    expect(hasRecordedNoise([1, 2, Number.NaN])).toBe(true);
    expect(hasRecordedNoise([1, 2.25])).toBe(false);
  });

  it.each([Number.NaN, Number.POSITIVE_INFINITY])('of %d is refused', (counts) => {
    expect(() => assertOffset(counts, place)).toThrow(place);
  });
});

describe('a file that is subtracted', () => {
  const file = (...lengths: number[]) => ({ name: 'dark.npy', shape: lengths, values: [], y0: 0 });
  const grid = gridOf({ ny: 4, nx: 5, nk: 6 });

  it('is a spectrum or a cube of the scan', () => {
    expect(assertReferenceShape(file(6), grid, place)).toBe('spectrum');
    expect(assertReferenceShape(file(1, 1, 6), grid, place)).toBe('spectrum');
    expect(assertReferenceShape(file(4, 5, 6), grid, place)).toBe('cube');
  });

  it.each([
    ['dark.npy has 7 channels, and the scan has 6', file(7)],
    ['dark.npy is 5 × 4 × 6, and the scan is 4 × 5 × 6', file(5, 4, 6)],
  ])('or is refused: %s', (words, given) => {
    expect(() => assertReferenceShape(given, grid, place)).toThrow(words);
  });
});

describe('the detector’s offset and read noise', () => {
  it('are found in a window without light, past steady patterns and cosmic rays', () => {
    const nk = 64;
    const counts = Float64Array.from({ length: 20 * 20 * nk }, (_, i) => {
      const random = createRandom(5, i);
      return Math.round(
        300 + 3 * Math.sin(i % nk) + 4 * random.normal() + (i % 5003 === 0 ? 9000 : 0),
      );
    });
    const window = channelsWithin(evenAxis(nk), [1.8, 1.83], place);
    expect(window).toEqual({ first: 0, end: 31 });
    const found = estimateDark(summariseDark(slabOf(counts, { ny: 20, nx: 20, nk }), window));
    expect(found.offsetCounts).toBeCloseTo(300, 0);
    // 4, and the rounding's 1/12 in squares; 12 000 differences: ± 0.04.
    expect(Math.abs(found.readNoiseCounts - Math.sqrt(16 + 1 / 12))).toBeLessThan(0.1);
  });
});

describe('the far field', () => {
  const window = { first: 1, end: 3 };

  it('is fitted by its counts in the window, for the scan or for each pixel', () => {
    const outside = cube([4, 8, 12, 4, 8, 12]);
    // (20 + 30 + 50 + 60)/(8 + 12 + 8 + 12)
    const { scale, error } = fitScale(summariseWindow(slab, outside, window), place);
    expect(scale).toBe(4);
    expect(error).toBeCloseTo(Math.sqrt(160 + 16 * 40) / 40, 12);
    expect([...subtractFarFieldByPixel(slab, outside, window).scales]).toEqual([2.5, 5.5]);
  });

  it('adds its variance times the scale’s square, and the scale’s own error', () => {
    const less = subtractFarField(slab, spectrum([4, 8, 12]), { scale: 2, error: 0.5 });
    expect([...less.counts]).toEqual([2, 4, 6, 32, 34, 36]);
    expect(less.variances?.[0]).toBeCloseTo(10 + 4 * 4 + 0.25 * 16, 12);
    expect([...detectedCounts(less, 1, new Float64Array(3))]).toEqual([40, 50, 60]);
    const { slab: byPixel } = subtractFarFieldByPixel(slab, spectrum([4, 8, 12]), window);
    expect([...byPixel.counts].slice(0, 3)).toEqual([0, 0, 0]);
  });

  it('is never added: a scale below 0 is 0', () => {
    const negative = slabOf([-10, -20, -30, -1, -2, -3], shape, noNoise);
    expect(
      fitScale(summariseWindow(negative, spectrum([4, 8, 12], noNoise), window), place).scale,
    ).toBe(0);
  });

  it('gives the near-field contrast (in − out)/out with its error', () => {
    const { values, errors } = nearFieldContrast(slab, cube([4, 8, 12, 4, 8, 12]), window);
    expect([...values]).toEqual([1.5, 4.5]);
    expect(errors?.[0]).toBeCloseTo(Math.sqrt(50 + 2.5 ** 2 * 20) / 20, 12);
  });

  it('is refused where it has nothing in the window, or a scale that is none', () => {
    const nothing = spectrum([4, 0, 0]);
    expect(() => fitScale(summariseWindow(slab, nothing, window), place)).toThrow(
      'no counts in the window',
    );
    expect(subtractFarFieldByPixel(slab, nothing, window).scales[0]).toBeNaN();
    for (const scale of [-1, Number.NaN]) expect(() => assertScale(scale, place)).toThrow(place);
    expect(() => channelsWithin(evenAxis(3), [2, 3], place)).toThrow('no channel');
  });
});
