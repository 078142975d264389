/** What both ways of despiking share: settings, the spikes found, and writing them into a slab. */
import type { ConditionedSlab } from './conditioned';
import { bridgeMarked } from './spike-finder';
import { type StepPlace, stepError } from './step-errors';

export interface DespikeOptions {
  /** of the modified z-score */
  readonly threshold: number;
  /** channels that are no spikes, as the user says: (y, x, k) on this step's grid */
  readonly kept: readonly SpikePlace[];
}

export interface SpikePlace {
  readonly y: number;
  readonly x: number;
  readonly k: number;
}

/** The channels replaced in some rows, in order of y, x and k; arrays of one length. */
export interface SpikeList {
  readonly y: Int32Array;
  readonly x: Int32Array;
  readonly k: Int32Array;
  /** counts before */
  readonly was: Float64Array;
}

export interface Despiked {
  readonly slab: ConditionedSlab;
  readonly spikes: SpikeList;
  /** (ny × nx) channels replaced: the map `despike.count` */
  readonly countMap: Float64Array;
}

/** @throws RimlightError 'recipe' - for a threshold of 0, below, or not a number */
export function assertThreshold(threshold: number, place: StepPlace): void {
  if (threshold > 0 && Number.isFinite(threshold)) return;
  throw stepError(
    place,
    `a spike cannot be told by a threshold of ${threshold}`,
    'Give a threshold above 0; 6 is usual, more finds fewer spikes.',
  );
}

/** Collects what was found, pixel by pixel, into a new slab. */
export class Despiking {
  readonly #slab: ConditionedSlab;
  readonly #counts: ConditionedSlab['counts'];
  readonly #variances: ConditionedSlab['variances'];
  readonly #kept: ReadonlySet<number>;
  readonly #guesses: Float64Array | null;
  #replaced: Uint8Array | null;
  readonly #countMap: Float64Array;
  readonly #found: number[] = [];
  readonly #was: number[] = [];

  /** @param slab - the rows that are given back */
  constructor(slab: ConditionedSlab, { kept }: DespikeOptions) {
    const { ny, nx, nk } = slab.shape;
    this.#slab = slab;
    this.#counts = slab.counts.slice();
    this.#variances = slab.variances?.slice() ?? null;
    this.#replaced = slab.replaced?.slice() ?? null;
    this.#guesses = slab.variances === null ? null : new Float64Array(nk);
    this.#countMap = new Float64Array(ny * nx);
    this.#kept = new Set(
      kept
        .filter(({ y }) => y >= slab.y0 && y < slab.y0 + ny)
        .map(({ y, x, k }) => ((y - slab.y0) * nx + x) * nk + k),
    );
  }

  /** Takes the marks off channels the user keeps; returns how many stay. */
  keep(pixel: number, marks: Uint8Array): number {
    const { nk } = this.#slab.shape;
    let left = 0;
    for (let k = 0; k < nk; k++) {
      if (marks[k] !== 0 && this.#kept.has(pixel * nk + k)) marks[k] = 0;
      left += marks[k];
    }
    return left;
  }

  /**
   * @param series - (nk) the counts, or what is left of them after `under` was taken away; marked channels are overwritten
   * @param variances - (nk) of the series; null where unknown
   * @param under - (nk), added back to the bridges
   */
  replace(
    pixel: number,
    marks: Uint8Array,
    series: Float64Array,
    variances: Float64Array | null,
    under: Float64Array | null,
  ): void {
    const { nk } = this.#slab.shape;
    bridgeMarked(series, marks, variances, this.#guesses);
    this.#replaced ??= new Uint8Array(this.#counts.length);
    for (let k = 0; k < nk; k++) {
      if (marks[k] === 0) continue;
      const at = pixel * nk + k;
      this.#found.push(at);
      this.#was.push(this.#counts[at]);
      this.#counts[at] = series[k] + (under === null ? 0 : under[k]);
      if (this.#variances !== null && this.#guesses !== null) {
        this.#variances[at] = this.#guesses[k];
      }
      this.#replaced[at] = 1;
      this.#countMap[pixel]++;
    }
  }

  done(): Despiked {
    const { nx, nk } = this.#slab.shape;
    const { y0 } = this.#slab;
    const pixelOf = (at: number): number => Math.floor(at / nk);
    return {
      slab: {
        ...this.#slab,
        counts: this.#counts,
        variances: this.#variances,
        replaced: this.#replaced,
      },
      spikes: {
        y: Int32Array.from(this.#found, (at) => y0 + Math.floor(pixelOf(at) / nx)),
        x: Int32Array.from(this.#found, (at) => pixelOf(at) % nx),
        k: Int32Array.from(this.#found, (at) => at % nk),
        was: Float64Array.from(this.#was),
      },
      countMap: this.#countMap,
    };
  }
}

/** The variance of one detected count, in counts² as they now are, (nk). */
export function leastVariances({ factor }: ConditionedSlab): Float64Array {
  return factor.map((value) => 1 / (value * value));
}
