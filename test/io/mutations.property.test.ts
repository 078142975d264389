/**
 * Damaged files of every format: cut off anywhere, bytes changed, parts taken out or doubled, pure noise.
 * Reading one either succeeds or throws a RimlightError 'scan' that says what, where and what to do; it
 * comes to an end soon, and takes no more memory than the format's library may.
 */
import fc from 'fast-check';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { memorySource } from '../../src/io/byte-source';
import { expectScanError, outcomeOf, type ReaderCase } from './check-reader';
import { mutationCases } from './mutation-cases';

/** Places and values that matter more than others: header bytes, and counts made very large, zero or one more. */
const place = fc.oneof(
  fc.double({ min: 0, max: 1, noNaN: true }),
  fc.double({ min: 0, max: 0.1, noNaN: true }),
);
const change = fc.record({
  at: place,
  bytes: fc.oneof(
    fc.uint8Array({ minLength: 1, maxLength: 8 }),
    fc.constantFrom(
      Uint8Array.of(0xff, 0xff, 0xff, 0xff),
      Uint8Array.of(0, 0, 0, 0),
      Uint8Array.of(0xff, 0xff, 0xff, 0x7f),
      Uint8Array.of(0x7f, 0xff, 0xff, 0xff),
    ),
  ),
});

const mutations = fc.oneof(
  { weight: 2, arbitrary: fc.record({ kind: fc.constant('cut' as const), at: place }) },
  {
    weight: 6,
    arbitrary: fc.record({
      kind: fc.constant('change' as const),
      changes: fc.array(change, { minLength: 1, maxLength: 6 }),
    }),
  },
  {
    weight: 2,
    arbitrary: fc.record({
      kind: fc.constantFrom('remove' as const, 'double' as const),
      at: place,
      length: fc.integer({ min: 1, max: 64 }),
    }),
  },
  {
    weight: 1,
    arbitrary: fc.record({
      kind: fc.constant('noise' as const),
      keep: fc.integer({ min: 0, max: 64 }),
      noise: fc.uint8Array({ maxLength: 400 }),
    }),
  },
);

type Mutation = typeof mutations extends fc.Arbitrary<infer T> ? T : never;

function mutated(bytes: Uint8Array, mutation: Mutation): Uint8Array {
  const index = (at: number): number => Math.min(bytes.length - 1, Math.floor(at * bytes.length));
  switch (mutation.kind) {
    case 'cut':
      return bytes.slice(0, index(mutation.at));
    case 'change': {
      const out = bytes.slice();
      for (const { at, bytes: put } of mutation.changes) {
        out.set(put.subarray(0, bytes.length - index(at)), index(at));
      }
      return out;
    }
    case 'remove': {
      const from = index(mutation.at);
      return joined(bytes.subarray(0, from), bytes.subarray(from + mutation.length));
    }
    case 'double': {
      const from = index(mutation.at);
      return joined(bytes.subarray(0, from + mutation.length), bytes.subarray(from));
    }
    case 'noise':
      return joined(bytes.subarray(0, mutation.keep), mutation.noise);
  }
}

function joined(a: Uint8Array, b: Uint8Array): Uint8Array {
  const out = new Uint8Array(a.length + b.length);
  out.set(a);
  out.set(b, a.length);
  return out;
}

/** Opens the file and reads up to 64 indices along each axis of every array. */
async function readSome({ name, bytes, reader }: ReaderCase): Promise<void> {
  const container = await reader.open(memorySource(name, bytes));
  const errors: unknown[] = [];
  for (const { path, shape } of container.entries) {
    const count = shape.map((length) => Math.min(length, shape.length > 3 ? 8 : 64));
    const { value, error } = await outcomeOf(() =>
      container.read(
        path,
        shape.map(() => 0),
        count,
      ),
    );
    if (value === null) errors.push(error);
    else expect(value).toHaveLength(count.reduce((product, length) => product * length, 1));
  }
  container.close();
  for (const error of errors) expectScanError(error);
}

/** The HDF5 library's own memory ends at 2 GiB, and a damaged length can make it ask for all of it. */
const mostMegabytes = (format: string): number => (format === 'HDF5' ? 2500 : 300);
const mostMs = 30_000;

describe.each(mutationCases)('$name, damaged in any way,', (file) => {
  let before = 0;
  let highest = 0;
  beforeAll(() => {
    before = process.memoryUsage().rss;
  });
  afterAll(() => {
    expect((highest - before) / 1e6).toBeLessThan(mostMegabytes(file.reader.format));
  });

  it('reads, or is refused with one clear sentence, soon', async () => {
    await fc.assert(
      fc.asyncProperty(mutations, async (mutation) => {
        const started = performance.now();
        const bytes = mutated(file.bytes, mutation);
        const { error } = await outcomeOf(() => readSome({ ...file, bytes }));
        if (error !== null) expectScanError(error);
        expect(performance.now() - started).toBeLessThan(mostMs);
        highest = Math.max(highest, process.memoryUsage().rss);
      }),
      { numRuns: 400 },
    );
  });
});
