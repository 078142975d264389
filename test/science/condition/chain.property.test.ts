/** Laws of conditioning that hold for any data and any order of steps. */
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { planChain, runChain, shareRows } from '../../../src/science/condition/chain';
import type { ChainStep } from '../../../src/science/condition/chain-step';
import { type ConditionedSlab, detectedCounts } from '../../../src/science/condition/conditioned';
import { medianInPlace } from '../../../src/science/numeric/select';
import { gridOf, slabOf } from './made-conditioned';

const shape = { ny: 5, nx: 8, nk: 24 };
const grid = gridOf(shape);
const size = shape.ny * shape.nx * shape.nk;

const counts = fc.array(
  fc.oneof(
    { weight: 20, arbitrary: fc.integer({ min: 0, max: 500 }) },
    { weight: 1, arbitrary: fc.constant(Number.NaN) },
  ),
  {
    minLength: size,
    maxLength: size,
  },
);

/** Steps that change what is shown, not what was detected. */
const scaling: fc.Arbitrary<ChainStep> = fc.oneof(
  fc
    .integer({ min: -50, max: 400 })
    .map((dark): ChainStep => ({ isOff: false, step: 'offset', dark })),
  fc
    .tuple(
      fc.double({ min: 0.05, max: 1, noNaN: true }),
      fc.double({ min: 0.05, max: 1, noNaN: true }),
    )
    .map(
      (response): ChainStep => ({
        isOff: false,
        step: 'response',
        curve: { name: 'qe.csv', unit: 'eV', medium: 'air', axis: [1.7, 1.9], response },
      }),
    ),
  fc.double({ min: 0, max: 3, noNaN: true }).map(
    (scale): ChainStep => ({
      isOff: false,
      step: 'farfield',
      outside: {
        name: 'out.npy',
        shape: [shape.nk],
        values: new Float64Array(shape.nk).fill(30.5),
        y0: 0,
      },
      scale,
      window: null,
    }),
  ),
  fc.constantFrom<ChainStep>(
    { isOff: false, step: 'baseline', method: 'arpls', smoothness: 1e3, iterations: 10 },
    { isOff: false, step: 'baseline', method: 'polynomial', degree: 1, windows: null },
  ),
);

/** Steps that need other rows, or change the grid. */
const reaching = fc.constantFrom<ChainStep>(
  { isOff: false, step: 'despike', method: 'neighbour', threshold: 5, kept: [] },
  { isOff: false, step: 'despike', method: 'spectral', threshold: 5, kept: [] },
  { isOff: false, step: 'align-rows', maxShiftPx: 1 },
  { isOff: false, step: 'bin', x: 1, y: 2, k: 1 },
  { isOff: false, step: 'bin', x: 1, y: 1, k: 2 },
  { isOff: false, step: 'crop', axisEv: [1.8005, 1.9], x: null, y: [0, 1] },
);

function outcomeOf(chain: readonly ChainStep[], slab: ConditionedSlab, cuts: readonly number[]) {
  const plan = planChain(chain, grid);
  const parts = cuts.slice(1).map((y1, i) => {
    const rows = shareRows(plan, { y0: cuts[i], y1 });
    const { y0, y1: end } = rows.needed[0];
    const { nx, nk } = shape;
    const part = slabOf(slab.counts.subarray(y0 * nx * nk, Math.max(y0, end) * nx * nk), {
      ny: Math.max(0, end - y0),
      nx,
      nk,
    });
    return { rows, slab: { ...part, y0 } };
  });
  return runChain(plan, parts);
}

