import { describe, expect, it } from 'vitest';
import { sampleTruthJson } from '../../src/io/sample-truth';
import { generateScenario, scenarioNames } from '../../src/science/scenarios/scenario';

describe.each(scenarioNames)('the truth of %s as JSON', (name) => {
  const scan = generateScenario(name, { ny: 5, nx: 7, nk: 64, seed: 4 });
  const truth = JSON.parse(sampleTruthJson(scan));

  it('says which scan it belongs to', () => {
    expect(truth).toMatchObject({
      scenario: name,
      seed: 4,
      shape: { ny: 5, nx: 7, nk: 64 },
      pitch_nm: scan.pitchNm,
      laser_nm_air: scan.laserNm,
      landmarks: scan.truth.landmarks,
    });
    expect(truth.constants).toEqual(scan.truth.constants);
  });

  it('holds every map as rows, or as one value where all pixels agree', () => {
    expect(Object.keys(truth.maps)).toEqual(scan.truth.maps.map((map) => map.name));
    // half of the last decimal kept
    const halfStep = { eV: 5e-6, counts: 0.5, 'cm-1': 5e-4, percent: 5e-5, nm: 5e-4 };
    for (const map of scan.truth.maps) {
      const written = truth.maps[map.name];
      expect(written.unit).toBe(map.unit);
      const limit = halfStep[map.unit as keyof typeof halfStep] * 1.0001;
      map.values.forEach((value, i) => {
        const kept = written.value ?? written.values[Math.floor(i / 7)][i % 7];
        expect(Math.abs(kept - value)).toBeLessThanOrEqual(limit);
      });
    }
    const fwhm = name === 'tent-field' ? 'localised.fwhm' : 'interlayer.fwhm';
    expect(truth.maps[fwhm]).not.toHaveProperty('values');
  });

  it('lists the spikes', () => {
    expect(truth.spikes).toEqual(scan.truth.spikes.map(({ y, x, k, counts }) => [y, x, k, counts]));
  });
});
