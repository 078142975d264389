import { describe, expect, it } from 'vitest';
import { detectScan } from '../../../src/io/detect/detect-scan';
import { type FakeFile, fakeContainer, ramp } from '../fake-container';
import { guess, inspect, plain, planOf, wavelengths } from './inspect';

describe('noise, exposure and serpentine rows', () => {
  const withCounts = (data: Float64Array | Int16Array): FakeFile => ({
    arrays: { counts: { shape: [2, 2, 10], data }, wavelength_nm: wavelengths(10) },
  });

  it('whole numbers from zero up are Poisson counts, also in floating point', async () => {
    expect(planOf(await inspect(withCounts(ramp(40, 0, 1)))).meta.noise).toEqual({
      kind: 'poisson',
    });
  });

  it('negative and fractional values have no noise model, for a stated reason', async () => {
    const negative = await inspect(withCounts(Int16Array.from(ramp(40, -28, 1))));
    expect(guess(negative, 'noise').evidence).toContain('negative values down to -28');
    const fractional = await inspect(withCounts(ramp(40, 0, 0.5)));
    expect(guess(fractional, 'noise').evidence).toContain('not whole numbers');
    expect(planOf(fractional).meta.noise).toEqual({ kind: 'none' });
  });

  it('a detector block is the noise model, its defaults filled in', async () => {
    const { meta, resolved } = planOf(
      await inspect(withCounts(ramp(40, 0, 0.5)), { detector: { read_noise_e: 5 } }),
    );
    expect(meta.noise).toEqual({
      kind: 'detector',
      detector: { electronsPerCount: 1, offsetCounts: 0, readNoiseE: 5, excessNoise: 1 },
    });
    expect(resolved.detector).toEqual({ read_noise_e: 5 });
    for (const detector of [
      { electrons_per_count: 0 },
      { excess_noise: 0.5 },
      { read_noise_e: -1 },
      { offset_counts: Number.NaN },
    ]) {
      const { problems } = await inspect(plain, { detector });
      expect(problems[0].where).toBe(`scan.detector.${Object.keys(detector)[0]}`);
    }
  });

  it('looks at a bounded share of a large cube, spread over it', async () => {
    const data = new Uint16Array(1_600_000).fill(5);
    const container = fakeContainer({
      arrays: { counts: { shape: [40, 40, 1000], data }, wavelength_nm: wavelengths(1000) },
    });
    const inspection = await detectScan(container, [], {}, 'big.h5');
    expect(planOf(inspection).meta.noise.kind).toBe('poisson');
    expect(container.handedOut.values).toBeLessThan(600_000);
  });

  it('exposure and serpentine rows are read where the file states them', async () => {
    const file: FakeFile = { ...plain, facts: { exposure_ms: 400, scan_pattern: 'Serpentine' } };
    const { meta, cube } = planOf(await inspect(file));
    expect(meta.exposureS).toBe(0.4);
    expect(cube.serpentine).toBe(true);
    expect(planOf(await inspect(file, { serpentine: false, exposure_s: 2 })).meta.exposureS).toBe(
      2,
    );
    expect(guess(await inspect(plain), 'serpentine')).toMatchObject({
      source: 'guess',
      alternatives: [{ choice: { serpentine: true } }],
    });
  });
});