describe('conditioning', () => {
  it('by any steps that scale and shift never loses what was detected, and states no less than its noise', () => {
    fc.assert(
      fc.property(counts, fc.array(scaling, { maxLength: 5 }), (values, chain) => {
        const recorded = slabOf(values, shape);
        const [slab] = outcomeOf(chain, recorded, [0, shape.ny]).slabs;
        const out = new Float64Array(shape.nk);
        for (let pixel = 0; pixel < shape.ny * shape.nx; pixel++) {
          detectedCounts(slab, pixel, out);
          for (let k = 0; k < shape.nk; k++) {
            const was = values[pixel * shape.nk + k];
            if (Number.isNaN(was)) {
              expect(out[k]).toBeNaN();
              continue;
            }
            // A handful of roundings of numbers up to a few thousand.
            expect(Math.abs(out[k] - was)).toBeLessThan(1e-9);
            const variance = slab.variances?.[pixel * shape.nk + k] ?? Number.NaN;
            const least = was / (slab.factor[k] * slab.factor[k]);
            expect(variance).toBeGreaterThanOrEqual(least * (1 - 1e-12));
          }
        }
      }),
      { numRuns: 40 },
    );
  });

  it('by any chain gives the same bits for rows shared out anyhow', () => {
    const cuts = fc.uniqueArray(fc.integer({ min: 1, max: shape.ny - 1 }), { maxLength: 4 });
    fc.assert(
      fc.property(
        counts,
        fc.array(fc.oneof(scaling, reaching), { maxLength: 4 }),
        cuts,
        (values, chain, inner) => {
          const recorded = slabOf(values, shape);
          const shared = [0, ...inner.sort((a, b) => a - b), shape.ny];
          let whole: ReturnType<typeof outcomeOf>;
          try {
            whole = outcomeOf(chain, recorded, [0, shape.ny]);
          } catch (error) {
            // Some orders cannot be: a crop to two rows of one.
            expect(String(error)).toMatch(/condition\[\d\]/);
            return;
          }
          const parts = outcomeOf(chain, recorded, shared);
          expect(parts.slabs.flatMap((slab) => [...slab.counts])).toEqual([
            ...whole.slabs[0].counts,
          ]);
          expect(parts.steps.map(({ report }) => report)).toEqual(
            whole.steps.map(({ report }) => report),
          );
        },
      ),
      { numRuns: 60 },
    );
  });

  it('by bins keeps the sum of all counts, where nothing is dropped', () => {
    const whole = fc.array(fc.integer({ min: 0, max: 9999 }), {
      minLength: 4 * 8 * 24,
      maxLength: 4 * 8 * 24,
    });
    fc.assert(
      fc.property(
        whole,
        fc.constantFrom(1, 2, 4),
        fc.constantFrom(1, 2, 8),
        fc.constantFrom(1, 3, 12),
        (values, y, x, k) => {
          const four = { ny: 4, nx: 8, nk: 24 };
          const plan = planChain([{ isOff: false, step: 'bin', x, y, k }], gridOf(four));
          const rows = shareRows(plan, { y0: 0, y1: 4 });
          const [slab] = runChain(plan, [{ rows, slab: slabOf(values, four) }]).slabs;
          const sum = (list: ArrayLike<number>): number =>
            Array.from(list).reduce((a, b) => a + b, 0);
          expect(sum(slab.counts)).toBe(sum(values));
          expect(sum(slab.variances ?? [])).toBe(sum(values));
        },
      ),
    );
  });
});

it('finds the median as sorting does', () => {
  const number = fc.oneof(
    fc.integer({ min: -3, max: 3 }),
    fc.double({ noNaN: true, noDefaultInfinity: true, min: -1e6, max: 1e6 }),
  );
  fc.assert(
    fc.property(fc.array(number, { minLength: 1, maxLength: 60 }), (values) => {
      const sorted = Float64Array.from(values).sort();
      const middle = sorted.length >> 1;
      const median =
        sorted.length % 2 === 1
          ? sorted[middle]
          : sorted[middle - 1] + (sorted[middle] - sorted[middle - 1]) / 2;
      expect(medianInPlace(Float64Array.from(values)) + 0).toBe(median + 0);
    }),
  );
});
