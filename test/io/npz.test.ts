import { zipSync } from 'fflate';
import { describe, expect, it } from 'vitest';
import { npzReader } from '../../src/io/npz';
import { encodeNpy } from '../../src/io/write/npy';
import { encodeNpz } from '../../src/io/write/npz';
import {
  checkBlob,
  checkBlocks,
  checkRenamed,
  checkTruncated,
  type ReaderCase,
  readWhole,
  refusalOf,
} from './check-reader';
import { type ExpectedArray, expectedOf, fixtureBytes, numbersOf, openFixture } from './fixtures';
import { spySource } from './spy-source';

interface ExpectedNpz {
  readonly entries: Readonly<Record<string, ExpectedArray>>;
  readonly facts: Readonly<Record<string, number>>;
  readonly notes?: number;
}

const expected = expectedOf<ExpectedNpz>('npz');

const caseOf = (name: string, bytes: Uint8Array): ReaderCase => ({
  name,
  bytes,
  reader: npzReader,
});

describe('npz archives written by NumPy', () => {
  it.each(Object.keys(expected))('%s reads as NumPy reads it', async (name) => {
    const container = await openFixture(npzReader, `npz/${name}.npz`);
    const { entries, facts, notes = 0 } = expected[name];
    expect(container.entries.map(({ path }) => path).sort()).toEqual(Object.keys(entries).sort());
    for (const entry of container.entries) {
      const { shape, type, values } = entries[entry.path];
      expect(entry).toMatchObject({ shape, type });
      expect(Array.from(await readWhole(container, entry))).toEqual(numbersOf(values));
    }
    expect(container.facts).toEqual(facts);
    expect(container.notes).toHaveLength(notes);
  });

  it('name what was left out, and why', async () => {
    const { notes } = await openFixture(npzReader, 'npz/mixed.npz');
    expect(notes).toEqual([
      'Member "settings.npy" was left out: its elements are pickled Python objects, which are never loaded because they could run a program.',
      'Member "readme.txt" is no array and was left out.',
    ]);
  });
});

const counts = encodeNpy(Uint16Array.of(1, 2, 3, 4, 5, 6), [2, 3]);

describe('archives that cannot be read', () => {
  const where = (archive: Uint8Array, signature: number, from = 0): number => {
    const view = new DataView(archive.buffer, archive.byteOffset, archive.byteLength);
    for (let at = from; at + 4 <= archive.length; at++) {
      if (view.getUint32(at, true) === signature) return at;
    }
    throw new Error('no such record');
  };
  const central = 0x02014b50;
  const local = 0x04034b50;
  const patched = (change: (view: DataView, central: number, local: number) => void) => {
    const archive = encodeNpz({ counts });
    const view = new DataView(archive.buffer, archive.byteOffset, archive.byteLength);
    change(view, where(archive, central), where(archive, local));
    return caseOf('a.npz', archive);
  };

  it('because a member is encrypted', async () => {
    const error = await refusalOf(
      patched((view, at) => view.setUint16(at + 8, view.getUint16(at + 8, true) | 1, true)),
    );
    expect(error.message).toBe(
      'the member is encrypted (a.npz: counts.npy). Unpack the archive with its password first.',
    );
  });

  it('because a member is packed in another way', async () => {
    const error = await refusalOf(patched((view, at) => view.setUint16(at + 10, 14, true)));
    expect(error.what).toMatch(/packed by method 14/);
  });

  it('because a small member claims to unpack to more than deflate can make', async () => {
    const error = await refusalOf(patched((view, at) => view.setUint32(at + 24, 2 ** 30, true)));
    expect(error.what).toMatch(/bytes claim to unpack to 1073741824, which no measured scan does/);
  });

  it('because two members have one name', async () => {
    const archive = zipSync({ 'a.npy': counts, 'b.npy': counts });
    const view = new DataView(archive.buffer, archive.byteOffset, archive.byteLength);
    const second = where(archive, central, where(archive, central) + 4);
    view.setUint8(second + 46, 'a'.charCodeAt(0));
    const error = await refusalOf(caseOf('a.npz', archive));
    expect(error.what).toBe('two members are called "a.npy"');
  });

  it('because the checksum disagrees', async () => {
    const error = await refusalOf(
      patched((view, at) => view.setUint32(at + 16, view.getUint32(at + 16, true) ^ 1, true)),
    );
    expect(error.what).toBe('its checksum does not agree with its data');
  });

  it('because it was cut off', async () => {
    const error = await refusalOf(caseOf('a.npz', encodeNpz({ counts }).slice(0, -10)));
    expect(error.what).toMatch(/directory is missing/);
  });

  it('because it holds no array', async () => {
    const error = await refusalOf(caseOf('a.npz', zipSync({ 'a.txt': counts })));
    expect(error.what).toBe('the archive holds no array');
    const empty = await refusalOf(caseOf('a.npz', zipSync({})));
    expect(empty.what).toBe('the archive holds no array');
  });

  it('because its only array is none of plain numbers', async () => {
    const pickled = fixtureBytes('npy-refused/pickled.npy');
    const error = await refusalOf(caseOf('a.npz', zipSync({ 'a.npy': pickled })));
    expect(error.what).toMatch(/pickled/);
    expect(error.where).toBe('a.npz: a.npy');
  });
});

