/** Reads a run's results back with our own readers. */
import { readFile } from 'node:fs/promises';
import { join } from 'node:path';
import { pathSource } from '../../../src/io/node-source';
import { openContainer } from '../../../src/io/open-scan';
import type { CountsArray } from '../../../src/science/scan';

export interface ReadArray {
  readonly shape: readonly number[];
  readonly values: CountsArray;
}

/** @param array - HDF5 path; "" for a .npy file */
export async function readArray(path: string, array = ''): Promise<ReadArray> {
  const container = await openContainer(await pathSource(path));
  try {
    const entry = container.entries.find((one) => one.path === array);
    if (entry === undefined) throw new Error(`${path} has no ${array}`);
    const start = entry.shape.map(() => 0);
    return { shape: entry.shape, values: await container.read(array, start, entry.shape) };
  } finally {
    container.close();
  }
}

export function readMap(folder: string, name: string): Promise<ReadArray> {
  return readArray(join(folder, 'maps', `${name}.npy`));
}

export interface Table {
  readonly names: readonly string[];
  /** one row a pixel; an empty field is NaN */
  readonly rows: readonly (readonly number[])[];
}

export async function readTable(path: string): Promise<Table> {
  const [head = '', ...lines] = (await readFile(path, 'utf8')).trimEnd().split('\n');
  const numberOf = (field: string): number => (field === '' ? Number.NaN : Number(field));
  return {
    names: head.split(','),
    rows: lines.map((line) => line.split(',').map(numberOf)),
  };
}
