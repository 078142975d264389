/** The definition of a band's quantities against the contract's formulas worked by hand, and against theory. */
import { describe, expect, it } from 'vitest';
import type { BandQuantity } from '../../../src/science/bands/band';
import { directBand } from '../../../src/science/bands/direct-band';
import { createRandom } from '../../../src/science/numeric/random';
import type { NoiseModel } from '../../../src/science/scan';
import { axisOf, poisson } from './made-slab';

describe('worked by hand from the contract’s §4', () => {
  // Channels at 1, 2, 3, 4 eV, one eV wide; shares ½, 1, 1, ¾.
  const axis = axisOf(Float64Array.of(1, 2, 3, 4));
  const band = { fromEv: 1, toEv: 4.25, floor: 'none' as const };
  const values = directBand([4, 10, 20, 6], axis, band, poisson);

  it('has the integral Σ f c = 2 + 10 + 20 + 4.5, its error √Σ f² v = √(1 + 10 + 20 + 3.375)', () => {
    expect(values.integral.value).toBe(36.5);
    expect(values.integral.error).toBeCloseTo(Math.sqrt(34.375), 12);
  });

  it('has the centroid Σ f c E/N = 100/36.5, its error √Σ f² v (E − m)²/N', () => {
    const m = 100 / 36.5;
    expect(values.centroid.value).toBeCloseTo(m, 12);
    const variance =
      1 * (1 - m) ** 2 + 10 * (2 - m) ** 2 + 20 * (3 - m) ** 2 + 3.375 * (4 - m) ** 2;
    expect(values.centroid.error).toBeCloseTo(Math.sqrt(variance) / 36.5, 12);
  });

  it('has the spread √(Σ f c (E − m)²/N), its error √Σ f² v ((E − m)² − s²)²/(2 s N)', () => {
    const m = 100 / 36.5;
    const at = (energy: number): number => (energy - m) ** 2;
    const square = (2 * at(1) + 10 * at(2) + 20 * at(3) + 4.5 * at(4)) / 36.5;
    const s = Math.sqrt(square);
    expect(values.spread.value).toBeCloseTo(s, 12);
    const variance =
      1 * (at(1) - square) ** 2 +
      10 * (at(2) - square) ** 2 +
      20 * (at(3) - square) ** 2 +
      3.375 * (at(4) - square) ** 2;
    expect(values.spread.error).toBeCloseTo(Math.sqrt(variance) / (2 * s * 36.5), 12);
  });

  it('has the median where 18.25 counts lie below: 6.25/20 into the third channel', () => {
    expect(values.median.value).toBeCloseTo(2.5 + 6.25 / 20, 12);
    // ½ √34.375 over 40 counts in the 4 eV of the channels around (a fifth is off the axis).
    expect(values.median.error).toBeCloseTo((0.5 * Math.sqrt(34.375)) / 10, 12);
  });

  it('has the peak 20 ± √20 at 3 eV', () => {
    expect(values.peak).toEqual({ value: 20, error: Math.sqrt(20) });
    expect(values.peak_at).toEqual({ value: 3, error: Number.NaN });
  });

  it('takes the variance from a detector where there is one', () => {
    const detector: NoiseModel = {
      kind: 'detector',
      detector: { electronsPerCount: 2, offsetCounts: 5, readNoiseE: 4, excessNoise: 1 },
    };
    const { integral } = directBand([4, 10, 20, 6], axis, band, detector);
    // v = max(c − 5, 0)/2 + 4: 4, 6.5, 11.5, 4.5
    const variance = 0.25 * 4 + 6.5 + 11.5 + 0.5625 * 4.5;
    expect(integral.error).toBeCloseTo(Math.sqrt(variance), 12);
  });

  it('has no errors without a noise model, and the same values', () => {
    const none = directBand([4, 10, 20, 6], axis, band, { kind: 'none' });
    for (const name of Object.keys(none) as BandQuantity[]) {
      expect(none[name].value).toBe(values[name].value);
      expect(none[name].error).toBeNaN();
    }
  });
});

