import { describe, expect, it } from 'vitest';
import { expectedSignal } from '../../../src/science/scenarios/plan';
import { generateScenario, planScenario } from '../../../src/science/scenarios/scenario';
import { momentsOf, signalOf, truthMap } from './truth';

const options = { seed: 1, ny: 64, nx: 64, nk: 400 };
const plan = planScenario('twin-layer', options);
const { truth } = generateScenario('twin-layer', { ...options, nk: 16 });

describe('twin-layer', () => {
  it('holds its interlayer emission between 1.35 and 1.45 eV', () => {
    const centres = truthMap(truth, 'interlayer.centre');
    for (let i = 0; i < centres.length; i += 101) {
      const { area, centroid } = momentsOf(plan, signalOf(plan, 'interlayer', i));
      expect(Math.abs(centroid - centres[i]!)).toBeLessThan(1e-4);
      expect(Math.abs(area / plan.peaks[0]!.area[i]! - 1)).toBeLessThan(0.01);
    }
    expect(Math.min(...centres)).toBeGreaterThan(1.35);
    expect(Math.max(...centres)).toBeLessThan(1.451);
    expect(Math.max(...centres) - Math.min(...centres)).toBeGreaterThan(0.06);
  });

  it('shows rings that shrink toward lower energy', () => {
    const top = truth.landmarks.find(({ label }) => label === 'top')!;
    const radii = [1.435, 1.42, 1.405, 1.39].map((ev) => ringRadiusPx(top, ev));
    for (let i = 1; i < radii.length; i++) expect(radii[i]!).toBeLessThan(radii[i - 1]! - 0.5);
    expect(radii.at(-1)!).toBeGreaterThan(0.5);
  });

  it('is brighter where it is stretched, without a ring in brightness', () => {
    const top = truth.landmarks.find(({ label }) => label === 'top')!;
    const area = truthMap(truth, 'interlayer.area');
    const profile = [0, 4, 8, 12].map((r) => area[top.y * 64 + top.x - r]!);
    for (let i = 1; i < 4; i++) expect(profile[i]!).toBeLessThan(profile[i - 1]!);
  });

  it('lies where a silicon detector ends', () => {
    const at = (nm: number) => plan.axis.wavelengthAirNm.findIndex((value) => value >= nm);
    expect(plan.response[at(940)]! / plan.response[at(860)]!).toBeLessThan(0.5);
    expect(Math.min(...plan.response)).toBeGreaterThan(0.2);
  });
});

/** Radius at which a 6 meV band around an energy is brightest, mean over all directions. */
function ringRadiusPx(centre: { y: number; x: number }, energyEv: number): number {
  const signal = new Float64Array(400);
  const sums = new Float64Array(20);
  const pixels = new Float64Array(20);
  for (let y = 0; y < 64; y++) {
    for (let x = 0; x < 64; x++) {
      const ring = Math.round(Math.hypot(y - centre.y, x - centre.x));
      if (ring >= 20) continue;
      expectedSignal(plan, y * 64 + x, signal);
      pixels[ring]!++;
      signal.forEach((counts, k) => {
        if (Math.abs(plan.axis.centresEv[k]! - energyEv) < 0.003) sums[ring]! += counts;
      });
    }
  }
  const means = [...sums].slice(0, 13).map((sum, r) => sum / pixels[r]!);
  return means.indexOf(Math.max(...means));
}
