import { describe, expect, it } from 'vitest';
import { tiffReader } from '../../src/io/tiff';
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
import {
  type ExpectedArray,
  expectedOf,
  fixtureBytes,
  numbersOf,
  openFixture,
  type PlainNumber,
} from './fixtures';
import { spySource } from './spy-source';

interface ExpectedTiff extends Omit<ExpectedArray, 'values'> {
  readonly values?: readonly PlainNumber[];
  readonly sum?: number;
  readonly first?: readonly number[];
  readonly last?: readonly number[];
  readonly facts: Readonly<Record<string, string | number>>;
  readonly notes?: number;
}

const expected = expectedOf<ExpectedTiff>('tiff');

const caseOf = (name: string, bytes: Uint8Array): ReaderCase => ({
  name,
  bytes,
  reader: tiffReader,
});

describe('TIFF stacks', () => {
  it.each(Object.keys(expected))('%s reads as it was written', async (name) => {
    const container = await openFixture(tiffReader, `tiff/${name}.tif`);
    const { shape, type, values, sum, first, last, facts, notes = 0 } = expected[name];
    const [entry] = container.entries;
    expect(entry).toEqual({ path: '', shape, type, attributes: {} });
    const read = Array.from(await readWhole(container, entry));
    if (values !== undefined) expect(read).toEqual(numbersOf(values));
    else {
      expect(read.reduce((total, value) => total + value, 0)).toBeCloseTo(sum!, 6);
      expect(read.slice(0, 5)).toEqual(first);
      expect(read.slice(-5)).toEqual(last);
    }
    expect(container.facts).toEqual(facts);
    expect(container.notes).toHaveLength(notes);
  });

  it('come packed and plain, in strips and tiles, in either byte order, classic and BigTIFF', () => {
    const names = Object.keys(expected);
    for (const part of [
      'lzw',
      'packbits',
      'deflate',
      'differences',
      'bytewise',
      'big-',
      'tiled',
      '-be',
      '-le',
    ]) {
      expect(names.some((name) => name.includes(part))).toBe(true);
    }
  });
});

describe('TIFF files that are no stack of numbers', () => {
  it.each([
    ['sizes-differ', /it has 6 × 5 pixels of 1 sample, but the first page has 4 × 5/, 'page 2'],
    ['circle', /pages refer back to one another/, 'byte'],
    ['jpeg', /packed by JPEG, which changes the numbers/, 'page 1'],
    ['twelve-bits', /samples are 12-bit uint values/, 'page 1'],
    ['colour-table', /places in a colour table, not intensities/, 'page 1'],
  ])('%s is refused', async (name, what, where) => {
    const bytes = fixtureBytes(`tiff-refused/${name}.tif`);
    const error = await refusalOf(caseOf(`${name}.tif`, bytes));
    expect(error.what).toMatch(what);
    expect(error.where).toContain(`${name}.tif`);
    expect(error.where).toContain(where);
  });

  it('a page that claims more pixels than the file can hold is refused before it is read', async () => {
    const bytes = fixtureBytes('tiff/u2-le.tif');
    const view = new DataView(bytes.buffer);
    const directory = view.getUint32(4, true);
    // First and second fields: width and height, each one 32-bit value.
    view.setUint32(directory + 2 + 8, 1 << 20, true);
    view.setUint32(directory + 2 + 12 + 8, 1 << 20, true);
    const error = await refusalOf(caseOf('a.tif', bytes));
    expect(error.what).toMatch(/but the first page has|cannot hold/);
  });
});

describe('reading by blocks', () => {
  it('takes only the rows and pages asked for', async () => {
    const { stack, values, shape } = largeStack();
    const source = spySource('a.tif', stack);
    const container = await tiffReader.open(source);
    expect(container.entries[0].shape).toEqual(shape);
    const before = source.seen.bytes;
    const block = await container.read('', [3, 10, 0], [2, 5, 200]);
    expect(source.seen.bytes - before).toBeLessThan(2 * 5 * 200 * 2 + 4 * 4096);
    const wanted = [3, 4].flatMap((k) =>
      Array.from(values.subarray((k * 100 + 10) * 200, (k * 100 + 15) * 200)),
    );
    expect(Array.from(block)).toEqual(wanted);
    container.close();
    expect(source.seen.closed).toBe(1);
  });

  it('stops when asked, and says how far it is', async () => {
    const container = await tiffReader.open(spySource('a.tif', largeStack().stack));
    const shares: number[] = [];
    const { shape } = container.entries[0];
    await container.read('', [0, 0, 0], shape, { onProgress: (share) => shares.push(share) });
    expect(shares.at(-1)).toBe(1);
    const { error } = await outcomeOf(() =>
      container.read('', [0, 0, 0], shape, { signal: AbortSignal.abort() }),
    );
    expect(error).toMatchObject({ kind: 'cancelled' });
  });
});

/** Eight pages of 100 × 200 16-bit pixels, each in one strip. */
function largeStack() {
  const shape = [8, 100, 200];
  const pageBytes = 100 * 200 * 2;
  const values = Uint16Array.from({ length: 160_000 }, (_, i) => (i * 2654435761) >>> 16);
  const fields = (at: number): readonly (readonly [number, number, number])[] => [
    [256, 4, 200],
    [257, 4, 100],
    [258, 3, 16],
    [259, 3, 1],
    [262, 3, 1],
    [273, 4, at],
    [277, 3, 1],
    [278, 4, 100],
    [279, 4, pageBytes],
  ];
  const directoryBytes = 2 + 9 * 12 + 4;
  const stack = new Uint8Array(8 + 8 * (pageBytes + directoryBytes));
  const view = new DataView(stack.buffer);
  stack.set([0x49, 0x49, 42, 0]);
  view.setUint32(4, 8 + pageBytes, true);
  for (let k = 0; k < 8; k++) {
    const at = 8 + k * (pageBytes + directoryBytes);
    stack.set(new Uint8Array(values.buffer, k * pageBytes, pageBytes), at);
    let entry = at + pageBytes;
    view.setUint16(entry, 9, true);
    entry += 2;
    for (const [tag, type, value] of fields(at)) {
      view.setUint16(entry, tag, true);
      view.setUint16(entry + 2, type, true);
      view.setUint32(entry + 4, 1, true);
      view.setUint32(entry + 8, value, true);
      entry += 12;
    }
    const next = at + pageBytes + directoryBytes + pageBytes;
    view.setUint32(entry, k < 7 ? next : 0, true);
  }
  return { stack, values, shape };
}

describe('like every reader', () => {
  const files = [
    'u2-le',
    'f4-be',
    'big-be',
    'deflate-u2-be',
    'bytewise-f4-le',
    'samples-together',
    'samples-apart',
    'tiled',
    'pillow-lzw-16',
    'pillow-packbits-8',
    'described',
  ].map((name) => caseOf(`${name}.tif`, fixtureBytes(`tiff/${name}.tif`)));

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
