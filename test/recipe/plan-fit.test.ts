/** From the model block to a plan: units, bounds, ties, noise, and everything that cannot be fitted. */
import { describe, expect, it } from 'vitest';
import { planFit } from '../../src/recipe/plan-fit';
import type { ModelComponent, PeakModel } from '../../src/recipe/schema';
import { channelEdges } from '../../src/science/axis';
import { parameterTitle } from '../../src/science/fit/fit-plan';
import type { NoiseModel } from '../../src/science/scan';

const centresEv = Float64Array.from({ length: 101 }, (_, k) => 1.8 + 0.003 * k);
const axis = { centresEv, edgesEv: channelEdges(centresEv) };
const noise: NoiseModel = { kind: 'poisson' };
const context = { axis, noise, laserEv: 2.1, medium: 'vacuum' as const };
const evPerCm1 = 1239.8419843320025 / 1e7;

function plan(components: readonly ModelComponent[], rest: Partial<PeakModel> = {}) {
  return planFit({ components, ...rest }, context);
}

const peak = (parts: object = {}): ModelComponent =>
  ({ name: 'x', shape: 'gaussian', ...parts }) as ModelComponent;

describe('the plan of a fit', () => {
  it('takes the channels whose centre lies in the window', () => {
    const { firstChannel, endChannel } = plan([peak()], { window: [1.9, 1.8295] });
    expect([firstChannel, endChannel]).toEqual([10, 34]);
    expect(plan([peak()]).endChannel).toBe(101);
  });

  it('has every energy in eV, with bounds that change places where the unit runs against energy', () => {
    const { parameters } = plan([
      peak({
        centre: { start: 418, min: 400, max: 430, unit: 'cm-1' },
        fwhm: { start: 20, min: 8, unit: 'cm-1' },
      }),
      peak({
        name: 'y',
        centre: { start: 650, max: 660, unit: 'nm' },
        fwhm: { start: 40, unit: 'meV' },
      }),
    ]);
    const [, centre, fwhm, , other, wide] = parameters;
    expect(centre.start).toBeCloseTo(2.1 - 418 * evPerCm1, 12);
    expect(centre.min).toBeCloseTo(2.1 - 430 * evPerCm1, 12);
    expect(centre.max).toBeCloseTo(2.1 - 400 * evPerCm1, 12);
    expect(fwhm.start).toBeCloseTo(20 * evPerCm1, 12);
    expect(fwhm.min).toBeCloseTo(8 * evPerCm1, 12);
    expect(other.start).toBeCloseTo(1239.8419843320025 / 650, 12);
    expect(other.min).toBeCloseTo(1239.8419843320025 / 660, 12);
    expect(other.max).toBe(axis.edgesEv[101]);
    expect(wide.start).toBeCloseTo(0.04, 15);
  });

  it('resolves chains of ties to one parameter, in the tied one’s unit', () => {
    const { parameters } = plan([
      peak({ name: 'a', centre: 2.0 }),
      peak({ name: 'b', centre: { tie: { to: 'a.centre', plus: -90 }, unit: 'meV' } }),
      peak({ name: 'c', centre: { tie: { to: 'b.centre', plus: 10 }, unit: 'cm-1' } }),
    ]);
    expect(parameters[4].tie).toEqual({ to: 1, times: 1, plus: -0.09 });
    // 10 cm⁻¹ more of shift is 10 cm⁻¹ less of energy.
    expect(parameters[7].tie).toMatchObject({ to: 1, times: 1 });
    expect(parameters[7].tie?.plus).toBeCloseTo(-0.09 - 10 * evPerCm1, 12);
  });

  it('shares the width of a voigt out between its two', () => {
    const [, , g, l] = plan([
      { name: 'v', shape: 'voigt', fwhm: 0.016376 } as ModelComponent,
    ]).parameters;
    expect(g.start).toBeCloseTo(0.01, 6);
    expect(l.start).toBe(g.start);
  });

  it('fits counts by their likelihood, with what the detector does to it', () => {
    const detector = { electronsPerCount: 2, offsetCounts: 300, readNoiseE: 4, excessNoise: 1 };
    const of = (asked: PeakModel['noise'] | undefined, known: NoiseModel) =>
      planFit(
        { components: [peak()], ...(asked === undefined ? {} : { noise: asked }) },
        { ...context, noise: known },
      ).noise;
    const line = { slope: 1, offset: 0, floor: 0 };
    expect(of(undefined, { kind: 'poisson' })).toEqual({ kind: 'variance', line });
    expect(of('poisson', { kind: 'detector', detector })).toEqual({
      kind: 'variance',
      line: { slope: 0.5, offset: 300, floor: 0 },
    });
    expect(of(undefined, { kind: 'detector', detector })).toEqual({
      kind: 'variance',
      line: { slope: 0.5, offset: 300, floor: 4 },
    });
    expect(of(undefined, { kind: 'none' })).toEqual({ kind: 'uniform' });
    expect(() => of('gaussian', { kind: 'none' })).toThrow(/needs a noise model/);
  });

  it('names parameters as ties do', () => {
    expect(parameterTitle(plan([peak(), peak({ name: 'y' })]), 4)).toBe('y.centre');
  });
});

