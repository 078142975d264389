/** Parameters that peaks share, in the recipe's words. */
import type { ShapeParameter } from './shape';

export const area: ShapeParameter = { name: 'area', isLinear: true, unit: 'counts' };
export const centre: ShapeParameter = { name: 'centre', isLinear: false, unit: 'eV' };
export const fwhm: ShapeParameter = { name: 'fwhm', isLinear: false, unit: 'eV' };

export function energyParameter(name: string): ShapeParameter {
  return { name, isLinear: false, unit: 'eV' };
}

export function plainParameter(name: string): ShapeParameter {
  return { name, isLinear: false, unit: '1' };
}
