/** Valid files of every format, to be damaged by mutations.property.test.ts. A new reader adds its files here. */
import { hdf5Reader } from '../../src/io/hdf5';
import { npyReader } from '../../src/io/npy';
import { npzReader } from '../../src/io/npz';
import { tiffReader } from '../../src/io/tiff';
import type { ReaderCase } from './check-reader';
import { fixtureBytes } from './fixtures';
import { textSamples } from './text-samples';

const from = (reader: ReaderCase['reader'], ...paths: readonly string[]): readonly ReaderCase[] =>
  paths.map((name) => ({ name, bytes: fixtureBytes(name), reader }));

export const mutationCases: readonly ReaderCase[] = [
  ...from(npyReader, 'npy/u2-le-c.npy', 'npy/f8-be-f.npy', 'npy/version-3.npy', 'npy/u8-huge.npy'),
  ...from(npzReader, 'npz/stored.npz', 'npz/deflated.npz', 'npz/zip64.npz'),
  ...from(
    hdf5Reader,
    'h5/types.h5',
    'h5/storage.h5',
    'h5/storage-rare.h5',
    'h5/newest.h5',
    'h5/nexus.h5',
    'h5/links.h5',
    'h5/others.h5',
    'h5/elsewhere.h5',
  ),
  ...from(
    tiffReader,
    'tiff/u2-le.tif',
    'tiff/big-be.tif',
    'tiff/deflate-f4-be.tif',
    'tiff/bytewise-f8-le.tif',
    'tiff/differences-u4-le.tif',
    'tiff/samples-apart.tif',
    'tiff/tiled.tif',
    'tiff/pillow-lzw-16.tif',
    'tiff/pillow-packbits-8.tif',
    'tiff/described.tif',
  ),
  ...textSamples,
];
