/** What one pass over a slab's counts tells: totals, sums along rows, extremes, missing values. */
import type { ScanShape } from '../scan';
import type { TileRun } from './moment-kernel';
import type { Tile } from './tiled-counts';

export interface SlabSurvey {
  /** (ny × nx) counts in all channels; NaN for a pixel without any data */
  readonly totals: Float64Array;
  /** (ny × nk) each row's spectra, summed in order of x, no data left out */
  readonly rowSums: Float64Array;
  /** (ny × nk) pixels of the row with data there */
  readonly rowPixels: Uint32Array;
  /** Infinity where there is no data at all */
  readonly minCounts: number;
  /** −Infinity where there is no data at all */
  readonly maxCounts: number;
  readonly noDataValues: number;
  readonly isWholeNumbers: boolean;
}

/** Facts of single pixels, bits of `pixelFlags`. */
export const hasNoData = 1;
export const hasNegative = 2;

/** Gathers a survey tile by tile, run by run, channels ascending within a tile. */
export class SurveyInProgress {
  readonly totals: Float64Array;
  readonly rowSums: Float64Array;
  readonly rowPixels: Uint32Array;
  /** (ny × nx) `hasNoData` and `hasNegative`; null where neither can be */
  readonly pixelFlags: Uint8Array | null;
  /** (ny × nx) Σ |c| of the pixel; null where it is the total */
  readonly pixelScale: Float64Array | null;
  readonly #shape: ScanShape;
  readonly #pixelData: Uint32Array | null;
  #min = Number.POSITIVE_INFINITY;
  #max = Number.NEGATIVE_INFINITY;
  #noDataValues = 0;
  #isWholeNumbers = true;

  /** @param isUnsigned - whether every value is there, whole and not negative, by its type */
  constructor(shape: ScanShape, isUnsigned: boolean) {
    const { ny, nx, nk } = shape;
    this.#shape = shape;
    this.totals = new Float64Array(ny * nx);
    this.rowSums = new Float64Array(ny * nk);
    this.rowPixels = new Uint32Array(ny * nk);
    this.pixelFlags = isUnsigned ? null : new Uint8Array(ny * nx);
    this.pixelScale = isUnsigned ? null : new Float64Array(ny * nx);
    this.#pixelData = isUnsigned ? null : new Uint32Array(ny * nx);
  }

  /** @param values - of the run's channels; no data is NaN */
  add(tile: Tile, run: TileRun, values: Float64Array): void {
    const { nx } = this.#shape;
    let from = tile.first;
    while (from < tile.first + tile.pixels) {
      const row = Math.floor(from / nx);
      const to = Math.min(tile.first + tile.pixels, (row + 1) * nx);
      if (this.pixelFlags === null) this.#addUnsigned(tile, run, values, row, from, to);
      else this.#addAny(tile, run, values, row, from, to);
      from = to;
    }
  }

  /** Pixels from ≤ p < to of one row. */
  #addUnsigned(
    tile: Tile,
    run: TileRun,
    values: Float64Array,
    row: number,
    from: number,
    to: number,
  ): void {
    const { totals } = this;
    const { pixels, k0, k1 } = run;
    const { nk } = this.#shape;
    let min = this.#min;
    let max = this.#max;
    for (let k = k0; k < k1; k++) {
      let at = (k - k0) * pixels + from - tile.first;
      let rowSum = this.rowSums[row * nk + k];
      for (let p = from; p < to; p++) {
        const v = values[at++];
        totals[p] += v;
        rowSum += v;
        if (v < min) min = v;
        if (v > max) max = v;
      }
      this.rowSums[row * nk + k] = rowSum;
      this.rowPixels[row * nk + k] += to - from;
    }
    this.#min = min;
    this.#max = max;
  }

  #addAny(
    tile: Tile,
    run: TileRun,
    values: Float64Array,
    row: number,
    from: number,
    to: number,
  ): void {
    const { pixels, k0, k1 } = run;
    const { nk } = this.#shape;
    for (let k = k0; k < k1; k++) {
      let at = (k - k0) * pixels + from - tile.first;
      let rowSum = this.rowSums[row * nk + k];
      let present = 0;
      for (let p = from; p < to; p++) {
        const v = values[at++];
        if (this.#note(p, v)) {
          rowSum += v;
          present++;
        }
      }
      this.rowSums[row * nk + k] = rowSum;
      this.rowPixels[row * nk + k] += present;
    }
  }

  /** Takes one value of pixel p into account; false for no data. */
  #note(p: number, v: number): boolean {
    const { pixelFlags, pixelScale } = this;
    if (pixelFlags === null || pixelScale === null || this.#pixelData === null) return true;
    if (Number.isNaN(v)) {
      pixelFlags[p] |= hasNoData;
      this.#noDataValues++;
      return false;
    }
    this.#pixelData[p]++;
    this.totals[p] += v;
    pixelScale[p] += Math.abs(v);
    if (v < 0) pixelFlags[p] |= hasNegative;
    if (v < this.#min) this.#min = v;
    if (v > this.#max) this.#max = v;
    if (this.#isWholeNumbers && Math.floor(v) !== v) this.#isWholeNumbers = false;
    return true;
  }

  /** Once every tile was added. */
  done(): SlabSurvey {
    this.#pixelData?.forEach((count, p) => {
      if (count === 0) this.totals[p] = Number.NaN;
    });
    return {
      totals: this.totals,
      rowSums: this.rowSums,
      rowPixels: this.rowPixels,
      minCounts: this.#min,
      maxCounts: this.#max,
      noDataValues: this.#noDataValues,
      isWholeNumbers: this.#isWholeNumbers,
    };
  }
}
