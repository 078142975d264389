/**
 * Blocks of an array that lies in a file (or in an unpacked stream) as plain bytes: the runs of bytes
 * that belong to a block are read, near ones together, and nothing else of the file.
 */
import { throwIfAborted } from '../errors';
import type { CountsArray } from '../science/scan';
import type { ElementType, ReadOptions } from './container';
import { bytesOfType, decodeElements } from './dtype';
import { reverseAxes } from './reverse-axes';
import { asScanError } from './scan-error';
import { checkBlock } from './shape';

export interface ArrayLayout {
  readonly shape: readonly number[];
  readonly type: ElementType;
  readonly isLittleEndian: boolean;
  /** first axis fastest */
  readonly isFortran: boolean;
  /** byte of the first element */
  readonly offset: number;
}

/** Exactly the bytes asked for; throws when there are fewer. */
export type ReadRange = (from: number, to: number) => Promise<Uint8Array>;

export interface ReadSizes {
  /** Read at once: small enough to be stopped soon, large enough for a disk. */
  readonly windowBytes: number;
  /** Skipping less than this costs more than reading it. */
  readonly gapBytes: number;
  /** Rows of a Fortran array lie all over the file, so that many are read together and kept. */
  readonly bandBytes: number;
}

const usualSizes: ReadSizes = { windowBytes: 4 << 20, gapBytes: 64 << 10, bandBytes: 128 << 20 };

interface Band {
  readonly first: number;
  readonly rows: number;
  readonly values: CountsArray;
}

export class StoredArray {
  private band: Band | null = null;

  constructor(
    private readonly layout: ArrayLayout,
    private readonly readRange: ReadRange,
    private readonly where: string,
    private readonly sizes = usualSizes,
  ) {}

  /** @throws RimlightError 'scan' - when the file ends before, or there is not enough memory */
  async read(
    start: readonly number[],
    count: readonly number[],
    options: ReadOptions = {},
  ): Promise<CountsArray> {
    checkBlock(this.layout, start, count, this.where);
    try {
      return this.isBanded(count)
        ? await this.readFromBand(start[0], count[0], options)
        : await this.readBlock(start, count, options);
    } catch (error) {
      throw asScanError(error, 'the array could not be read', this.where);
    }
  }

  private isBanded(count: readonly number[]): boolean {
    const { shape, isFortran } = this.layout;
    if (!isFortran || shape.length < 2 || count[0] === shape[0]) return false;
    return count.every((length, axis) => axis === 0 || length === shape[axis]);
  }

  private async readFromBand(
    first: number,
    rows: number,
    options: ReadOptions,
  ): Promise<CountsArray> {
    const { shape, type } = this.layout;
    const rowValues = shape.slice(1).reduce((product, length) => product * length, 1);
    const rowBytes = rowValues * bytesOfType[type];
    let { band } = this;
    if (band === null || first < band.first || first + rows > band.first + band.rows) {
      this.band = null;
      const wanted = Math.max(rows, Math.floor(this.sizes.bandBytes / Math.max(1, rowBytes)));
      const bandRows = Math.min(wanted, shape[0] - first);
      const values = await this.readBlock(
        shape.map((_, axis) => (axis === 0 ? first : 0)),
        shape.with(0, bandRows),
        options,
      );
      band = { first, rows: bandRows, values };
      if (bandRows > rows) this.band = band;
    }
    if (band.rows === rows) return band.values;
    const from = (first - band.first) * rowValues;
    return band.values.slice(from, from + rows * rowValues);
  }

  private async readBlock(
    start: readonly number[],
    count: readonly number[],
    options: ReadOptions,
  ): Promise<CountsArray> {
    const { type, isLittleEndian, isFortran } = this.layout;
    const bytes = await this.gather(start, count, options);
    const values = decodeElements(bytes, type, isLittleEndian);
    return isFortran ? reverseAxes(values, count) : values;
  }

  /** The block's bytes in the file's own order. */
  private async gather(
    start: readonly number[],
    count: readonly number[],
    { signal, onProgress }: ReadOptions,
  ): Promise<Uint8Array> {
    const { layout } = this;
    const { gapBytes, windowBytes } = this.sizes;
    const size = bytesOfType[layout.type];
    const total = count.reduce((product, length) => product * length, size);
    const out = new Uint8Array(total);
    if (total === 0) return out;
    const runs = runsOf(layout, start, count);
    const window: { from: number; bytes: Uint8Array } = { from: 0, bytes: new Uint8Array(0) };
    const reach = runs.gap * size <= gapBytes ? windowBytes : 0;
    let done = 0;
    for (const at of runs.starts()) {
      let from = layout.offset + at * size;
      let left = runs.length * size;
      while (left > 0) {
        if (from < window.from || from >= window.from + window.bytes.length) {
          throwIfAborted(signal, 'reading');
          onProgress?.(done / total);
          const most = Math.max(reach, Math.min(left, windowBytes));
          const to = Math.min(from + most, layout.offset + runs.end * size);
          window.bytes = await this.readRange(from, to);
          window.from = from;
        }
        const skip = from - window.from;
        const take = Math.min(left, window.bytes.length - skip);
        out.set(window.bytes.subarray(skip, skip + take), done);
        done += take;
        from += take;
        left -= take;
      }
    }
    onProgress?.(1);
    return out;
  }
}

interface Runs {
  /** elements of a run */
  readonly length: number;
  /** elements between the end of a run and the next run's start */
  readonly gap: number;
  /** element after the last run's */
  readonly end: number;
  starts(): Generator<number>;
}

/** The block as runs of elements that follow one another in the file. */
function runsOf(
  { shape, isFortran }: ArrayLayout,
  start: readonly number[],
  count: readonly number[],
): Runs {
  const inFileOrder = <T>(list: readonly T[]): readonly T[] =>
    isFortran ? list.toReversed() : list;
  const lengths = inFileOrder(shape);
  const from = inFileOrder(start);
  const take = inFileOrder(count);
  let length = 1;
  let stride = 1;
  let outer = lengths.length;
  while (outer > 0) {
    outer--;
    length *= take[outer];
    stride *= lengths[outer];
    if (take[outer] !== lengths[outer]) break;
  }
  const strides = lengths.map((_, axis) =>
    lengths.slice(axis + 1).reduce((product, one) => product * one, 1),
  );
  const first = from.reduce((sum, index, axis) => sum + index * strides[axis], 0);
  const last = take.reduce((sum, many, axis) => sum + (many - 1) * strides[axis], first);
  return {
    length,
    gap: stride - length,
    end: last + 1,
    *starts() {
      const index = new Array<number>(outer).fill(0);
      let at = first;
      for (;;) {
        yield at;
        let axis = outer - 1;
        while (axis >= 0) {
          at += strides[axis];
          if (++index[axis] < take[axis]) break;
          at -= index[axis] * strides[axis];
          index[axis] = 0;
          axis--;
        }
        if (axis < 0) return;
      }
    },
  };
}
