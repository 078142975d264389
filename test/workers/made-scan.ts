/** A small scan made in memory, as files an engine can open, with what is in it. */

import type { ScanPlan } from '../../src/io/scan-plan';
import { encodeNpy } from '../../src/io/write/npy';
import { encodeNpz } from '../../src/io/write/npz';
import { createRandom } from '../../src/science/numeric/random';
import type { CountsArray } from '../../src/science/scan';
import type { OpenScan, ScanEngine, ScanInputs } from '../../workers/engine';

export interface MadeScan {
  readonly inputs: ScanInputs;
  readonly ny: number;
  readonly nx: number;
  readonly nk: number;
  readonly counts: CountsArray;
  readonly energiesEv: Float64Array;
  readonly heightNm: Float64Array;
}

export interface MadeOptions {
  readonly ny?: number;
  readonly nx?: number;
  readonly nk?: number;
  readonly seed?: number;
  /** changes one pixel's channel after the Poisson counts were drawn */
  readonly change?: (counts: Float64Array) => void;
  readonly type?: 'uint16' | 'float64';
}

/** A bump of Poisson counts on a line, wandering from pixel to pixel. */
export function makeScan(options: MadeOptions = {}): MadeScan {
  const { ny = 7, nx = 9, nk = 400, seed = 1, type = 'uint16' } = options;
  const energiesEv = Float64Array.from({ length: nk }, (_, k) => 1.8 + 0.0005 * k + 2e-7 * k * k);
  const drawn = new Float64Array(ny * nx * nk);
  for (let pixel = 0; pixel < ny * nx; pixel++) {
    const random = createRandom(seed, pixel);
    const centre = nk * (0.4 + 0.2 * random.uniform());
    for (let k = 0; k < nk; k++) {
      const z = (k - centre) / (nk / 12);
      drawn[pixel * nk + k] = random.poisson(6 + 40 / (1 + z * z) + k / nk);
    }
  }
  options.change?.(drawn);
  const counts = type === 'uint16' ? Uint16Array.from(drawn) : drawn;
  const heightNm = Float64Array.from({ length: ny * nx }, (_, pixel) => pixel / 4);
  const bytes = encodeNpz({
    counts: encodeNpy(counts, [ny, nx, nk]),
    energy_ev: encodeNpy(energiesEv, [nk]),
    height_nm: encodeNpy(heightNm, [ny, nx]),
  });
  const inputs = { scan: { kind: 'memory' as const, name: 'made.npz', bytes }, companions: [] };
  return { inputs, ny, nx, nk, counts, energiesEv, heightNm };
}

export async function planOf(engine: ScanEngine, { inputs }: MadeScan): Promise<ScanPlan> {
  const { plan, problems } = await engine.inspect(inputs, {});
  if (plan === null) throw problems[0] ?? new Error('no plan');
  return plan;
}

export async function openMade(engine: ScanEngine, made: MadeScan): Promise<OpenScan> {
  return engine.open(made.inputs, await planOf(engine, made));
}

/** Everything an open scan answers, to be compared bit for bit. */
export async function answersOf(scan: OpenScan): Promise<unknown> {
  const { ny, nx } = scan.plan.meta.shape;
  const bands = [
    { fromEv: 1.8205, toEv: 1.97, floor: 'none' as const },
    { fromEv: 1.87, toEv: 1.8834, floor: 'none' as const },
    { fromEv: 1.8401, toEv: 1.95, floor: 'ends' as const },
  ];
  const maps = [];
  for (const band of bands) maps.push(await scan.bandMaps({ band, quantities: everyQuantity }));
  const mask = Uint8Array.from({ length: ny * nx }, (_, pixel) => (pixel % 3 === 0 ? 1 : 0));
  const { overview } = scan;
  return {
    maps,
    totals: overview.totals,
    height: overview.height,
    mean: overview.meanSpectrum,
    masked: await scan.meanSpectrum(mask),
    spectrum: await scan.spectrum({ y: ny - 1, x: 0 }),
    extremes: [overview.minCounts, overview.maxCounts, overview.noDataValues],
  };
}

export const everyQuantity = [
  'integral',
  'centroid',
  'median',
  'spread',
  'peak',
  'peak_at',
] as const;
