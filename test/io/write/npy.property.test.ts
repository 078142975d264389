import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { memorySource } from '../../../src/io/byte-source';
import { npyReader } from '../../../src/io/npy';
import { npzReader } from '../../../src/io/npz';
import { encodeNpy } from '../../../src/io/write/npy';
import { encodeNpz } from '../../../src/io/write/npz';
import { fixtureBytes } from '../fixtures';

const arrays = fc.oneof(
  fc.uint8Array({ minLength: 24, maxLength: 24 }),
  fc.int8Array({ minLength: 24, maxLength: 24 }),
  fc.uint16Array({ minLength: 24, maxLength: 24 }),
  fc.int16Array({ minLength: 24, maxLength: 24 }),
  fc.uint32Array({ minLength: 24, maxLength: 24 }),
  fc.int32Array({ minLength: 24, maxLength: 24 }),
  fc.float32Array({ minLength: 24, maxLength: 24 }),
  fc.float64Array({ minLength: 24, maxLength: 24 }),
);

const shapes = fc.constantFrom([24], [4, 6], [2, 3, 4], [2, 1, 3, 4], [24, 1], [1, 24]);

describe('an array written as .npy or .npz', () => {
  it('is read back bit for bit, whatever its type, shape and orders', async () => {
    await fc.assert(
      fc.asyncProperty(
        arrays,
        shapes,
        fc.boolean(),
        fc.boolean(),
        async (array, shape, fortran, bigEndian) => {
          const bytes = encodeNpy(array, shape, { fortran, bigEndian });
          const start = shape.map(() => 0);
          const npy = await npyReader.open(memorySource('a.npy', bytes));
          expect(npy.entries[0].shape).toEqual(shape);
          expect(await npy.read('', start, shape)).toEqual(array);
          const npz = await npzReader.open(memorySource('a.npz', encodeNpz({ 'a b': bytes })));
          expect(npz.entries[0].path).toBe('a b');
          expect(await npz.read('a b', start, shape)).toEqual(array);
        },
      ),
      { numRuns: 300 },
    );
  });
});

describe('the header', () => {
  it('is the one NumPy writes', () => {
    // Whole files of NumPy 1.24 (make-binary.py): ours must be the same to the byte.
    const ramp = (
      fixture: string,
      array: Uint16Array,
      options: { fortran?: boolean; bigEndian?: boolean },
    ) => expect(encodeNpy(array, [2, 3, 4], options)).toEqual(fixtureBytes(`npy/${fixture}.npy`));
    const values = new Uint16Array(fixtureBytes('npy/u2-le-c.npy').slice(128).buffer);
    ramp('u2-le-c', values, {});
    ramp('u2-be-c', values, { bigEndian: true });
    ramp('u2-le-f', values, { fortran: true });
    ramp('u2-be-f', values, { fortran: true, bigEndian: true });
  });

  it('says one axis as a tuple, and none for a single value', () => {
    const text = (bytes: Uint8Array) => new TextDecoder().decode(bytes.subarray(10, 128));
    expect(text(encodeNpy(new Uint8Array(3), [3]))).toContain("'descr': '|u1'");
    expect(text(encodeNpy(new Uint8Array(3), [3]))).toContain("'shape': (3,), }");
    expect(text(encodeNpy(new Float64Array(1), []))).toContain("'shape': (), }");
  });
});

describe('writing', () => {
  it('gives the same bytes for the same arrays', () => {
    const npy = encodeNpy(Float64Array.of(1, 2, 3), [3]);
    expect(encodeNpz({ a: npy, b: npy })).toEqual(encodeNpz({ a: npy, b: npy }));
  });

  it('leaves the given array as it was', () => {
    const array = Uint16Array.of(1, 2, 3, 4, 5, 6);
    encodeNpy(array, [2, 3], { bigEndian: true, fortran: true });
    expect(array).toEqual(Uint16Array.of(1, 2, 3, 4, 5, 6));
  });

  it('of an array that does not fill its shape is a fault', () => {
    expect(() => encodeNpy(new Uint8Array(5), [2, 3])).toThrow('5 values do not fill the shape');
  });
});
