import { describe, expect, it } from 'vitest';
import { assertThreshold } from '../../../src/science/condition/despike';
import { despikeNeighbour } from '../../../src/science/condition/despike-neighbour';
import { despikeSpectral } from '../../../src/science/condition/despike-spectral';
import { createRandom } from '../../../src/science/numeric/random';
import { noNoise, place, slabOf, spectrumOf } from './made-conditioned';

const options = { threshold: 6, kept: [] };
const nk = 64;

/** Two channels wide, at channels 30 and 31, over a floor of 50 that falls by 0 … 20 % across the scan. */
function narrowLineScan(ny: number, nx: number, seed = 1): Float64Array {
  const random = createRandom(seed);
  return Float64Array.from({ length: ny * nx * nk }, (_, at) => {
    const k = at % nk;
    const brightness = 1 + 0.2 * ((Math.floor(at / nk) % nx) / nx);
    return random.poisson(brightness * (50 + (k === 30 || k === 31 ? 900 : 0)));
  });
}

describe('against the neighbours', () => {
  const shape = { ny: 6, nx: 6, nk };
  const all = { y0: 0, y1: 6 };

  it('leaves a line of two channels that is next door too, which a spectrum alone would lose', () => {
    const slab = slabOf(narrowLineScan(6, 6), shape);
    expect(despikeSpectral(slab, options).spikes.k.length).toBeGreaterThan(30);
    const { spikes } = despikeNeighbour(slab, options, all);
    expect(spikes.k).toHaveLength(0);
  });

  it('finds a spike upon that line, and puts the neighbours’ line in its place', () => {
    const counts = narrowLineScan(6, 6);
    const hit = (2 * 6 + 3) * nk + 30;
    counts[hit] += 2000;
    const { slab, spikes } = despikeNeighbour(slabOf(counts, shape), options, all);
    expect([[...spikes.y], [...spikes.x], [...spikes.k]]).toEqual([[2], [3], [30]]);
    expect(Math.abs(slab.counts[hit] - 1045)).toBeLessThan(4 * Math.sqrt(1045));
    expect(slab.replaced?.[hit]).toBe(1);
  });

  it('is not misled by a spike that outshines its whole spectrum', () => {
    const counts = narrowLineScan(6, 6);
    counts[(3 * 6 + 3) * nk + 12] += 60000;
    const { slab, spikes } = despikeNeighbour(slabOf(counts, shape), options, all);
    expect([...spikes.k]).toEqual([12]);
    expect(slab.counts[(3 * 6 + 3) * nk + 12]).toBeLessThan(120);
  });

  it('gives the same for rows cut apart, with a row more on either side', () => {
    const counts = narrowLineScan(6, 6);
    for (const at of [100, 800, 1300, 2000]) counts[at] += 1500;
    const whole = despikeNeighbour(slabOf(counts, shape), options, all);
    const part = slabOf(counts.subarray(6 * nk, 5 * 6 * nk), { ny: 4, nx: 6, nk });
    const cut = despikeNeighbour({ ...part, y0: 1 }, options, { y0: 2, y1: 4 });
    expect(cut.slab.y0).toBe(2);
    expect(cut.slab.counts).toEqual(whole.slab.counts.subarray(2 * 6 * nk, 4 * 6 * nk));
  });

  it('works without a noise model, and in a scan of one pixel finds nothing', () => {
    const counts = narrowLineScan(6, 6);
    counts[(2 * 6 + 2) * nk + 10] += 3000;
    expect([...despikeNeighbour(slabOf(counts, shape, noNoise), options, all).spikes.k]).toContain(
      10,
    );
    const lone = despikeNeighbour(spectrumOf(counts.subarray(0, nk)), options, { y0: 0, y1: 1 });
    expect(lone.spikes.k).toHaveLength(0);
  });
});

describe('within a spectrum', () => {
  const flat = (): Float64Array =>
    Float64Array.from({ length: nk }, (_, k) => 100 + ((k * 7919) % 13));

  it('finds spikes of up to three channels, at the ends too, and leaves wider ones', () => {
    const counts = flat();
    for (const k of [0, 20, 21, 40, 41, 42, 63]) counts[k] += 900;
    expect([...despikeSpectral(spectrumOf(counts), options).spikes.k]).toEqual([
      0, 20, 21, 40, 41, 42, 63,
    ]);
    const wide = flat();
    for (const k of [30, 31, 32, 33]) wide[k] += 900;
    expect(despikeSpectral(spectrumOf(wide), options).spikes.k).toHaveLength(0);
  });

  it('leaves an edge, which does not come back', () => {
    const edge = flat().map((value, k) => (k < 30 ? value : value + 900));
    expect(despikeSpectral(spectrumOf(edge), options).spikes.k).toHaveLength(0);
  });

  it('gives a spike back that the user keeps', () => {
    const counts = flat();
    counts[20] += 900;
    counts[50] += 900;
    const kept = [{ y: 0, x: 0, k: 20 }];
    const { spikes, slab } = despikeSpectral(spectrumOf(counts), { threshold: 6, kept });
    expect([...spikes.k]).toEqual([50]);
    expect(slab.counts[20]).toBe(counts[20]);
  });

  it('says of a guess that it is less sure than a count', () => {
    const counts = flat();
    counts[20] += 900;
    const { slab } = despikeSpectral(spectrumOf(counts), options);
    expect(slab.variances?.[20]).toBeGreaterThan(slab.counts[20]);
  });

  it('bridges a gap without data, and never fills it', () => {
    const counts = flat();
    counts[20] = Number.NaN;
    counts[21] += 900;
    const { slab, spikes } = despikeSpectral(spectrumOf(counts), options);
    expect([...spikes.k]).toEqual([21]);
    expect(slab.counts[20]).toBeNaN();
    expect(slab.counts[21]).toBeCloseTo(
      // The line runs from channel 19 to 22.
      counts[19] + (2 / 3) * (counts[22] - counts[19]),
      10,
    );
  });

  it.each([
    ['constant', new Float64Array(nk).fill(7)],
    ['empty', new Float64Array(nk).fill(Number.NaN)],
    ['dark', new Float64Array(nk)],
    ['short', Float64Array.of(1, 900, 1)],
  ])('finds nothing in a %s spectrum', (_, counts) => {
    const { slab, spikes } = despikeSpectral(spectrumOf(counts), options);
    expect(spikes.k).toHaveLength(0);
    expect(slab.counts).toEqual(counts);
  });
});

it.each([0, -1, Number.NaN, Number.POSITIVE_INFINITY])('refuses a threshold of %d', (threshold) => {
  expect(() => assertThreshold(threshold, place)).toThrow(/condition\[0\], step/);
});
