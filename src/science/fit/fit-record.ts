/** What is kept of a pixel's fit: one row of numbers, the same for every pixel, and what each number is. */
import { isPeak } from '../peaks/shape-by-name';
import type { FitModel } from './fit-model';

export type FitQuantityKind = 'parameter' | 'fwhm' | 'height' | 'centre_cm1' | 'needed';

/** One value of a component; its error lies `errorOffset` behind it. */
export interface FitQuantity {
  readonly component: number;
  /** as in map names: "area", "height", "needed" */
  readonly name: string;
  readonly kind: FitQuantityKind;
  /** of a parameter, its index in the plan; otherwise −1 */
  readonly parameter: number;
}

/** Where the numbers that belong to no component stand, after all values and errors. */
export const qualityNames = ['chi2r', 'status', 'iterations', 'deviance', 'freeCount'] as const;
export type FitQualityName = (typeof qualityNames)[number];

/**
 * A row: a value for each quantity, then an error for each, then the qualities. Values and errors of
 * a component that was not kept are NaN, but for `needed`; errors are NaN at bounds.
 */
export interface RecordLayout {
  readonly quantities: readonly FitQuantity[];
  readonly qualityOffset: number;
  readonly length: number;
}

/** Quantities of each component: its parameters, a Voigt's whole width, height, Raman shift, need. */
export function recordLayout({ plan, shapes }: FitModel): RecordLayout {
  const quantities = plan.components.flatMap((planned, component): FitQuantity[] => {
    const { first, count, shape, role, isOptional } = planned;
    const other = (kind: Exclude<FitQuantityKind, 'parameter'>): FitQuantity => ({
      component,
      name: kind,
      kind,
      parameter: -1,
    });
    const peak = isPeak(shapes[component]);
    return [
      ...plan.parameters.slice(first, first + count).map(
        ({ name }, i): FitQuantity => ({
          component,
          name,
          kind: 'parameter',
          parameter: first + i,
        }),
      ),
      ...(shape === 'voigt' ? [other('fwhm')] : []),
      ...(peak ? [other('height')] : []),
      ...(peak && role === 'raman' && plan.laserEv !== null ? [other('centre_cm1')] : []),
      ...(isOptional ? [other('needed')] : []),
    ];
  });
  const qualityOffset = 2 * quantities.length;
  return { quantities, qualityOffset, length: qualityOffset + qualityNames.length };
}

export function qualityAt({ qualityOffset }: RecordLayout, name: FitQualityName): number {
  return qualityOffset + qualityNames.indexOf(name);
}

/** The parameters a row holds, as a start for another fit; `fallback` where it has none. */
export function startFromRecord(
  { quantities }: RecordLayout,
  record: Float64Array,
  fallback: Float64Array,
  out: Float64Array,
): void {
  out.set(fallback);
  for (let i = 0; i < quantities.length; i++) {
    const { parameter } = quantities[i];
    if (parameter >= 0 && !Number.isNaN(record[i])) out[parameter] = record[i];
  }
}
