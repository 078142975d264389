/**
 * Whether the engine is as fast as it has to be on this machine: `npm run bench`. Times are compared
 * with others of the same run, so that a slow machine is no excuse and a fast one no merit.
 */
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { availableParallelism, cpus, tmpdir } from 'node:os';
import { join } from 'node:path';
import { encodeNpy } from '../../src/io/write/npy';
import { channelEdges } from '../../src/science/axis';
import type { EnergyBand } from '../../src/science/bands/band';
import { SlabBands } from '../../src/science/bands/slab-bands';
import { prepareSlab } from '../../src/science/bands/slab-data';
import { tilePixelsFor } from '../../src/science/bands/tiled-counts';
import { createRandom } from '../../src/science/numeric/random';
import type { EnergyAxis } from '../../src/science/scan';
import { evFromNm } from '../../src/science/units';
import { elementContexts } from '../../workers/element-context';
import type { OpenScan } from '../../workers/engine';
import { createMomentKernel } from '../../workers/kernel/moment-kernel';
import { createNodeEngine } from '../../workers/node-engine';
import { benchCondition } from './condition';
import { benchFits } from './fit-bench';
import { median, ms, printTable, quantile, type Row, timesInTurn, timesOf, told } from './measure';
import { plainTotals, servesPlainPass, startPlainThreads } from './plain-pass';
import { cubeShape, syntheticCounts, wavelengths } from './synthetic-cube';

const quantities = ['integral', 'centroid'] as const;
const frameMs = 16;
const rounds = 15;
const bandsPerRound = 6;

