/** Checks that hold for the reader of every format, made on one valid file of it. */
import { expect } from 'vitest';
import { isRimlightError, type RimlightError } from '../../src/errors';
import { blobSource, memorySource } from '../../src/io/byte-source';
import type { ArrayEntry, Container, Reader } from '../../src/io/container';
import type { CountsArray } from '../../src/science/scan';

export interface ReaderCase {
  /** file name with ending */
  readonly name: string;
  readonly bytes: Uint8Array;
  readonly reader: Reader;
}

/** All that a container holds. */
export async function contentsOf(container: Container) {
  const arrays: Record<string, readonly number[]> = {};
  for (const entry of container.entries) {
    arrays[entry.path] = Array.from(await readWhole(container, entry));
  }
  const { format, entries, groups, facts } = container;
  return { format, entries, groups, facts, arrays };
}

/** The whole of an array. */
export function readWhole(container: Container, entry: ArrayEntry): Promise<CountsArray> {
  return container.read(
    entry.path,
    entry.shape.map(() => 0),
    entry.shape,
  );
}

export async function contentsOfCase({ name, bytes, reader }: ReaderCase) {
  const container = await reader.open(memorySource(name, bytes));
  try {
    return await contentsOf(container);
  } finally {
    container.close();
  }
}

/** The name is a hint only: without its ending the same is read. */
export async function checkRenamed(file: ReaderCase): Promise<void> {
  expect(file.reader.sniff(file.bytes.subarray(0, 4096), 'renamed')).toBe(true);
  const renamed = await contentsOfCase({ ...file, name: 'renamed' });
  expect(renamed).toEqual(await contentsOfCase(file));
}

/** A Blob, as a browser gives it, reads as bytes in memory do. */
export async function checkBlob(file: ReaderCase): Promise<void> {
  const blob = new Blob([file.bytes.slice()]);
  const container = await file.reader.open(blobSource(file.name, blob));
  expect(await contentsOf(container)).toEqual(await contentsOfCase(file));
  container.close();
}

/** A file cut off anywhere is refused, or reads as far as it goes; never another error, never other numbers. */
export async function checkTruncated(file: ReaderCase, cuts = 40): Promise<void> {
  const whole = await contentsOfCase(file);
  for (let i = 0; i < cuts; i++) {
    const bytes = file.bytes.slice(0, Math.floor((file.bytes.length * i) / cuts));
    const outcome = await outcomeOf(() => contentsOfCase({ ...file, bytes }));
    if (outcome.value === null) expectScanError(outcome.error);
    else expect(outcome.value.arrays).toEqual(whole.arrays);
  }
}

/** Any block is the same part of the whole. */
export async function checkBlocks(file: ReaderCase, blocksPerArray = 12): Promise<void> {
  const container = await file.reader.open(memorySource(file.name, file.bytes));
  let state = 1;
  // A plain congruential sequence: the same blocks in every run.
  const below = (limit: number): number => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return Math.floor((state / 2 ** 32) * limit);
  };
  for (const entry of container.entries) {
    const whole = await readWhole(container, entry);
    for (let i = 0; i < blocksPerArray; i++) {
      const start = entry.shape.map((length) => below(length));
      const count = entry.shape.map((length, axis) => 1 + below(length - start[axis]));
      if (whole.length === 0) count.fill(0);
      const block = await container.read(entry.path, start, count);
      expect(Array.from(block)).toEqual(partOf(whole, entry.shape, start, count));
    }
  }
  container.close();
}

function partOf(
  whole: CountsArray,
  shape: readonly number[],
  start: readonly number[],
  count: readonly number[],
): number[] {
  const size = count.reduce((product, length) => product * length, 1);
  return Array.from({ length: size }, (_, i) => {
    let rest = i;
    let offset = 0;
    let stride = 1;
    for (let axis = shape.length - 1; axis >= 0; axis--) {
      offset += (start[axis] + (rest % count[axis])) * stride;
      rest = Math.floor(rest / count[axis]);
      stride *= shape[axis];
    }
    return whole[offset];
  });
}

export type Outcome<T> =
  | { readonly value: T; readonly error: null }
  | { readonly value: null; readonly error: unknown };

export async function outcomeOf<T>(run: () => Promise<T>): Promise<Outcome<T>> {
  try {
    return { value: await run(), error: null };
  } catch (error) {
    return { value: null, error };
  }
}

/** An error a user can meet about a file: what, where, what to do, on one line. */
export function expectScanError(error: unknown): asserts error is RimlightError {
  if (!isRimlightError(error)) throw error;
  expect(error.kind).toBe('scan');
  expect(error.what.length).toBeGreaterThan(5);
  expect(error.where).not.toBe('');
  expect(error.hint).toMatch(/\S.*[.\w]$/);
  expect(error.message).not.toContain('\n');
}

/** Opens and reads everything, expecting it to be refused; gives the error. */
export async function refusalOf(file: ReaderCase): Promise<RimlightError> {
  const { error } = await outcomeOf(() => contentsOfCase(file));
  if (error === null) throw new Error(`${file.name} was read, and should have been refused`);
  expectScanError(error);
  return error;
}
