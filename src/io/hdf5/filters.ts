/** Which compressed datasets can be read, and what to say of the others. */
import { scanError } from '../scan-error';
import type { Hdf5File } from './file';

/** Deflate, shuffle, Fletcher-32, n-bit, scale-offset: part of the library. */
const readable: readonly number[] = [1, 2, 3, 5, 6];

/** @see The HDF Group, Registered Filter Plugins */
const names: Readonly<Record<number, string>> = {
  4: 'szip',
  307: 'bzip2',
  32000: 'lzf',
  32001: 'blosc',
  32004: 'lz4',
  32008: 'bitshuffle',
  32013: 'zfp',
  32015: 'zstd',
  32017: 'sz',
  32026: 'blosc2',
};

/** @throws RimlightError 'scan' - when the dataset went through a filter we have not got */
export function assertFilters(file: Hdf5File, path: string): void {
  const other = file.filtersOf(path).find(({ id }) => !readable.includes(id));
  if (other === undefined) return;
  const name = names[other.id] ?? `filter number ${other.id}`;
  throw scanError(
    `the dataset is compressed by ${name}, which cannot be read here`,
    `${file.name}: ${path}`,
    `Write it again with gzip, for example: h5repack -f GZIP=4 ${file.name} copy.h5`,
  );
}