describe('a bomb', () => {
  it('of honest sizes is unpacked only as far as it is asked for', async () => {
    // 64 MB of zeros in 64 kB.
    const zeros = encodeNpy(new Uint8Array(64 << 20), [64, 1024, 1024]);
    const source = spySource('zeros.npz', encodeNpz({ zeros }));
    const container = await npzReader.open(source);
    const before = source.seen.bytes;
    await container.read('zeros', [0, 0, 0], [1, 1024, 1024]);
    expect(source.seen.bytes - before).toBeLessThan(source.size / 3);
  });

  it('that unpacks to more than it claims is stopped', async () => {
    const archive = encodeNpz({ a: encodeNpy(new Uint8Array(1 << 20), [1 << 20]) });
    const view = new DataView(archive.buffer, archive.byteOffset, archive.byteLength);
    const directory = archive.length - 22 - 46 - 'a.npy'.length;
    expect(view.getUint32(directory, true)).toBe(0x02014b50);
    view.setUint32(directory + 24, 2000, true);
    const error = await refusalOf(caseOf('a.npz', archive));
    expect(error.what).toBe('it unpacks to more than it claims');
  });
});

describe('reading a packed member by blocks', () => {
  const shape = [60, 40, 50];
  const values = Uint16Array.from({ length: 120_000 }, (_, i) => (i * 2654435761) >>> 16);
  const archive = encodeNpz({ counts: encodeNpy(values, shape), other: counts });

  it('unpacks it once from its beginning to its end', async () => {
    const source = spySource('a.npz', archive);
    const container = await npzReader.open(source);
    const before = source.seen.bytes;
    for (let y = 0; y < 60; y += 5) {
      const rows = await container.read('counts', [y, 0, 0], [5, 40, 50]);
      expect(rows).toEqual(values.subarray(y * 2000, (y + 5) * 2000));
    }
    expect(source.seen.bytes - before).toBeLessThan(1.05 * archive.length);
  });

  it('in any order, and several at once, gives the same', async () => {
    const container = await npzReader.open(spySource('a.npz', archive));
    const rowsFrom = [50, 3, 20, 3, 59, 0, 31];
    const blocks = await Promise.all(
      rowsFrom.map((y) => container.read('counts', [y, 0, 0], [1, 40, 50])),
    );
    blocks.forEach((block, i) => {
      expect(block).toEqual(values.subarray(rowsFrom[i] * 2000, (rowsFrom[i] + 1) * 2000));
    });
  });
});

describe('like every reader', () => {
  const files = Object.keys(expected).map((name) =>
    caseOf(`${name}.npz`, fixtureBytes(`npz/${name}.npz`)),
  );

  it.each(files)(
    '$name is known by its bytes, read in blocks, from a Blob, and cut off',
    async (file) => {
      await checkRenamed(file);
      await checkBlob(file);
      await checkBlocks(file);
      await checkTruncated(file);
    },
  );
});
