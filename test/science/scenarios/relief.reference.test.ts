// The closed form of the strain against the differential equation it solves.
import { expect, it } from 'vitest';
import {
  type Bell,
  type Relief,
  reliefHeightNm,
  strainTracePercent,
} from '../../../src/science/scenarios/relief';

const bell: Bell = { xNm: 3, yNm: -7, heightNm: 15, sigmaNm: 70 };
const relief: Relief = { bells: [bell], ridges: [], poissonRatio: 0.22 };

/** Second differences at a point, sixth-order accurate (B. Fornberg, Math. Comput. 51, 699 (1988), table 1). */
const weights = [1 / 90, -3 / 20, 3 / 2, -49 / 18, 3 / 2, -3 / 20, 1 / 90];
const STEP_NM = 2;

function second(f: (t: number) => number): number {
  return weights.reduce((sum, w, i) => sum + w * f((i - 3) * STEP_NM), 0) / STEP_NM ** 2;
}

it.each([
  [3, -7],
  [40, 10],
  [-60, 80],
  [150, -120],
])('solves ∇²(εxx + εyy) = −(1 − ν)(hxx hyy − hxy²) at (%d, %d) nm', (x, y) => {
  // trace of ∇⁴χ = −Y(hxx hyy − hxy²), Föppl and von Kármán; Landau and Lifshitz, Theory of Elasticity, §14
  const h = (dx: number, dy: number) => reliefHeightNm(relief, x + dx, y + dy);
  const trace = (dx: number, dy: number) => strainTracePercent(relief, x + dx, y + dy) / 100;
  const hxx = second((t) => h(t, 0));
  const hyy = second((t) => h(0, t));
  const diagonal = second((t) => h(t, t));
  const hxy = (diagonal - hxx - hyy) / 2;
  const laplacian = second((t) => trace(t, 0)) + second((t) => trace(0, t));
  const curvature = hxx * hyy - hxy * hxy;
  expect(curvature).not.toBe(0);
  expect(Math.abs(laplacian / (-(1 - 0.22) * curvature) - 1)).toBeLessThan(1e-5);
});

it('gives (1 − ν) h₀²/4s² at the top of a bell', () => {
  // reference-values.md §5, computed there from the same theory
  expect(strainTracePercent(relief, 3, -7)).toBeCloseTo((100 * 0.78 * 15 ** 2) / (4 * 70 ** 2), 12);
});

it('stretches a ridge by its extra length: ∫ε du = ½∫h′² du', () => {
  const ridge = { xNm: 0, yNm: 0, angleRad: 0.4, heightNm: 5, sigmaNm: 25 };
  const ridged: Relief = { bells: [], ridges: [ridge], poissonRatio: 0.22 };
  const along = (u: number) => [-u * Math.sin(0.4), u * Math.cos(0.4)] as const;
  let [stretch, length] = [0, 0];
  for (let u = -200; u < 200; u += 0.5) {
    const slope =
      (reliefHeightNm(ridged, ...along(u + 0.25)) - reliefHeightNm(ridged, ...along(u - 0.25))) /
      0.5;
    stretch += (strainTracePercent(ridged, ...along(u)) / 100) * 0.5;
    length += 0.5 * slope ** 2 * 0.5;
  }
  expect(Math.abs(stretch / length - 1)).toBeLessThan(1e-4);
});

it('quadruples the strain when the height doubles', () => {
  const doubled = { ...relief, bells: [{ ...bell, heightNm: 30 }] };
  expect(strainTracePercent(doubled, 30, 20)).toBeCloseTo(
    4 * strainTracePercent(relief, 30, 20),
    12,
  );
});
