/** Whether the errors a fit gives are the errors it makes: many spectra of one known truth. */
import { describe, expect, it } from 'vitest';
import { fitStatus } from '../../../src/science/fit/fit-plan';
import { qualityAt } from '../../../src/science/fit/fit-record';
import { PixelFitter } from '../../../src/science/fit/pixel-fitter';
import {
  drawSpectrum,
  expectedCounts,
  type MadeModel,
  makeModel,
  uniformAxis,
} from './made-spectra';

const axis = uniformAxis(128, 1.9, 2.1);

/** A Gaussian of so many counts on a floor that adds a fifth of them under its width. */
function peakOf(area: number): MadeModel {
  return makeModel(axis, [
    { name: 'floor', shape: 'flat', parameters: [{ truth: area / 100 }] },
    {
      name: 'peak',
      shape: 'gaussian',
      parameters: [
        { truth: area, start: null },
        { truth: 2, start: 2.003, min: 1.9, max: 2.1 },
        { truth: 0.03, start: 0.035, max: 0.2 },
      ],
    },
  ]);
}

interface Sample {
  readonly name: string;
  readonly truth: number;
  readonly values: number[];
  readonly errors: number[];
}

/** Fits `count` draws; each sample is one parameter. */
function fitDraws(made: MadeModel, count: number): { samples: Sample[]; statuses: number[] } {
  const { plan } = made.model;
  const expected = expectedCounts(made);
  const fitter = new PixelFitter(made.model);
  const { quantities } = fitter.layout;
  const samples = plan.parameters.map(
    ({ name }, i): Sample => ({ name, truth: made.truth[i]!, values: [], errors: [] }),
  );
  const statuses = [0, 0, 0, 0, 0];
  for (let draw = 0; draw < count; draw++) {
    const row = fitter.fit(drawSpectrum(expected, 11, draw));
    const status = row[qualityAt(fitter.layout, 'status')]!;
    statuses[status]!++;
    if (status !== fitStatus.converged) continue;
    for (const [at, { parameter }] of quantities.entries()) {
      if (parameter < 0) continue;
      samples[parameter]!.values.push(row[at]!);
      samples[parameter]!.errors.push(row[at + quantities.length]!);
    }
  }
  return { samples, statuses };
}

const sorted = (values: readonly number[]): number[] => [...values].sort((a, b) => a - b);
const quantile = (values: readonly number[], share: number): number =>
  sorted(values)[Math.round(share * (values.length - 1))]!;
const mean = (values: readonly number[]): number =>
  values.reduce((sum, value) => sum + value, 0) / values.length;

function pullsOf({ values, errors, truth }: Sample): number[] {
  return values.map((value, i) => (value - truth) / errors[i]!);
}

/** Half the distance between the 15.87 and 84.13 percentiles: 1 for a normal distribution. */
const widthOf = (pulls: readonly number[]): number =>
  (quantile(pulls, 0.8413) - quantile(pulls, 0.1587)) / 2;

const coverOf = (pulls: readonly number[]): number =>
  pulls.filter((pull) => Math.abs(pull) < 1).length / pulls.length;

describe.each([100, 1000, 20_000])('errors of a peak of %i counts', (area) => {
  const draws = 3000;
  const { samples, statuses } = fitDraws(peakOf(area), draws);

  it('are given at all but a few spectra, each of which says why', () => {
    expect(statuses[fitStatus.converged]).toBeGreaterThan(0.99 * draws);
    expect(statuses[fitStatus.notConverged]).toBe(0);
  });

  it('are centred on the truth, as wide as they say, and cover it as often as 1 σ should', () => {
    for (const sample of samples) {
      const pulls = pullsOf(sample);
      expect(Math.abs(quantile(pulls, 0.5)), sample.name).toBeLessThan(0.1);
      expect(widthOf(pulls), sample.name).toBeGreaterThan(0.9);
      expect(widthOf(pulls), sample.name).toBeLessThan(1.1);
      expect(coverOf(pulls), sample.name).toBeGreaterThan(0.64);
      expect(coverOf(pulls), sample.name).toBeLessThan(0.72);
    }
  });
});

describe('the estimates', () => {
  it('scatter as little as any unbiased ones can, to 5 % of the variance', () => {
    // Cramér–Rao: the inverse of Σ (∂μ/∂a)(∂μ/∂b)/μ, here by differences of the expected counts and
    // Gauss–Jordan elimination, apart from the program's own derivatives and solver.
    const made = peakOf(20_000);
    const bound = cramerRao(made);
    // The variance of 4000 draws is itself known to √(2/4000) = 2.2 %.
    const { samples } = fitDraws(made, 4000);
    for (const [i, { name, values }] of samples.entries()) {
      const middle = mean(values);
      const variance = mean(values.map((value) => (value - middle) ** 2));
      expect(Math.abs(variance / bound[i]! - 1), name).toBeLessThan(0.05);
    }
  });
});

/** Least variance of each parameter at the truth. */
function cramerRao(made: MadeModel): number[] {
  const at = (truth: Float64Array): Float64Array => expectedCounts({ ...made, truth });
  const here = at(made.truth);
  const slopes = Array.from(made.truth, (value, i) => {
    const step = 1e-5 * Math.max(Math.abs(value), 1e-3);
    const high = Float64Array.from(made.truth);
    const low = Float64Array.from(made.truth);
    high[i]! += step;
    low[i]! -= step;
    const [above, below] = [at(high), at(low)];
    return above.map((one, k) => (one - below[k]!) / (2 * step));
  });
  const information = slopes.map((one) =>
    slopes.map((other) => one.reduce((sum, slope, k) => sum + (slope * other[k]!) / here[k]!, 0)),
  );
  return inverseDiagonal(information);
}

function inverseDiagonal(matrix: readonly (readonly number[])[]): number[] {
  const size = matrix.length;
  const rows = matrix.map((row, i) => [...row, ...row.map((_, j) => (i === j ? 1 : 0))]);
  for (let i = 0; i < size; i++) {
    const pivot = rows[i]![i]!;
    rows[i] = rows[i]!.map((value) => value / pivot);
    for (let j = 0; j < size; j++) {
      if (j === i) continue;
      const factor = rows[j]![i]!;
      rows[j] = rows[j]!.map((value, k) => value - factor * rows[i]![k]!);
    }
  }
  return rows.map((row, i) => row[size + i]!);
}
