/** Baselines against the published equations solved by SciPy, and against their limits. */
import { describe, expect, it } from 'vitest';
import {
  type BaselineOptions,
  createBaselineFinder,
} from '../../../src/science/condition/baseline';
import { PenalisedSmoother } from '../../../src/science/numeric/penalised-smoother';
import { expected, farthest } from './expected';
import { evenAxis, place } from './made-conditioned';

const spectrum = Float64Array.from(expected.spectrum);
const nk = spectrum.length;

function baselineOf(options: BaselineOptions, counts = spectrum): Float64Array {
  const out = new Float64Array(counts.length);
  createBaselineFinder(options, evenAxis(counts.length), place).find(counts, out);
  return out;
}

/** Least-squares straight line, by the textbook's sums. */
function straightLine(counts: Float64Array): Float64Array {
  const n = counts.length;
  const mean = counts.reduce((sum, value) => sum + value, 0) / n;
  const middle = (n - 1) / 2;
  const slope =
    counts.reduce((sum, value, k) => sum + value * (k - middle), 0) / ((n * (n * n - 1)) / 12);
  return counts.map((_, k) => mean + slope * (k - middle));
}

describe('the smoother', () => {
  it.each(expected.smoother)(
    'solves the banded system as a dense solve does, λ = $lambda',
    ({ lambda, values }) => {
      const out = new Float64Array(nk);
      const weights = Float64Array.from(expected.weights);
      new PenalisedSmoother(nk, lambda).solve(spectrum, weights, out);
      // Condition number λ · 16: 1e6 leaves nine digits of hundreds of counts.
      expect(farthest(out, values)).toBeLessThan(1e-6);
    },
  );
});

describe('asymmetric least squares, Eilers & Boelens (2005)', () => {
  it('agrees with the sparse solve of its equations', () => {
    const options = { method: 'asls', smoothness: 1e4, asymmetry: 0.01, iterations: 50 } as const;
    expect(farthest(baselineOf(options), expected.asls)).toBeLessThan(1e-6);
  });

  it('is the spectrum itself for λ → 0', () => {
    const options = { method: 'asls', smoothness: 1e-9, asymmetry: 0.5, iterations: 20 } as const;
    expect(farthest(baselineOf(options), spectrum)).toBeLessThan(1e-4);
  });

  it('is the least-squares line for λ → ∞ and even weights', () => {
    const options = { method: 'asls', smoothness: 1e11, asymmetry: 0.5, iterations: 20 } as const;
    expect(farthest(baselineOf(options), straightLine(spectrum))).toBeLessThan(0.01);
  });
});

describe('arPLS, Baek et al. (2015)', () => {
  it('agrees with the sparse solve of its equations', () => {
    const options = { method: 'arpls', smoothness: 1e4, iterations: 50 } as const;
    expect(farthest(baselineOf(options), expected.arpls)).toBeLessThan(1e-5);
  });

  it('is the spectrum itself for λ → 0', () => {
    const options = { method: 'arpls', smoothness: 1e-12, iterations: 20 } as const;
    expect(farthest(baselineOf(options), spectrum)).toBeLessThan(1e-4);
  });

  it('is a straight line for λ → ∞', () => {
    const curve = baselineOf({ method: 'arpls', smoothness: 1e11, iterations: 20 });
    expect(farthest(curve, straightLine(curve))).toBeLessThan(0.01);
  });

  it('takes the whole of a straight floor, and nothing of a line on it', () => {
    const floor = Float64Array.from({ length: 300 }, (_, k) => 100 + 0.5 * k);
    const counts = floor.map((value, k) => value + 500 * Math.exp(-((k - 150) ** 2) / 50));
    const curve = baselineOf({ method: 'arpls', smoothness: 1e6, iterations: 50 }, counts);
    expect(farthest(curve, floor)).toBeLessThan(1);
  });
});

describe('clipping', () => {
  it('agrees with SNIP written in NumPy', () => {
    expect(farthest(baselineOf({ method: 'snip', halfWidth: 20 }), expected.snip)).toBeLessThan(
      1e-9,
    );
  });

  it('takes a straight floor to within half a percent: it bends under two logarithms', () => {
    const floor = Float64Array.from({ length: 200 }, (_, k) => 1000 + k);
    expect(farthest(baselineOf({ method: 'snip', halfWidth: 40 }, floor), floor)).toBeLessThan(5);
  });
});

describe('a polynomial', () => {
  it('through a window is NumPy’s least squares there', () => {
    const axis = evenAxis(nk);
    const windows = [[axis.edgesEv[0], axis.edgesEv[40]]] as const;
    const curve = baselineOf({ method: 'polynomial', degree: 3, windows });
    // Outside of its window a cubic grows to thousands.
    const size = Math.max(...expected.polynomial.map((value) => Math.abs(value)));
    expect(farthest(curve, expected.polynomial)).toBeLessThan(1e-8 * size);
  });

  it('found by clipping lies under a line, on a parabola', () => {
    const floor = Float64Array.from({ length: 300 }, (_, k) => 100 + (k - 150) ** 2 / 100);
    const counts = floor.map((value, k) => value + 500 * Math.exp(-((k - 150) ** 2) / 50));
    const curve = baselineOf({ method: 'polynomial', degree: 2, windows: null }, counts);
    expect(farthest(curve, floor)).toBeLessThan(0.1);
  });
});
