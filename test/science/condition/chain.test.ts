import { describe, expect, it } from 'vitest';
import {
  type ChainOutcome,
  planChain,
  runChain,
  shareRows,
} from '../../../src/science/condition/chain';
import type { ChainStep } from '../../../src/science/condition/chain-step';
import { conditionedFrom } from '../../../src/science/condition/conditioned';
import { counts, grid, recorded, run, shape, spectrum, steps } from './made-chain';
import { slabOf } from './made-conditioned';

const joined = (outcome: ChainOutcome, of: 'counts' | 'variances'): number[] =>
  outcome.slabs.flatMap((slab) => [...(slab[of] ?? [])]);

const chains: readonly (readonly [string, readonly ChainStep[]])[] = [
  [
    'despike, offset, response, far field, baseline',
    [steps.neighbour, steps.offset, steps.response, steps.farfield, steps.baseline],
  ],
  [
    'bin, neighbours, crop, bin',
    [steps.bin, steps.neighbour, { ...steps.crop, x: null, y: [1, 3], axisEv: null }, steps.bin],
  ],
  ['components, rows, crop, components', [steps.denoise, steps.align, steps.crop, steps.denoise]],
  [
    'crop, far field by pixel, bin, neighbours',
    [steps.crop, steps.byPixel, steps.bin, steps.neighbour],
  ],
  [
    'dark cube, calibration, rows, spectral, far field',
    [steps.dark, steps.calibrate, steps.align, steps.spectral, steps.farfield],
  ],
];

describe.each(chains)('%s', (_, chain) => {
  it('give the same bits however the rows are shared out', () => {
    const whole = run(chain);
    for (const cuts of [
      [0, 4, 11],
      [0, 1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11],
      [0, 10, 11],
    ]) {
      const parts = run(chain, cuts);
      expect(joined(parts, 'counts')).toEqual(joined(whole, 'counts'));
      expect(joined(parts, 'variances')).toEqual(joined(whole, 'variances'));
      expect(parts.steps.map(({ report }) => report)).toEqual(
        whole.steps.map(({ report }) => report),
      );
      const maps = (outcome: ChainOutcome) =>
        outcome.steps.map((step) =>
          step.maps.flatMap((part) => part.flatMap((map) => [...map.values])),
        );
      expect(maps(parts)).toEqual(maps(whole));
    }
  });

  it('end on the grid that was planned', () => {
    const { after } = planChain(chain, grid);
    const [slab] = run(chain).slabs;
    expect(slab.shape).toEqual(after.shape);
    expect(slab.axis).toEqual(after.axis);
    expect(slab.noise).toEqual(after.noise);
  });
});

