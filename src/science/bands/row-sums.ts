/** Sums of the spectra of chosen pixels, row by row. */
import { type TiledCounts, tileAt, tileCount } from './tiled-counts';

/**
 * Each row's spectra of the pixels taken, summed in order of x; no data left out.
 *
 * @param nx - pixels of a row
 * @param mask - (ny × nx) 1 = take
 * @returns (ny × nk) sums, and how many pixels had data there
 */
export function maskedRowSums(
  tiled: TiledCounts,
  nx: number,
  mask: Uint8Array,
): { readonly sums: Float64Array; readonly pixels: Uint32Array } {
  const { counts, nk } = tiled;
  const rows = tiled.pixels / nx;
  const sums = new Float64Array(rows * nk);
  const pixels = new Uint32Array(rows * nk);
  for (let index = 0; index < tileCount(tiled); index++) {
    const tile = tileAt(tiled, index);
    const taken: number[] = [];
    for (let p = 0; p < tile.pixels; p++) if (mask[tile.first + p] === 1) taken.push(p);
    for (let k = 0; k < nk && taken.length > 0; k++) {
      for (const p of taken) {
        const value = counts[tile.offset + k * tile.pixels + p];
        if (Number.isNaN(value)) continue;
        const at = Math.floor((tile.first + p) / nx) * nk + k;
        sums[at] += value;
        pixels[at]++;
      }
    }
  }
  return { sums, pixels };
}
