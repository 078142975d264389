/**
 * Despiking against the pixels around: what stands out of a pixel's spectrum but not of its
 * neighbours' is a cosmic ray; a narrow line of the sample is next door too. Needs a row on either side.
 */
import { type ConditionedSlab, rowsOf } from './conditioned';
import { type Despiked, type DespikeOptions, Despiking, leastVariances } from './despike';
import { NeighbourSpectra } from './neighbour-spectra';
import { SpikeFinder } from './spike-finder';

/** Scale and spikes depend on one another; they settle in two rounds, save where spectra are mostly spikes. */
const mostRounds = 4;

/**
 * Replaces channels hit by cosmic rays in rows y0 ≤ y < y1.
 *
 * The median of the up to eight pixels around is scaled to the pixel (by their counts outside of spikes)
 * and taken from it; spikes are sought in what is left by the same rule as within one spectrum, with the
 * neighbours' own differences, channel by channel, counted as noise. The guess is the scaled median
 * plus a straight line through the rest beside the spike.
 *
 * @param slab - rows with one more on either side, where the scan has one
 */
export function despikeNeighbour(
  slab: ConditionedSlab,
  options: DespikeOptions,
  { y0, y1 }: { readonly y0: number; readonly y1: number },
): Despiked {
  const { nx } = slab.shape;
  const rows = rowsOf(slab, y0, y1);
  const around = new NeighbourSpectra(slab);
  const search = new PixelSearch(slab, options);
  const despiking = new Despiking(rows, options);
  for (let y = y0; y < y1; y++) {
    for (let x = 0; x < nx; x++) {
      if (!around.read(y - slab.y0, x)) continue;
      const pixel = (y - y0) * nx + x;
      search.find(around, (y - slab.y0) * nx + x);
      if (despiking.keep(pixel, search.marks) === 0) continue;
      despiking.replace(pixel, search.marks, search.rest, search.variances, search.scaled);
    }
  }
  return despiking.done();
}

/** One pixel against its neighbours' median; its arrays hold what the last search left. */
class PixelSearch {
  readonly marks: Uint8Array;
  /** (nk) counts less the scaled median */
  readonly rest: Float64Array;
  readonly scaled: Float64Array;
  /** (nk) null where unknown */
  readonly variances: Float64Array | null;
  readonly #slab: ConditionedSlab;
  readonly #least: Float64Array;
  readonly #before: Uint8Array;
  /** (nk) the neighbours' own, scaled */
  readonly #spread: Float64Array;
  readonly #finder: SpikeFinder;

  constructor(slab: ConditionedSlab, { threshold }: DespikeOptions) {
    const { nk } = slab.shape;
    this.#slab = slab;
    this.#least = leastVariances(slab);
    this.#before = new Uint8Array(nk);
    this.#spread = new Float64Array(nk);
    this.#finder = new SpikeFinder(nk, threshold);
    this.marks = new Uint8Array(nk);
    this.rest = new Float64Array(nk);
    this.scaled = new Float64Array(nk);
    this.variances = slab.variances === null ? null : new Float64Array(nk);
  }

  find(around: NeighbourSpectra, pixel: number): void {
    const { nk } = this.#slab.shape;
    this.marks.fill(0);
    for (let round = 0; round < mostRounds; round++) {
      this.#subtract(around, pixel);
      this.#before.set(this.marks);
      const noise = { variances: this.variances, least: this.#least, spread: this.#spread };
      this.#finder.find(this.rest, noise, this.marks);
      let hasChanged = false;
      for (let k = 0; k < nk; k++) hasChanged ||= this.marks[k] !== this.#before[k];
      if (!hasChanged) return;
    }
  }

  /** The scale is that of the counts outside of what is marked. */
  #subtract({ median, spread }: NeighbourSpectra, pixel: number): void {
    const { counts, variances } = this.#slab;
    const { nk } = this.#slab.shape;
    let own = 0;
    let theirs = 0;
    for (let k = 0; k < nk; k++) {
      const value = counts[pixel * nk + k];
      if (this.marks[k] !== 0 || Number.isNaN(value - median[k])) continue;
      own += value;
      theirs += median[k];
    }
    const scale = theirs > 0 && own > 0 ? own / theirs : 1;
    for (let k = 0; k < nk; k++) {
      // Where the neighbours know nothing, nor is anything said of this channel.
      this.scaled[k] = scale * median[k];
      this.rest[k] = counts[pixel * nk + k] - this.scaled[k];
      this.#spread[k] = scale * scale * spread[k];
      if (this.variances !== null && variances !== null) {
        this.variances[k] = variances[pixel * nk + k] + this.#spread[k];
      }
    }
  }
}
