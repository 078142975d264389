/**
 * What a fit is, as plain data that crosses to workers: channels, noise, components and their
 * parameters, every energy in eV and every tie resolved. Made of a recipe by `recipe/plan-fit.ts`.
 */
import type { VarianceLine } from '../noise';

/**
 * What the fit maximises. `variance`: the likelihood of counts whose variance is a line of the
 * expected counts (Poisson where slope is 1 and the rest 0); `uniform`: least squares, every channel
 * alike, with errors scaled by the residual.
 */
export type FitNoise =
  | { readonly kind: 'variance'; readonly line: VarianceLine }
  | { readonly kind: 'uniform' };

export const poissonNoise: FitNoise = {
  kind: 'variance',
  line: { slope: 1, offset: 0, floor: 0 },
};

/** value = times × value of the parameter `to` + plus; `to` itself is never tied. */
export interface PlannedTie {
  /** index into the plan's parameters */
  readonly to: number;
  readonly times: number;
  readonly plus: number;
}

export interface PlannedParameter {
  /** "area", "centre", "fwhm" … of the component's shape */
  readonly name: string;
  /** eV, counts, counts per channel (per eV, per eV²) or no unit; null: estimated from the data */
  readonly start: number | null;
  /** −∞ and ∞ where there is no bound; never for a width, whose bounds are the program's own where none is given */
  readonly min: number;
  readonly max: number;
  /** held at `start`, which then is a number */
  readonly isFixed: boolean;
  /** null for one with a value of its own */
  readonly tie: PlannedTie | null;
}

export type ComponentRole = 'exciton' | 'trion' | 'localised' | 'interlayer' | 'raman';

export interface PlannedComponent {
  readonly name: string;
  /** as `shapeByName` knows it */
  readonly shape: string;
  readonly role: ComponentRole | null;
  /** kept at a pixel only where the Bayesian information criterion asks for it */
  readonly isOptional: boolean;
  /** its parameters are `count` of the plan's, from index `first`, in the shape's order */
  readonly first: number;
  readonly count: number;
}

export interface FitPlan {
  /** channels first ≤ k < end of the scan's axis */
  readonly firstChannel: number;
  readonly endChannel: number;
  readonly noise: FitNoise;
  /** where a pixel's fit begins: at a fitted pixel beside it, or at the starts */
  readonly seed: 'neighbour' | 'start';
  /** in the recipe's order */
  readonly components: readonly PlannedComponent[];
  readonly parameters: readonly PlannedParameter[];
  /** photon energy of the laser, for centres as Raman shifts; null when unknown */
  readonly laserEv: number | null;
}

/** What is known of a pixel's fit; the numbers are those of the map `fit.status`. */
export const fitStatus = {
  /** no data, fewer channels with data than parameters, or stopped before its turn */
  notFitted: 0,
  converged: 1,
  /** converged with a parameter at one of its bounds: that one has no error */
  atBound: 2,
  notConverged: 3,
  /** too few counts for the model: see `isTooDim`; or a parameter the counts say nothing of */
  tooDim: 4,
} as const;

export type FitStatus = (typeof fitStatus)[keyof typeof fitStatus];

/** "exciton.centre", as ties and messages name it. */
export function parameterTitle({ components, parameters }: FitPlan, index: number): string {
  const owner = components.find(({ first, count }) => index >= first && index < first + count);
  return `${owner?.name ?? '?'}.${parameters[index].name}`;
}
