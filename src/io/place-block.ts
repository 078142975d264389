/**
 * Puts a block of the file into a slab of (y, x, k): a plain copy where the file runs the same way,
 * a transpose in cache-sized tiles where channels are not its fastest axis.
 */
import type { CountsArray } from '../science/scan';

export interface Placement {
  /** file axis of rows, columns, channels; −1 where the file has none */
  readonly yAxis: number;
  readonly xAxis: number;
  readonly kAxis: number;
  /** slab channel of each file channel; −1 for one left out */
  readonly channelOf: Int32Array;
  /** whether file channels are exactly the slab's, in the same or the opposite order */
  readonly run: 'up' | 'down' | 'mixed';
  readonly serpentine: boolean;
  /** the slab's first row in the scan */
  readonly y0: number;
  readonly ny: number;
  readonly nx: number;
  readonly nk: number;
}

/** 64 × 64 values of 8 bytes: source and target tiles fit a 64 kB first-level cache. */
const tile = 64;

/**
 * @param values - the block, C order of the file's axes
 * @param block - its place in the file
 * @param out - (ny, nx, nk); only the block's values are written
 */
export function placeBlock(
  values: CountsArray,
  block: { readonly start: readonly number[]; readonly count: readonly number[] },
  to: Placement,
  out: CountsArray,
): void {
  const strides = stridesOf(block.count);
  const side = (axis: number, origin: number): Side =>
    axis < 0
      ? { first: 0, count: 1, stride: 0 }
      : { first: block.start[axis] - origin, count: block.count[axis], stride: strides[axis] };
  const sides = { y: side(to.yAxis, to.y0), x: side(to.xAxis, 0), k: side(to.kAxis, 0) };
  if (isPlainCopy(sides, to)) {
    out.set(values, sides.y.first * to.nx * to.nk);
  } else if (sides.k.stride === 1) {
    copySpectra(values, sides, to, out);
  } else {
    transpose(values, sides, to, out);
  }
}

/** Extent of a block along rows, columns or channels: first index in the slab, how many, values from one to the next. */
interface Side {
  readonly first: number;
  readonly count: number;
  readonly stride: number;
}

interface Sides {
  readonly y: Side;
  readonly x: Side;
  readonly k: Side;
}

/** Whole rows that lie in the file just as in the slab. */
function isPlainCopy({ y, x, k }: Sides, { nx, nk, run, serpentine }: Placement): boolean {
  if (run !== 'up' || serpentine || x.count !== nx || k.count !== nk || k.stride !== 1)
    return false;
  return (nx === 1 || x.stride === nk) && (y.count === 1 || y.stride === nx * nk);
}

/** Where a pixel's spectrum begins in the slab; odd rows of a serpentine scan ran right to left. */
function pixelStart(y: number, x: number, { nx, nk, serpentine, y0 }: Placement): number {
  const isTurned = serpentine && (y + y0) % 2 === 1;
  return (y * nx + (isTurned ? nx - 1 - x : x)) * nk;
}

/** Spectra that lie whole: one copy each, straight, reversed or channel by channel. */
function copySpectra(
  values: CountsArray,
  { y, x, k }: Sides,
  to: Placement,
  out: CountsArray,
): void {
  const { channelOf, run, nk } = to;
  for (let row = 0; row < y.count; row++) {
    for (let column = 0; column < x.count; column++) {
      const from = row * y.stride + column * x.stride;
      const start = pixelStart(y.first + row, x.first + column, to);
      if (run === 'up') {
        out.set(values.subarray(from, from + k.count), start + k.first);
      } else if (run === 'down') {
        let at = start + nk - 1 - k.first;
        for (let i = 0; i < k.count; i++) out[at--] = values[from + i];
      } else {
        for (let i = 0; i < k.count; i++) {
          const channel = channelOf[k.first + i];
          if (channel >= 0) out[start + channel] = values[from + i];
        }
      }
    }
  }
}

/**
 * Channels that lie apart: planes of channels × the file's faster axis of space, in tiles, read along
 * that axis and written so that a tile's spectra stay in cache.
 */
function transpose(values: CountsArray, { y, x, k }: Sides, to: Placement, out: CountsArray): void {
  const isColumnsFaster = to.xAxis > to.yAxis;
  const [fast, slow] = isColumnsFaster ? [x, y] : [y, x];
  // Offsets of one plane's spectra; doubles, since a slab may hold more than 2^31 values.
  const starts = new Float64Array(fast.count);
  for (let j = 0; j < slow.count; j++) {
    for (let i = 0; i < fast.count; i++) {
      starts[i] = isColumnsFaster
        ? pixelStart(y.first + j, x.first + i, to)
        : pixelStart(y.first + i, x.first + j, to);
    }
    transposePlane(values, { at: j * slow.stride, fast, k }, starts, to.channelOf, out);
  }
}

function transposePlane(
  values: CountsArray,
  { at, fast, k }: { readonly at: number; readonly fast: Side; readonly k: Side },
  starts: Float64Array,
  channelOf: Int32Array,
  out: CountsArray,
): void {
  for (let kTile = 0; kTile < k.count; kTile += tile) {
    const kEnd = Math.min(kTile + tile, k.count);
    for (let iTile = 0; iTile < fast.count; iTile += tile) {
      const iEnd = Math.min(iTile + tile, fast.count);
      for (let kk = kTile; kk < kEnd; kk++) {
        const channel = channelOf[k.first + kk];
        if (channel < 0) continue;
        const from = at + kk * k.stride;
        for (let i = iTile; i < iEnd; i++)
          out[starts[i] + channel] = values[from + i * fast.stride];
      }
    }
  }
}

/** Values from one index to the next along each axis of a C-order block. */
function stridesOf(count: readonly number[]): readonly number[] {
  const strides = count.map(() => 1);
  for (let axis = count.length - 2; axis >= 0; axis--) {
    strides[axis] = strides[axis + 1] * count[axis + 1];
  }
  return strides;
}
