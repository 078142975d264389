import { decode } from 'fast-png';
import { describe, expect, it } from 'vitest';
import { encodePng } from '../../../src/io/write/png';

const rgba = Uint8ClampedArray.from({ length: 3 * 2 * 4 }, (_, i) => i * 10);

describe('a picture', () => {
  it('reads back pixel by pixel', () => {
    const { width, height, channels, depth, data } = decode(encodePng(rgba, 3, 2));
    expect({ width, height, channels, depth }).toEqual({
      width: 3,
      height: 2,
      channels: 4,
      depth: 8,
    });
    expect(Array.from(data)).toEqual(Array.from(rgba));
  });

  it('is a PNG: signature, size and colour type in the header chunk', () => {
    const bytes = encodePng(rgba, 3, 2);
    // ISO/IEC 15948, 5.2 (signature) and 11.2.2 (IHDR: width, height, bit depth 8, colour type 6).
    expect(Array.from(bytes.subarray(0, 8))).toEqual([137, 80, 78, 71, 13, 10, 26, 10]);
    expect(Array.from(bytes.subarray(16, 26))).toEqual([0, 0, 0, 3, 0, 0, 0, 2, 8, 6]);
  });

  it('has the same bytes every time', () => {
    expect(encodePng(rgba, 3, 2)).toEqual(encodePng(new Uint8Array(rgba), 3, 2));
  });

  it('of another size than its pixels is a fault', () => {
    expect(() => encodePng(rgba, 4, 2)).toThrow('24 bytes are not a picture of 4 × 2 pixels');
    expect(() => encodePng(new Uint8Array(0), 0, 0)).toThrow('not a picture');
  });
});
