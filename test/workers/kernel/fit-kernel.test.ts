/** The kernel in WebAssembly beside its plain twin: the same bits in everything they write. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { channelEdges } from '../../../src/science/axis';
import {
  createPlainFitKernel,
  type FitKernel,
  type PoissonScale,
  poissonScale,
} from '../../../src/science/fit/fit-kernel';
import { createRandom } from '../../../src/science/numeric/random';
import { createFitKernel } from '../../../workers/kernel/fit-kernel';

function gridOf(channels: number, isEven: boolean) {
  const centresEv = Float64Array.from(
    { length: channels },
    (_, k) => 1.8 + (0.3 * k) / channels + (isEven ? 0 : 1e-6 * k * k),
  );
  const edgesEv = channelEdges(centresEv);
  const widthsEv = centresEv.map((_, k) => edgesEv[k + 1] - edgesEv[k]);
  return { centresEv, edgesEv, widthsEv };
}

const parameters = 14;

/** Everything a kernel gives, after the same work. */
function work(kernel: FitKernel, seed: number, scale: PoissonScale | null) {
  const random = createRandom(seed);
  const { length } = kernel.model;
  const centre = 1.8 + 0.3 * random.uniform();
  const width = 0.002 + 0.1 * random.uniform() * random.uniform();
  kernel.model.fill(0);
  const { loops } = kernel;
  loops.polynomial(3 + random.normal(), 10 * random.normal(), 50 * random.normal());
  loops.decay(0, true, 5, 0.05 + 0.1 * random.uniform());
  // The Gaussian's loop is for channels that are narrow beside it.
  const wide = Math.max(width, 10 * kernel.grid.widestEv);
  const first = Math.floor(random.uniform() * length * 0.5);
  const end = first + Math.ceil(random.uniform() * (length - first));
  loops.gaussian(2, { first, end }, true, 100 * random.normal(), centre, wide);
  loops.lorentzian(5, true, 300, centre + 0.01, width, 1, false);
  loops.lorentzian(8, true, 80, centre - 0.02, width / 30, 0.3 + 0.4 * random.uniform(), true);
  const spans = Array.from({ length: parameters }, (_, i) =>
    i >= 2 && i < 5 ? { first, end } : { first: 0, end: length },
  );
  for (let k = 0; k < length; k++) {
    const mean = Math.max(0, kernel.model[k]);
    kernel.counts[k] = random.uniform() < 0.02 ? Number.NaN : random.poisson(mean);
  }
  kernel.prepare(scale);
  kernel.weigh();
  const used = Int32Array.of(0, 1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11);
  const matrix = new Float64Array(144);
  const gradient = new Float64Array(12);
  kernel.normal(used, spans, matrix, gradient);
  const lower = matrix.map((value, i) => (i % 12 <= Math.floor(i / 12) ? value : 0));
  const columns = kernel.columns.map((column) => column.slice());
  const model = kernel.model.slice();
  const sums = { ...kernel.sums, data: kernel.dataPart() };
  return { model, columns, sums, lower, gradient };
}

const scales = {
  counts: poissonScale({ kind: 'variance', line: { slope: 1, offset: 0, floor: 0 } }),
  detector: poissonScale({ kind: 'variance', line: { slope: 0.7, offset: 3, floor: 4.5 } }),
  uniform: null,
};

describe('the fit kernel in WebAssembly', () => {
  it('runs where these tests run', () => {
    expect(createFitKernel(gridOf(8, true), 3).kind).toBe('vectors');
  });

  it.each(Object.entries(scales))('has the bits of its twin, noise of %s', (_, scale) => {
    fc.assert(
      fc.property(
        fc.integer({ min: 2, max: 131 }),
        fc.integer({ min: 0, max: 1e6 }),
        fc.boolean(),
        (channels, seed, isEven) => {
          const grid = gridOf(channels, isEven);
          const plain = work(createPlainFitKernel(grid, parameters), seed, scale);
          const fast = work(createFitKernel(grid, parameters), seed, scale);
          expect(fast).toStrictEqual(plain);
          expect(Number.isFinite(plain.sums.deviance)).toBe(true);
        },
      ),
      { numRuns: 150 },
    );
  });
});
