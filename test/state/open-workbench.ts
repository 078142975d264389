/** A workbench with a small made scan open, on the real engine in one process. */
import type { Recipe } from '../../src/recipe/schema';
import { openOffered } from '../../src/state/scan-opening';
import { createWorkbench, type Workbench } from '../../src/state/workbench';
import type { BandRequest, OpenScan, ScanEngine } from '../../workers/engine';
import { createInProcessEngine } from '../../workers/in-process-engine';
import { type MadeOptions, type MadeScan, makeScan } from '../workers/made-scan';

export interface OpenWorkbench {
  readonly workbench: Workbench;
  readonly made: MadeScan;
  /** what was asked of the engine for bands, oldest first */
  readonly asked: readonly BandRequest[];
  /** waits until no band map is behind the recipe */
  readonly settled: () => Promise<void>;
  /** waits until the engine has answered all it was asked, wanted or not */
  readonly answered: () => Promise<void>;
  /** from now on the engine fails to make band maps */
  readonly breakBands: (reason: string) => void;
}

export const twoBands: Recipe = {
  recipe: 1,
  bands: [
    { name: 'low', from: 1.82, to: 1.88, unit: 'eV' },
    { name: 'high', from: 1.9, to: 1.95, unit: 'eV' },
  ],
  blend: {
    mode: 'additive',
    channels: [{ source: 'band.low.integral', colour: '#ff0000' }],
  },
};

export async function openWorkbench(
  recipe: Recipe | null = twoBands,
  options: MadeOptions = {},
): Promise<OpenWorkbench> {
  const made = makeScan(options);
  const asked: BandRequest[] = [];
  let broken: string | null = null;
  const heard = (request: BandRequest): void => {
    asked.push(request);
    if (broken !== null) throw new Error(broken);
  };
  const breakBands = (reason: string): void => {
    broken = reason;
  };
  const answers: Promise<unknown>[] = [];
  const engine = listening(createInProcessEngine(), heard, answers);
  const workbench = createWorkbench(engine);
  await openOffered(workbench, made.inputs, recipe, '/sample-data/made.npz');
  const settled = async (): Promise<void> => {
    do await pause();
    while (workbench.results.getState().pending.size > 0);
  };
  const answered = async (): Promise<void> => {
    let waitedFor = -1;
    while (waitedFor < answers.length) {
      waitedFor = answers.length;
      await Promise.allSettled(answers);
      // What is done about an answer comes after it, and may ask again.
      await pause(0);
    }
  };
  await settled();
  return { workbench, made, asked, settled, answered, breakBands };
}

/** The engine with an ear at its band maps, its answers kept; bound, since its parts know only themselves. */
function listening(
  engine: ScanEngine,
  heard: (request: BandRequest) => void,
  answers: Promise<unknown>[],
): ScanEngine {
  const kept = <T>(answer: Promise<T>): Promise<T> => {
    answers.push(answer);
    return answer;
  };
  const open: ScanEngine['open'] = async (inputs, plan, options) => {
    const scan = await engine.open(inputs, plan, options);
    const bandMaps: OpenScan['bandMaps'] = async (request, callOptions) => {
      heard(request);
      return scan.bandMaps(request, callOptions);
    };
    return bound(scan, {
      bandMaps: (...asked) => kept(bandMaps(...asked)),
      spectrum: (pixel) => kept(scan.spectrum(pixel)),
      fitPixel: (...asked) => kept(scan.fitPixel(...asked)),
    });
  };
  return bound(engine, {
    open: (...asked) => kept(open(...asked)),
    inspect: (...asked) => kept(engine.inspect(...asked)),
  });
}

/** An object like another, with some methods in place of its own. */
function bound<T extends object>(target: T, replaced: Partial<T>): T {
  return new Proxy(target, {
    get(_, key) {
      const own = Reflect.get(replaced, key);
      if (own !== undefined) return own;
      const value: unknown = Reflect.get(target, key);
      return typeof value === 'function' ? value.bind(target) : value;
    },
  });
}

export function pause(ms = 5): Promise<void> {
  return new Promise((resolve) => setTimeout(resolve, ms));
}

/** Storage as the browser's, in memory. */
export function memoryStorage() {
  const kept = new Map<string, unknown>();
  return {
    kept,
    get: async (key: string) => kept.get(key),
    set: async (key: string, value: unknown) => {
      kept.set(key, structuredClone(value));
    },
  };
}
