import { describe, expect, it } from 'vitest';
import { npyReader } from '../../src/io/npy';
import { encodeNpy } from '../../src/io/write/npy';
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

const expected = expectedOf<ExpectedArray>('npy');

const caseOf = (name: string, bytes: Uint8Array): ReaderCase => ({
  name,
  bytes,
  reader: npyReader,
});

describe('npy files written by NumPy', () => {
  it.each(Object.keys(expected))('%s reads as NumPy reads it', async (name) => {
    const container = await openFixture(npyReader, `npy/${name}.npy`);
    const [entry] = container.entries;
    const { shape, type, values } = expected[name];
    expect(entry).toEqual({ path: '', shape, type, attributes: {} });
    expect(Array.from(await readWhole(container, entry))).toEqual(numbersOf(values));
    expect(container.notes).toEqual([]);
  });

  it('come in every numeric type, byte order and memory order', () => {
    expect(Object.keys(expected).filter((name) => /-(le|be)-[cf]$/.test(name))).toHaveLength(
      3 * 2 + 9 * 4,
    );
  });

  it('keep small integers in their own type, and 64-bit ones in the smallest that holds them', async () => {
    const typeOf = async (name: string) => {
      const container = await openFixture(npyReader, `npy/${name}.npy`);
      return (await readWhole(container, container.entries[0])).constructor;
    };
    expect(await typeOf('u2-be-f')).toBe(Uint16Array);
    expect(await typeOf('i1-le-c')).toBe(Int8Array);
    expect(await typeOf('b1-le-c')).toBe(Uint8Array);
    expect(await typeOf('f2-be-c')).toBe(Float32Array);
    expect(await typeOf('i8-small')).toBe(Int16Array);
    expect(await typeOf('u8-huge')).toBe(Float64Array);
  });
});

describe('what is no array of plain numbers', () => {
  it.each([
    ['pickled', /pickled Python objects/, /numpy\.save/],
    ['complex', /complex numbers/, /real parts/],
    ['records', /records of several fields/, /one field/],
    ['texts', /texts/, /numbers alone/],
    ['bytes', /texts/, /numbers alone/],
    ['dates', /dates/, /numbers alone/],
    ['long-double', /extended floating-point/, /float64/],
  ])('%s is refused, saying what to do', async (name, what, hint) => {
    const bytes = fixtureBytes(`npy-refused/${name}.npy`);
    const error = await refusalOf(caseOf(`${name}.npy`, bytes));
    expect(error.what).toMatch(what);
    expect(error.hint).toMatch(hint);
    expect(error.where).toBe(`${name}.npy`);
  });
});

describe('damaged npy files', () => {
  const header = (text: string, dataBytes = 0): Uint8Array => {
    const bytes = new Uint8Array(10 + text.length + dataBytes);
    bytes.set([0x93, 0x4e, 0x55, 0x4d, 0x50, 0x59, 1, 0, text.length & 0xff, text.length >> 8]);
    bytes.set(new TextEncoder().encode(text), 10);
    return bytes;
  };
  const refused = async (text: string) => (await refusalOf(caseOf('a.npy', header(text, 8)))).what;

  it('say how much is promised and how much is there', async () => {
    const error = await refusalOf(caseOf('cut.npy', fixtureBytes('npy/u2-le-c.npy').slice(0, -1)));
    expect(error.what).toBe(
      'the header promises 2 × 3 × 4 values of uint16, 176 bytes in all, but the file ends at byte 175',
    );
  });

  it('with an absurd shape are refused before anything is read', async () => {
    const shapes = ['(9007199254740992, 2)', '(99999999999999999999,)', '(-1,)', '(1.5,)'];
    for (const shape of shapes) {
      const text = `{'descr': '<f8', 'fortran_order': False, 'shape': ${shape}, }`;
      expect(await refused(text)).toMatch(/absurd|long|damaged/);
    }
    const large = `{'descr': '<f8', 'fortran_order': False, 'shape': (4294967296, 1024), }`;
    expect(await refused(large)).toMatch(/promises 4294967296 × 1024 values/);
  });

  it.each([
    '',
    '{',
    "{'descr': '<f8'}",
    "{'descr': '<f8', 'fortran_order': False, 'shape': (1,)} + [1]",
    "{'descr': __import__('os'), 'fortran_order': False, 'shape': (1,)}",
    `${'('.repeat(5000)}${')'.repeat(5000)}`,
    "{'descr': '<f8', 'fortran_order': 0, 'shape': (1,)}",
    "{'descr': '<q9', 'fortran_order': False, 'shape': (1,)}",
    "{'descr': '<f8', 'fortran_order': False, 'shape': ('1',)}",
  ])('with the header %j are refused', async (text) => {
    expect(await refused(text)).toBe('its .npy header is damaged');
  });

  it('of an unknown version are refused', async () => {
    const bytes = fixtureBytes('npy/u2-le-c.npy');
    bytes[6] = 4;
    expect((await refusalOf(caseOf('a.npy', bytes))).what).toMatch(/version 4\.0/);
  });

  it('with bytes after the array say so', async () => {
    const bytes = new Uint8Array(300);
    bytes.set(fixtureBytes('npy/u2-le-c.npy'));
    const container = await npyReader.open(spySource('a.npy', bytes));
    expect(container.notes).toEqual(['124 bytes after the array were not read.']);
  });
});

describe('reading by blocks', () => {
  const shape = [40, 50, 60];
  const values = Uint16Array.from({ length: 40 * 50 * 60 }, (_, i) => i % 65_521);

  it('takes the bytes of the rows asked for, not the file', async () => {
    const source = spySource('a.npy', encodeNpy(values, shape));
    const container = await npyReader.open(source);
    const before = source.seen.bytes;
    const rows = await container.read('', [10, 0, 0], [2, 50, 60]);
    expect(source.seen.bytes - before).toBe(2 * 50 * 60 * 2);
    expect(rows).toEqual(values.subarray(10 * 3000, 12 * 3000));
    container.close();
    expect(source.seen.closed).toBe(1);
  });

  it('of a Fortran array goes through the file once for all its rows', async () => {
    const bytes = encodeNpy(values, shape, { fortran: true });
    const source = spySource('a.npy', bytes);
    const container = await npyReader.open(source);
    for (let y = 0; y < 40; y += 4) {
      const rows = await container.read('', [y, 0, 0], [4, 50, 60]);
      expect(rows).toEqual(values.subarray(y * 3000, (y + 4) * 3000));
    }
    expect(source.seen.bytes).toBeLessThan(1.1 * bytes.length);
  });

  it('stops when asked, and says how far it is', async () => {
    const container = await npyReader.open(spySource('a.npy', encodeNpy(values, shape)));
    const shares: number[] = [];
    await container.read('', [0, 0, 0], shape, { onProgress: (share) => shares.push(share) });
    expect(shares.at(-1)).toBe(1);
    const { error } = await outcomeOf(() =>
      container.read('', [0, 0, 0], shape, { signal: AbortSignal.abort() }),
    );
    expect(error).toMatchObject({ kind: 'cancelled' });
  });

  it('closes the source of a file it refuses', async () => {
    const source = spySource('a.npy', new Uint8Array(100));
    await outcomeOf(() => npyReader.open(source));
    expect(source.seen.closed).toBe(1);
  });
});

describe('like every reader', () => {
  const files = ['u2-le-c', 'f8-be-f', 'four-axes-f', 'scalar', 'empty'].map((name) =>
    caseOf(`${name}.npy`, fixtureBytes(`npy/${name}.npy`)),
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
