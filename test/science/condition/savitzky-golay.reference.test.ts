/** Smoothing weights against the published tables, as corrected, and SciPy. */
import { describe, expect, it } from 'vitest';
import {
  savitzkyGolayWeights,
  smoothForDisplay,
} from '../../../src/science/condition/savitzky-golay';
import { expected, farthest } from './expected';

// Savitzky & Golay, Anal. Chem. 36, 1627 (1964), with the corrections of Steinier, Termonia & Deltour,
// Anal. Chem. 44, 1906 (1972). 5 and 7 points and the slope: computed from the definition as well; 9, 11 and
// the quartics: from memory, checked by their sums.
const tables = [
  { half: 2, degree: 2, weights: [-3, 12, 17, 12, -3], norm: 35 },
  { half: 3, degree: 2, weights: [-2, 3, 6, 7, 6, 3, -2], norm: 21 },
  { half: 4, degree: 2, weights: [-21, 14, 39, 54, 59, 54, 39, 14, -21], norm: 231 },
  { half: 5, degree: 2, weights: [-36, 9, 44, 69, 84, 89, 84, 69, 44, 9, -36], norm: 429 },
  { half: 3, degree: 4, weights: [5, -30, 75, 131, 75, -30, 5], norm: 231 },
  { half: 4, degree: 4, weights: [15, -55, 30, 135, 179, 135, 30, -55, 15], norm: 429 },
];

describe.each(tables)(
  '$half channels on either side, degree $degree',
  ({ half, degree, weights, norm }) => {
    const table = weights.map((weight) => weight / norm);

    it('has the weights of the table, which add up to 1', () => {
      expect(farthest(savitzkyGolayWeights(half, degree), table)).toBeLessThan(1e-13);
      expect(weights.reduce((sum, weight) => sum + weight, 0)).toBe(norm);
    });

    it('has the same for the next odd degree', () => {
      expect(farthest(savitzkyGolayWeights(half, degree + 1), table)).toBeLessThan(1e-13);
    });
  },
);

it('has the slope (−2, −1, 0, 1, 2)/10 of five points, degree 2', () => {
  expect(farthest(savitzkyGolayWeights(2, 2, 1), [-0.2, -0.1, 0, 0.1, 0.2])).toBeLessThan(1e-14);
});

it('has SciPy’s weights for nine points, degree 4', () => {
  expect(farthest(savitzkyGolayWeights(4, 4), expected.savitzkyGolay.weights)).toBeLessThan(1e-12);
});

it('smooths as SciPy does, ends included', () => {
  const smoothed = smoothForDisplay(Float64Array.from(expected.spectrum), 4, 3);
  expect(farthest(smoothed, expected.savitzkyGolay.filtered)).toBeLessThan(1e-10);
});

it('leaves a cubic as it is, channels around a gap too, and spectra that are too short', () => {
  const cubic = Float64Array.from({ length: 30 }, (_, k) => (k - 10) ** 3);
  cubic[15] = Number.NaN;
  const smoothed = smoothForDisplay(cubic, 3, 3);
  expect(smoothed[15]).toBeNaN();
  cubic.forEach((value, k) => {
    if (k !== 15) expect(smoothed[k]).toBeCloseTo(value, 8);
  });
  expect([...smoothForDisplay(Float64Array.of(1, 5, 2), 2, 2)]).toEqual([1, 5, 2]);
});
