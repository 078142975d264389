import { describe, expect, it } from 'vitest';
import { detectedCounts } from '../../../src/science/condition/conditioned';
import {
  divideByResponse,
  type ResponseCurve,
  responseOnAxis,
} from '../../../src/science/condition/response';
import { monotoneCubic } from '../../../src/science/numeric/monotone-cubic';
import { expected, farthest } from './expected';
import { evenAxis, noNoise, place, spectrumOf } from './made-conditioned';

const axis = evenAxis(5);
const curveOf = (parts: Partial<ResponseCurve>): ResponseCurve => ({
  name: 'qe.csv',
  unit: 'eV',
  medium: 'air',
  axis: [1.7, 1.9],
  response: [0.5, 0.5],
  ...parts,
});

describe('the curve between its points', () => {
  it('is the monotone cubic that SciPy draws (PchipInterpolator)', () => {
    const { x, y, at, values } = expected.pchip;
    const curve = monotoneCubic(x, y);
    expect(farthest(at.map(curve), values)).toBeLessThan(1e-12);
  });

  it('ends with its points', () => {
    const curve = monotoneCubic([1, 2, 4], [3, 5, 4]);
    expect([curve(0.999), curve(4.001), curve(Number.NaN)]).toEqual([NaN, NaN, NaN]);
    expect([curve(1), curve(2), curve(4)]).toEqual([3, 5, 4]);
  });
});

describe('the response', () => {
  it('divides counts, their variances by its square, and multiplies the factor', () => {
    const slab = divideByResponse(spectrumOf([10, 20]), Float64Array.of(0.5, 0.25));
    expect([...slab.counts]).toEqual([20, 80]);
    expect([...(slab.variances ?? [])]).toEqual([40, 320]);
    expect([...slab.factor]).toEqual([0.5, 0.25]);
    expect([...detectedCounts(slab, 0, new Float64Array(2))]).toEqual([10, 20]);
    expect(
      divideByResponse(spectrumOf([10, 20], noNoise), Float64Array.of(1, 1)).variances,
    ).toBeNull();
  });

  it('makes no data outside of its curve, and where the detector is blind', () => {
    // Channels at 1.800 … 1.804 eV.
    const curve = curveOf({ axis: [1.8005, 1.8025, 1.8035], response: [0.8, 0.4, 0] });
    const found = responseOnAxis(curve, axis, place);
    expect(found.values[0]).toBeNaN();
    expect(found.values[4]).toBeNaN();
    expect(found).toMatchObject({ outsideChannels: 2, blindChannels: 0 });
    const slab = divideByResponse(spectrumOf([1, 1, 1, 1, 1]), found.values);
    expect([...slab.counts].map(Number.isNaN)).toEqual([true, false, false, false, true]);
    const blind = curveOf({ axis: [1.7, 1.8015, 1.802, 1.9], response: [0.8, 0.4, 0, 0] });
    expect(responseOnAxis(blind, axis, place).blindChannels).toBe(3);
  });

  it('is told to be in percent where it exceeds one and a half', () => {
    const percent = responseOnAxis(curveOf({ response: [50, 50] }), axis, place);
    expect(percent.isPercent).toBe(true);
    expect(percent.values[2]).toBeCloseTo(0.5, 12);
    const fraction = responseOnAxis(curveOf({ response: [0.5, 1.02] }), axis, place);
    expect(fraction.isPercent).toBe(false);
  });

  it('counts channels below a tenth of its greatest value', () => {
    const curve = curveOf({
      axis: [1.8, 1.801, 1.802, 1.803, 1.804],
      response: [1, 0.5, 0.11, 0.09, 0.05],
    });
    expect(responseOnAxis(curve, axis, place).faintChannels).toBe(2);
  });

  it('reads wavelengths in air or in vacuum, in either order', () => {
    // 1.802 eV is 688.0366 nm in vacuum (CODATA hc), 0.1899 nm less in air (Ciddor, n − 1 = 2.7606e-4).
    const nm = curveOf({
      unit: 'nm',
      medium: 'vacuum',
      axis: [700, 688.0366, 680],
      response: [0.1, 0.6, 0.9],
    });
    expect(responseOnAxis(nm, axis, place).values[2]).toBeCloseTo(0.6, 4);
    const air = curveOf({
      unit: 'nm',
      medium: 'air',
      axis: [700, 687.8467, 680],
      response: [0.1, 0.6, 0.9],
    });
    expect(responseOnAxis(air, axis, place).values[2]).toBeCloseTo(0.6, 4);
  });

  it.each<[string, Partial<ResponseCurve>]>([
    ['runs from 690 to 700 nm', { unit: 'nm', axis: [690, 700] }],
    ['a curve needs two', { axis: [1.8], response: [1] }],
    ['nowhere above 0', { response: [0, -1] }],
    ['more than once', { axis: [1.8, 1.8] }],
    ['point 2', { response: [1, Number.NaN] }],
  ])('refuses a curve that … %s', (words, parts) => {
    expect(() => responseOnAxis(curveOf(parts), axis, place)).toThrow(words);
    expect(() => responseOnAxis(curveOf(parts), axis, place)).toThrow(place);
  });
});
