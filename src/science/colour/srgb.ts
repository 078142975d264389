/**
 * sRGB as screens use it: "#rrggbb" ↔ bytes, and the transfer curve between encoded values and
 * linear light (IEC 61966-2-1:1999).
 */
import { RimlightError } from '../../errors';
import { pow } from '../numeric/elementary';

/** Red, green, blue as bytes, 0 to 255. */
export type RgbBytes = readonly [red: number, green: number, blue: number];

/** Red, green, blue as linear light with the sRGB primaries; 0 to 1 inside the gamut. */
export type LinearRgb = readonly [red: number, green: number, blue: number];

/**
 * Linear light of an encoded sRGB value.
 *
 * @param encoded - 0 to 1
 * @returns 0 to 1
 * @see IEC 61966-2-1:1999, 5.2
 */
export function linearFromEncoded(encoded: number): number {
  return encoded <= 0.04045 ? encoded / 12.92 : pow((encoded + 0.055) / 1.055, 2.4);
}

/**
 * Encoded sRGB value of linear light; the inverse of `linearFromEncoded`.
 *
 * @param linear - 0 to 1; values outside are not clipped
 */
export function encodedFromLinear(linear: number): number {
  return linear <= 0.0031308 ? linear * 12.92 : 1.055 * pow(linear, 1 / 2.4) - 0.055;
}

/** Linear light of a colour given in bytes. */
export function linearFromBytes([red, green, blue]: RgbBytes): LinearRgb {
  return [
    linearFromEncoded(red / 255),
    linearFromEncoded(green / 255),
    linearFromEncoded(blue / 255),
  ];
}

/** Bytes nearest to a linear colour; what lies outside the gamut is clipped channel by channel. */
export function bytesFromLinear([red, green, blue]: LinearRgb): RgbBytes {
  return [byteFromLinear(red), byteFromLinear(green), byteFromLinear(blue)];
}

function byteFromLinear(linear: number): number {
  return Math.round(255 * encodedFromLinear(Math.min(1, Math.max(0, linear))));
}

/** Whether a text is a colour as recipes write it: "#rrggbb" or "#rgb", either case. */
export function isHexColour(text: string): boolean {
  return /^#(?:[0-9a-f]{3}|[0-9a-f]{6})$/i.test(text);
}

/**
 * Bytes of a "#rrggbb" or "#rgb" colour.
 *
 * @throws RimlightError 'recipe' - when the text is not one
 */
export function parseHexColour(text: string): RgbBytes {
  if (!isHexColour(text)) {
    throw new RimlightError('recipe', {
      what: `"${text}" is not a colour`,
      where: '',
      hint: 'Write a colour as "#rrggbb", for instance "#ff5a4d".',
    });
  }
  const digits = text.length === 4 ? text.slice(1).replace(/./g, '$&$&') : text.slice(1);
  return [
    Number.parseInt(digits.slice(0, 2), 16),
    Number.parseInt(digits.slice(2, 4), 16),
    Number.parseInt(digits.slice(4, 6), 16),
  ];
}

/** "#rrggbb", lower case. */
export function formatHexColour(bytes: RgbBytes): string {
  return `#${bytes.map((byte) => byte.toString(16).padStart(2, '0')).join('')}`;
}