describe('a floor between the ends, worked by hand', () => {
  // Channels at 1 … 7 eV. Left level 10 at 2 eV, right level 16 at 6 eV: the line is 10 + 1.5 (E − 2).
  const axis = axisOf(Float64Array.of(1, 2, 3, 4, 5, 6, 7));
  const band = { fromEv: 0, toEv: 8, floor: 'ends' as const };
  const values = directBand([10, 10, 10, 40, 16, 16, 16], axis, band, poisson);

  it('leaves 1.5, 0, −1.5, 27, 1.5, 0, −1.5 above the line', () => {
    expect(values.integral.value).toBeCloseTo(27, 12);
    expect(values.peak.value).toBeCloseTo(27, 12);
    expect(values.peak_at.value).toBe(4);
    expect(values.centroid.value).toBeCloseTo(4 + (-4.5 + 1.5 + 1.5 - 4.5) / 27, 12);
  });

  it('propagates the errors of the line: each end channel takes 7/6 from the sum and gives 1', () => {
    expect(values.integral.error).toBeCloseTo(Math.sqrt(40 + (30 + 48) / 36), 12);
  });

  it('propagates them to the peak: 1 for its own channel, −1/6 for each of the six', () => {
    expect(values.peak.error).toBeCloseTo(Math.sqrt(40 + (30 + 48) / 36), 12);
  });

  it('uses fewer channels where the band has less than six, so that none serves both ends', () => {
    // Four channels, two at each end: levels 3 at 1.5 eV and 5 at 3.5 eV; the line is 3 + (E − 1.5).
    const narrow = { fromEv: 0.5, toEv: 4.5, floor: 'ends' as const };
    const { peak, peak_at } = directBand([1, 5, 6, 4, 9, 9, 9], axis, narrow, poisson);
    expect(peak.value).toBeCloseTo(5 - 3.5, 12);
    expect(peak_at.value).toBe(2);
  });

  it('leaves nothing of a straight line, and no centroid of nothing', () => {
    const slope = [3, 5, 7, 9, 11, 13, 15];
    const { integral, centroid, median, spread } = directBand(slope, axis, band, poisson);
    expect(Math.abs(integral.value)).toBeLessThan(1e-12);
    for (const { value } of [centroid, median, spread]) expect(value).toBeNaN();
  });

  it('leaves nothing of a single channel', () => {
    const single = { fromEv: 2.6, toEv: 3.2, floor: 'ends' as const };
    const { integral, peak } = directBand([1, 2, 8, 4, 5, 6, 7], axis, single, poisson);
    expect(integral).toEqual({ value: 0, error: 0 });
    expect(peak).toEqual({ value: 0, error: 0 });
  });
});

describe('no data', () => {
  const axis = axisOf(Float64Array.of(1, 2, 3, 4, 5, 6));
  const band = { fromEv: 0.5, toEv: 6.5, floor: 'none' as const };
  const { NaN: missing } = Number;

  it('is left out', () => {
    const values = directBand([missing, 4, missing, 6, 0, 0], axis, band, poisson);
    expect(values.integral).toEqual({ value: 10, error: Math.sqrt(10) });
    expect(values.centroid.value).toBeCloseTo(3.2, 12);
    expect(values.peak.value).toBe(6);
  });

  it('leaves an end of a floor to its other channels; without any there is no floor', () => {
    const ends = { ...band, floor: 'ends' as const };
    const values = directBand([missing, 4, 4, 9, 8, 8], axis, ends, poisson);
    // Left 4 at 2.5 eV, right (9 + 8 + 8)/3 at 5 eV.
    const line = (energy: number): number => 4 + ((25 / 3 - 4) * (energy - 2.5)) / 2.5;
    const net = [2, 3, 4, 5, 6].map((energy, i) => ([4, 4, 9, 8, 8][i] ?? 0) - line(energy));
    expect(values.integral.value).toBeCloseTo(
      net.reduce((sum, one) => sum + one, 0),
      12,
    );
    const without = directBand([missing, missing, missing, 9, 8, 8], axis, ends, poisson);
    for (const { value } of Object.values(without)) expect(value).toBeNaN();
  });

  it('in every channel gives NaN; zero counts give a sum of 0 and no centroid', () => {
    const none = directBand(new Array<number>(6).fill(missing), axis, band, poisson);
    for (const { value } of Object.values(none)) expect(value).toBeNaN();
    const zero = directBand(new Array<number>(6).fill(0), axis, band, poisson);
    expect(zero.integral).toEqual({ value: 0, error: 0 });
    expect(zero.peak).toEqual({ value: 0, error: 0 });
    for (const { value } of [zero.centroid, zero.median, zero.spread]) expect(value).toBeNaN();
  });
});