const fixedPeak = peak({
  area: { start: 5, fixed: true },
  centre: { start: 2, fixed: true },
  fwhm: { start: 0.03, fixed: true },
});

describe('a model that cannot be fitted', () => {
  it.each<[string, readonly ModelComponent[], Partial<PeakModel>, RegExp]>([
    ['no free parameter', [fixedPeak], {}, /no free parameter/],
    [
      'more parameters than channels',
      [peak()],
      { window: [1.8, 1.804] },
      /3 free parameters.* 2 channels/,
    ],
    ['a window off the axis', [peak()], { window: [3, 4] }, /holds no channel.*model\.window/],
    [
      'a start outside the window',
      [peak({ centre: 3 })],
      {},
      /start 3 .*"x", centre.*inside the window/,
    ],
    [
      'a start outside bounds',
      [peak({ fwhm: { start: 0.5, max: 0.1 } })],
      {},
      /start 0\.5 .*"x", fwhm/,
    ],
    [
      'crossed bounds',
      [peak({ centre: { min: 2.05, max: 1.9 } })],
      {},
      /leave nothing.*"x", centre/,
    ],
    [
      'two components of one name',
      [peak(), peak({ name: 'X' })],
      {},
      /two components.*components\[1\]/,
    ],
    [
      'a tie to nothing',
      [peak({ fwhm: { tie: { to: 'y.fwhm' } } })],
      {},
      /x\.fwhm leads to y\.fwhm/,
    ],
    [
      'a tie in a circle',
      [
        peak({ fwhm: { tie: { to: 'y.fwhm' } } }),
        peak({ name: 'y', fwhm: { tie: { to: 'x.fwhm' } } }),
      ],
      {},
      /leads back/,
    ],
    [
      'a tie that is no line in energy',
      [peak({ centre: { tie: { to: 'y.centre', plus: 2 }, unit: 'nm' } }), peak({ name: 'y' })],
      {},
      /no straight line.*"x", centre/,
    ],
    [
      'more shift than the laser has',
      [peak({ centre: { start: 2e4, unit: 'cm-1' } })],
      {},
      /more than the laser/,
    ],
  ])('%s: is refused in a sentence that names the place', (_, components, rest, message) => {
    expect(() => plan(components, rest)).toThrow(message);
    expect(() => plan(components, rest)).toThrow(expect.objectContaining({ kind: 'recipe' }));
  });

  it('is one with a Raman line and no laser', () => {
    const model = { components: [peak({ role: 'raman' })] };
    expect(() => planFit(model, { ...context, laserEv: null })).toThrow(
      /"raman" needs the laser.*"x"/,
    );
  });
});
