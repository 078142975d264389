/** Plans and Poisson spectra of known truth, for tests of the fit. */
import { channelEdges } from '../../../src/science/axis';
import { createFitModel, type FitModel } from '../../../src/science/fit/fit-model';
import type { FitPlan, PlannedParameter } from '../../../src/science/fit/fit-plan';
import { poissonNoise } from '../../../src/science/fit/fit-plan';
import { createRandom } from '../../../src/science/numeric/random';
import { shapeByName } from '../../../src/science/peaks/shape-by-name';
import type { EnergyAxis } from '../../../src/science/scan';

export function uniformAxis(channels: number, fromEv: number, toEv: number): EnergyAxis {
  const centresEv = Float64Array.from(
    { length: channels },
    (_, k) => fromEv + ((toEv - fromEv) * k) / (channels - 1),
  );
  return { centresEv, edgesEv: channelEdges(centresEv) };
}

export type MadeParameter = Partial<PlannedParameter> & { readonly truth: number };

export interface MadeComponent {
  readonly name: string;
  readonly shape: string;
  readonly isOptional?: boolean;
  readonly role?: FitPlan['components'][number]['role'];
  /** in the shape's order */
  readonly parameters: readonly MadeParameter[];
}

export interface MadeModel {
  readonly model: FitModel;
  readonly truth: Float64Array;
}

const widths = ['fwhm', 'fwhm_g', 'fwhm_l', 'tail'];

/** Starts are the truth unless stated; widths are above 0. */
export function makeModel(
  axis: EnergyAxis,
  made: readonly MadeComponent[],
  plan: Partial<FitPlan> = {},
): MadeModel {
  let first = 0;
  const components = made.map(({ name, shape, isOptional = false, role = null, parameters }) => {
    const { length: count } = parameters;
    first += count;
    return { name, shape, role, isOptional, first: first - count, count };
  });
  const parameters = made.flatMap((component) =>
    component.parameters.map(({ truth, ...given }, i): PlannedParameter => {
      const { name } = shapeByName(component.shape).parameters[i];
      const min = widths.includes(name) ? 1e-6 : Number.NEGATIVE_INFINITY;
      const own = { name, start: truth, min, max: Number.POSITIVE_INFINITY };
      return { ...own, isFixed: false, tie: null, ...given };
    }),
  );
  const whole: FitPlan = {
    firstChannel: 0,
    endChannel: axis.centresEv.length,
    noise: poissonNoise,
    seed: 'neighbour',
    components,
    parameters,
    laserEv: null,
    ...plan,
  };
  const truth = made.flatMap((component) => component.parameters.map((one) => one.truth));
  return { model: createFitModel(whole, axis), truth: Float64Array.from(truth) };
}

/** Expected counts of the model at its truth. */
export function expectedCounts({ model, truth }: MadeModel): Float64Array {
  const counts = new Float64Array(model.grid.centresEv.length);
  for (const [c, { first, count }] of model.plan.components.entries()) {
    model.shapes[c].evaluate(model.grid, truth.slice(first, first + count), counts, null);
  }
  return counts;
}

export function drawSpectrum(expected: Float64Array, seed: number, stream: number): Float64Array {
  const random = createRandom(seed, stream);
  return expected.map((mean) => random.poisson(mean));
}
