/** The recipe's `scan` block: what the user states about a scan file; everything omitted is guessed. */

import type { AxisKind, Medium } from '../science/axis';

export type { AxisKind, Medium };
export type LengthUnit = 'nm' | 'um' | 'mm' | 'm' | 'angstrom';

export interface AxisChoice {
  readonly data?: string;
  readonly values?: readonly number[];
  readonly file?: string;
  readonly from?: number;
  readonly to?: number;
  readonly kind?: AxisKind;
  /** nm, um, angstrom | eV, meV, cm-1 (absolute) | cm-1 (shift) */
  readonly unit?: string;
  readonly medium?: Medium;
}

export interface HeightChoice {
  readonly data?: string;
  readonly file?: string;
  readonly unit?: LengthUnit;
  readonly shift_px?: readonly [number, number];
}

export interface ScanChoices {
  readonly data?: string;
  /** axis order in the file, a permutation of y x k (or of the two present: "xk", "yk"; "k" for one spectrum) */
  readonly order?: string;
  readonly axis?: AxisChoice;
  readonly pixel?: { readonly x: number; readonly y: number; readonly unit: string };
  readonly laser?: { readonly value: number; readonly unit: 'nm' | 'eV' | 'cm-1' };
  readonly serpentine?: boolean;
  readonly exposure_s?: number;
  readonly detector?: {
    readonly electrons_per_count?: number;
    readonly offset_counts?: number;
    readonly read_noise_e?: number;
    readonly excess_noise?: number;
  };
  readonly height?: HeightChoice;
}