async function bench(): Promise<void> {
  const { ny, nx, nk } = cubeShape;
  const cores = availableParallelism();
  if (!process.argv.includes('--bands')) printTable(benchFits());
  if (process.argv.includes('--fits')) return;
  console.log(
    `${ny} × ${nx} × ${nk} 16-bit counts; ${cores} cores, ${cpus()[0]?.model ?? 'unknown'}; Node ${process.version}\n`,
  );
  const counts = syntheticCounts();
  const folder = mkdtempSync(join(tmpdir(), 'rimlight-bench-'));
  const path = join(folder, 'cube.npy');
  writeFileSync(path, encodeNpy(counts, [ny, nx, nk]));
  try {
    const alone = await benchAlone(counts);
    const one = await benchPool(path, 1);
    const all = await benchPool(path, cores);
    const speedUp = one.bandMs / all.bandMs;
    const conditioning = await benchCondition(counts);
    printTable([
      ...alone,
      ...all.rows,
      told(`new band, ${cores} workers against one`, `${speedUp.toFixed(2)} ×`),
      ...conditioning,
    ]);
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

/** A band's ends, as shares of the axis; at random, but the same in every run. */
function bandMaker(): (run: number) => EnergyBand {
  const axis = energyAxis();
  return (run) => {
    const random = createRandom(11, run);
    const from = 0.6 * random.uniform();
    const to = from + 0.05 + (0.95 - from) * random.uniform();
    return { fromEv: energyAt(axis, from), toEv: energyAt(axis, Math.min(1, to)), floor: 'none' };
  };
}

/** One end stays, the other moves by half a hundredth of the axis at a time. */
function dragMaker(): (run: number) => EnergyBand {
  const axis = energyAxis();
  return (run) => ({
    fromEv: energyAt(axis, 0.31),
    toEv: energyAt(axis, 0.45 + 0.005 * (run % 100)),
    floor: 'none',
  });
}

function energyAxis(): EnergyAxis {
  const { nk } = cubeShape;
  const { from, to } = wavelengths;
  const centresEv = Float64Array.from({ length: nk }, (_, k) =>
    evFromNm(to + ((from - to) * k) / (nk - 1)),
  );
  return { centresEv, edgesEv: channelEdges(centresEv) };
}

function energyAt({ edgesEv }: EnergyAxis, share: number): number {
  const last = edgesEv[edgesEv.length - 1];
  return edgesEv[0] + share * (last - edgesEv[0]);
}

interface Measured {
  readonly rows: readonly Row[];
  /** of a new band */
  readonly bandMs: number;
}

/** In this thread alone, without messages. */
async function benchAlone(counts: Uint16Array): Promise<readonly Row[]> {
  const { ny, nx, nk } = cubeShape;
  const totals = new Float64Array(ny * nx);
  const bandAt = bandMaker();
  const kernel = createMomentKernel(tilePixelsFor(nk), nk);
  const steps = prepareSlab(
    { y0: 0, shape: cubeShape, counts: counts.slice() },
    { axis: energyAxis(), noise: { kind: 'poisson' }, ...elementContexts.uint16 },
    kernel,
  );
  let step = steps.next();
  while (!step.done) step = steps.next();
  const bands = new SlabBands(step.value, kernel);
  const { first: plain, second: band } = await timesInTurn(
    () => plainTotals(counts, nk, totals),
    (run) => bands.maps(bandAt(run), quantities),
    rounds,
    bandsPerRound,
  );
  return [
    told('plain summing pass, one thread', ms(median(plain))),
    ratioRow('new band, integral and centroid with errors, one thread', band, plain),
  ];
}

/** Through the pool, as the app asks. */
async function benchPool(path: string, workers: number): Promise<Measured> {
  const engine = createNodeEngine({ workerCount: workers });
  const threads = await startPlainThreads(new URL(import.meta.url), workers);
  try {
    const file = { kind: 'path' as const, name: 'cube.npy', path };
    const inputs = { scan: file, companions: [] };
    const axis = { ...wavelengths, kind: 'wavelength', unit: 'nm', medium: 'vacuum' } as const;
    const { plan } = await engine.inspect(inputs, { axis });
    if (plan === null) throw new Error('the cube has no plan');
    const openings = await timesOf(async () => (await engine.open(inputs, plan)).release(), 3, 1);
    const open = await engine.open(inputs, plan);
    const scan = await benchScan(open, threads.pass, workers);
    const opening = told('open 128 MiB from disk', ms(median(openings)));
    return { rows: [...scan.rows, opening], bandMs: scan.bandMs };
  } finally {
    await threads.close();
    await engine.close();
  }
}

async function benchScan(
  open: OpenScan,
  plainPass: () => Promise<void>,
  workers: number,
): Promise<Measured> {
  const { ny, nx } = cubeShape;
  const bandAt = bandMaker();
  const dragAt = dragMaker();
  const { first: plain, second: band } = await timesInTurn(
    plainPass,
    (run) => open.bandMaps({ band: bandAt(run), quantities }),
    rounds,
    bandsPerRound,
  );
  const drag = await timesOf((run) => open.bandMaps({ band: dragAt(run), quantities }), 100, 10);
  const hover = await timesOf(
    (run) => open.spectrum({ y: (run * 37) % ny, x: (run * 101) % nx }),
    200,
    20,
  );
  const { countsBytes, sumsBytes } = open.overview;
  const share = sumsBytes / countsBytes;
  const rows = [
    told(`plain summing pass, ${workers} threads`, ms(median(plain))),
    ratioRow(`new band through the pool, ${workers} workers`, band, plain),
    frameRow('drag of a band’s end, one change', drag),
    frameRow('hovered spectrum', hover),
    {
      what: 'memory beside the counts',
      value: `${(100 * share).toFixed(1)} %`,
      goal: 'under 25 %',
      isMet: share < 0.25,
    },
  ];
  return { rows, bandMs: median(band) };
}

function ratioRow(what: string, band: readonly number[], plain: readonly number[]): Row {
  const ratio = median(plain) / median(band);
  return {
    what,
    value: `${ms(median(band))}, 1/${ratio.toFixed(1)}`,
    goal: 'under 1/8 of the plain pass',
    isMet: ratio > 8,
  };
}

function frameRow(what: string, times: readonly number[]): Row {
  return {
    what,
    value: `${ms(median(times))}, 95 % below ${ms(quantile(times, 0.95))}`,
    goal: `median at most ${frameMs} ms`,
    isMet: median(times) <= frameMs,
  };
}

if (!servesPlainPass()) await bench();
