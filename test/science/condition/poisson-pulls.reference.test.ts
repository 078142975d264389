/** Poisson statistics after response and binning: pulls of 10⁴ pixels are normal with mean 0 and variance 1. */
import { expect, it } from 'vitest';
import { binSlab } from '../../../src/science/condition/bin';
import { detectedCounts } from '../../../src/science/condition/conditioned';
import { subtractOffset } from '../../../src/science/condition/offset';
import { divideByResponse } from '../../../src/science/condition/response';
import { createRandom } from '../../../src/science/numeric/random';
import type { NoiseModel } from '../../../src/science/scan';
import { slabOf } from './made-conditioned';

const noise: NoiseModel = {
  kind: 'detector',
  detector: { electronsPerCount: 1, offsetCounts: 300, readNoiseE: 5, excessNoise: 1 },
};
const nk = 16;
const light = Float64Array.from({ length: nk }, (_, k) => 400 + 200 * Math.sin(k / 3));
const response = Float64Array.from({ length: nk }, (_, k) => 0.9 - 0.04 * k);

it('holds for counts after offset, response and bins of 2 × 2 pixels and 4 channels', () => {
  const nx = 200;
  const counts = Float64Array.from({ length: nx * nx * nk }, (_, at) => {
    const random = createRandom(20, at);
    const k = at % nk;
    return 300 + random.poisson(light[k] * response[k]) + Math.round(5 * random.normal());
  });
  const recorded = slabOf(counts, { ny: nx, nx, nk }, noise, 'float32');
  const slab = binSlab(divideByResponse(subtractOffset(recorded, 300), response), {
    x: 2,
    y: 2,
    k: 4,
  });
  expect(slab.shape).toEqual({ ny: 100, nx: 100, nk: 4 });
  for (let bin = 0; bin < 4; bin++) {
    const truth = 4 * light.slice(4 * bin, 4 * bin + 4).reduce((sum, value) => sum + value, 0);
    let sum = 0;
    let squares = 0;
    let within = 0;
    for (let pixel = 0; pixel < 1e4; pixel++) {
      const pull =
        (slab.counts[pixel * 4 + bin] - truth) / Math.sqrt(slab.variances?.[pixel * 4 + bin] ?? 0);
      sum += pull;
      squares += pull * pull;
      if (Math.abs(pull) < 1) within++;
    }
    // Means to 4/√10⁴; the data's own variances pull means low by 1/(2 √counts) = 0.007 at 5000 counts.
    expect(Math.abs(sum / 1e4)).toBeLessThan(0.05);
    // A variance of 10⁴ pulls scatters by √(2/10⁴) = 0.014, the rounded read noise's 1/12 adds nothing.
    expect(Math.abs(squares / 1e4 - 1)).toBeLessThan(0.06);
    // 68.27 % of a normal distribution, ± 0.5 %.
    expect(Math.abs(within / 1e4 - 0.6827)).toBeLessThan(0.02);
  }
});

it('holds for what was detected: expected counts are model × factor + background', () => {
  const nx = 100;
  const counts = Float64Array.from({ length: nx * nx * nk }, (_, at) =>
    createRandom(21, at).poisson(30 + light[at % nk] * response[at % nk]),
  );
  const recorded = slabOf(counts, { ny: nx, nx, nk });
  const slab = binSlab(divideByResponse(subtractOffset(recorded, 30), response), {
    x: 1,
    y: 1,
    k: 4,
  });
  const out = new Float64Array(4);
  for (let bin = 0; bin < 4; bin++) {
    const model = light.slice(4 * bin, 4 * bin + 4).reduce((sum, value) => sum + value, 0);
    const mean = model * slab.factor[bin] + slab.background.values[bin];
    let sum = 0;
    let squares = 0;
    for (let pixel = 0; pixel < 1e4; pixel++) {
      const pull = (detectedCounts(slab, pixel, out)[bin] - mean) / Math.sqrt(mean);
      sum += pull;
      squares += pull * pull;
    }
    // 4 channels of unequal response in a bin: the mean is off by their covariance, here below 0.5 % of counts.
    expect(Math.abs(sum / 1e4)).toBeLessThan(0.1 + 0.005 * Math.sqrt(mean));
    expect(Math.abs(squares / 1e4 - 1)).toBeLessThan(0.06);
  }
});
