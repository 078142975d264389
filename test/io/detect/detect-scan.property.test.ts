/** Whatever a file holds, looking at it ends in a plan or in a sentence. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { isRimlightError } from '../../../src/errors';
import { detectScan } from '../../../src/io/detect/detect-scan';
import type { ScanChoices } from '../../../src/io/scan-choices';
import { type FakeArray, fakeContainer } from '../fake-container';

const names = [
  ...[
    'counts',
    'intensity',
    'dark',
    'height',
    'wavelength',
    'wavelength_nm',
    'energy',
    'Raman shift [cm-1]',
  ],
  ...[
    'wavenumber',
    'x',
    'y',
    'x_um',
    'gate_volts',
    'Pixel',
    'axis',
    '',
    'laser_nm',
    'column 1',
    'z',
    'exposure_s',
  ],
];
const units = ['nm', 'eV', 'cm-1', 'um', 'V', 'counts', 'furlong', ''];

const array: fc.Arbitrary<FakeArray> = fc
  .record({
    shape: fc.array(fc.integer({ min: 0, max: 6 }), { maxLength: 4 }),
    first: fc.constantFrom(-100, 0, 1, 1.8, 600, 18_000, Number.NaN, Number.POSITIVE_INFINITY),
    step: fc.constantFrom(-3, 0, 0.01, 1, 10.5),
    unit: fc.option(fc.constantFrom(...units)),
    holes: fc.boolean(),
  })
  .map(({ shape, first, step, unit, holes }) => {
    const size = shape.reduce((product, length) => product * length, 1);
    const data = Float64Array.from({ length: size }, (_, i) =>
      holes && i % 3 === 2 ? Number.NaN : first + i * step,
    );
    return { shape, data, attributes: unit === null ? {} : { units: unit } };
  });

const stating: fc.Arbitrary<ScanChoices> = fc.record(
  {
    data: fc.constantFrom('counts', 'nothing'),
    order: fc.constantFrom('yxk', 'kyx', 'xk', 'k', 'zz'),
    axis: fc.constantFrom<NonNullable<ScanChoices['axis']>[]>(
      { from: 1, to: 2, unit: 'eV' },
      { values: [1, 2, 3], kind: 'shift' },
      { data: 'energy' },
      { file: 'axis.npy' },
      { kind: 'wavelength', unit: 'nm', medium: 'vacuum' },
    ),
    laser: fc.constantFrom<NonNullable<ScanChoices['laser']>[]>(
      { value: 532, unit: 'nm' },
      { value: 0, unit: 'eV' },
    ),
    pixel: fc.constantFrom({ x: 1, y: 2, unit: 'nm' }, { x: 0, y: 1, unit: 'V' }),
    height: fc.constantFrom({ data: 'height' }, { file: 'h.npy' }),
    serpentine: fc.boolean(),
  },
  { requiredKeys: [] },
);

const choices = fc.oneof({ weight: 2, arbitrary: fc.constant<ScanChoices>({}) }, stating);

/** Arrays at random, and every other time among them a cube with an axis, so that plans come up too. */
const files = fc
  .record({
    arrays: fc.dictionary(fc.constantFrom(...names), array, { maxKeys: 7 }),
    shape: fc.constantFrom([3, 4, 5], [5, 4, 3], [4, 5], [5, 5], [5], [5, 2, 5]),
    axis: fc.constantFrom('wavelength_nm', 'energy', 'Raman shift [cm-1]', 'wavenumber', 'axis'),
    first: fc.constantFrom(1.8, 600, 18_000),
    isScan: fc.boolean(),
  })
  .map(({ arrays, shape, axis, first, isScan }) => {
    if (!isScan) return arrays;
    const size = shape.reduce((product, length) => product * length, 1);
    const counts: FakeArray = { shape, data: Uint16Array.from({ length: size }, (_, i) => i) };
    const values: FakeArray = { shape: [5], data: [0, 1, 2, 3, 4].map((k) => first + k / 8) };
    return { ...arrays, counts, [axis]: values };
  });

describe('detectScan', () => {
  it('ends with a plan or a problem, and a plan fits the file', async () => {
    let plans = 0;
    await fc.assert(
      fc.asyncProperty(files, choices, async (arrays, stated) => {
        const container = fakeContainer({ format: 'npz', arrays });
        const { plan, problems, guesses } = await detectScan(container, [], stated, 'scan.npz');
        expect(plan === null).toBe(problems.length > 0);
        for (const problem of problems) {
          expect(isRimlightError(problem) && problem.kind !== 'fault').toBe(true);
          expect(problem.message).not.toMatch(/undefined|\[object|null/);
        }
        for (const { label, evidence } of guesses) {
          expect(`${label} ${evidence}`).not.toMatch(/undefined|\[object|null/);
          expect(evidence.length).toBeGreaterThan(5);
        }
        if (plan === null) return;
        plans++;
        const { centresEv, edgesEv } = plan.meta.axis;
        expect(centresEv.length).toBe(plan.meta.shape.nk);
        expect(edgesEv.length).toBe(plan.meta.shape.nk + 1);
        for (let k = 0; k < centresEv.length; k++) expect(edgesEv[k]).toBeLessThan(edgesEv[k + 1]);
        expect(plan.cube.fileShape).toEqual(arrays[plan.cube.path].shape);
        const again = await detectScan(
          container,
          [],
          JSON.parse(JSON.stringify(plan.resolved)),
          'scan.npz',
        );
        expect(again.plan).toEqual(plan);
      }),
      { numRuns: 1500 },
    );
    // A test that never gets to a plan would check nothing of it.
    expect(plans).toBeGreaterThan(30);
  });
});
