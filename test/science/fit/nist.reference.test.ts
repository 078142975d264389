/**
 * The solver against NIST's Statistical Reference Datasets for nonlinear regression (Gauss1–3 and
 * Eckerle4, https://www.itl.nist.gov/div898/strd/nls/nls_main.shtml): certified to eleven digits.
 */
import { describe, expect, it } from 'vitest';
import { modelOnGrid } from '../../../src/science/fit/fit-model';
import type { FitPlan, PlannedParameter } from '../../../src/science/fit/fit-plan';
import { closeTolerance, SpectrumFitter } from '../../../src/science/fit/fit-spectrum';
import { type NistProblem, readNist } from './nist-file';

const free = (name: string, start: number, min = -Infinity): PlannedParameter => ({
  name,
  start,
  min,
  max: Infinity,
  isFixed: false,
  tie: null,
});

/** Channels so narrow that a channel's counts are the curve's value at its centre times their width. */
const width = 1e-6;

function gridOf(x: Float64Array) {
  const edgesEv = new Float64Array(x.length + 1);
  edgesEv[0] = x[0] - 1;
  for (let k = 1; k < x.length; k++) edgesEv[k] = (x[k - 1] + x[k]) / 2;
  edgesEv[x.length] = x[x.length - 1] + 1;
  return { centresEv: x, widthsEv: new Float64Array(x.length).fill(width), edgesEv };
}

function fitterFor(
  problem: NistProblem,
  shapes: readonly string[],
  parameters: PlannedParameter[],
) {
  let first = 0;
  const components = shapes.map((shape, index) => {
    const count = shape === 'decay' ? 2 : 3;
    first += count;
    const name = `c${index}`;
    return { name, shape, role: null, isOptional: false, first: first - count, count };
  });
  const plan: FitPlan = {
    firstChannel: 0,
    endChannel: problem.x.length,
    noise: { kind: 'uniform' },
    seed: 'start',
    components,
    parameters,
    laserEv: null,
  };
  const fitter = new SpectrumFitter(modelOnGrid(plan, gridOf(problem.x)));
  fitter.load(problem.y);
  return fitter;
}

/** Ours from theirs: h exp(−(x−b)²/c²) has the area h c √π and the full width 2 √(ln 2) c. */
const fwhmPerC = 2 * Math.sqrt(Math.log(2));
const areaPerHc = Math.sqrt(Math.PI) / width;

const worst = (got: readonly number[], want: readonly number[]): number =>
  Math.max(...got.map((value, i) => Math.abs(value / want[i] - 1)));

describe.each(['Gauss1', 'Gauss2', 'Gauss3'])('NIST %s', (name) => {
  const problem = readNist(name);
  it.each([0, 1])('is solved from certified start %i to six digits and more', (which) => {
    const b = problem.starts[which];
    const middle = (problem.x[0] - 1 + problem.x[problem.x.length - 1] + 1) / 2;
    const peak = (height: number, centre: number, c: number) => [
      free('area', height * c * areaPerHc),
      free('centre', centre),
      free('fwhm', c * fwhmPerC, 1e-3),
    ];
    const fitter = fitterFor(
      problem,
      ['decay', 'gaussian', 'gaussian'],
      [
        free('level', b[0] * Math.exp(-b[1] * middle)),
        free('decay', 1 / b[1], 1),
        ...peak(b[2], b[3], b[4]),
        ...peak(b[5], b[6], b[7]),
      ],
    );
    const starts = fitter.model.plan.parameters.map(({ start }) => start ?? 0);
    const found = fitter.fit(Float64Array.from(starts), [true, true, true], closeTolerance);
    const v = found.values;
    const covariance = new Float64Array(64);
    fitter.writeCovariance(covariance);
    const variance = (gradient: Readonly<Record<number, number>>): number => {
      let sum = 0;
      for (const [i, gi] of Object.entries(gradient)) {
        for (const [j, gj] of Object.entries(gradient)) sum += gi * gj * covariance[+i * 8 + +j];
      }
      return Math.sqrt(sum);
    };
    const rate = 1 / v[1];
    const top = v[0] * Math.exp(middle * rate);
    const got: number[] = [top, rate];
    const errors: number[] = [
      variance({ 0: top / v[0], 1: -top * middle * rate * rate }),
      variance({ 1: rate * rate }),
    ];
    for (const i of [2, 5]) {
      const c = v[i + 2] / fwhmPerC;
      const height = v[i] / (c * areaPerHc);
      got.push(height, v[i + 1], c);
      errors.push(
        variance({ [i]: height / v[i], [i + 2]: -height / v[i + 2] }),
        variance({ [i + 1]: 1 }),
        variance({ [i + 2]: 1 / fwhmPerC }),
      );
    }
    expect(found.status).toBe(1);
    expect(worst(got, problem.certified)).toBeLessThan(1e-7);
    expect(worst(errors, problem.deviations)).toBeLessThan(1e-6);
    // Our Gaussians end where 1e-9 of their height is left, which shows in the tenth digit.
    expect(found.deviance / problem.residualSum).toBeCloseTo(1, 8);
  });
});

describe('NIST Eckerle4', () => {
  const problem = readNist('Eckerle4');
  it.each([0, 1])('is solved from certified start %i to six digits and more', (which) => {
    const [b1, b2, b3] = problem.starts[which];
    const perArea = Math.sqrt(2 * Math.PI) / width;
    const perSigma = 2 * Math.sqrt(2 * Math.log(2));
    const fitter = fitterFor(
      problem,
      ['gaussian'],
      [free('area', b1 * perArea), free('centre', b3), free('fwhm', b2 * perSigma, 1e-3)],
    );
    const starts = fitter.model.plan.parameters.map(({ start }) => start ?? 0);
    const { values, errors, status, deviance } = fitter.fit(
      Float64Array.from(starts),
      [true],
      closeTolerance,
    );
    expect(status).toBe(1);
    const got = [values[0] / perArea, values[2] / perSigma, values[1]];
    const deviations = [errors[0] / perArea, errors[2] / perSigma, errors[1]];
    expect(worst(got, problem.certified)).toBeLessThan(1e-7);
    expect(worst(deviations, problem.deviations)).toBeLessThan(1e-6);
    expect(deviance / problem.residualSum).toBeCloseTo(1, 9);
  });
});
