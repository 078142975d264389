/** Spikes against the published score worked by hand, and what must never be taken for one. */
import { describe, expect, it } from 'vitest';
import { despikeSpectral } from '../../../src/science/condition/despike-spectral';
import { SpikeFinder } from '../../../src/science/condition/spike-finder';
import { createRandom } from '../../../src/science/numeric/random';
import { noNoise, spectrumOf } from './made-conditioned';

const options = { threshold: 6, kept: [] };

describe('Whitaker & Hayes (2018), 0.6745 (Δx − median)/MAD, worked by hand', () => {
  const series = [10, 11, 12, 15, 13, 15, 40, 14, 13, 15, 16, 14];
  // Δ = 1 1 3 −2 2 25 −26 −1 2 1 −2; sorted −26 −2 −2 −1 1 1 1 2 2 3 25: median 1.
  // |Δ − 1| = 0 0 2 3 1 24 27 2 1 0 3; sorted 0 0 0 1 1 2 2 3 3 24 27: MAD 2.
  // z of the rise 0.6745 · 24/2 = 8.094, of the fall −0.6745 · 27/2 = −9.10575; the next largest 1.01.
  const noise = { variances: null, least: new Float64Array(12), spread: null };
  const found = (threshold: number): number[] => {
    const marks = new Uint8Array(12);
    new SpikeFinder(12, threshold).find(Float64Array.from(series), noise, marks);
    return [...marks].flatMap((mark, k) => (mark === 1 ? [k] : []));
  };

  it('marks the spike up to a threshold of 8.094', () => {
    expect(found(6)).toEqual([6]);
    expect(found(8.0939)).toEqual([6]);
    expect(found(8.0941)).toEqual([]);
  });

  it('replaces it by the straight line, 14.5', () => {
    const { slab, spikes, countMap } = despikeSpectral(spectrumOf(series, noNoise), options);
    expect(slab.counts[6]).toBe(14.5);
    expect([...spikes.was]).toEqual([40]);
    expect([...countMap]).toEqual([1]);
  });

  it('uses the mean absolute deviation where most differences are the same', () => {
    // Δ − median: 20 zeros, 30 and −30: mean deviation 60/22, σ = 1.2533 · 2.727 = 3.418; z = ±8.777.
    const flat = new Float64Array(23).fill(5);
    flat[11] = 35;
    const marks = new Uint8Array(23);
    const calm = { variances: null, least: new Float64Array(23), spread: null };
    expect(new SpikeFinder(23, 8.77).find(flat, calm, marks)).toBe(1);
    expect(new SpikeFinder(23, 8.78).find(flat, calm, marks)).toBe(0);
  });
});

describe('with Poisson noise over 2000 spectra of 256 channels', () => {
  const nk = 256;
  const line = (k: number): number => 40 + 5000 * Math.exp(-((k - 100.3) ** 2) / (2 * 3 ** 2));
  const expected = Array.from({ length: nk }, (_, k) => line(k));

  it('finds next to nothing where there is no spike, bright line and all', () => {
    let found = 0;
    for (let n = 0; n < 2000; n++) {
      const random = createRandom(7, n);
      const counts = expected.map((mean) => random.poisson(mean));
      found += despikeSpectral(spectrumOf(counts), options).spikes.k.length;
    }
    // Heights above 6 √(2v) by chance: 1e-5 of the channels at the very most.
    expect(found).toBeLessThanOrEqual(5);
  });

  it('finds nine of ten single-channel spikes of 12 σ away from the line, and replaces them near the truth', () => {
    let hits = 0;
    let pulls = 0;
    const spectra = 500;
    for (let n = 0; n < spectra; n++) {
      const random = createRandom(8, n);
      const counts = expected.map((mean) => random.poisson(mean));
      const at = 150 + Math.floor(100 * random.uniform());
      counts[at] += 12 * Math.sqrt(2 * 40);
      const { slab, spikes } = despikeSpectral(spectrumOf(counts), options);
      if (!spikes.k.includes(at)) continue;
      hits++;
      pulls += (slab.counts[at] - 40) ** 2 / (slab.variances?.[at] ?? Number.NaN);
    }
    expect(hits).toBeGreaterThan(0.9 * spectra);
    // The stated variance is a guess's: no smaller than the error turns out to be.
    expect(pulls / hits).toBeLessThan(1);
  });
});
