/** From the recipe's model block to a fit of one scan: the window in channels, every value in eV, ties resolved. */
import { RimlightError } from '../errors';
import type { Medium } from '../science/axis';
import {
  type FitNoise,
  type FitPlan,
  type PlannedComponent,
  type PlannedParameter,
  poissonNoise,
} from '../science/fit/fit-plan';
import { varianceLine } from '../science/noise';
import type { EnergyAxis, NoiseModel } from '../science/scan';
import { defaults } from './default-values';
import { boundsOf, type PlannedWindow } from './planned-bounds';
import { type ConvertedValue, convertValue, type ValueKind } from './planned-values';
import { resolveTies } from './resolved-ties';
import type { ModelComponent, ParameterSpec, PeakModel } from './schema';
import { type ShapeParameter, shapeParameters } from './shape-parameters';

/** What a model needs to know of the scan it is fitted to. */
export interface FitContext {
  readonly axis: EnergyAxis;
  readonly noise: NoiseModel;
  /** photon energy of the laser, eV; null when unknown */
  readonly laserEv: number | null;
  /** medium of the scan's wavelengths, in which centres in nm are read */
  readonly medium: Medium;
}

interface Entry {
  readonly title: string;
  readonly where: string;
  readonly parameter: ShapeParameter;
  readonly value: ConvertedValue;
}

/**
 * The fit a model asks for.
 *
 * Counts are fitted by the Poisson likelihood of the electrons that were detected: with a detector
 * block its gain and offset are taken into account by "poisson", and its read and excess noise by
 * "gaussian".
 *
 * @throws RimlightError 'recipe' - naming the component and parameter, for everything that cannot be
 * fitted: a window off the axis, a start outside bounds, a Raman line without a laser, nothing free,
 * more free parameters than channels
 */
export function planFit(model: PeakModel, context: FitContext): FitPlan {
  const { axis, laserEv } = context;
  const channels = channelsOf(model.window ?? null, axis);
  const window = windowOf(axis, channels);
  assertLasers(model.components, laserEv);
  assertNames(model.components);
  const entries = model.components.flatMap((component, index) =>
    entriesOf(component, index, context),
  );
  const ties = resolveTies(entries.map(({ value, ...rest }) => ({ ...rest, tie: value.tie })));
  const parameters = entries.map(({ parameter, value, where }, index): PlannedParameter => {
    const { start, isFixed } = value;
    return {
      name: parameter,
      start,
      ...boundsOf(parameter, value, window, where),
      isFixed,
      tie: ties[index],
    };
  });
  assertFittable(parameters, channels);
  return {
    firstChannel: channels.first,
    endChannel: channels.end,
    noise: fitNoise(model.noise ?? null, context.noise),
    seed: model.seed ?? defaults.model.seed,
    components: plannedComponents(model.components),
    parameters,
    laserEv,
  };
}

interface Channels {
  readonly first: number;
  readonly end: number;
}

/** Channels whose centre lies in the window; all of them without one. */
function channelsOf(window: readonly [number, number] | null, { centresEv }: EnergyAxis): Channels {
  if (window === null) return { first: 0, end: centresEv.length };
  const [from, to] = [Math.min(...window), Math.max(...window)];
  let first = 0;
  while (first < centresEv.length && centresEv[first] < from) first++;
  let end = first;
  while (end < centresEv.length && centresEv[end] <= to) end++;
  if (end > first) return { first, end };
  throw new RimlightError('recipe', {
    what: `the window ${from} to ${to} eV holds no channel of the scan, whose axis runs from ${centresEv[0]} to ${centresEv[centresEv.length - 1]} eV`,
    where: 'model.window',
    hint: 'Give a window that lies on the axis, in eV.',
  });
}

function windowOf({ edgesEv }: EnergyAxis, { first, end }: Channels): PlannedWindow {
  let channelEv = Number.POSITIVE_INFINITY;
  for (let k = first; k < end; k++) channelEv = Math.min(channelEv, edgesEv[k + 1] - edgesEv[k]);
  return { fromEv: edgesEv[first], toEv: edgesEv[end], channelEv };
}

const placeOf = ({ name }: ModelComponent, index: number): string =>
  `model.components[${index}], "${name}"`;

