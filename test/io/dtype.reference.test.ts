import { describe, expect, it } from 'vitest';
import type { ElementType } from '../../src/io/container';
import { bytesOfType, decodeElements } from '../../src/io/dtype';

const decoded = (type: ElementType, hex: string, isLittleEndian = false) => {
  const bytes = Uint8Array.from(hex.match(/../g) ?? [], (pair) => Number.parseInt(pair, 16));
  return decodeElements(bytes, type, isLittleEndian);
};

describe('half-precision numbers', () => {
  // IEEE 754-2019, 3.4 and table 3.5 (binary16: 1 sign, 5 exponent, 10 fraction bits, bias 15).
  it.each([
    ['0000', 0],
    ['8000', -0],
    ['3c00', 1],
    ['c000', -2],
    ['3555', 0.333251953125], // nearest to 1/3
    ['7bff', 65504], // largest
    ['0400', 6.103515625e-5], // smallest normal, 2^-14
    ['03ff', 6.097555160522461e-5], // largest subnormal
    ['0001', 2 ** -24], // smallest, 2^-24
    ['7c00', Number.POSITIVE_INFINITY],
    ['fc00', Number.NEGATIVE_INFINITY],
    ['7e00', Number.NaN],
  ])('%s is %d', (hex, value) => {
    expect(Array.from(decoded('float16', hex))).toEqual([value]);
  });
});

describe('64-bit integers', () => {
  it.each([
    ['uint64', '0000000000000000', 0, Uint8Array],
    ['uint64', '00000000000000ff', 255, Uint8Array],
    ['uint64', '0000000000000100', 256, Uint16Array],
    ['uint64', '00000000ffffffff', 4294967295, Uint32Array],
    ['uint64', '0000000100000000', 4294967296, Float64Array],
    ['uint64', '001fffffffffffff', 9007199254740991, Float64Array], // 2^53 − 1, the last exact one
    ['uint64', 'ffffffffffffffff', 2 ** 64, Float64Array], // 2^64 − 1: the nearest double
    ['int64', 'ffffffffffffffff', -1, Int8Array],
    ['int64', 'ffffffffffff7fff', -32769, Int32Array],
    ['int64', 'ffffffff7fffffff', -2147483649, Float64Array],
    ['int64', '8000000000000000', -(2 ** 63), Float64Array],
  ] as const)('%s %s is %d', (type, hex, value, array) => {
    const values = decoded(type, hex);
    expect(Array.from(values)).toEqual([value]);
    expect(values).toBeInstanceOf(array);
  });

  it('beyond 2^53 are the nearest double, as BigInt conversion gives it', () => {
    for (const value of [2n ** 53n + 1n, 2n ** 53n + 3n, 2n ** 63n - 1n, 12345678901234567890n]) {
      const hex = value.toString(16).padStart(16, '0');
      expect(decoded('uint64', hex)[0]).toBe(Number(value));
    }
  });

  it('take the narrowest array that holds all of them', () => {
    expect(decoded('int64', 'ffffffffffffffff00000000000000c8')).toEqual(Int16Array.of(-1, 200));
    expect(decoded('int64', 'ffffffffffffffff00000000ffffffff')).toEqual(
      Float64Array.of(-1, 4294967295),
    );
  });
});

describe('element types', () => {
  it.each(Object.keys(bytesOfType) as ElementType[])(
    '%s decodes alike from either byte order',
    (type) => {
      const size = bytesOfType[type];
      const little = Uint8Array.from({ length: 6 * size }, (_, i) => (i * 37 + 11) & 0x3f);
      const big = new Uint8Array(little.length);
      for (let i = 0; i < little.length; i++) {
        big[i] = little[i - (i % size) + (size - 1 - (i % size))];
      }
      const values = decodeElements(big, type, false);
      expect(values).toEqual(decodeElements(little.slice(), type, true));
      expect(values).toHaveLength(6);
    },
  );

  it('read from bytes that begin anywhere in memory', () => {
    const bytes = new Uint8Array(17);
    bytes[9] = 1;
    expect(Array.from(decodeElements(bytes.subarray(1, 17), 'uint64', true))).toEqual([0, 1]);
  });

  it('give bool as 0 and 1', () => {
    expect(decodeElements(Uint8Array.of(0, 1, 255), 'bool', true)).toEqual(Uint8Array.of(0, 1, 1));
  });
});
