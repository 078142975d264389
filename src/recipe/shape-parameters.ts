/** Which parameters each shape of the model has, and what is reported of it beside them. */

/** Peaks are given by area, centre and widths; `voigt` by its two widths, its `fwhm` follows. */
export const peakParameters = {
  gaussian: ['area', 'centre', 'fwhm'],
  lorentzian: ['area', 'centre', 'fwhm'],
  'pseudo-voigt': ['area', 'centre', 'fwhm', 'eta'],
  voigt: ['area', 'centre', 'fwhm_g', 'fwhm_l'],
  tailed: ['area', 'centre', 'fwhm', 'tail'],
  fano: ['area', 'centre', 'fwhm', 'q'],
} as const;

/** What a peak stands on, counts per channel. */
export const floorParameters = {
  flat: ['level'],
  line: ['level', 'slope'],
  parabola: ['level', 'slope', 'curvature'],
  decay: ['level', 'decay'],
} as const;

export type PeakShape = keyof typeof peakParameters;
export type FloorShape = keyof typeof floorParameters;
export type ComponentShape = PeakShape | FloorShape;

export type ShapeParameter =
  | (typeof peakParameters)[PeakShape][number]
  | (typeof floorParameters)[FloorShape][number];

/** Derived from the parameters, or told of the choice of the component. */
export type ReportedParameter = 'height' | 'fwhm' | 'centre_cm1' | 'needed';

export type FitParameter = ShapeParameter | ReportedParameter;

export function isPeakShape(shape: unknown): shape is PeakShape {
  return typeof shape === 'string' && Object.hasOwn(peakParameters, shape);
}

export function isFloorShape(shape: unknown): shape is FloorShape {
  return typeof shape === 'string' && Object.hasOwn(floorParameters, shape);
}

/** Parameters that are fitted, in the order they are written; empty for a shape that is not known. */
export function shapeParameters(shape: unknown): readonly ShapeParameter[] {
  if (isPeakShape(shape)) return peakParameters[shape];
  return isFloorShape(shape) ? floorParameters[shape] : [];
}

/** Everything a component has a map of: fit.COMPONENT.PARAM. */
export function reportedParameters(component: {
  readonly shape: unknown;
  readonly role: unknown;
  readonly optional: unknown;
}): readonly FitParameter[] {
  const reported: FitParameter[] = [...shapeParameters(component.shape)];
  if (component.shape === 'voigt') reported.push('fwhm');
  if (isPeakShape(component.shape)) reported.push('height');
  if (component.role === 'raman' && isPeakShape(component.shape)) reported.push('centre_cm1');
  if (component.optional === true) reported.push('needed');
  return reported;
}

const units: Readonly<Record<FitParameter, string>> = {
  area: 'counts',
  centre: 'eV',
  fwhm: 'eV',
  fwhm_g: 'eV',
  fwhm_l: 'eV',
  tail: 'eV',
  decay: 'eV',
  eta: '',
  q: '',
  height: 'counts per channel',
  level: 'counts per channel',
  slope: 'counts per channel per eV',
  curvature: 'counts per channel per eV²',
  centre_cm1: 'cm-1',
  needed: '',
};

/** Unit of fit.COMPONENT.PARAM, as maps carry it. */
export function fitParameterUnit(parameter: FitParameter): string {
  return units[parameter];
}

export function isFitParameter(word: string): word is FitParameter {
  return Object.hasOwn(units, word);
}
