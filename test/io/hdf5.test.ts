import { describe, expect, it } from 'vitest';
import type { GroupEntry } from '../../src/io/container';
import { hdf5Reader } from '../../src/io/hdf5';
import { writeHdf5 } from '../../src/io/write/hdf5';
import { lookup3 } from '../../src/io/write/lookup3';
import {
  checkBlob,
  checkBlocks,
  checkRenamed,
  checkTruncated,
  outcomeOf,
  type ReaderCase,
  readWhole,
  refusalOf,
} from './check-reader';
import { type ExpectedArray, expectedOf, fixtureBytes, numbersOf, openFixture } from './fixtures';
import { spySource } from './spy-source';

interface ExpectedHdf5 {
  readonly entries: Readonly<Record<string, ExpectedArray>>;
  readonly facts: Readonly<Record<string, string | number>>;
  readonly groups: Readonly<Record<string, GroupEntry['attributes']>>;
  readonly notes: number;
}

const expected = expectedOf<ExpectedHdf5>('h5');

const caseOf = (name: string, bytes: Uint8Array): ReaderCase => ({
  name,
  bytes,
  reader: hdf5Reader,
});

describe('HDF5 files written by h5py', () => {
  it.each(Object.keys(expected))('%s reads as h5py reads it', async (name) => {
    const container = await openFixture(hdf5Reader, `h5/${name}.h5`);
    const { entries, facts, groups, notes } = expected[name];
    expect(container.entries.map(({ path }) => path).sort()).toEqual(Object.keys(entries).sort());
    for (const entry of container.entries) {
      const { shape, type, values, attributes } = entries[entry.path];
      expect(entry).toMatchObject({ shape, type });
      if (attributes !== undefined) expect(entry.attributes).toEqual(attributes);
      expect(Array.from(await readWhole(container, entry))).toEqual(numbersOf(values));
    }
    expect(container.facts).toEqual(facts);
    for (const [path, attributes] of Object.entries(groups)) {
      expect(container.groups.find((group) => group.path === path)?.attributes).toEqual(attributes);
    }
    expect(container.notes).toHaveLength(notes);
    container.close();
  });

  it('keep counts in their own type', async () => {
    const container = await openFixture(hdf5Reader, 'h5/types.h5');
    const typeOf = async (path: string) =>
      (await container.read(path, [0, 0, 0], [1, 1, 2])).constructor;
    expect(await typeOf('/u2-be')).toBe(Uint16Array);
    expect(await typeOf('/f2-le')).toBe(Float32Array);
    expect(await typeOf('/b1-le')).toBe(Uint8Array);
    container.close();
  });

  it('say what links were not followed', async () => {
    const { notes } = await openFixture(hdf5Reader, 'h5/links.h5');
    expect(notes).toEqual([
      '/scan/again is the same group as /scan and is listed there.',
      '/elsewhere, /itself lead to other files and were not followed.',
      '/nowhere, /circle, /through lead nowhere.',
    ]);
  });
});

describe('datasets that cannot be read', () => {
  it('because of a filter we have not got say which, and how to write them again', async () => {
    const error = await refusalOf(caseOf('lzf.h5', fixtureBytes('h5/lzf.h5')));
    expect(error.message).toBe(
      'the dataset is compressed by lzf, which cannot be read here (lzf.h5: /counts). Write it again with gzip, for example: h5repack -f GZIP=4 lzf.h5 copy.h5',
    );
  });

  it('because their values are kept in another file', async () => {
    const error = await refusalOf(caseOf('outside.h5', fixtureBytes('h5/outside.h5')));
    expect(error.what).toMatch(/^the data could not be read: .*external raw data file/);
    const { notes } = await openFixture(hdf5Reader, 'h5/elsewhere.h5');
    expect(notes).toEqual(['/virtual is put together from other files and was left out.']);
  });

  it('because there are none', async () => {
    const bytes = await writeHdf5({
      kind: 'group',
      children: { title: { kind: 'dataset', data: 'nothing else' } },
    });
    const error = await refusalOf(caseOf('a.h5', bytes));
    expect(error.what).toBe('the file holds no array of numbers');
  });

  it('because the file is not HDF5', async () => {
    const error = await refusalOf(caseOf('a.h5', new Uint8Array(5000)));
    expect(error.what).toMatch(/^the HDF5 file could not be opened: .*signature not found/);
  });

  it('because the file was cut off', async () => {
    const bytes = fixtureBytes('h5/types.h5');
    const error = await refusalOf(caseOf('a.h5', bytes.slice(0, bytes.length - 100)));
    expect(error.what).toMatch(/truncated file/);
  });
});

