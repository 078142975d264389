/** What detection found in a file, why, and what could be instead; and the plan by which slabs are read. */
import type { RimlightError } from '../errors';
import type { CountsArray, ScanMeta } from '../science/scan';
import type { Container, FormatName } from './container';
import type { ScanChoices } from './scan-choices';

/** A file the user gave beside the scan: an axis, a height map. Opened by its caller, who also closes it. */
export interface Companion {
  /** file name without folder */
  readonly name: string;
  readonly container: Container;
}

/** The things guessed while reading, in the order they are shown. */
export type GuessField =
  | 'data'
  | 'order'
  | 'axis'
  | 'kind'
  | 'unit'
  | 'medium'
  | 'laser'
  | 'pixel'
  | 'height'
  | 'serpentine'
  | 'exposure'
  | 'noise';

export interface Alternative {
  /** as shown: "/scan/wavenumber" */
  readonly label: string;
  readonly evidence: string;
  /** merged into the recipe's `scan` block when the user picks it */
  readonly choice: ScanChoices;
}

export interface Guess {
  readonly field: GuessField;
  /** as shown: "wavelength_nm · 728.10 – 811.45 nm, 1340 values"; "unknown" when nothing was found */
  readonly label: string;
  /** `stated` by the recipe, `file` says so, `guess` from the numbers or names, `missing` and needed or `absent` and not needed */
  readonly source: 'stated' | 'file' | 'guess' | 'missing' | 'absent';
  /** one sentence: why */
  readonly evidence: string;
  readonly alternatives: readonly Alternative[];
}

/** How to read rows of the cube; plain data. */
export interface CubePlan {
  readonly path: string;
  /** shape in the file */
  readonly fileShape: readonly number[];
  /** which file axis is y, x, k; -1 where the file has none (length 1) */
  readonly yAxis: number;
  readonly xAxis: number;
  readonly kAxis: number;
  /** (nk) file channel of each channel in ascending energy; channels without an axis value are left out */
  readonly channels: Int32Array;
  readonly serpentine: boolean;
}

export interface HeightPlan {
  /** companion file name, or null when the map is inside the scan file */
  readonly file: string | null;
  readonly path: string;
  readonly unitNm: number;
  readonly shiftPx: readonly [number, number];
}

export interface ScanPlan {
  readonly meta: ScanMeta;
  readonly cube: CubePlan;
  readonly height: HeightPlan | null;
  /** The guesses written out as a complete `scan` block: replaying it guesses nothing. */
  readonly resolved: ScanChoices;
}

export interface Inspection {
  readonly fileName: string;
  readonly format: FormatName;
  readonly guesses: readonly Guess[];
  /** what keeps the scan from being opened; empty when `plan` is there */
  readonly problems: readonly RimlightError[];
  readonly warnings: readonly string[];
  readonly plan: ScanPlan | null;
}

/** A first look, for the import sheet. */
export interface Preview {
  /** total of each sampled pixel, (ny, nx) possibly thinned */
  readonly ny: number;
  readonly nx: number;
  readonly totals: Float64Array;
  /** (nk) */
  readonly meanSpectrum: Float64Array;
  /** one pixel is taken in every `step` rows and columns */
  readonly step: number;
}

export type { CountsArray };
