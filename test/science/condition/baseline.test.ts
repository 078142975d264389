import { describe, expect, it } from 'vitest';
import {
  type BaselineOptions,
  createBaselineFinder,
  subtractBaseline,
} from '../../../src/science/condition/baseline';
import { detectedCounts } from '../../../src/science/condition/conditioned';
import { expected } from './expected';
import { evenAxis, place, slabOf } from './made-conditioned';

const methods: readonly BaselineOptions[] = [
  { method: 'arpls', smoothness: 1e4, iterations: 20 },
  { method: 'asls', smoothness: 1e4, asymmetry: 0.01, iterations: 20 },
  { method: 'snip', halfWidth: 20 },
  { method: 'polynomial', degree: 2, windows: null },
];
const nk = expected.spectrum.length;
const axis = evenAxis(nk);

describe.each(methods)('the baseline by $method', (options) => {
  const taken = (counts: ArrayLike<number>) =>
    subtractBaseline(
      slabOf(counts, { ny: 1, nx: counts.length / nk, nk }),
      createBaselineFinder(options, axis, place),
    );

  it('moves into the background: what was detected, and its variance, stay', () => {
    const { slab, baselines } = taken(expected.spectrum);
    detectedCounts(slab, 0, new Float64Array(nk)).forEach((value, k) => {
      expect(value).toBeCloseTo(expected.spectrum[k], 9);
    });
    expect(slab.counts[60]).toBeCloseTo(expected.spectrum[60] - baselines[60], 9);
    expect([...(slab.variances ?? [])]).toEqual(expected.spectrum);
  });

  it('of a constant spectrum is that constant', () => {
    const { slab, status, totals } = taken(new Float64Array(nk).fill(50));
    for (const value of slab.counts) expect(Math.abs(value)).toBeLessThan(1e-6);
    expect([...status]).toEqual([0]);
    expect(totals[0]).toBeCloseTo(50 * nk, 3);
  });

  it('passes beneath a gap, which stays one', () => {
    const counts = Float64Array.from(expected.spectrum);
    counts.fill(Number.NaN, 20, 25);
    const { slab, baselines } = taken(counts);
    expect(slab.counts[22]).toBeNaN();
    expect(baselines[22]).toBeGreaterThan(50);
    expect(baselines[22]).toBeLessThan(150);
  });

  it('of a pixel without data is none, and says so', () => {
    const counts = new Float64Array(2 * nk).fill(Number.NaN);
    counts.set(expected.spectrum, nk);
    const { slab, status } = taken(counts);
    expect([...status]).toEqual([2, 0]);
    expect(slab.counts[0]).toBeNaN();
    expect(slab.counts[nk + 60]).toBeGreaterThan(100);
  });

  it('depends on its own pixel only', () => {
    const other = Float64Array.from(expected.spectrum, (value, k) => value + (k % 7) * 30);
    const both = taken([...other, ...expected.spectrum]);
    expect(both.baselines.subarray(nk)).toEqual(taken(expected.spectrum).baselines);
  });
});

describe('settings that make no baseline are refused', () => {
  it.each<[string, BaselineOptions]>([
    ['smoothness of 0', { method: 'arpls', smoothness: 0, iterations: 20 }],
    ['asymmetry of 1', { method: 'asls', smoothness: 1, asymmetry: 1, iterations: 20 }],
    ['half width of 0', { method: 'snip', halfWidth: 0 }],
    ['half width of 80', { method: 'snip', halfWidth: 80 }],
    ['degree 2 cannot', { method: 'polynomial', degree: 2, windows: [[1.8, 1.801]] }],
  ])('%s', (words, options) => {
    expect(() => createBaselineFinder(options, axis, place)).toThrow(words);
    expect(() => createBaselineFinder(options, axis, place)).toThrow(place);
  });

  it('two channels', () => {
    expect(() =>
      createBaselineFinder({ method: 'snip', halfWidth: 1 }, evenAxis(2), place),
    ).toThrow('2 channels');
  });
});
