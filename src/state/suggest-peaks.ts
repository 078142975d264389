/** Proposes a peak model from what stands out in the scan: its mean, its brightest pixel, its extremes in energy, its pins. */
import type { OpenScan, Pixel } from '../../workers/engine';
import { setModel } from '../recipe/model-edits';
import { isRamanLine, suggestModel } from '../recipe/suggest-model';
import { type FoundPeak, findPeaks, withoutDoubles } from '../science/fit/find-peaks';
import { varianceLine } from '../science/noise';
import { gridOf } from '../science/peaks/shape';
import type { PixelMap } from '../science/scan';
import { selectModel } from './model-actions';
import type { Workbench } from './workbench';

/** More of them, each kept only where needed, would be tried in too many choices. */
const mostBands = 3;
const mostLines = 6;

/** Puts a proposal in place of the model, as one edit; says so where nothing stands out of the noise. */
export async function suggestPeaks(workbench: Workbench): Promise<void> {
  const { session, recipe, spectra, notices } = workbench;
  const { scan, scanNumber } = session.getState();
  if (scan === null) return;
  try {
    const { open } = scan;
    const pixels = await tellingPixels(open);
    const read = await Promise.all(pixels.map((pixel) => open.spectrum(pixel)));
    const pinned = [...spectra.getState().pins.values()].map(({ counts }) => counts);
    if (session.getState().scanNumber !== scanNumber) return;
    const peaks = peaksOf(open, [...read, ...pinned]);
    if (peaks.length === 0) {
      notices.say('warning', 'No peak stands out of the noise.', {
        hint: 'Add peaks by hand where you expect them.',
      });
      return;
    }
    const model = suggestModel(peaks, open.plan.meta.laserEv);
    recipe.edit('Suggest a peak model', (now) => setModel(now, model));
    selectModel(workbench);
  } catch (error) {
    notices.sayError(error);
  }
}

function peaksOf(open: OpenScan, single: readonly Float64Array[]): readonly FoundPeak[] {
  const { meta, meanSpectrum } = open.overview;
  const grid = gridOf(meta.axis, 0, meta.shape.nk);
  const varianceOf = variancesFor(open);
  const pixels = meta.shape.ny * meta.shape.nx;
  const seen = [
    { counts: meanSpectrum, pixels },
    ...single.map((counts) => ({ counts, pixels: 1 })),
  ];
  const find = (spectra: typeof seen): readonly FoundPeak[] =>
    withoutDoubles(
      spectra.flatMap(({ counts, pixels: n }) => findPeaks(grid, counts, varianceOf(counts, n))),
    );
  const lines = find(seen)
    .filter((peak) => isRamanLine(peak, meta.laserEv))
    .slice(0, mostLines);
  // Lines close together look like one wide peak: what lies under them is searched without them.
  const cleared = seen.map(({ counts, pixels: n }) => ({
    counts: withoutLines(counts, meta.axis.centresEv, lines),
    pixels: n,
  }));
  const bands = find(cleared).filter((peak) => !isRamanLine(peak, meta.laserEv));
  return [...lines, ...bands.slice(0, mostBands)];
}

/** Counts with a straight line across each peak, from foot to foot. */
function withoutLines(
  counts: Float64Array,
  centresEv: Float64Array,
  lines: readonly FoundPeak[],
): Float64Array {
  const cleared = counts.slice();
  for (const { centreEv, fwhmEv } of lines) {
    const first = centresEv.findIndex((energyEv) => energyEv > centreEv - 2 * fwhmEv);
    const last = centresEv.findLastIndex((energyEv) => energyEv < centreEv + 2 * fwhmEv);
    if (first < 0 || last <= first) continue;
    const [from, to] = [cleared[first] ?? 0, cleared[last] ?? 0];
    for (let k = first; k <= last; k++) {
      cleared[k] = from + ((to - from) * (k - first)) / (last - first);
    }
  }
  return cleared;
}

/** Variances of a spectrum that is the mean of so many pixels; of values that are no counts, from their own roughness. */
function variancesFor(open: OpenScan): (counts: Float64Array, pixels: number) => Float64Array {
  const { noise } = open.overview.meta;
  if (noise.kind !== 'none') {
    const { slope, offset, floor } = varianceLine(noise);
    return (counts, pixels) =>
      counts.map((value) => (slope * Math.max(value - offset, 0) + floor + slope) / pixels);
  }
  return (counts) => counts.map(() => roughness(counts));
}

/** The mean square of second differences over six: the variance of white noise on a smooth curve. */
function roughness(counts: Float64Array): number {
  let sum = 0;
  let terms = 0;
  for (let k = 1; k < counts.length - 1; k++) {
    const bend = (counts[k - 1] ?? 0) - 2 * (counts[k] ?? 0) + (counts[k + 1] ?? 0);
    if (!Number.isFinite(bend)) continue;
    sum += bend * bend;
    terms++;
  }
  return terms === 0 ? 1 : sum / terms / 6;
}

/** The brightest pixel, and those whose light lies lowest and highest in energy. */
async function tellingPixels(open: OpenScan): Promise<readonly Pixel[]> {
  const { edgesEv } = open.overview.meta.axis;
  const band = {
    fromEv: edgesEv[0] ?? 0,
    toEv: edgesEv[edgesEv.length - 1] ?? 0,
    floor: 'none' as const,
  };
  const [centroid] = await open.bandMaps({ band, quantities: ['centroid'] });
  const { totals } = open.overview;
  const extremes = centroid === undefined ? [] : extremesOf({ ...totals, values: centroid.values });
  const { highest } = ends(totals);
  return [highest, ...extremes].map((index) => ({
    y: Math.floor(index / totals.nx),
    x: index % totals.nx,
  }));
}

function extremesOf(map: PixelMap): readonly number[] {
  const { lowest, highest } = ends(map);
  return [lowest, highest];
}

function ends({ values }: PixelMap): { readonly lowest: number; readonly highest: number } {
  let lowest = 0;
  let highest = 0;
  for (let i = 0; i < values.length; i++) {
    if ((values[i] ?? 0) > (values[highest] ?? 0)) highest = i;
    if ((values[i] ?? 0) < (values[lowest] ?? 0)) lowest = i;
  }
  return { lowest, highest };
}
