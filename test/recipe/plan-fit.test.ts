import { describe, expect, it } from 'vitest';
import { RimlightError } from '../../src/errors';
import { type FitContext, planFit } from '../../src/recipe/plan-fit';
import type { ModelComponent, PeakModel } from '../../src/recipe/schema';
import { parameterTitle } from '../../src/science/fit/fit-plan';
import { uniformAxis } from '../science/fit/made-spectra';

const axis = uniformAxis(241, 1.82, 2.06);
const laserEv = 2.0865;
const context: FitContext = { axis, noise: { kind: 'poisson' }, laserEv, medium: 'air' };
const detector = { electronsPerCount: 4, offsetCounts: 300, readNoiseE: 8, excessNoise: 1.5 };

function plan(components: readonly ModelComponent[], more: Partial<PeakModel> = {}) {
  return planFit({ ...more, components: [...components] }, context);
}

/** The error a model is refused with. */
function refusal(
  components: readonly ModelComponent[],
  more: Partial<PeakModel> = {},
  other: Partial<FitContext> = {},
): RimlightError {
  try {
    planFit({ ...more, components: [...components] }, { ...context, ...other });
  } catch (error) {
    if (error instanceof RimlightError) return error;
    throw error;
  }
  throw new Error('it was planned');
}

const floor: ModelComponent = { name: 'floor', shape: 'flat' };
const exciton: ModelComponent = { name: 'exciton', shape: 'gaussian', centre: 2, fwhm: 0.04 };

describe('a plan', () => {
  it('has the channels whose centres lie in the window, both ends included', () => {
    const window: [number, number] = [axis.centresEv[80], axis.centresEv[130]];
    expect(plan([floor], { window })).toMatchObject({ firstChannel: 80, endChannel: 131 });
    const turned: [number, number] = [window[1], window[0]];
    expect(plan([floor], { window: turned })).toMatchObject({ firstChannel: 80, endChannel: 131 });
    expect(plan([floor])).toMatchObject({ firstChannel: 0, endChannel: 241 });
  });

  it('has starts and bounds in eV whatever unit they were written in', () => {
    const inCm1: ModelComponent = {
      name: 'A1',
      role: 'raman',
      shape: 'lorentzian',
      centre: { start: 418, min: 400, max: 430, unit: 'cm-1' },
      fwhm: { start: 6, max: 20, unit: 'cm-1' },
    };
    const { parameters } = plan([inCm1]);
    // CODATA 2018: hc = 1.239841984e-4 eV cm, exact in the SI.
    const cm1 = 1.239841984e-4;
    expect(parameters.map(({ name }) => name)).toEqual(['area', 'centre', 'fwhm']);
    expect(parameters[0].start).toBeNull();
    expect(parameters[1].start).toBeCloseTo(laserEv - 418 * cm1, 9);
    expect(parameters[1].min).toBeCloseTo(laserEv - 430 * cm1, 9);
    expect(parameters[1].max).toBeCloseTo(laserEv - 400 * cm1, 9);
    expect(parameters[2].start).toBeCloseTo(6 * cm1, 9);
    expect(parameters[2].max).toBeCloseTo(20 * cm1, 9);
    const inMev = plan([
      {
        name: 'x',
        shape: 'gaussian',
        centre: { start: 2000, unit: 'meV' },
        fwhm: { start: 40, unit: 'meV' },
      },
    ]);
    expect(inMev.parameters[1].start).toBeCloseTo(2, 12);
    expect(inMev.parameters[2].start).toBeCloseTo(0.04, 12);
  });

  it('keeps centres in the window and widths above zero where no bound is given', () => {
    const { parameters } = plan([{ name: 'x', shape: 'pseudo-voigt' }], { window: [1.9, 2] });
    const [area, centre, fwhm, eta] = parameters;
    expect([area.min, area.max]).toEqual([-Infinity, Infinity]);
    expect(centre.min).toBeCloseTo(1.8995, 9);
    expect(centre.max).toBeCloseTo(2.0005, 9);
    expect(fwhm.min).toBeGreaterThan(0);
    expect([eta.min, eta.max]).toEqual([0, 1]);
  });

  it('resolves a chain of ties to the parameter at its end, offsets in their own units', () => {
    const { parameters, components, ...rest } = plan([
      exciton,
      {
        name: 'trion',
        shape: 'gaussian',
        centre: { tie: { to: 'exciton.centre', plus: -30 }, unit: 'meV' },
        fwhm: { tie: { to: 'exciton.fwhm', times: 2 } },
      },
      {
        name: 'third',
        shape: 'gaussian',
        centre: { tie: { to: 'trion.centre', plus: -0.05 } },
        fwhm: { tie: { to: 'trion.fwhm', times: 3, plus: 0.001 } },
      },
    ]);
    const whole = { parameters, components, ...rest };
    const third = parameters.findIndex(
      (_, index) => parameterTitle(whole, index) === 'third.centre',
    );
    expect(parameters[third].tie?.to).toBe(1);
    expect(parameters[third].tie?.times).toBe(1);
    expect(parameters[third].tie?.plus).toBeCloseTo(-0.08, 12);
    expect(parameters[third + 1].tie).toEqual({ to: 2, times: 6, plus: 0.001 });
  });

  it('fits counts by the electrons that were detected', () => {
    const noiseOf = (noise: PeakModel['noise'], of: FitContext['noise']) =>
      planFit(
        { components: [floor], ...(noise !== undefined && { noise }) },
        { ...context, noise: of },
      ).noise;
    const withDetector = { kind: 'detector', detector } as const;
    expect(noiseOf(undefined, { kind: 'poisson' })).toEqual({
      kind: 'variance',
      line: { slope: 1, offset: 0, floor: 0 },
    });
    // gain 4 e/count: a variance of counts/4, without the read noise
    expect(noiseOf('poisson', withDetector)).toEqual({
      kind: 'variance',
      line: { slope: 0.25, offset: 300, floor: 0 },
    });
    // F² = 2.25, read noise (8/4)² = 4 counts²
    const gaussian = { kind: 'variance', line: { slope: 0.5625, offset: 300, floor: 4 } };
    expect(noiseOf('gaussian', withDetector)).toEqual(gaussian);
    expect(noiseOf(undefined, withDetector)).toEqual(gaussian);
    expect(noiseOf(undefined, { kind: 'none' })).toEqual({ kind: 'uniform' });
  });
});

