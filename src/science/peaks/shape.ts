/** What a peak or a background is to the fit: expected counts per channel and their derivatives. */

/** Channels of the fit window in ascending energy, shared by all shapes of a model. */
export interface FitGrid {
  /** (n), eV */
  readonly centresEv: Float64Array;
  /** (n), eV */
  readonly widthsEv: Float64Array;
  /** (n + 1), eV */
  readonly edgesEv: Float64Array;
}

/** Channels a shape touches: first ≤ k < end. */
export interface ChannelSpan {
  readonly first: number;
  readonly end: number;
}

export type ParameterUnit =
  | 'counts'
  | 'counts/channel'
  | 'counts/channel/eV'
  | 'counts/channel/eV²'
  | 'eV'
  | '1';

export interface ShapeParameter {
  /** the recipe's name: area, centre, fwhm … */
  readonly name: string;
  /** the expected counts are proportional to it, or a sum in which it is a factor */
  readonly isLinear: boolean;
  readonly unit: ParameterUnit;
}

export interface Shape {
  readonly name: string;
  /** order of values and columns; a peak's area comes first */
  readonly parameters: readonly ShapeParameter[];
  /**
   * Adds the expected counts per channel, and gives their derivatives.
   *
   * @param values - in the order of `parameters`
   * @param counts - (n), added to within the span
   * @param columns - one (n) array per parameter, d counts/d parameter; overwritten within the span,
   * untouched outside, where derivatives are zero; null where they are not asked for
   * @returns the channels touched
   */
  evaluate(
    grid: FitGrid,
    values: Float64Array,
    counts: Float64Array,
    columns: readonly Float64Array[] | null,
  ): ChannelSpan;
}

/** The grid of channels first ≤ k < end of an axis. */
export function gridOf(
  axis: { readonly centresEv: Float64Array; readonly edgesEv: Float64Array },
  first: number,
  end: number,
): FitGrid {
  const centresEv = axis.centresEv.slice(first, end);
  const edgesEv = axis.edgesEv.slice(first, end + 1);
  const widthsEv = centresEv.map((_, k) => edgesEv[k + 1] - edgesEv[k]);
  return { centresEv, widthsEv, edgesEv };
}

/** The channels that reach into low … high, eV. */
export function spanWithin(grid: FitGrid, lowEv: number, highEv: number): ChannelSpan {
  const { edgesEv } = grid;
  const count = edgesEv.length - 1;
  let first = firstAbove(edgesEv, lowEv) - 1;
  if (first < 0) first = 0;
  let end = firstAbove(edgesEv, highEv);
  if (end > count) end = count;
  return end > first ? { first, end } : { first: 0, end: 0 };
}

/** Index of the first edge above a value; the number of edges where there is none. */
function firstAbove(edgesEv: Float64Array, value: number): number {
  let low = 0;
  let high = edgesEv.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (edgesEv[middle] > value) high = middle;
    else low = middle + 1;
  }
  return low;
}