describe('a chain', () => {
  it('of no steps is the scan as recorded, without a copy', () => {
    expect(run([]).slabs[0]).toBe(recorded);
  });

  it('skips steps that are off, and says nothing of them', () => {
    const off = { ...steps.offset, isOff: true, dark: Number.NaN };
    const outcome = run([off, steps.offset]);
    expect(outcome.steps.map(({ report }) => report.place)).toEqual(['condition[1], offset']);
    expect(outcome.slabs[0].counts[0]).toBe(counts[0] - 20);
  });

  it('says in numbers what each step did', () => {
    const lines = run([
      steps.neighbour,
      steps.response,
      steps.farfield,
      steps.denoise,
      steps.crop,
      steps.bin,
    ]).steps.map(({ report }) => report.line);
    expect(lines[0]).toBe('4 spikes in 4 px');
    expect(lines[1]).toBe('divided by 6.75 to 34.2 %, given in percent');
    expect(lines[2]).toMatch(/^out\.npy × 1\.\d+ ± 0\.0\d+, fitted$/);
    expect(lines[3]).toMatch(/^\d of 48 components kept, \d stand above the noise$/);
    expect(lines[4]).toBe('11 × 9 px of 12 × 11, 40 of 48 channels');
    expect(lines[5]).toBe(
      '2 × 2 px and 2 channels into one: 5 × 4 px, 20 channels; 1 column, 1 row dropped at the far edge',
    );
  });

  it('warns where the response is faint, and where errors are no longer independent', () => {
    const { curve } = steps.response;
    const outcome = run([
      { ...steps.response, curve: { ...curve, axis: [1.81, 1.83, 1.9], response: [100, 5, 5] } },
      steps.align,
    ]);
    expect(outcome.steps[0].report.warnings.join(' ')).toMatch(
      /below a tenth.*does not cover \d+ channels/,
    );
    expect(outcome.steps[1].report.warnings.join(' ')).toMatch(/not independent/);
  });

  it('tells a narrow line of the sample from cosmic rays by where it is', () => {
    const withLine = counts.map((value, at) => value + (at % 48 === 10 ? 900 : 0));
    const plan = planChain([steps.spectral], grid);
    const rows = shareRows(plan, { y0: 0, y1: 11 });
    const [step] = runChain(plan, [{ rows, slab: slabOf(withLine, shape) }]).steps;
    expect(step.report.warnings.join(' ')).toMatch(/^At 1\.8100 eV 1\d\d of 132 px were replaced/);
    expect(run([steps.spectral]).steps[0].report.warnings).toEqual([]);
  });

  it('lists every spike, so that it can be given back', () => {
    const [step] = run([steps.neighbour], [0, 5, 11]).steps;
    const found = step.spikes.flatMap((list) =>
      [...(list?.y ?? [])].map((y, i) => ({ y, x: list?.x[i] ?? 0, k: list?.k[i] ?? 0 })),
    );
    expect(found).toHaveLength(4);
    const again = run([{ ...steps.neighbour, kept: found }]);
    expect(again.steps[0].report.line).toBe('no spikes');
    expect(again.slabs[0].counts).toEqual(recorded.counts);
  });

  it('takes a tip-out recording through the steps of the detector before it is taken off', () => {
    // 50 counts with an offset of 20: 30 of light, divided by the response as the scan is.
    const outside = spectrum(50, 'out.npy');
    const chain: ChainStep[] = [
      steps.offset,
      steps.response,
      { ...steps.bin, y: 1 },
      { ...steps.farfield, outside, scale: 1 },
    ];
    const [without] = run(chain.slice(0, 3)).slabs;
    const [slab] = run(chain).slabs;
    const nk = 24;
    const factor = without.factor;
    for (let k = 0; k < nk; k++) {
      const taken = without.counts[k] - slab.counts[k];
      // Two columns, two channels; the response of the two differs by less than 5 %.
      expect(taken * factor[k]).toBeGreaterThan(4 * 30 * 0.97);
      expect(taken * factor[k]).toBeLessThan(4 * 30 * 1.03);
    }
  });

  it('knows no noise of a recording that is a mean', () => {
    const [slab] = run([{ ...steps.offset, dark: spectrum(20.5, 'dark.npy') }]).slabs;
    expect(slab.variances).toEqual(recorded.variances);
    const noisy = run([{ ...steps.offset, dark: spectrum(20, 'dark.npy') }]);
    expect(noisy.slabs[0].variances?.[0]).toBe(counts[0] + 20);
    expect(noisy.steps[0].report.line).toBe('dark.npy off all pixels alike, its noise added');
  });

  it('works on data that are not counts: no variances, no noise', () => {
    const none = { ...grid, noise: { kind: 'none' } as const };
    const plan = planChain(
      [steps.neighbour, steps.response, steps.farfield, steps.baseline, steps.denoise, steps.bin],
      none,
    );
    const rows = shareRows(plan, { y0: 0, y1: 11 });
    const slab = conditionedFrom({ y0: 0, shape, counts }, none, 'float32');
    const [out] = runChain(plan, [{ rows, slab }]).slabs;
    expect(out.variances).toBeNull();
    expect(out.counts).toBeInstanceOf(Float32Array);
    expect(out.counts.every((value) => Number.isFinite(value))).toBe(true);
  });

  it('survives pixels and scans without data', () => {
    const empty = slabOf(new Float64Array(11 * 12 * 48).fill(Number.NaN), shape);
    const plan = planChain(
      [
        steps.spectral,
        steps.neighbour,
        steps.offset,
        steps.response,
        steps.baseline,
        steps.byPixel,
        steps.align,
        steps.bin,
      ],
      grid,
    );
    const rows = shareRows(plan, { y0: 0, y1: 11 });
    const [out] = runChain(plan, [{ rows, slab: empty }]).slabs;
    expect(out.counts.every((value) => Number.isNaN(value))).toBe(true);
  });
});