describe('a Gaussian line of N counts', () => {
  const sigma = 0.02;
  const counts = 1e6;
  const axis = axisOf(Float64Array.from({ length: 401 }, (_, k) => 1.8 + 0.001 * k));
  const line = axis.centresEv.map(
    (energy) =>
      (counts * 0.001 * Math.exp(-0.5 * ((energy - 2) / sigma) ** 2)) /
      (sigma * Math.sqrt(2 * Math.PI)),
  );
  const band = { fromEv: 1.85, toEv: 2.15, floor: 'none' as const };
  const values = directBand(line, axis, band, poisson);

  // Cramér–Rao bounds of a Gaussian without background, which its own moments reach
  // (reference values §7): σ_centre = σ/√N, σ_σ = σ/√(2N), σ_area = √N.
  it('has the errors σ/√N, σ/√(2N) and √N that theory gives', () => {
    expect(values.integral.value).toBeCloseTo(counts, 3);
    expect(values.integral.error).toBeCloseTo(Math.sqrt(counts), 6);
    expect(values.centroid.value).toBeCloseTo(2, 9);
    expect(values.centroid.error / (sigma / Math.sqrt(counts))).toBeCloseTo(1, 5);
    expect(values.spread.value).toBeCloseTo(sigma, 8);
    expect(values.spread.error / (sigma / Math.sqrt(2 * counts))).toBeCloseTo(1, 5);
  });

  // The sample median of a normal distribution: σ √(π/2)/√N for large N (Kendall & Stuart, The
  // Advanced Theory of Statistics 1, from memory).
  it('has the median’s error σ √(π/2)/√N', () => {
    expect(values.median.value).toBeCloseTo(2, 6);
    const expected = sigma * Math.sqrt(Math.PI / 2 / counts);
    // The five-channel mean of the density at the top is 0.1 % low.
    expect(Math.abs(values.median.error / expected - 1)).toBeLessThan(0.003);
  });
});

describe('errors over ten thousand Poisson pixels', () => {
  const axis = axisOf(Float64Array.from({ length: 60 }, (_, k) => 1.9 + 0.004 * k));
  // Bright enough that the first order, to which errors are propagated, is nearly all: what is left of
  // the second is a bias of about a hundredth of the error.
  const expected = axis.centresEv.map(
    (energy) => 60 + 1600 * Math.exp(-0.5 * ((energy - 2.01) / 0.02) ** 2),
  );
  const pixels = 10_000;

  // Pulls (value − truth)/error have a mean of 0 ± 1/√n and a deviation of 1 ± 1/√(2n): 0.01 and 0.007
  // here; four of these allowed, and a little for the bias of errors taken from the data themselves.
  it.each([
    ['none', ['integral', 'centroid', 'spread', 'median']],
    ['ends', ['integral', 'centroid', 'spread']],
  ] as const)('are as large as the scatter, with floor %s', (floor, quantities) => {
    const band = { fromEv: 1.931, toEv: 2.0955, floor };
    const truth = directBand(expected, axis, band, poisson);
    const pulls = new Map<BandQuantity, number[]>(quantities.map((name) => [name, []]));
    for (let pixel = 0; pixel < pixels; pixel++) {
      const random = createRandom(77, pixel);
      const counts = Array.from(expected, (mean) => random.poisson(mean));
      const values = directBand(counts, axis, band, poisson);
      for (const [name, list] of pulls) {
        list.push((values[name].value - truth[name].value) / values[name].error);
      }
    }
    for (const [name, list] of pulls) {
      const mean = list.reduce((sum, pull) => sum + pull, 0) / pixels;
      const deviation = Math.sqrt(
        list.reduce((sum, pull) => sum + (pull - mean) ** 2, 0) / (pixels - 1),
      );
      expect({ name, isCentred: Math.abs(mean) < 0.05 }).toEqual({ name, isCentred: true });
      // The mean of five channels around the top of a line as narrow as this is 3.9 % below the top,
      // Σ exp(−k²/50)/5 for k = −2 … 2, so the median's error is as much too large.
      const due = name === 'median' ? 0.961 : 1;
      expect({ name, isRight: Math.abs(deviation - due) < 0.03 }).toEqual({ name, isRight: true });
    }
  });
});
