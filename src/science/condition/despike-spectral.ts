/** Despiking, each spectrum on its own: a pixel's result depends on that pixel only. */
import type { ConditionedSlab } from './conditioned';
import { type Despiked, type DespikeOptions, Despiking, leastVariances } from './despike';
import { SpikeFinder } from './spike-finder';

/** After the widest of two spikes side by side is gone, the other shows. */
const mostPasses = 3;

/**
 * Replaces channels hit by cosmic rays by straight lines between the channels beside them.
 *
 * Lines of the sample that are no wider than 3 channels look the same and go as well: compare with the
 * neighbours there.
 *
 * @see `SpikeFinder` for what a spike is; Whitaker and Hayes (2018)
 */
export function despikeSpectral(slab: ConditionedSlab, options: DespikeOptions): Despiked {
  const { nk } = slab.shape;
  const finder = new SpikeFinder(nk, options.threshold);
  const despiking = new Despiking(slab, options);
  const series = new Float64Array(nk);
  const variances = slab.variances === null ? null : new Float64Array(nk);
  const least = leastVariances(slab);
  const marks = new Uint8Array(nk);
  const found = new Uint8Array(nk);
  for (let pixel = 0; pixel * nk < slab.counts.length; pixel++) {
    series.set(slab.counts.subarray(pixel * nk, (pixel + 1) * nk));
    if (slab.variances !== null) {
      variances?.set(slab.variances.subarray(pixel * nk, (pixel + 1) * nk));
    }
    found.fill(0);
    let total = 0;
    for (let pass = 0; pass < mostPasses; pass++) {
      if (finder.find(series, { variances, least, spread: null }, marks) === 0) break;
      if (despiking.keep(pixel, marks) === 0) break;
      for (let k = 0; k < nk; k++) {
        if (marks[k] === 0) continue;
        found[k] = 1;
        // Out of the next pass' sight.
        series[k] = Number.NaN;
        total++;
      }
    }
    if (total > 0) despiking.replace(pixel, found, series, variances, null);
  }
  return despiking.done();
}
