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

/** Pixels from ≤ pixel < to, (to − from, nk). */
export interface PixelBand {
  readonly from: number;
  readonly to: number;
  readonly values: CountsArray;
}

/** Writes the values of a stretch that belong to the band into it; what the file does not have stays. */
export type ReadStretch = (
  stretch: PixelStretch,
  band: PixelBand,
  options: ReadOptions,
) => Promise<void>;

/** Cubes up to this are held as a whole, and as much of larger ones. */
export const heldBytes = 64 << 20;

export class StreamedCube {
  private band: PixelBand | null = null;
  private readonly nk: number;
  private readonly pixels: number;

  /** @param entry - its last axis is the channels, those before are pixels */
  constructor(
    readonly entry: ArrayEntry,
    private readonly stretches: readonly PixelStretch[],
    private readonly readStretch: ReadStretch,
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

  private async bandOf(from: number, to: number, options: ReadOptions): Promise<PixelBand> {
    const held = this.band;
    if (held !== null && from >= held.from && to <= held.to) return held;
    // Let go of it first: two bands at once would be twice the memory.
    this.band = null;
    const { type } = this.entry;
    const end = this.endOfBand(from, to);
    const values = new arrayOfType[type]((end - from) * this.nk);
    if (type === 'float64') values.fill(Number.NaN);
    const band = { from, to: end, values };
    await this.fill(band, options);
    this.band = band;
    return band;
  }

  /**
   * The pixels after the last one asked for whose rows are read anyway: few where the file goes through
   * the scan in order, as many as can be held where every part of it has pixels from all over.
   */
  private endOfBand(from: number, to: number): number {
    const room = Math.floor(heldBytes / (this.nk * bytesOfType[this.entry.type]));
    const highest = this.stretches.reduce(
      (most, stretch) =>
        stretch.lowest < to && stretch.highest >= from ? Math.max(most, stretch.highest) : most,
      to - 1,
    );
    return Math.max(to, Math.min(this.pixels, highest + 1, from + room));
  }

  private async fill(band: PixelBand, { signal, onProgress }: ReadOptions): Promise<void> {
    const quiet: ReadOptions = signal === undefined ? {} : { signal };
    const needed = this.stretches.filter(
      ({ lowest, highest }) => highest >= band.from && lowest < band.to,
    );
    for (const [done, stretch] of needed.entries()) {
      await this.readStretch(stretch, band, quiet);
      onProgress?.((done + 1) / needed.length);
    }
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
