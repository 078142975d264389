import { describe, expect, it } from 'vitest';
import { expectedSignal } from '../../../src/science/scenarios/plan';
import {
  generateScenario,
  planScenario,
  scenarioNames,
} from '../../../src/science/scenarios/scenario';
import { digestOfSample } from './digest';

const small = { seed: 3, ny: 12, nx: 14, nk: 256 };

describe('one seed, one scan', () => {
  it.each([
    ['tent-field', '09c9cf30'],
    ['twin-layer', '6e65ad93'],
  ])('%s keeps its bytes', (name, digest) => {
    expect(digestOfSample(generateScenario(name, small))).toBe(digest);
  });

  it('gives another scan for another seed', () => {
    const digests = [1, 2, 3, 4].map((seed) =>
      digestOfSample(generateScenario('tent-field', { ...small, seed })),
    );
    expect(new Set(digests).size).toBe(4);
  });

  it('tells its progress and stops when told to', () => {
    const shares: number[] = [];
    generateScenario('twin-layer', small, (share) => shares.push(share));
    expect(shares).toHaveLength(small.ny);
    expect(shares.at(-1)).toBe(1);
    const stop = () => {
      throw new Error('enough');
    };
    expect(() => generateScenario('twin-layer', small, stop)).toThrow('enough');
  });
});

describe.each(scenarioNames)('%s is recorded as a detector would', (name) => {
  const scan = generateScenario(name, { ny: 20, nx: 24, nk: 200, seed: 9 });
  const plan = planScenario(name, { ny: 20, nx: 24, nk: 200, seed: 9 });
  const { nk } = scan.shape;

  it('has the shapes it states', () => {
    expect(scan.shape).toEqual({ ny: 20, nx: 24, nk: 200 });
    expect(scan.counts).toHaveLength(20 * 24 * 200);
    expect(scan.heightNm).toHaveLength(480);
    for (const array of [scan.wavelengthAirNm, scan.darkCounts, scan.response]) {
      expect(array).toHaveLength(nk);
    }
    for (const map of scan.truth.maps) {
      expect(map.values, map.name).toHaveLength(480);
      expect(map.values.every(Number.isFinite), map.name).toBe(true);
    }
  });

  it('has an ascending axis that is not quite uniform', () => {
    const steps = [...scan.wavelengthAirNm].slice(1).map((nm, k) => nm - scan.wavelengthAirNm[k]!);
    expect(Math.min(...steps)).toBeGreaterThan(0);
    expect(steps[0]! / steps.at(-1)!).toBeGreaterThan(1.01);
    expect(steps[0]! / steps.at(-1)!).toBeLessThan(1.05);
  });

  it('has the mean and the variance of Poisson light, read noise and an offset of about 300', () => {
    const spiked = new Set(scan.truth.spikes.map(({ y, x, k }) => (y * 24 + x) * nk + k));
    let [sum, chi2, n] = [0, 0, 0];
    for (let pixel = 0; pixel < 480; pixel++) {
      const signal = expected(plan, pixel);
      for (let k = 0; k < nk; k++) {
        if (spiked.has(pixel * nk + k)) continue;
        // rounding to whole counts adds 1/12
        const variance = signal[k]! + plan.readNoiseCounts ** 2 + 1 / 12;
        const z =
          (scan.counts[pixel * nk + k]! - signal[k]! - scan.darkCounts[k]!) / Math.sqrt(variance);
        sum += z;
        chi2 += z * z;
        n++;
      }
    }
    expect(Math.abs(sum)).toBeLessThan(4 * Math.sqrt(n));
    // the fourth moment of Poisson counts and normal noise together is at most 3 + 1/variance
    expect(Math.abs(chi2 / n - 1)).toBeLessThan(4 * Math.sqrt(2.2 / n));
    expect(Math.abs(scan.darkCounts.reduce((a, b) => a + b, 0) / nk - 300)).toBeLessThan(3);
  });

  it('has every listed spike in its counts, and none unlisted', () => {
    const added = new Float64Array(scan.counts.length);
    for (const { y, x, k, counts } of scan.truth.spikes) added[(y * 24 + x) * nk + k]! += counts;
    expect(scan.truth.spikes.length).toBeGreaterThan(4);
    for (let pixel = 0; pixel < 480; pixel++) {
      const signal = expected(plan, pixel);
      for (let k = 0; k < nk; k++) {
        const i = pixel * nk + k;
        const light = signal[k]! + scan.darkCounts[k]!;
        const surplus = scan.counts[i]! - Math.min(light + added[i]!, 65535);
        expect(Math.abs(surplus)).toBeLessThan(
          6 * Math.sqrt(signal[k]! + plan.readNoiseCounts ** 2) + 2,
        );
      }
    }
  });

  it('reaches the brightness asked for on the flat layer', () => {
    const flat = scan.truth.landmarks.find(({ label }) => label === 'flat')!;
    const bright = planScenario(name, { ny: 20, nx: 24, nk: 200, seed: 9, peakCounts: 5000 });
    const top = Math.max(...expected(bright, flat.y * 24 + flat.x));
    expect(top).toBeGreaterThan(5000 * 0.8);
    expect(top).toBeLessThan(5000 * 1.35);
  });

  it('saturates at 65535 and never goes below 0', () => {
    const glaring = generateScenario(name, { ny: 6, nx: 6, nk: 64, peakCounts: 60_000 });
    expect(Math.max(...glaring.counts)).toBeLessThanOrEqual(65535);
    expect(Math.max(...glaring.counts)).toBeGreaterThan(50_000);
  });
});

function expected(plan: ReturnType<typeof planScenario>, pixel: number): Float64Array {
  const signal = expectedSignal(plan, pixel, new Float64Array(plan.shape.nk));
  return signal.map((counts, k) => counts * plan.response[k]!);
}

describe('what cannot be made is refused', () => {
  it.each([
    ['tent-fields', {}, 'there is no demo scan called "tent-fields"'],
    ['tent-field', { ny: 0 }, '0 is not a possible number of rows'],
    ['tent-field', { nx: 2.5 }, '2.5 is not a possible number of columns'],
    ['tent-field', { nk: 8 }, '8 is not a possible number of channels'],
    ['tent-field', { nk: Number.NaN }, 'NaN is not a possible number of channels'],
    ['tent-field', { ny: 4096, nx: 4096, nk: 4096 }, '4096 × 4096 pixels of 4096 channels'],
    ['tent-field', { seed: -1 }, '-1 is not a possible seed'],
    ['tent-field', { seed: 0.5 }, '0.5 is not a possible seed'],
    ['twin-layer', { peakCounts: 0 }, '0 is not a possible brightness'],
  ])('%s with %o', (name, options, what) => {
    expect(() => generateScenario(name, options)).toThrowError(what);
    try {
      generateScenario(name, options);
    } catch (error) {
      expect(error).toMatchObject({
        kind: 'usage',
        hint: expect.stringMatching(/^(Choose|Give|Ask)/),
      });
    }
  });

  it('makes the smallest scan there is', () => {
    for (const name of scenarioNames) {
      const scan = generateScenario(name, { ny: 1, nx: 1, nk: 16 });
      expect(scan.counts).toHaveLength(16);
      expect(scan.truth.landmarks).toHaveLength(3);
    }
  });
});
