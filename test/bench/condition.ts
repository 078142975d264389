/** Conditioning against plain NumPy and SciPy doing the same on the same counts, one thread each. */
import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { encodeNpy } from '../../src/io/write/npy';
import { channelEdges } from '../../src/science/axis';
import { planChain, runChain, shareRows } from '../../src/science/condition/chain';
import type { ChainStep } from '../../src/science/condition/chain-step';
import { conditionedFrom, type Grid } from '../../src/science/condition/conditioned';
import { median, type Row, timesOf, told } from './measure';

const shape = { ny: 128, nx: 128, nk: 1024 };

/** Seconds for the whole cube; of arPLS for one spectrum. */
type Seconds = Readonly<Record<'spectral' | 'neighbour' | 'response' | 'svd' | 'arpls', number>>;

interface Method {
  readonly name: keyof Seconds;
  readonly what: string;
  readonly step: ChainStep;
  /** how many times as fast as NumPy or SciPy it has to be */
  readonly goal: number;
  readonly times: number;
}

const isOff = false;
const despike = { isOff, step: 'despike', threshold: 6, kept: [] } as const;
const curve = {
  name: 'curve',
  unit: 'eV',
  medium: 'vacuum',
  axis: [1.7, 1.9, 2.1, 2.3],
  response: [0.9, 0.8, 0.5, 0.2],
} as const;

const methods: readonly Method[] = [
  {
    name: 'spectral',
    what: 'despike, spectral',
    step: { ...despike, method: 'spectral' },
    goal: 1,
    times: 3,
  },
  {
    name: 'neighbour',
    what: 'despike, neighbour',
    step: { ...despike, method: 'neighbour' },
    goal: 1,
    times: 1,
  },
  {
    name: 'response',
    what: 'response',
    step: { isOff, step: 'response', curve },
    goal: 1,
    times: 5,
  },
  {
    name: 'svd',
    what: 'denoise, 8 components',
    step: { isOff, step: 'denoise', rank: 8 },
    goal: 1,
    times: 1,
  },
  {
    name: 'arpls',
    what: 'arPLS, one spectrum',
    step: { isOff, step: 'baseline', method: 'arpls', smoothness: 1e5, iterations: 20 },
    goal: 10,
    times: 1,
  },
];

/** @param counts - of 128 × 128 pixels of 1024 channels, or more */
export async function benchCondition(counts: Uint16Array): Promise<readonly Row[]> {
  const cube = counts.slice(0, shape.ny * shape.nx * shape.nk);
  const plain = timesOfNumPy(cube);
  if (plain === null) return [told('conditioning', 'skipped: no python3 with SciPy here')];
  const grid = gridOf();
  const slab = conditionedFrom({ y0: 0, shape, counts: cube }, grid);
  const rows: Row[] = [];
  for (const { name, what, step, goal, times } of methods) {
    const plan = planChain([step], grid);
    const part = { rows: shareRows(plan, { y0: 0, y1: shape.ny }), slab };
    const taken =
      median(await timesOf(() => runChain(plan, [part]), times, times > 1 ? 1 : 0)) / 1000;
    const seconds = name === 'arpls' ? taken / (shape.ny * shape.nx) : taken;
    const ratio = plain[name] / seconds;
    rows.push({
      what: `${what}, one thread each`,
      value: `${shown(seconds)} against ${shown(plain[name])}: ${ratio.toFixed(1)} ×`,
      goal: goal === 1 ? 'as fast as NumPy' : `${goal} × as fast as SciPy`,
      isMet: ratio >= goal,
    });
  }
  return rows;
}

function gridOf(): Grid {
  const centresEv = Float64Array.from({ length: shape.nk }, (_, k) => 1.75 + 0.0005 * k);
  const pixels = { label: 'x', unit: 'px', isLength: false, pitch: 1, values: null };
  return {
    shape,
    axis: { centresEv, edgesEv: channelEdges(centresEv) },
    noise: { kind: 'poisson' },
    laserEv: null,
    x: pixels,
    y: pixels,
  };
}

/** Null where there is no python3 with SciPy. */
function timesOfNumPy(cube: Uint16Array): Seconds | null {
  const folder = mkdtempSync(join(tmpdir(), 'rimlight-bench-'));
  try {
    const path = join(folder, 'cube.npy');
    writeFileSync(path, encodeNpy(cube, [shape.ny, shape.nx, shape.nk]));
    const threads = { OPENBLAS_NUM_THREADS: '1', OMP_NUM_THREADS: '1', MKL_NUM_THREADS: '1' };
    const script = join('test', 'bench', 'condition.py');
    const { status, stdout } = spawnSync('python3', [script, path], {
      env: { ...process.env, ...threads },
      encoding: 'utf8',
    });
    return status === 0 ? JSON.parse(stdout) : null;
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

function shown(seconds: number): string {
  return seconds < 0.1 ? `${(1000 * seconds).toFixed(2)} ms` : `${seconds.toFixed(2)} s`;
}
