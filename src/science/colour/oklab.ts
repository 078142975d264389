/**
 * OKLab, a space in which equal distances look about equally different: used to build colour scales
 * and to check them.
 *
 * Björn Ottosson, "A perceptual color space for image processing", 2020,
 * https://bottosson.github.io/posts/oklab/ (matrices for linear sRGB, revised 2021-01-25).
 */
import { cbrt } from '../numeric/elementary';
import type { LinearRgb, RgbBytes } from './srgb';
import { linearFromBytes } from './srgb';

export interface Oklab {
  /** lightness: 0 black, 1 white of D65 */
  readonly lightness: number;
  /** green (−) to red (+) */
  readonly a: number;
  /** blue (−) to yellow (+) */
  readonly b: number;
}

/**
 * OKLab of a linear sRGB colour.
 *
 * Colours outside the gamut are converted too (the cube root of a negative number is negative).
 *
 * @see Ottosson 2020, "Converting from linear sRGB to Oklab"
 */
export function oklabFromLinear([red, green, blue]: LinearRgb): Oklab {
  const long = cbrt(0.4122214708 * red + 0.5363325363 * green + 0.0514459929 * blue);
  const medium = cbrt(0.2119034982 * red + 0.6806995451 * green + 0.1073969566 * blue);
  const short = cbrt(0.0883024619 * red + 0.2817188376 * green + 0.6299787005 * blue);
  return {
    lightness: 0.2104542553 * long + 0.793617785 * medium - 0.0040720468 * short,
    a: 1.9779984951 * long - 2.428592205 * medium + 0.4505937099 * short,
    b: 0.0259040371 * long + 0.7827717662 * medium - 0.808675766 * short,
  };
}

/**
 * Linear sRGB of an OKLab colour; outside 0 to 1 where the screen cannot show it.
 *
 * @see Ottosson 2020, "Converting from linear sRGB to Oklab" (inverse)
 */
export function linearFromOklab({ lightness, a, b }: Oklab): LinearRgb {
  const long = cube(lightness + 0.3963377774 * a + 0.2158037573 * b);
  const medium = cube(lightness - 0.1055613458 * a - 0.0638541728 * b);
  const short = cube(lightness - 0.0894841775 * a - 1.291485548 * b);
  return [
    4.0767416621 * long - 3.3077115913 * medium + 0.2309699292 * short,
    -1.2684380046 * long + 2.6097574011 * medium - 0.3413193965 * short,
    -0.0041960863 * long - 0.7034186147 * medium + 1.707614701 * short,
  ];
}

/** OKLab of a colour given in bytes. */
export function oklabFromBytes(bytes: RgbBytes): Oklab {
  return oklabFromLinear(linearFromBytes(bytes));
}

/** Distance of two colours in OKLab; about 0.02 is just noticed side by side (common practice, no source). */
export function oklabDistance(one: Oklab, other: Oklab): number {
  const dLightness = one.lightness - other.lightness;
  const da = one.a - other.a;
  const db = one.b - other.b;
  return Math.sqrt(dLightness * dLightness + da * da + db * db);
}

/** Whether a screen can show it, to within half a byte's rounding. */
export function isInGamut(colour: LinearRgb): boolean {
  return colour.every((part) => part >= -1e-4 && part <= 1 + 1e-4);
}

function cube(value: number): number {
  return value * value * value;
}
