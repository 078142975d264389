/**
 * A cube too large to hold: each block is read from the file anew, only the parts of it that hold the
 * pixels asked for, with the pixels that follow so that the next block is there already.
 */
import type { CountsArray } from '../../science/scan';
import type { ArrayEntry, ReadOptions } from '../container';
import { arrayOfType, bytesOfType } from '../dtype';
import type { Stretch } from './table-rows';

/** A part of the file and the pixels that occur in it. */
export interface PixelStretch extends Stretch {
  /** first and last pixel */
  readonly lowest: number;
  readonly highest: number;
  /** rows of the table before it */
  readonly row: number;
}

/** Writes the values of pixels from ≤ pixel < to into (to − from, nk); what the file does not have stays. */
export type FillPixels = (
  from: number,
  to: number,
  out: CountsArray,
  options: ReadOptions,
) => Promise<void>;

/** Cubes up to this are held as a whole, and as much of larger ones. */
export const heldBytes = 64 << 20;

interface Band {
  readonly from: number;
  readonly to: number;
  readonly values: CountsArray;
}

export class StreamedCube {
  private band: Band | null = null;
  private readonly nk: number;
  private readonly pixels: number;

  /** @param entry - its last axis is the channels, those before are pixels */
  constructor(
    readonly entry: ArrayEntry,
    private readonly fill: FillPixels,
  ) {
    const { shape } = entry;
    this.nk = shape[shape.length - 1];
    this.pixels = shape.slice(0, -1).reduce((product, length) => product * length, 1);
  }

  async read(
    start: readonly number[],
    count: readonly number[],
    options: ReadOptions,
  ): Promise<CountsArray> {
    const { nk } = this;
    const { shape, type } = this.entry;
    const space = shape.length - 1;
    const channels = count[space];
    const spectra = count.slice(0, -1).reduce((product, length) => product * length, 1);
    const out = new arrayOfType[type](spectra * channels);
    if (out.length === 0) return out;
    const pixels = pixelsOf(shape.slice(0, -1), start, count);
    const band = await this.bandOf(pixels[0], pixels[pixels.length - 1] + 1, options);
    pixels.forEach((pixel, i) => {
      const from = (pixel - band.from) * nk + start[space];
      out.set(band.values.subarray(from, from + channels), i * channels);
    });
    return out;
  }

  private async bandOf(from: number, to: number, options: ReadOptions): Promise<Band> {
    const held = this.band;
    if (held !== null && from >= held.from && to <= held.to) return held;
    // Let go of it first: two bands at once would be twice the memory.
    this.band = null;
    const { type } = this.entry;
    const room = Math.floor(heldBytes / (this.nk * bytesOfType[type]));
    const end = Math.min(this.pixels, Math.max(to, from + room));
    const values = new arrayOfType[type]((end - from) * this.nk);
    if (type === 'float64') values.fill(Number.NaN);
    await this.fill(from, end, values, options);
    const band = { from, to: end, values };
    this.band = band;
    return band;
  }
}

/** Pixel numbers of a block in ascending order. */
function pixelsOf(
  shape: readonly number[],
  start: readonly number[],
  count: readonly number[],
): readonly number[] {
  let pixels = [0];
  shape.forEach((length, axis) => {
    pixels = pixels.flatMap((before) =>
      Array.from({ length: count[axis] }, (_, i) => before * length + start[axis] + i),
    );
  });
  return pixels;
}
