/** A smooth background under each spectrum, found in the spectrum itself and taken off. */
import type { EnergyAxis } from '../scan';
import { ArplsBaseline } from './arpls';
import { AslsBaseline } from './asls';
import { type ConditionedArray, type ConditionedSlab, subtracted, zerosLike } from './conditioned';
import { PolynomialBaseline } from './polynomial-baseline';
import { SnipBaseline } from './snip';
import { type StepPlace, stepError } from './step-errors';

export type BaselineOptions =
  | { readonly method: 'arpls'; readonly smoothness: number; readonly iterations: number }
  | {
      readonly method: 'asls';
      readonly smoothness: number;
      /** weight of channels above the baseline; those below have the rest to 1 */
      readonly asymmetry: number;
      readonly iterations: number;
    }
  | { readonly method: 'snip' /** channels */; readonly halfWidth: number }
  | {
      readonly method: 'polynomial';
      readonly degree: number;
      /** eV; null: found by clipping */
      readonly windows: readonly (readonly [number, number])[] | null;
    };

/** Finds baselines of spectra of one length; keeps its scratch space, no memory of spectra. */
export interface BaselineFinder {
  /**
   * @param spectrum - (nk), no data is NaN
   * @param out - (nk) overwritten; a number at every channel, or NaN at all of them
   * @returns false where rounds ran out before it settled
   */
  find(spectrum: Float64Array, out: Float64Array): boolean;
}

export interface WithoutBaseline {
  readonly slab: ConditionedSlab;
  /** (ny, nx, nk), counts as they were */
  readonly baselines: ConditionedArray;
  /** (ny × nx) the baseline's counts, all channels together */
  readonly totals: Float64Array;
  /** (ny × nx) 0: settled; 1: rounds ran out; 2: too little data, and no baseline */
  readonly status: Float64Array;
}

/** @throws RimlightError 'recipe' - when settings are out of range or the windows hold too few channels */
export function createBaselineFinder(
  options: BaselineOptions,
  axis: EnergyAxis,
  place: StepPlace,
): BaselineFinder {
  const nk = axis.centresEv.length;
  if (nk < 3) {
    throw stepError(
      place,
      `a baseline cannot be told in ${nk} channels`,
      'Take the baseline before channels are summed or cropped.',
    );
  }
  if (options.method === 'snip') return new SnipBaseline(nk, options.halfWidth, place);
  if (options.method === 'polynomial') {
    return new PolynomialBaseline(axis, options.degree, options.windows, place);
  }
  if (!(options.smoothness > 0) || !Number.isFinite(options.smoothness)) {
    throw stepError(
      place,
      `a smoothness of ${options.smoothness} makes no baseline`,
      'Give a number above 0; 1e5 is usual, more is stiffer.',
    );
  }
  if (options.method === 'arpls') {
    return new ArplsBaseline(nk, options.smoothness, options.iterations);
  }
  if (!(options.asymmetry > 0 && options.asymmetry < 1)) {
    throw stepError(
      place,
      `an asymmetry of ${options.asymmetry} is not between 0 and 1`,
      'Give a small share, such as 0.01.',
    );
  }
  return new AslsBaseline(nk, options);
}

/**
 * Takes the baseline off every spectrum; it moves to the background, so that its shot noise stays in the
 * variance. The baseline's own error is left out: it is drawn from many channels, and is small
 * beside a single one's, though not beside a band's that is as wide as the baseline is stiff.
 */
export function subtractBaseline(slab: ConditionedSlab, finder: BaselineFinder): WithoutBaseline {
  const { nk } = slab.shape;
  const baselines = zerosLike(slab.counts, slab.counts.length);
  const spectrum = new Float64Array(nk);
  const found = new Float64Array(nk);
  const totals = new Float64Array(slab.counts.length / nk);
  const status = new Float64Array(totals.length);
  for (let pixel = 0; pixel < totals.length; pixel++) {
    const at = pixel * nk;
    spectrum.set(slab.counts.subarray(at, at + nk));
    const isSettled = finder.find(spectrum, found);
    if (Number.isNaN(found[0])) {
      status[pixel] = 2;
      continue;
    }
    baselines.set(found, at);
    for (let k = 0; k < nk; k++) totals[pixel] += found[k];
    if (!isSettled) status[pixel] = 1;
  }
  return {
    slab: subtracted(slab, { kind: 'pixel', values: baselines }),
    baselines,
    totals,
    status,
  };
}
