/** Which maps a recipe makes, each with its unit and a title in words. */
import type { BandQuantity } from '../science/bands/band';
import { bandQuantities } from '../science/bands/band';
import { formatMapName, hasErrors, type MapName, strainComponents } from './map-names';
import type { Recipe } from './schema';
import { isRecord } from './schema-parts';
import { type FitParameter, fitParameterUnit, reportedParameters } from './shape-parameters';

export interface OfferedMap {
  /** contract name, without `.err` */
  readonly name: string;
  readonly parts: MapName;
  /** as DerivedMap carries it: "counts", "eV", "nm", "cm-1", "percent", "degrees" or "" */
  readonly unit: string;
  /** "Centroid of band tail" */
  readonly title: string;
  /** whether there is a map `name`.err beside it, where the scan has a noise model */
  readonly hasErrors: boolean;
}

/**
 * Every map the recipe's blocks ask for, in the order of the recipe; whether this build can make them
 * is the business of `executable.ts`. `scan.height` is listed although a scan may have no height map.
 */
export function offeredMaps(recipe: Recipe): readonly OfferedMap[] {
  return offeredMapsLoosely(recipe);
}

/** The same of a value that may be no valid recipe: what can be recognised of it. */
export function offeredMapsLoosely(value: unknown): readonly OfferedMap[] {
  const recipe = isRecord(value) ? value : {};
  const condition = entries(recipe.condition);
  const model = isRecord(recipe.model) ? recipe.model : null;
  const strain = isRecord(recipe.strain) ? recipe.strain : {};
  return [
    ...scanMaps,
    ...(condition.some(({ step }) => step === 'despike') ? despikeMaps : []),
    ...entries(recipe.bands).flatMap(({ name }) =>
      typeof name === 'string' ? bandMaps(name) : [],
    ),
    ...entries(model?.components).flatMap(componentMaps),
    ...(model === null ? [] : qualityMaps),
    ...(['pl', 'raman'] as const).flatMap((method) =>
      isRecord(strain[method]) ? strainMaps[method] : [],
    ),
    ...(isRecord(strain.height) ? heightStrainMaps : []),
  ];
}

function entries(list: unknown): readonly Readonly<Record<string, unknown>>[] {
  return Array.isArray(list) ? list.filter(isRecord) : [];
}

function offered(parts: MapName, unit: string, title: string): OfferedMap {
  return { name: formatMapName(parts), parts, unit, title, hasErrors: hasErrors(parts) };
}

const scanMaps = [
  offered({ kind: 'scan', quantity: 'total', isError: false }, 'counts', 'Sum of all channels'),
  offered({ kind: 'scan', quantity: 'height', isError: false }, 'nm', 'Height'),
];

const despikeMaps = [
  offered(
    { kind: 'despike', quantity: 'count', isError: false },
    'channels',
    'Channels replaced as spikes',
  ),
];

const qualityMaps = [
  offered(
    { kind: 'fit-quality', quantity: 'chi2r', isError: false },
    '',
    'Reduced chi-square of the fit',
  ),
  offered({ kind: 'fit-quality', quantity: 'status', isError: false }, '', 'Status of the fit'),
  offered(
    { kind: 'fit-quality', quantity: 'iterations', isError: false },
    '',
    'Iterations of the fit',
  ),
];

const strainMaps = {
  pl: [
    offered(
      { kind: 'strain', method: 'pl', isError: false },
      'percent',
      'Strain from the luminescence',
    ),
  ],
  raman: [
    offered(
      { kind: 'strain', method: 'raman', isError: false },
      'percent',
      'Strain from the Raman line',
    ),
  ],
};

const strainWords = {
  xx: 'along x',
  yy: 'along y',
  xy: 'in shear',
  sum: 'in sum',
  major: 'along its major axis',
  minor: 'along its minor axis',
  angle: '',
} as const;

const heightStrainMaps = strainComponents.map((component) =>
  offered(
    { kind: 'strain-height', component, isError: false },
    component === 'angle' ? 'degrees' : 'percent',
    component === 'angle'
      ? 'Direction of the major strain from the height'
      : `Strain from the height, ${strainWords[component]}`,
  ),
);

const bandUnits: Readonly<Record<BandQuantity, string>> = {
  integral: 'counts',
  centroid: 'eV',
  median: 'eV',
  spread: 'eV',
  peak: 'counts',
  peak_at: 'eV',
};

const bandWords: Readonly<Record<BandQuantity, string>> = {
  integral: 'Integral of',
  centroid: 'Centroid of',
  median: 'Median energy of',
  spread: 'RMS width of',
  peak: 'Highest channel of',
  peak_at: 'Energy of the highest channel of',
};

/**
 * Unit of band.NAME.QUANTITY.
 *
 * @param scanQuantity - what the scan's values are: "counts", or another quantity ("absorbance")
 */
export function bandQuantityUnit(quantity: BandQuantity, scanQuantity = 'counts'): string {
  const unit = bandUnits[quantity];
  return unit === 'counts' ? scanQuantity : unit;
}

function bandMaps(band: string): readonly OfferedMap[] {
  return bandQuantities.map((quantity) =>
    offered(
      { kind: 'band', band, quantity, isError: false },
      bandUnits[quantity],
      `${bandWords[quantity]} band ${band}`,
    ),
  );
}

const fitWords: Readonly<Record<FitParameter, string>> = {
  area: 'Area',
  centre: 'Centre',
  fwhm: 'Full width at half maximum',
  fwhm_g: 'Gaussian width',
  fwhm_l: 'Lorentzian width',
  tail: 'Tail',
  eta: 'Lorentzian share',
  q: 'Asymmetry q',
  height: 'Height',
  level: 'Level',
  slope: 'Slope',
  curvature: 'Curvature',
  decay: 'Decay energy',
  centre_cm1: 'Raman shift',
  needed: 'Need (difference in BIC)',
};

function componentMaps(component: Readonly<Record<string, unknown>>): readonly OfferedMap[] {
  const { name, shape, role, optional } = component;
  if (typeof name !== 'string') return [];
  return reportedParameters({ shape, role, optional }).map((parameter) =>
    offered(
      { kind: 'fit', component: name, parameter, isError: false },
      fitParameterUnit(parameter),
      `${fitWords[parameter]} of ${name}`,
    ),
  );
}