function entriesOf(component: ModelComponent, index: number, context: FitContext): Entry[] {
  const { name, shape } = component;
  const specs: Readonly<Record<string, unknown>> = component;
  return shapeParameters(shape).map((parameter) => {
    const where = `${placeOf(component, index)}, ${parameter}`;
    const kind = kindOf(parameter);
    const { laserEv, medium } = context;
    const spec = specs[parameter] as ParameterSpec | undefined;
    const value = convertValue(spec, { kind, laserEv, medium, where });
    const shared =
      shape === 'voigt' && kind === 'width' ? voigtShare(component, context, where) : null;
    return { title: `${name}.${parameter}`, where, parameter, value: shared ?? value };
  });
}

/** Two equal widths make a Voigt profile 1.6376 times as wide (Olivero and Longbothum 1977). */
const voigtPerEqualWidths = 0.5346 + Math.sqrt(1.2166);

/** The start of either width from that of the whole; null where the whole is not given. */
function voigtShare(
  component: ModelComponent & { readonly shape: 'voigt' },
  { laserEv, medium }: FitContext,
  where: string,
): ConvertedValue | null {
  if (component.fwhm === undefined) return null;
  const whole = convertValue(component.fwhm, { kind: 'width', laserEv, medium, where });
  if (whole.isFixed || whole.tie !== null || whole.min !== null || whole.max !== null) {
    throw new RimlightError('recipe', {
      what: 'the fwhm of a voigt is a start for its two widths and can be neither fixed, bounded nor tied',
      where,
      hint: 'Give fwhm_g and fwhm_l instead.',
    });
  }
  const start = whole.start === null ? null : whole.start / voigtPerEqualWidths;
  return { start, min: null, max: null, isFixed: false, tie: null };
}

function kindOf(parameter: ShapeParameter): ValueKind {
  switch (parameter) {
    case 'centre':
      return 'centre';
    case 'fwhm':
    case 'fwhm_g':
    case 'fwhm_l':
    case 'tail':
      return 'width';
    case 'eta':
      return 'share';
    default:
      return 'plain';
  }
}

function plannedComponents(components: readonly ModelComponent[]): readonly PlannedComponent[] {
  let first = 0;
  return components.map(({ name, shape, role, optional }) => {
    const { length: count } = shapeParameters(shape);
    const planned = {
      name,
      shape,
      role: role ?? null,
      isOptional: optional === true,
      first,
      count,
    };
    first += count;
    return planned;
  });
}

/** @param noise - the scan's noise model: by its numbers, or its detector block */
function fitNoise(asked: PeakModel['noise'] | null, noise: NoiseModel): FitNoise {
  const usual = { poisson: 'poisson', detector: 'gaussian', none: 'uniform' } as const;
  const kind = asked ?? usual[noise.kind];
  if (kind === 'uniform') return { kind: 'uniform' };
  if (kind === 'gaussian') {
    if (noise.kind !== 'none') return { kind: 'variance', line: varianceLine(noise) };
    throw new RimlightError('recipe', {
      what: 'noise "gaussian" needs a noise model, and the scan’s values are not counts',
      where: 'model.noise',
      hint: 'State scan.detector, or choose "uniform".',
    });
  }
  if (noise.kind !== 'detector') return poissonNoise;
  const { electronsPerCount, offsetCounts } = noise.detector;
  return {
    kind: 'variance',
    line: { slope: 1 / electronsPerCount, offset: offsetCounts, floor: 0 },
  };
}

function assertLasers(components: readonly ModelComponent[], laserEv: number | null): void {
  const index = components.findIndex(({ role }) => role === 'raman');
  if (index < 0 || laserEv !== null) return;
  throw new RimlightError('recipe', {
    what: 'a component of role "raman" needs the laser, which is not known',
    where: placeOf(components[index], index),
    hint: 'State scan.laser, or leave the role out.',
  });
}

function assertNames(components: readonly ModelComponent[]): void {
  const names = components.map(({ name }) => name.toLowerCase());
  const index = names.findIndex((name, at) => names.indexOf(name) !== at);
  if (index < 0) return;
  throw new RimlightError('recipe', {
    what: `two components are called "${components[index].name}"`,
    where: placeOf(components[index], index),
    hint: 'Give each component a name of its own.',
  });
}

function assertFittable(parameters: readonly PlannedParameter[], { first, end }: Channels): void {
  const free = parameters.filter(({ isFixed, tie }) => !isFixed && tie === null).length;
  if (free === 0) {
    throw new RimlightError('recipe', {
      what: 'the model has no free parameter: each is fixed or tied',
      where: 'model.components',
      hint: 'Free one, by "fixed": false.',
    });
  }
  if (free < end - first) return;
  throw new RimlightError('recipe', {
    what: `the model has ${free} free parameters, and its window ${end - first} channels`,
    where: 'model',
    hint: 'Widen model.window, or fix or tie parameters.',
  });
}
