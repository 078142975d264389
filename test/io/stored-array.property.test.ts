import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { memorySource, readExactly } from '../../src/io/byte-source';
import { StoredArray } from '../../src/io/stored-array';

const shapes = fc.array(fc.integer({ min: 1, max: 7 }), { minLength: 1, maxLength: 4 });

/** A shape, a block inside it, and sizes so small that every path of the reader is taken. */
const cases = shapes.chain((shape) =>
  fc.record({
    shape: fc.constant(shape),
    start: fc.tuple(...shape.map((length) => fc.integer({ min: 0, max: length - 1 }))),
    share: fc.tuple(...shape.map(() => fc.double({ min: 0, max: 1, noNaN: true }))),
    isFortran: fc.boolean(),
    isLittleEndian: fc.boolean(),
    offset: fc.integer({ min: 0, max: 9 }),
    windowBytes: fc.integer({ min: 2, max: 64 }),
    gapBytes: fc.integer({ min: 0, max: 64 }),
    bandBytes: fc.integer({ min: 1, max: 500 }),
  }),
);

describe('a block of a stored array', () => {
  it('is the same part of the array, whatever its order, place and the sizes read at once', async () => {
    await fc.assert(
      fc.asyncProperty(cases, async (one) => {
        const { shape, start, isFortran, isLittleEndian, offset } = one;
        const count = shape.map((length, axis) =>
          Math.max(1, Math.round(one.share[axis] * (length - start[axis]))),
        );
        const total = shape.reduce((product, length) => product * length, 1);
        const bytes = new Uint8Array(offset + 2 * total);
        const view = new DataView(bytes.buffer);
        const strideOf = (axis: number): number =>
          (isFortran ? shape.slice(0, axis) : shape.slice(axis + 1)).reduce((p, l) => p * l, 1);
        const wanted: number[] = [];
        for (const index of indices(shape)) {
          const at = index.reduce((sum, i, axis) => sum + i * strideOf(axis), 0);
          const value = index.reduce((sum, i, axis) => sum * shape[axis] + i, 0) + 259;
          view.setUint16(offset + 2 * at, value, isLittleEndian);
          const isInside = index.every((i, a) => i >= start[a] && i < start[a] + count[a]);
          if (isInside) wanted.push(value);
        }
        const source = memorySource('a', bytes);
        const layout = { shape, type: 'uint16', isLittleEndian, isFortran, offset } as const;
        const array = new StoredArray(layout, (a, b) => readExactly(source, a, b), 'a', one);
        expect(Array.from(await array.read(start, count))).toEqual(wanted);
        // A second time, from what may have been kept.
        expect(Array.from(await array.read(start, count))).toEqual(wanted);
      }),
      { numRuns: 500 },
    );
  });

  it('that is not inside is a fault of the program, not of the file', async () => {
    const layout = {
      shape: [2, 3],
      type: 'uint8',
      isLittleEndian: true,
      isFortran: false,
      offset: 0,
    } as const;
    const array = new StoredArray(layout, async (a, b) => new Uint8Array(b - a), 'a');
    for (const [start, count] of [
      [[0], [1]],
      [
        [0, 0],
        [3, 3],
      ],
      [
        [-1, 0],
        [1, 1],
      ],
      [
        [0, 0.5],
        [1, 1],
      ],
      [
        [0, 0],
        [1, Number.NaN],
      ],
    ]) {
      await expect(array.read(start, count)).rejects.toMatchObject({ kind: 'fault' });
    }
  });

  it('of more than 16 GiB is refused', async () => {
    const layout = {
      shape: [2 ** 20, 2 ** 20],
      type: 'float64',
      isLittleEndian: true,
      isFortran: false,
      offset: 0,
    } as const;
    const array = new StoredArray(layout, async (a, b) => new Uint8Array(b - a), 'a');
    await expect(array.read([0, 0], layout.shape)).rejects.toMatchObject({
      kind: 'scan',
      what: '8192.0 GiB are asked for at once (at most 16)',
    });
  });
});

/** All indices, last axis fastest. */
function* indices(shape: readonly number[]): Generator<readonly number[]> {
  const total = shape.reduce((product, length) => product * length, 1);
  for (let i = 0; i < total; i++) {
    let rest = i;
    const index = shape
      .toReversed()
      .map((length) => {
        const at = rest % length;
        rest = Math.floor(rest / length);
        return at;
      })
      .toReversed();
    yield index;
  }
}
