/** The fits that are measured: the model, its truth and Poisson spectra of it, the same in every run. */
import { planFit } from '../../src/recipe/plan-fit';
import type { ModelComponent } from '../../src/recipe/schema';
import { channelEdges } from '../../src/science/axis';
import { completeStarts } from '../../src/science/fit/estimate-starts';
import { createFitModel, type FitModel } from '../../src/science/fit/fit-model';
import { createRandom } from '../../src/science/numeric/random';

export interface FitWorkload {
  readonly name: string;
  readonly model: FitModel;
  readonly truth: Float64Array;
  readonly spectra: readonly Float64Array[];
}

interface Made {
  readonly name: string;
  readonly channels: number;
  readonly fromEv: number;
  readonly toEv: number;
  readonly components: readonly ModelComponent[];
  readonly truth: readonly number[];
}

const spectraOfEach = 256;

/** Counts of about 500 at the peak; 13 free parameters. */
const w1: Made = {
  name: 'W1, 1024 channels, 13 parameters',
  channels: 1024,
  fromEv: 1.82,
  toEv: 2.06,
  components: [
    { name: 'floor', shape: 'line' },
    { name: 'exciton', shape: 'gaussian', centre: 2, fwhm: 0.035 },
    { name: 'tail', shape: 'lorentzian', centre: 1.92, fwhm: 0.05 },
    {
      name: 'A1',
      shape: 'pseudo-voigt',
      centre: 2.034,
      fwhm: 0.001,
      eta: { start: 0.5, fixed: true },
    },
    { name: '2LA', shape: 'lorentzian', centre: 2.043, fwhm: { start: 0.0012, fixed: true } },
  ],
  truth: [30, 10, 79000, 2, 0.035, 20000, 1.92, 0.05, 800, 2.034, 0.001, 0.5, 600, 2.043, 0.0012],
};

const w2: Made = {
  name: 'W2, 256 channels, 7 parameters',
  channels: 256,
  fromEv: 1.82,
  toEv: 2.06,
  components: [
    { name: 'floor', shape: 'flat' },
    { name: 'exciton', shape: 'gaussian', centre: 2, fwhm: 0.035 },
    { name: 'tail', shape: 'lorentzian', centre: 1.92, fwhm: 0.05 },
  ],
  truth: [30, 19800, 2, 0.035, 5000, 1.92, 0.05],
};

const w3: Made = {
  name: 'W3, 464 channels, tailed peak, 15 parameters',
  channels: 464,
  fromEv: 1.84,
  toEv: 2.06,
  components: [
    { name: 'floor', shape: 'line' },
    { name: 'exciton', shape: 'gaussian', centre: 2, fwhm: 0.035 },
    { name: 'tail', shape: 'tailed', centre: 1.92, fwhm: 0.05, tail: 0.02 },
    { name: 'A1', shape: 'lorentzian', centre: 2.034, fwhm: 0.0009 },
    { name: '2LA', shape: 'lorentzian', centre: 2.043, fwhm: 0.0012 },
  ],
  truth: [
    ...[305, -15, 50000, 2.005, 0.032, 30000, 1.92, 0.045, 0.02],
    ...[730, 2.034, 0.00085, 570, 2.043, 0.0011],
  ],
};

export function fitWorkloads(): readonly FitWorkload[] {
  return [w1, w2, w3].map(make);
}

function make({ name, channels, fromEv, toEv, components, truth }: Made): FitWorkload {
  const centresEv = Float64Array.from(
    { length: channels },
    (_, k) => fromEv + ((toEv - fromEv) * k) / (channels - 1),
  );
  const axis = { centresEv, edgesEv: channelEdges(centresEv) };
  const context = { axis, noise: { kind: 'poisson' }, laserEv: 2.0865, medium: 'air' } as const;
  const asked = createFitModel(planFit({ components }, context), axis);
  const mean = new Float64Array(channels);
  for (const [c, { first, count }] of asked.plan.components.entries()) {
    const own = Float64Array.from(truth.slice(first, first + count));
    asked.shapes[c].evaluate(asked.grid, own, mean, null);
  }
  return {
    name,
    model: createFitModel(completeStarts(asked, mean), axis),
    truth: Float64Array.from(truth),
    spectra: Array.from({ length: spectraOfEach }, (_, i) => {
      const random = createRandom(3, i);
      return mean.map((expected) => random.poisson(expected));
    }),
  };
}
