/** The transfer curve of sRGB (IEC 61966-2-1:1999, 5.2), and colours as text. */
import { describe, expect, it } from 'vitest';
import { isRimlightError } from '../../../src/errors';
import {
  bytesFromLinear,
  encodedFromLinear,
  formatHexColour,
  linearFromBytes,
  linearFromEncoded,
  parseHexColour,
} from '../../../src/science/colour/srgb';

describe('the sRGB transfer curve', () => {
  it('is the straight line of slope 12.92 up to 0.04045, and the power 2.4 above', () => {
    expect(linearFromEncoded(0.04045)).toBeCloseTo(0.04045 / 12.92, 15);
    // ((0.5 + 0.055) / 1.055)^2.4, by the standard's formula with mpmath: 0.214041140482232…
    expect(linearFromEncoded(0.5)).toBeCloseTo(0.214041140482232, 14);
    // middle grey of photography, 18 % of light, is byte 118 (common practice)
    expect(Math.round(255 * encodedFromLinear(0.18))).toBe(118);
  });

  it('joins at the standard’s two thresholds to the digits they are given with', () => {
    // 0.0031308 and 0.04045 are rounded: the curve jumps there by less than 1e-7 of full light
    const jump = linearFromEncoded(0.04045 + 1e-12) - linearFromEncoded(0.04045);
    expect(Math.abs(jump)).toBeLessThan(1e-7);
  });

  it('keeps 0 and 1, and all 256 bytes there and back', () => {
    expect([linearFromEncoded(0), linearFromEncoded(1)]).toEqual([0, 1]);
    for (let byte = 0; byte < 256; byte++) {
      expect(bytesFromLinear(linearFromBytes([byte, 0, 255]))).toEqual([byte, 0, 255]);
    }
  });

  it('clips what a screen cannot show', () => {
    expect(bytesFromLinear([-0.2, 1.7, 0.5])).toEqual([0, 255, 188]);
  });
});

describe('a colour as text', () => {
  it('has three or six digits, in either case', () => {
    expect(parseHexColour('#F5a')).toEqual([0xff, 0x55, 0xaa]);
    expect(parseHexColour('#ff5a4d')).toEqual([0xff, 0x5a, 0x4d]);
    expect(formatHexColour([255, 90, 7])).toBe('#ff5a07');
  });

  it.each(['ff5a4d', '#ff5a4', 'red', '#gg0000', ''])('is not "%s"', (text) => {
    try {
      parseHexColour(text);
      expect.unreachable();
    } catch (error) {
      expect(isRimlightError(error) && error.kind).toBe('recipe');
    }
  });
});