describe('reading by blocks', () => {
  const shape = [64, 40, 100];
  const values = Uint16Array.from({ length: 256_000 }, (_, i) => (i * 2654435761) >>> 16);

  it.each([
    ['contiguous', {}],
    ['chunked', { chunks: [1, 40, 100] }],
    ['packed', { chunks: [1, 40, 100], gzip: 4, shuffle: true }],
  ])('of a %s dataset takes little more of the file than it needs', async (_, storage) => {
    const bytes = await writeHdf5({
      kind: 'group',
      children: { counts: { kind: 'dataset', data: values, shape, ...storage } },
    });
    const source = spySource('a.h5', bytes);
    const container = await hdf5Reader.open(source);
    const rows = await container.read('/counts', [10, 0, 0], [2, 40, 100]);
    expect(rows).toEqual(values.subarray(10 * 4000, 12 * 4000));
    // Structure is read in pages of 64 kB.
    expect(source.seen.bytes).toBeLessThan(5 * 65_536);
    expect(source.seen.bytes).toBeLessThan(0.75 * bytes.length);
    container.close();
    expect(source.seen.closed).toBe(1);
  });

  it('stops when asked, and says how far it is', async () => {
    const bytes = await writeHdf5({
      kind: 'group',
      children: { counts: { kind: 'dataset', data: values, shape } },
    });
    const container = await hdf5Reader.open(spySource('a.h5', bytes));
    const shares: number[] = [];
    await container.read('/counts', [0, 0, 0], shape, {
      onProgress: (share) => shares.push(share),
    });
    expect(shares.at(-1)).toBe(1);
    const { error } = await outcomeOf(() =>
      container.read('/counts', [0, 0, 0], shape, { signal: AbortSignal.abort() }),
    );
    expect(error).toMatchObject({ kind: 'cancelled' });
    container.close();
  });
});

describe('a file so damaged that the library breaks down', () => {
  /** A data type whose parts lie outside it: HDF5 2.0 converts beyond its buffer. */
  const breaking = () => {
    const bytes = fixtureBytes('h5/types.h5');
    bytes[10_873] ^= 1;
    return bytes;
  };

  it('is refused for what it is', async () => {
    const container = await hdf5Reader.open(spySource('a.h5', breaking()));
    const entry = container.entries.find(({ path }) => path === '/f8-be')!;
    const { error } = await outcomeOf(() => readWhole(container, entry));
    expect(error).toMatchObject({
      kind: 'scan',
      what: 'the data could not be read: it is damaged in a way that stopped the HDF5 library',
    });
    container.close();
  });

  it('leaves files that are open, and files opened later, as they were', async () => {
    const before = await openFixture(hdf5Reader, 'h5/nexus.h5');
    const bad = await hdf5Reader.open(spySource('a.h5', breaking()));
    const entry = bad.entries.find(({ path }) => path === '/f8-be')!;
    await outcomeOf(() => readWhole(bad, entry));
    const after = await openFixture(hdf5Reader, 'h5/nexus.h5');
    const counts = numbersOf(expected.nexus.entries['/entry/data/counts'].values);
    for (const container of [before, after]) {
      const values = await container.read('/entry/data/counts', [0, 0, 0], [3, 4, 5]);
      expect(Array.from(values)).toEqual(counts);
      container.close();
    }
    bad.close();
  });
});

describe('a heap of texts that would send the library round in circles', () => {
  it('is not handed to it', async () => {
    const bytes = fixtureBytes('h5/others.h5');
    const heap = bytes.findIndex((_, at) =>
      [0x47, 0x43, 0x4f, 0x4c].every((byte, i) => bytes[at + i] === byte),
    );
    // Its length grows by 206: what follows its free space is an object of no length.
    bytes[heap + 8] = 206;
    const container = await hdf5Reader.open(spySource('a.h5', bytes));
    const counts = container.entries.find(({ path }) => path === '/counts')!;
    expect(counts.attributes).toEqual({});
    container.close();
  });
});

describe('sizes no file can have', () => {
  it('are left out, with a note', async () => {
    const bytes = await writeHdf5({
      kind: 'group',
      children: {
        large: { kind: 'dataset', data: new Uint8Array(16), shape: [4, 4], chunks: [2, 2] },
        small: { kind: 'dataset', data: new Uint8Array(3) },
      },
    });
    // The one dataspace of 4 × 4, made 2^40 × 4; object headers carry a checksum, so it is renewed.
    const container = await hdf5Reader.open(spySource('a.h5', withLargeSpace(bytes)));
    expect(container.entries.map(({ path }) => path)).toEqual(['/small']);
    expect(container.notes).toEqual([
      expect.stringMatching(/^\/large was left out: it claims 1099511627776 × 4 values/),
    ]);
    container.close();
  });
});

function withLargeSpace(file: Uint8Array): Uint8Array {
  const bytes = file.slice();
  const view = new DataView(bytes.buffer);
  for (let at = 0; at + 4 < bytes.length; at++) {
    if (view.getUint32(at, true) !== 0x5244484f) continue;
    const end = at + 10 + view.getUint32(at + 6, true);
    for (let message = at + 10; message + 8 < end; message++) {
      if (
        view.getBigUint64(message, true) !== 4n ||
        view.getUint32(message - 4, true) !== 0x01000202
      )
        continue;
      view.setBigUint64(message, 2n ** 40n, true);
      view.setUint32(end, lookup3(bytes.subarray(at, end)), true);
      return bytes;
    }
  }
  throw new Error('no dataspace of 4 × 4 found');
}

describe('like every reader', () => {
  const files = ['types', 'storage', 'storage-rare', 'newest', 'nexus', 'links', 'others'].map(
    (name) => caseOf(`${name}.h5`, fixtureBytes(`h5/${name}.h5`)),
  );

  it.each(files)(
    '$name is known by its bytes, read in blocks, from a Blob, and cut off',
    async (file) => {
      await checkRenamed(file);
      await checkBlob(file);
      await checkBlocks(file, 6);
      await checkTruncated(file, 15);
    },
  );
});
