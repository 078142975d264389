/** The names of derived maps: "band.tail.centroid.err" and its kin, as text and as parts. */

import { assertUnreachable } from '../errors';
import { type BandQuantity, bandQuantities } from '../science/bands/band';
import { type FitParameter, isFitParameter } from './shape-parameters';

export const strainComponents = ['xx', 'yy', 'xy', 'sum', 'major', 'minor', 'angle'] as const;
export type StrainComponent = (typeof strainComponents)[number];

const fitQualities = ['chi2r', 'status', 'iterations'] as const;
export type FitQuality = (typeof fitQualities)[number];

/** A map name in its parts; `isError` is the map of 1-σ uncertainties, named with `.err`. */
export type MapName =
  | { readonly kind: 'scan'; readonly quantity: 'total' | 'height'; readonly isError: boolean }
  | {
      readonly kind: 'band';
      readonly band: string;
      readonly quantity: BandQuantity;
      readonly isError: boolean;
    }
  | {
      readonly kind: 'fit';
      readonly component: string;
      readonly parameter: FitParameter;
      readonly isError: boolean;
    }
  | { readonly kind: 'fit-quality'; readonly quantity: FitQuality; readonly isError: false }
  | { readonly kind: 'strain'; readonly method: 'pl' | 'raman'; readonly isError: boolean }
  | {
      readonly kind: 'strain-height';
      readonly component: StrainComponent;
      readonly isError: boolean;
    }
  | { readonly kind: 'despike'; readonly quantity: 'count'; readonly isError: false };

/**
 * Reads a map name; null when it follows none of the patterns. Whether a recipe makes such a map is
 * another question (`offered-maps.ts`).
 */
export function parseMapName(name: string): MapName | null {
  const parts = name.split('.');
  const isError = parts.length > 2 && parts.at(-1) === 'err';
  const [family, second = '', third, ...rest] = isError ? parts.slice(0, -1) : parts;
  if (rest.length > 0 || second === '') return null;
  const parsed = third === undefined ? pairName(family, second) : tripleName(family, second, third);
  if (parsed === null || !isError) return parsed;
  return hasErrors(parsed) ? { ...parsed, isError } : null;
}

function pairName(family: string | undefined, second: string): MapName | null {
  const isError = false;
  if (family === 'scan' && (second === 'total' || second === 'height')) {
    return { kind: 'scan', quantity: second, isError };
  }
  const quality = fitQualities.find((known) => known === second);
  if (family === 'fit' && quality !== undefined) {
    return { kind: 'fit-quality', quantity: quality, isError };
  }
  if (family === 'strain' && (second === 'pl' || second === 'raman')) {
    return { kind: 'strain', method: second, isError };
  }
  return family === 'despike' && second === 'count'
    ? { kind: 'despike', quantity: second, isError }
    : null;
}

function tripleName(family: string | undefined, second: string, third: string): MapName | null {
  const isError = false;
  const quantity = bandQuantities.find((known) => known === third);
  if (family === 'band' && quantity !== undefined) {
    return { kind: 'band', band: second, quantity, isError };
  }
  if (family === 'fit' && isFitParameter(third)) {
    return { kind: 'fit', component: second, parameter: third, isError };
  }
  const component = strainComponents.find((known) => known === third);
  return family === 'strain' && second === 'height' && component !== undefined
    ? { kind: 'strain-height', component, isError }
    : null;
}

/** Whether the map has a second one with its 1-σ uncertainty, where there is a noise model. */
export function hasErrors(
  name: MapName,
): name is MapName & { readonly kind: 'scan' | 'band' | 'fit' | 'strain' | 'strain-height' } {
  switch (name.kind) {
    case 'scan':
      return name.quantity === 'total';
    case 'fit':
      return name.parameter !== 'needed';
    case 'band':
    case 'strain':
    case 'strain-height':
      return true;
    case 'fit-quality':
    case 'despike':
      return false;
    default:
      return assertUnreachable(name);
  }
}

/** The name as text: the inverse of `parseMapName`. */
export function formatMapName(name: MapName): string {
  const suffix = name.isError ? '.err' : '';
  switch (name.kind) {
    case 'scan':
      return `scan.${name.quantity}${suffix}`;
    case 'band':
      return `band.${name.band}.${name.quantity}${suffix}`;
    case 'fit':
      return `fit.${name.component}.${name.parameter}${suffix}`;
    case 'fit-quality':
      return `fit.${name.quantity}`;
    case 'strain':
      return `strain.${name.method}${suffix}`;
    case 'strain-height':
      return `strain.height.${name.component}${suffix}`;
    case 'despike':
      return 'despike.count';
    default:
      return assertUnreachable(name);
  }
}
