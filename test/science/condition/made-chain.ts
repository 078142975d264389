/** A small scan with a spot, spikes and serpentine rows, and one step of every kind for it. */
import {
  type ChainOutcome,
  planChain,
  runChain,
  shareRows,
} from '../../../src/science/condition/chain';
import type { ChainStep } from '../../../src/science/condition/chain-step';
import { rowsOf } from '../../../src/science/condition/conditioned';
import { createRandom } from '../../../src/science/numeric/random';
import { gridOf, slabOf } from './made-conditioned';

export const shape = { ny: 11, nx: 12, nk: 48 };
export const grid = gridOf(shape);
export const counts = Float64Array.from({ length: 11 * 12 * 48 }, (_, at) => {
  const k = at % 48;
  const pixel = Math.floor(at / 48);
  const y = Math.floor(pixel / 12);
  const x = (pixel % 12) - (y % 2 === 1 ? 1 : 0);
  const spot = Math.exp(-((y - 5) ** 2 + (x - 6) ** 2) / 12);
  const mean = 40 + 0.5 * k + 300 * spot * Math.exp(-((k - 24 - 3 * spot) ** 2) / 20);
  const random = createRandom(31, at);
  return random.poisson(mean) + (at % 1999 === 7 ? 4000 : 0);
});
export const recorded = slabOf(counts, shape);

export const spectrum = (mean: number, name: string) => ({
  name,
  shape: [48],
  values: new Float64Array(48).fill(mean),
  y0: 0,
});
export const cube = {
  name: 'out.npy',
  shape: [11, 12, 48],
  values: Float64Array.from(counts, (_, at) => createRandom(32, at).poisson(30)),
  y0: 0,
};
const darkCube = { ...cube, name: 'dark.npy', values: cube.values.map((value) => value % 7) };

const on = { isOff: false } as const;
export const steps = {
  spectral: { ...on, step: 'despike', method: 'spectral', threshold: 6, kept: [] },
  neighbour: { ...on, step: 'despike', method: 'neighbour', threshold: 6, kept: [] },
  offset: { ...on, step: 'offset', dark: 20 },
  dark: { ...on, step: 'offset', dark: darkCube },
  response: {
    ...on,
    step: 'response',
    curve: { name: 'qe.csv', unit: 'eV', medium: 'air', axis: [1.79, 1.85], response: [40, 5] },
  },
  calibrate: {
    ...on,
    step: 'calibrate',
    points: [[680, 680.4]],
    degree: 0,
    unit: 'nm',
    medium: 'air',
  },
  farfield: { ...on, step: 'farfield', outside: cube, scale: 'fit', window: [1.8, 1.81] },
  byPixel: { ...on, step: 'farfield', outside: cube, scale: 'fit-pixels', window: [1.8, 1.81] },
  baseline: { ...on, step: 'baseline', method: 'arpls', smoothness: 1e4, iterations: 20 },
  denoise: { ...on, step: 'denoise', rank: 'auto' },
  align: { ...on, step: 'align-rows', maxShiftPx: 2 },
  crop: { ...on, step: 'crop', axisEv: [1.801, 1.84], x: [1, 11], y: [1, 9] },
  bin: { ...on, step: 'bin', x: 2, y: 2, k: 2 },
} as const satisfies Record<string, ChainStep>;

/** The chain with rows shared out at these cuts. */
export function run(chain: readonly ChainStep[], cuts: readonly number[] = [0, 11]): ChainOutcome {
  const plan = planChain(chain, grid);
  const parts = cuts.slice(1).map((y1, i) => {
    const rows = shareRows(plan, { y0: cuts[i], y1 });
    const { y0, y1: end } = rows.needed[0];
    return { rows, slab: rowsOf(recorded, y0, Math.max(y0, end)) };
  });
  return runChain(plan, parts);
}
