/**
 * OKLab against the table of Ottosson 2020 ("A perceptual color space for image processing", section
 * "Table of example XYZ and Oklab pairs"): XYZ to OKLab, three decimals.
 */
import { describe, expect, it } from 'vitest';
import {
  linearFromOklab,
  oklabFromBytes,
  oklabFromLinear,
} from '../../../src/science/colour/oklab';
import type { LinearRgb } from '../../../src/science/colour/srgb';

/** Linear sRGB of CIE XYZ (D65): the inverse matrix of IEC 61966-2-1:1999/Amd 1:2003, F.7. */
function linearFromXyz([x, y, z]: readonly [number, number, number]): LinearRgb {
  return [
    3.2406255 * x - 1.537208 * y - 0.4986286 * z,
    -0.9689307 * x + 1.8757561 * y + 0.0415175 * z,
    0.0557101 * x - 0.2040211 * y + 1.0569959 * z,
  ];
}

const table = [
  { xyz: [0.95, 1.0, 1.089], lab: [1.0, 0.0, 0.0] },
  { xyz: [1.0, 0.0, 0.0], lab: [0.45, 1.236, -0.019] },
  { xyz: [0.0, 1.0, 0.0], lab: [0.922, -0.671, 0.263] },
  { xyz: [0.0, 0.0, 1.0], lab: [0.153, -1.415, -0.449] },
] as const;

describe('oklabFromLinear', () => {
  it.each(table)('gives the published OKLab of XYZ $xyz', ({ xyz, lab }) => {
    const { lightness, a, b } = oklabFromLinear(linearFromXyz(xyz));
    // 0.0015: half a unit of the table's last decimal, and the seven digits of the XYZ matrix, whose
    // rounding the cube root of small sums enlarges
    [lightness, a, b].forEach((value, i) => {
      expect(Math.abs(value - lab[i]!)).toBeLessThan(0.0015);
    });
  });

  it('gives white lightness 1 and greys no colour', () => {
    for (const level of [0, 1, 64, 128, 255]) {
      const { lightness, a, b } = oklabFromBytes([level, level, level]);
      // 1e-6: the matrices' ten digits
      expect(Math.abs(a)).toBeLessThan(1e-6);
      expect(Math.abs(b)).toBeLessThan(1e-6);
      if (level === 255) expect(Math.abs(lightness - 1)).toBeLessThan(1e-6);
    }
  });

  it('is undone by its inverse', () => {
    for (const colour of [
      [0.2, 0.5, 0.8],
      [1, 0, 0],
      [0.01, 0.9, 0.3],
    ] as const) {
      linearFromOklab(oklabFromLinear(colour)).forEach((part, i) => {
        // 1e-6: the two published matrices are inverses to about 1e-7
        expect(Math.abs(part - colour[i]!)).toBeLessThan(1e-6);
      });
    }
  });
});
