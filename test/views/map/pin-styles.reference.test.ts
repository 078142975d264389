/**
 * Pins told apart by every kind of colour vision: simulated dichromacy by G. M. Machado, M. M.
 * Oliveira, L. A. F. Fernandes, IEEE Trans. Vis. Comput. Graph. 15, 1291 (2009), matrices of severity
 * 1.0 for linear sRGB; contrast by WCAG 2.2, 1.4.11 (3 : 1 for graphics).
 */
import { describe, expect, it } from 'vitest';
import { oklabDistance, oklabFromLinear } from '../../../src/science/colour/oklab';
import { type LinearRgb, linearFromBytes, parseHexColour } from '../../../src/science/colour/srgb';
import { pinColour, pinColours, pinRing } from '../../../src/views/map/pin-styles';

type Matrix = readonly [LinearRgb, LinearRgb, LinearRgb];

const visions: Readonly<Record<string, Matrix>> = {
  normal: [
    [1, 0, 0],
    [0, 1, 0],
    [0, 0, 1],
  ],
  deuteranopia: [
    [0.367322, 0.860646, -0.227968],
    [0.280085, 0.672501, 0.047413],
    [-0.01182, 0.04294, 0.968881],
  ],
  protanopia: [
    [0.152286, 1.052583, -0.204868],
    [0.114503, 0.786281, 0.099216],
    [-0.003882, -0.048116, 1.051998],
  ],
  tritanopia: [
    [1.255528, -0.076749, -0.178779],
    [-0.078411, 0.930809, 0.147602],
    [0.004733, 0.691367, 0.3039],
  ],
};

function seen(colour: string, matrix: Matrix): LinearRgb {
  const light = linearFromBytes(parseHexColour(colour));
  const [red, green, blue] = matrix.map((row) =>
    Math.min(
      1,
      Math.max(
        0,
        row.reduce((sum, factor, i) => sum + factor * light[i]!, 0),
      ),
    ),
  );
  return [red!, green!, blue!];
}

function leastDistance(colours: readonly string[], matrix: Matrix): number {
  const labs = colours.map((colour) => oklabFromLinear(seen(colour, matrix)));
  const distances = labs.flatMap((one, i) =>
    labs.slice(i + 1).map((other) => oklabDistance(one, other)),
  );
  return Math.min(...distances);
}

/** Relative luminance by WCAG. */
function luminance(colour: string): number {
  const [red, green, blue] = linearFromBytes(parseHexColour(colour));
  return 0.2126 * red + 0.7152 * green + 0.0722 * blue;
}

/** --plot of the two themes. */
const grounds = { dark: '#101114', light: '#ffffff' } as const;

describe.each(['dark', 'light'] as const)('pins of the %s theme', (theme) => {
  it.each(Object.entries(visions))('are told apart with %s vision', (_, matrix) => {
    // 0.02 is just noticed side by side (common practice, no source); thin lines need more
    expect(leastDistance(pinColours[theme], matrix)).toBeGreaterThan(0.05);
  });

  it('stand out from the plot’s ground', () => {
    for (const colour of pinColours[theme]) {
      const [low, high] = [luminance(colour), luminance(grounds[theme])].sort((a, b) => a - b);
      expect((high! + 0.05) / (low! + 0.05)).toBeGreaterThanOrEqual(3);
    }
  });
});

describe('pinColour', () => {
  it('is amber for A, sky for B, rose for C', () => {
    expect(['A', 'B', 'C'].map((name) => pinColour(name))).toEqual([
      '#f0b457',
      '#7fc8f8',
      '#e88fb4',
    ]);
  });

  it('comes again with the seventh, in a ring of its own', () => {
    expect(pinColour('G')).toBe(pinColour('A'));
    expect(pinRing('A')).toEqual([]);
    expect(pinRing('G')).not.toEqual(pinRing('A'));
    expect(pinRing('M')).not.toEqual(pinRing('G'));
  });

  it('has one for every name there can be', () => {
    for (const name of ['Z', 'AA', 'ZZ']) expect(pinColours.dark).toContain(pinColour(name));
    // Z is the 26th: 25 = 4 × 6 + 1
    expect(pinColour('Z')).toBe(pinColour('B'));
    expect(pinColour('AA')).toBe(pinColour('C'));
  });
});
