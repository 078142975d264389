import { describe, expect, it, vi } from 'vitest';
import { isRimlightError } from '../../src/errors';
import { memorySource } from '../../src/io/byte-source';
import { openContainer, openExtensions } from '../../src/io/open-scan';
import { cubeIn, hdf5Bytes, npyBytes, npzBytes, tiffBytes } from './variant-files';

const loaded = vi.hoisted(() => [] as string[]);
vi.mock('../../src/io/hdf5', async (original) => {
  loaded.push('HDF5');
  return await original();
});
vi.mock('../../src/io/tiff', async (original) => {
  loaded.push('TIFF');
  return await original();
});

const { shape, values } = cubeIn({ order: 'yxk' });

async function refusal(name: string, bytes: Uint8Array): Promise<string> {
  let isClosed = false;
  const source = { ...memorySource(name, bytes), close: () => (isClosed = true) };
  try {
    await openContainer(source);
  } catch (error) {
    if (!isRimlightError(error)) throw error;
    expect(error.kind).toBe('scan');
    expect(error.where).toContain(name);
    expect(isClosed).toBe(true);
    return `${error.what}. ${error.hint}`;
  }
  return 'opened';
}

describe('openContainer', () => {
  it('goes by the first bytes, whatever the file is called, and loads only that reader', async () => {
    const npy = npyBytes(values, shape);
    for (const name of ['scan.npy', 'scan', 'scan.h5', 'scan.csv']) {
      expect((await openContainer(memorySource(name, npy))).format).toBe('npy');
    }
    expect((await openContainer(memorySource('scan.tif', npzBytes({ counts: npy })))).format).toBe(
      'npz',
    );
    expect(loaded).toEqual([]);
    const pages = [new Uint16Array(12), new Uint16Array(12)];
    for (const isLittle of [true, false]) {
      expect(
        (await openContainer(memorySource('scan', tiffBytes(pages, { isLittle })))).format,
      ).toBe('TIFF');
    }
    expect(loaded).toEqual(['TIFF']);
    const h5 = await hdf5Bytes({ counts: { kind: 'dataset', data: Uint16Array.of(1, 2, 3) } });
    expect((await openContainer(memorySource('scan.npy', h5))).format).toBe('HDF5');
    expect(loaded).toEqual(['TIFF', 'HDF5']);
  });

  it('finds HDF5 behind a user block', async () => {
    const h5 = await hdf5Bytes({ counts: { kind: 'dataset', data: Uint16Array.of(1, 2, 3) } });
    const withBlock = new Uint8Array(512 + h5.length);
    withBlock.set(h5, 512);
    expect((await openContainer(memorySource('scan.h5', withBlock))).entries[0].path).toBe(
      '/counts',
    );
  });

  it('says what can be opened when a file is none of it', async () => {
    const png = Uint8Array.of(0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a, 0, 0, 0, 13);
    expect(await refusal('photo.png', png)).toBe(
      'the file is of no format that can be opened. Open an HDF5 (.h5, .nxs), NumPy (.npy, .npz), TIFF (.tif), delimited text (.csv, .tsv, .txt, .dat) or JCAMP-DX (.jdx, .dx) file.',
    );
    expect(await refusal('scan.h5', png)).toMatch(/^the file is called \.h5 but is not HDF5\./);
    expect(await refusal('scan.npy', new Uint8Array(0))).toMatch(/^the file is empty\./);
  });

  it('lists endings for the file picker', () => {
    expect(openExtensions).toContain('.h5');
    expect(new Set(openExtensions).size).toBe(openExtensions.length);
  });
});
