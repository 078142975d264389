/**
 * Counts of a slab in tiles of a few hundred pixels, channels outermost within a tile: the same
 * channels of neighbouring pixels lie together, so that a few channels of every pixel are read as long
 * runs instead of one cache line per pixel. Tiles only order memory: no result depends on them.
 */
import type { CountsArray } from '../scan';

export interface TiledCounts {
  /** tile by tile; within a tile (nk, pixels of the tile), C order */
  readonly counts: CountsArray;
  /** pixels of the slab, numbered along its rows */
  readonly pixels: number;
  readonly nk: number;
  /** pixels of every tile but perhaps the last */
  readonly tilePixels: number;
}

export interface Tile {
  /** number of its first pixel */
  readonly first: number;
  readonly pixels: number;
  /** where its counts begin */
  readonly offset: number;
}

/** A tile as doubles stays within a core's second-level cache. */
const tileValues = 1 << 18;
/** No power of two, whose multiples would compete for the same lines of a cache. */
const mostTilePixels = 252;

/** How many pixels a tile has: a multiple of three, which the kernels take at a time. */
export function tilePixelsFor(nk: number): number {
  return Math.max(3, Math.min(mostTilePixels, Math.floor(tileValues / nk / 3) * 3));
}

export function tileCount({ pixels, tilePixels }: TiledCounts): number {
  return Math.ceil(pixels / tilePixels);
}

export function tileAt({ pixels, nk, tilePixels }: TiledCounts, index: number): Tile {
  const first = index * tilePixels;
  return { first, pixels: Math.min(tilePixels, pixels - first), offset: first * nk };
}

/**
 * Turns one tile of counts that are still in pixel order, in place.
 *
 * @param spare - of the counts' own type, at least as long as a tile
 */
export function turnTile(tiled: TiledCounts, tile: Tile, spare: CountsArray): void {
  const { counts, nk } = tiled;
  const { pixels, offset } = tile;
  spare.set(counts.subarray(offset, offset + pixels * nk));
  turn(spare, counts, tile, nk);
}

/** Channels at a time, so that the lines written to stay in the first-level cache. */
const turnChannels = 32;

function turn(from: CountsArray, to: CountsArray, { pixels, offset }: Tile, nk: number): void {
  for (let k0 = 0; k0 < nk; k0 += turnChannels) {
    const k1 = Math.min(nk, k0 + turnChannels);
    for (let pixel = 0; pixel < pixels; pixel++) {
      let target = offset + k0 * pixels + pixel;
      for (let source = pixel * nk + k0; source < pixel * nk + k1; source++) {
        to[target] = from[source];
        target += pixels;
      }
    }
  }
}

/** A view of channels k0 ≤ k < k1 of one tile: (k1 − k0, pixels of the tile), C order. */
export function tileChannels(
  { counts }: TiledCounts,
  { offset, pixels }: Tile,
  k0: number,
  k1: number,
): CountsArray {
  return counts.subarray(offset + k0 * pixels, offset + k1 * pixels);
}

/** Counts of one pixel, (nk). */
export function pixelSpectrum(tiled: TiledCounts, pixel: number, out: Float64Array): Float64Array {
  const { counts, nk } = tiled;
  const tile = tileAt(tiled, Math.floor(pixel / tiled.tilePixels));
  let at = tile.offset + pixel - tile.first;
  for (let k = 0; k < nk; k++) {
    out[k] = counts[at];
    at += tile.pixels;
  }
  return out;
}

/** Whether a pixel of the tile has no data in any of the channels first … last. */
export function hasMissing(
  { counts }: TiledCounts,
  { offset, pixels }: Tile,
  pixel: number,
  first: number,
  last: number,
): boolean {
  for (let k = first; k <= last; k++) {
    if (Number.isNaN(counts[offset + k * pixels + pixel])) return true;
  }
  return false;
}
