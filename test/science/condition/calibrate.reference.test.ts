/** Calibration against NumPy, and finding lines of lamps and standards in made spectra. */
import { describe, expect, it } from 'vitest';
import { calibratedAxis, fitCalibration } from '../../../src/science/condition/calibrate';
import { findLines } from '../../../src/science/condition/find-lines';
import { lampLinesNm, shiftLinesCm1 } from '../../../src/science/condition/reference-lines';
import { createRandom } from '../../../src/science/numeric/random';
import { expected, farthest } from './expected';
import { axisOf, evenAxis, place } from './made-conditioned';

describe.each(expected.calibration)('a polynomial of degree $degree', (made) => {
  const fit = fitCalibration(made.points, made.degree, place);

  it('is NumPy’s', () => {
    for (const [measured, truth] of made.at) expect(fit.trueOf(measured)).toBeCloseTo(truth, 10);
    expect(farthest(fit.residuals, made.residuals)).toBeLessThan(1e-10);
  });

  it('has the left-out residuals of fits without each point', () => {
    expect(farthest(fit.leaveOneOut, made.leaveOneOut)).toBeLessThan(1e-9);
    expect(fit.leaveOneOutRms).toBeGreaterThan(fit.rms);
  });
});

describe('the axis', () => {
  const hc = 1239.8419843320025;

  it('moves by a shift in vacuum wavelength', () => {
    const fit = fitCalibration([[600, 600.5]], 0, place);
    const moved = calibratedAxis(
      axisOf([hc / 640, hc / 600]),
      fit,
      { unit: 'nm', medium: 'vacuum' },
      place,
    );
    expect(hc / moved.centresEv[1]).toBeCloseTo(600.5, 10);
    expect(hc / moved.centresEv[0]).toBeCloseTo(640.5, 10);
    expect(fit.leaveOneOut[0]).toBeNaN();
  });

  it('moves by a Raman shift from the laser', () => {
    const fit = fitCalibration([[519.6, 520.6]], 0, place);
    const laserEv = hc / 532;
    const cm1 = 1e7 / hc;
    const energies = [laserEv - 600 / cm1, laserEv - 519.6 / cm1];
    const moved = calibratedAxis(axisOf(energies), fit, { unit: 'cm-1', laserEv }, place);
    expect((laserEv - moved.centresEv[1]) * cm1).toBeCloseTo(520.6, 8);
  });

  it('is refused where it turns back, and where the laser is not known', () => {
    const fit = fitCalibration(
      [
        [688.8, 688.8],
        [688.4, 689.6],
      ],
      1,
      place,
    );
    expect(() => calibratedAxis(evenAxis(9), fit, { unit: 'nm', medium: 'air' }, place)).toThrow(
      'out of order',
    );
    expect(() => calibratedAxis(evenAxis(9), fit, { unit: 'cm-1', laserEv: null }, place)).toThrow(
      'laser',
    );
  });

  it.each<[string, readonly (readonly [number, number])[], number]>([
    [
      'needs 3 points',
      [
        [1, 1],
        [2, 2],
      ],
      2,
    ],
    ['needs 1 points', [], 0],
    ['point 1', [[Number.NaN, 1]], 0],
    [
      'two true ones',
      [
        [1, 1],
        [1, 2],
        [3, 3],
      ],
      1,
    ],
  ])('is refused for points of which one … %s', (words, points, degree) => {
    expect(() => fitCalibration(points, degree, place)).toThrow(words);
  });
});

/** Lines of some width on a floor with Poisson noise. */
function lineSpectrum(axis: readonly number[], at: readonly number[], width: number): number[] {
  const random = createRandom(3);
  return axis.map((value) =>
    random.poisson(
      30 +
        at.reduce(
          (sum, line, i) =>
            sum + (1000 + 300 * (i % 4)) * Math.exp(-((value - line) ** 2) / (2 * width ** 2)),
          0,
        ),
    ),
  );
}

describe('lines of known place are found', () => {
  it('of neon, on an axis 0.8 nm off (NIST ASD, air)', () => {
    const axis = Array.from({ length: 1024 }, (_, k) => 580 + 0.1 * k);
    const seen = lampLinesNm.neon.filter((nm) => nm < 680);
    const counts = lineSpectrum(
      axis,
      seen.map((nm) => nm - 0.8),
      0.15,
    );
    const found = findLines(axis, counts, lampLinesNm.neon, 2);
    expect(found.map(({ truth }) => truth)).toEqual(seen);
    for (const { measured, truth } of found) expect(measured).toBeCloseTo(truth - 0.8, 1);
    const fit = fitCalibration(
      found.map(({ measured, truth }) => [measured, truth]),
      1,
      place,
    );
    expect(Math.abs(fit.trueOf(632.64278) - 633.44278)).toBeLessThan(0.01);
  });

  it('of argon, with a lamp line of another gas among them', () => {
    const axis = Array.from({ length: 1340 }, (_, k) => 690 + 0.1 * k);
    const seen = lampLinesNm.argon.filter((nm) => nm > 691 && nm < 823);
    const counts = lineSpectrum(axis, [...seen.map((nm) => nm + 0.3), 743.2], 0.12);
    const found = findLines(axis, counts, lampLinesNm.argon, 1);
    expect(found.map(({ truth }) => truth)).toEqual(seen);
  });

  it('of silicon, and of polystyrene by ASTM E1840, on descending axes', () => {
    const axis = Array.from({ length: 1000 }, (_, k) => 3200 - 3 * k);
    const counts = lineSpectrum(
      axis,
      shiftLinesCm1.polystyrene.map((shift) => shift + 4),
      5,
    );
    const found = findLines(axis, counts, shiftLinesCm1.polystyrene, 12);
    expect(found.length).toBeGreaterThanOrEqual(10);
    for (const { measured, truth } of found) expect(Math.abs(measured - truth - 4)).toBeLessThan(1);
    const fine = Array.from({ length: 400 }, (_, k) => 700 - k);
    const silicon = findLines(fine, lineSpectrum(fine, [523.1], 2), shiftLinesCm1.silicon, 5);
    expect(silicon).toHaveLength(1);
    expect(silicon[0].measured).toBeCloseTo(523.1, 0);
  });

  it('not at all in noise, an empty and a constant spectrum', () => {
    const axis = Array.from({ length: 200 }, (_, k) => 580 + 0.5 * k);
    expect(findLines(axis, lineSpectrum(axis, [], 1), lampLinesNm.neon, 1)).toEqual([]);
    expect(
      findLines(
        axis,
        axis.map(() => Number.NaN),
        lampLinesNm.neon,
        1,
      ),
    ).toEqual([]);
    expect(
      findLines(
        axis,
        axis.map(() => 7),
        lampLinesNm.neon,
        1,
      ),
    ).toEqual([]);
  });
});

it('knows the lines of the tables (NIST ASD via Saloman & Sansonetti 2004; ASTM E1840)', () => {
  expect(lampLinesNm.neon).toContain(640.2248);
  expect(lampLinesNm.neon).toContain(703.24131);
  expect(lampLinesNm.argon).toContain(763.5106);
  expect(lampLinesNm.argon).toContain(912.2967);
  // From memory.
  expect(lampLinesNm.mercury).toEqual([546.074, 576.96, 579.066]);
  expect(shiftLinesCm1.polystyrene).toContain(1001.4);
  expect(shiftLinesCm1.cyclohexane).toContain(801.3);
  for (const lines of [...Object.values(lampLinesNm), ...Object.values(shiftLinesCm1)]) {
    expect([...lines].sort((a, b) => a - b)).toEqual(lines);
  }
});
