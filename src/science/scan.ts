/**
 * The scan as everything after the readers sees it: counts[y][x][k], row y downwards, column x to
 * the right, channel k in ascending photon energy.
 */

/** Typed arrays counts are kept in: integers stay in their own type (a 16-bit scan costs 2 bytes a channel). */
export type CountsArray =
  | Uint8Array
  | Int8Array
  | Uint16Array
  | Int16Array
  | Uint32Array
  | Int32Array
  | Float32Array
  | Float64Array;

export interface ScanShape {
  readonly ny: number;
  readonly nx: number;
  readonly nk: number;
}

/** Photon energies of the channels, ascending. */
export interface EnergyAxis {
  /** (nk), eV */
  readonly centresEv: Float64Array;
  /** (nk + 1), eV: midpoints between centres, outermost mirrored */
  readonly edgesEv: Float64Array;
}

/** Where columns or rows lie. A length is in nm; other quantities (a gate voltage) keep their unit. */
export interface PositionAxis {
  /** "x", "y", or what the file calls it: "gate_volts" */
  readonly label: string;
  /** "nm", another unit as found ("V"), or "px" where nothing is known */
  readonly unit: string;
  readonly isLength: boolean;
  /** step from one column or row to the next, in `unit`; 1 for "px" */
  readonly pitch: number;
  /** (nx) or (ny), in `unit`; null when positions are simply index × pitch */
  readonly values: Float64Array | null;
}

/** The recipe's detector block with its defaults filled in. */
export interface Detector {
  readonly electronsPerCount: number;
  readonly offsetCounts: number;
  readonly readNoiseE: number;
  /** excess noise factor F; √2 for an electron-multiplying gain far above 1 */
  readonly excessNoise: number;
}

/**
 * Variance of a channel's counts c:
 * `poisson`: v = c (whole-number counts without a detector block);
 * `detector`: v = F² max(c − offset, 0)/g + (read/g)²;
 * `none`: data that are not counts; no `.err` maps.
 */
export type NoiseModel =
  | { readonly kind: 'poisson' }
  | { readonly kind: 'detector'; readonly detector: Detector }
  | { readonly kind: 'none' };

/** Everything about a scan but its counts; plain data, crosses worker boundaries by copy. */
export interface ScanMeta {
  /** the file's own name, without folder */
  readonly name: string;
  readonly shape: ScanShape;
  readonly axis: EnergyAxis;
  readonly x: PositionAxis;
  readonly y: PositionAxis;
  /** photon energy of the laser; null when unknown */
  readonly laserEv: number | null;
  readonly exposureS: number | null;
  readonly noise: NoiseModel;
  /** "counts", or what the file calls its values ("absorbance") */
  readonly quantity: string;
}

/** Rows y0 ≤ y < y0 + ny of a scan, held by one worker. */
export interface Slab {
  readonly y0: number;
  /** rows of this slab, all columns, all channels */
  readonly shape: ScanShape;
  /** (ny, nx, nk), C order, channels in ascending energy; no data is NaN in float arrays */
  readonly counts: CountsArray;
}

/** One value per pixel; NaN where there is none. */
export interface PixelMap {
  readonly ny: number;
  readonly nx: number;
  /** (ny, nx), C order */
  readonly values: Float64Array;
}

/** Contract names such as "band.tail.centroid", with the unit of its values. */
export interface DerivedMap extends PixelMap {
  readonly name: string;
  /** "counts", "eV", "nm", "cm-1", "percent", "degrees" or "" */
  readonly unit: string;
  /** 1-σ uncertainty, same shape and unit; null where there is no noise model */
  readonly errors: Float64Array | null;
}