describe('a model that cannot be fitted', () => {
  const refused: readonly [string, RimlightError, readonly (string | RegExp)[]][] = [
    [
      'nothing free',
      refusal([{ ...floor, level: { start: 3, fixed: true } } as ModelComponent]),
      ['no free parameter', 'model.components'],
    ],
    [
      'more parameters than channels',
      refusal([exciton, floor], { window: [1.9985, 2.0025] }),
      ['4 free parameters', '4 channels'],
    ],
    [
      'a window off the axis',
      refusal([floor], { window: [1.2, 1.3] }),
      ['1.2 to 1.3 eV', 'model.window'],
    ],
    [
      'two components of one name',
      refusal([exciton, { name: 'Exciton', shape: 'flat' }]),
      ['"Exciton"', 'components[1]'],
    ],
    [
      'a tie to nothing',
      refusal([
        exciton,
        { name: 'trion', shape: 'gaussian', centre: { tie: { to: 'nobody.centre' } } },
      ]),
      ['trion.centre', 'nobody.centre', '"trion", centre'],
    ],
    [
      'ties in a circle',
      refusal([
        { name: 'a', shape: 'gaussian', centre: { tie: { to: 'b.centre' } } },
        { name: 'b', shape: 'gaussian', centre: { tie: { to: 'a.centre' } } },
      ]),
      ['a.centre', 'back to itself'],
    ],
    [
      'a tie to itself',
      refusal([{ name: 'a', shape: 'gaussian', centre: { tie: { to: 'a.centre' } } }]),
      ['a.centre', 'back to itself'],
    ],
    [
      'bounds crossed',
      refusal([{ ...exciton, fwhm: { min: 0.05, max: 0.01 } } as ModelComponent]),
      ['0.05', '0.01', '"exciton", fwhm'],
    ],
    [
      'a start outside its bounds',
      refusal([{ ...exciton, centre: { start: 2.05, max: 2.01 } } as ModelComponent]),
      ['2.05', '2.01', '"exciton", centre'],
    ],
    [
      'a centre outside the window',
      refusal([{ ...exciton, centre: 1.5 } as ModelComponent]),
      ['1.5', '"exciton", centre', 'window'],
    ],
    [
      'a Raman line without a laser',
      refusal([{ ...exciton, role: 'raman' }], {}, { laserEv: null }),
      ['"raman" needs the laser', '"exciton"', 'scan.laser'],
    ],
    [
      'a shift without a laser',
      refusal(
        [{ ...exciton, centre: { start: 418, unit: 'cm-1' } } as ModelComponent],
        {},
        { laserEv: null },
      ),
      ['laser', '"exciton", centre'],
    ],
    [
      'a shift beyond the laser',
      refusal([{ ...exciton, centre: { start: 20000, unit: 'cm-1' } } as ModelComponent]),
      ['20000 cm-1', '"exciton", centre'],
    ],
    [
      'a wavelength that is none',
      refusal([{ ...exciton, centre: { start: -5, unit: 'nm' } } as ModelComponent]),
      ['-5 nm', '"exciton", centre'],
    ],
    [
      'Gaussian noise without a noise model',
      refusal([floor], { noise: 'gaussian' }, { noise: { kind: 'none' } }),
      ['noise model', 'model.noise'],
    ],
    [
      'a fixed whole width of a voigt',
      refusal([{ name: 'v', shape: 'voigt', fwhm: { start: 0.03, fixed: true } }]),
      ['voigt', '"v"', 'fwhm_g'],
    ],
  ];

  it.each(refused)('is refused by name: %s', (_, error, parts) => {
    expect(error.kind).toBe('recipe');
    for (const part of parts) expect(error.message).toMatch(part);
    expect(error.hint).toMatch(/^[A-Z].*\.$/);
  });
});
