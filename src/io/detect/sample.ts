/** A bounded look at the cube's values, spread over it: whole numbers or not, negative or not, any data at all. */
import type { CountsArray } from '../../science/scan';
import type { ArrayEntry, Container, ReadOptions } from '../container';

export interface ValueSample {
  readonly looked: number;
  readonly finite: number;
  readonly min: number;
  readonly max: number;
  readonly isWhole: boolean;
  /** every value of the array was looked at */
  readonly isAll: boolean;
}

/** 4 MB of doubles. */
const sampleValues = 1 << 19;
const sampleBlocks = 8;

/**
 * Looks at up to half a million values in eight blocks evenly spread along the file's slowest axis
 * (and, where one index of it is too much, along the next), so that no reader is asked for more.
 */
export async function sampleValuesOf(
  container: Container,
  entry: ArrayEntry,
  options: ReadOptions,
): Promise<ValueSample> {
  const size = entry.shape.reduce((product, count) => product * count, 1);
  if (size <= sampleValues) {
    const all = await container.read(
      entry.path,
      entry.shape.map(() => 0),
      entry.shape,
      options,
    );
    return { ...looked([all]), isAll: true };
  }
  const blocks: CountsArray[] = [];
  for (let block = 0; block < sampleBlocks; block++) {
    const { start, count } = blockAt(entry.shape, block);
    blocks.push(await container.read(entry.path, start, count, options));
  }
  return { ...looked(blocks), isAll: false };
}

function blockAt(shape: readonly number[], block: number): { start: number[]; count: number[] } {
  const start: number[] = [];
  const count: number[] = [];
  let room = sampleValues / sampleBlocks;
  for (let axis = 0; axis < shape.length; axis++) {
    const inner = shape.slice(axis + 1).reduce((product, length) => product * length, 1);
    const take = Math.max(1, Math.min(shape[axis], Math.floor(room / inner)));
    start.push(Math.floor(((shape[axis] - take) * block) / (sampleBlocks - 1)));
    count.push(take);
    room /= take;
  }
  return { start, count };
}

function looked(blocks: readonly CountsArray[]): Omit<ValueSample, 'isAll'> {
  let finite = 0;
  let total = 0;
  let min = Number.POSITIVE_INFINITY;
  let max = Number.NEGATIVE_INFINITY;
  let isWhole = true;
  for (const values of blocks) {
    total += values.length;
    for (let i = 0; i < values.length; i++) {
      const value = values[i];
      if (!Number.isFinite(value)) continue;
      finite++;
      if (value < min) min = value;
      if (value > max) max = value;
      if (isWhole && !Number.isInteger(value)) isWhole = false;
    }
  }
  return { looked: total, finite, min, max, isWhole };
}
