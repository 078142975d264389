/**
 * Rows of the cube as the engine wants them: (y, x, k), channels in ascending energy, serpentine rows
 * turned back, integers in their own type. Read in blocks of at most 32 MB along the file's slowest
 * axes, so that neither memory nor a stop has to wait for the whole.
 */
import { RimlightError, throwIfAborted } from '../errors';
import type { CountsArray, Slab } from '../science/scan';
import type { Container, ReadOptions } from './container';
import { emptyLike, widened } from './count-types';
import { type Placement, placeBlock } from './place-block';
import type { CubePlan, ScanPlan } from './scan-plan';

/** 32 MB of the widest type. */
const blockValues = 4 << 20;

/**
 * Loads rows y0 ≤ y < y1.
 *
 * @returns (y1 − y0, nx, nk) counts; NaN where the file has none, in float arrays
 * @throws RimlightError 'cancelled' - when stopped; 'scan' - when the file is damaged there
 */
export async function loadSlab(
  container: Container,
  plan: ScanPlan,
  rows: { readonly y0: number; readonly y1: number },
  options: ReadOptions = {},
): Promise<Slab> {
  const { cube, meta } = plan;
  const { nx, nk, ny } = meta.shape;
  if (rows.y0 < 0 || rows.y1 > ny || !(rows.y0 < rows.y1)) {
    throw new RimlightError('fault', {
      what: `rows ${rows.y0} to ${rows.y1} are not rows of a scan of ${ny}`,
      where: meta.name,
      hint: 'Please report this.',
    });
  }
  const shape = { ny: rows.y1 - rows.y0, nx, nk };
  const placement = placementOf(cube, shape, rows.y0);
  const { start, count } = regionOf(cube, rows);
  const total = count.reduce((product, length) => product * length, 1);
  const quiet = options.signal === undefined ? {} : { signal: options.signal };
  let counts: CountsArray | null = null;
  let done = 0;
  for (const block of blocksOf(start, count)) {
    throwIfAborted(options.signal, `reading ${meta.name}`);
    const values = await container.read(cube.path, block.start, block.count, quiet);
    counts = counts === null ? emptyLike(values, shape.ny * nx * nk) : widened(counts, values);
    placeBlock(values, block, placement, counts);
    done += values.length;
    options.onProgress?.(done / total);
  }
  throwIfAborted(options.signal, `reading ${meta.name}`);
  return { y0: rows.y0, shape, counts: counts ?? new Float64Array(0) };
}

export interface Block {
  readonly start: readonly number[];
  readonly count: readonly number[];
}

/** The part of the file that holds these rows. */
export function regionOf(
  { fileShape, yAxis }: CubePlan,
  rows: { readonly y0: number; readonly y1: number },
): Block {
  return {
    start: fileShape.map((_, axis) => (axis === yAxis ? rows.y0 : 0)),
    count: fileShape.map((length, axis) => (axis === yAxis ? rows.y1 - rows.y0 : length)),
  };
}

/** A region cut along its slowest axes into blocks of at most `most` values (one index at least), in file order. */
export function blocksOf(
  start: readonly number[],
  count: readonly number[],
  most = blockValues,
): readonly Block[] {
  let blocks: Block[] = [{ start, count }];
  for (let axis = 0; axis < count.length; axis++) {
    const inner = count.slice(axis + 1).reduce((product, length) => product * length, 1);
    const take = Math.max(1, Math.min(count[axis], Math.floor(most / inner)));
    blocks = blocks.flatMap((block) => cutAlong(block, axis, take));
    if (inner <= most) break;
  }
  return blocks;
}

function cutAlong(block: Block, axis: number, take: number): Block[] {
  const pieces: Block[] = [];
  const whole = block.count[axis];
  for (let at = 0; at < whole; at += take) {
    pieces.push({
      start: block.start.with(axis, block.start[axis] + at),
      count: block.count.with(axis, Math.min(take, whole - at)),
    });
  }
  return pieces;
}

/** Where file channels, rows and columns go in the slab. */
export function placementOf(
  cube: CubePlan,
  shape: { readonly ny: number; readonly nx: number; readonly nk: number },
  y0: number,
): Placement {
  const fileChannels = cube.fileShape[cube.kAxis];
  const channelOf = new Int32Array(fileChannels).fill(-1);
  cube.channels.forEach((fileChannel, k) => {
    channelOf[fileChannel] = k;
  });
  const { yAxis, xAxis, kAxis, serpentine } = cube;
  return {
    yAxis,
    xAxis,
    kAxis,
    channelOf,
    run: runOf(channelOf, shape.nk),
    serpentine,
    y0,
    ...shape,
  };
}

/** Channels in one unbroken run, up or down, can be copied without looking each one up. */
function runOf(channelOf: Int32Array, nk: number): Placement['run'] {
  if (channelOf.length !== nk) return 'mixed';
  if (channelOf.every((k, fileChannel) => k === fileChannel)) return 'up';
  return channelOf.every((k, fileChannel) => k === nk - 1 - fileChannel) ? 'down' : 'mixed';
}
