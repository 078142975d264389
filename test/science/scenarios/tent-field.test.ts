import { describe, expect, it } from 'vitest';
import { vacuumNmFromAir } from '../../../src/science/air';
import { generateScenario, planScenario } from '../../../src/science/scenarios/scenario';
import { evFromNm, shiftCm1FromEv } from '../../../src/science/units';
import { median, momentsOf, signalOf, truthMap } from './truth';

const options = { seed: 1, ny: 40, nx: 44, nk: 1024 };
const plan = planScenario('tent-field', options);
const { truth } = generateScenario('tent-field', { ...options, nk: 16 });
const pixels = [...new Array(40 * 44).keys()].filter((i) => i % 37 === 0);
const at = (label: string) => {
  const { y, x } = truth.landmarks.find((landmark) => landmark.label === label)!;
  return y * 44 + x;
};

describe('the noiseless spectra hold the truth', () => {
  it('exciton: area, centroid and width', () => {
    for (const i of pixels) {
      const { area, centroid, spread } = momentsOf(plan, signalOf(plan, 'exciton', i));
      const centre = plan.peaks[0]!.centreEv[i]!;
      expect(Math.abs(centroid - centre)).toBeLessThan(1e-5);
      expect(Math.abs(area / plan.peaks[0]!.area[i]! - 1)).toBeLessThan(1e-3);
      // fwhm = 2√(2 ln 2) σ
      expect(Math.abs((2.35482 * spread) / plan.peaks[0]!.fwhmEv[i]! - 1)).toBeLessThan(2e-3);
    }
  });

  it('Raman lines lie at the laser less their shift', () => {
    const laserEv = evFromNm(vacuumNmFromAir(594.1));
    for (const [name, unstrained] of [
      ['A1', 418],
      ['2LA', 350],
    ] as const) {
      for (const i of pixels) {
        const spectrum = signalOf(plan, name, i);
        const top = spectrum.indexOf(Math.max(...spectrum));
        const shift = shiftCm1FromEv(plan.axis.centresEv[top]!, laserEv);
        const channelCm1 = Math.abs(shift - shiftCm1FromEv(plan.axis.centresEv[top + 1]!, laserEv));
        expect(Math.abs(shift - truthMap(truth, `${name}.shift`)[i]!)).toBeLessThan(channelCm1 / 2);
      }
      expect(truthMap(truth, `${name}.shift`)[at('flat')]).toBeCloseTo(unstrained, 2);
    }
  });

  it('keeps the area of a line as narrow as a channel', () => {
    const coarse = planScenario('tent-field', { ...options, nk: 256 });
    const { area } = momentsOf(coarse, signalOf(coarse, 'A1', 0));
    // the axis ends 13 half-widths above the line and far below it: 2.6 % of a Lorentzian lie outside
    expect(area / coarse.peaks[2]!.area[0]!).toBeGreaterThan(0.96);
    expect(area / coarse.peaks[2]!.area[0]!).toBeLessThan(1);
  });
});

describe('the physics', () => {
  const exciton = truthMap(truth, 'exciton.centre');
  const localised = truthMap(truth, 'localised.centre');
  const trace = truthMap(truth, 'strain.trace');

  it('localised emission lies about 90 meV below the exciton', () => {
    const below = [...exciton].map((ev, i) => 1000 * (ev - localised[i]!));
    expect(Math.abs(median(below) - 90)).toBeLessThan(2);
    expect(Math.min(...below)).toBeGreaterThan(84);
    expect(Math.max(...below)).toBeLessThan(96);
  });

  it('the exciton falls by 65 meV per percent of trace, less the disorder of the ground', () => {
    const rest = [...exciton].map((ev, i) => ev - 2.01 + 0.065 * trace[i]!);
    const rms = Math.sqrt(rest.reduce((sum, r) => sum + r * r, 0) / rest.length);
    expect(rms).toBeLessThan(0.003);
    expect(Math.max(...trace)).toBeGreaterThan(0.5);
    expect(Math.max(...trace)).toBeLessThan(2);
  });

  it('each Raman shift follows its Grüneisen parameter', () => {
    // biaxial Δω = −2 γ ω₀ ε with 2ε the trace
    for (const [name, unstrained, grueneisen] of [
      ['A1', 418, 0.3],
      ['2LA', 350, 0.55],
    ] as const) {
      truthMap(truth, `${name}.shift`).forEach((cm1, i) => {
        expect(cm1 - unstrained).toBeCloseTo((-grueneisen * unstrained * trace[i]!) / 100, 9);
      });
    }
  });

  it('the rim glows below the exciton, the crown is red-shifted without it, flat ground is neither', () => {
    const [flat, rim, crown] = [at('flat'), at('rim'), at('crown')];
    const ratio = (i: number) =>
      truthMap(truth, 'localised.area')[i]! / truthMap(truth, 'exciton.area')[i]!;
    expect(ratio(rim)).toBeGreaterThan(1);
    expect(ratio(flat)).toBeLessThan(0.05);
    expect(ratio(crown)).toBeLessThan(0.3);
    expect(exciton[flat]! - exciton[crown]!).toBeGreaterThan(0.03);
    expect(trace[crown]!).toBeGreaterThan(trace[rim]!);
    expect(trace[rim]!).toBeGreaterThan(trace[flat]!);
    expect(truthMap(truth, 'height')[crown]!).toBeGreaterThan(truthMap(truth, 'height')[rim]!);
  });

  it('the wrinkle crosses the whole field', () => {
    const height = truthMap(truth, 'height');
    for (const x of [0, 43]) {
      const column = [...new Array(40).keys()].map((y) => height[y * 44 + x]!);
      expect(Math.max(...column)).toBeGreaterThan(4);
    }
  });
});
