/**
 * A worker's engine over a message port: `serveEngine` on the worker's side, `connectEngine` on the
 * page's. What does not cross unharmed is changed on the way: errors, also those inside an inspection,
 * travel as plain data; results are transferred, not copied; callbacks are let go of after their call.
 */
import {
  type Endpoint,
  expose,
  type ProxyMarked,
  proxy,
  type Remote,
  releaseProxy,
  transfer,
  wrap,
} from 'comlink';
import type { Inspection } from '../src/io/scan-plan';
import type { FitTile, WorkerEngine } from './engine';
import { fromWire, registerWireErrors, toWire, type WireError } from './wire-errors';

/** An inspection whose problems have become plain data. */
export type WireInspection = Omit<Inspection, 'problems'> & {
  readonly problems: readonly WireError[];
};

/** The surface that crosses; progress callbacks arrive as proxies. */
export type WireEngine = Omit<WorkerEngine, 'inspect'> & {
  inspect(...call: Parameters<WorkerEngine['inspect']>): Promise<WireInspection>;
};

type OnProgress = (share: number) => void;

/**
 * Answers calls on a port until it closes.
 *
 * @param endpoint - a Web Worker's own port where it is left out
 */
export function serveEngine(core: WorkerEngine, endpoint?: Endpoint): void {
  registerWireErrors();
  const served: WireEngine = {
    ...core,
    inspect: async (...call) => {
      const found = await core.inspect(...call);
      return { ...found, problems: found.problems.map(toWire) };
    },
    preview: async (...call) => {
      const found = await core.preview(...call);
      return transfer(found, [found.totals.buffer, found.meanSpectrum.buffer]);
    },
    sha256: (callId, source, onProgress) =>
      thenLetGo(onProgress, (report) => core.sha256(callId, source, report)),
    load: (callId, scanId, inputs, plan, rows, onProgress) =>
      thenLetGo(onProgress, async (report) => {
        const summary = await core.load(callId, scanId, inputs, plan, rows, report);
        const { totals, rowSums, rowPixels } = summary;
        return transfer(summary, [totals.buffer, rowSums.buffer, rowPixels.buffer]);
      }),
    height: async (...call) => {
      const map = await core.height(...call);
      return transfer(map, [map.values.buffer]);
    },
    bandMaps: async (...call) => {
      const maps = await core.bandMaps(...call);
      const arrays = maps.flatMap(({ values, errors }) =>
        errors === null ? [values] : [values, errors],
      );
      return transfer(
        maps,
        arrays.map(({ buffer }) => buffer),
      );
    },
    spectrum: async (...call) => {
      const counts = await core.spectrum(...call);
      return transfer(counts, [counts.buffer]);
    },
    maskedRowSums: async (...call) => {
      const found = await core.maskedRowSums(...call);
      return transfer(found, [found.sums.buffer, found.pixels.buffer]);
    },
    fitNodes: (callId, scanId, plan, known, onTile) =>
      thenLetGoOf(onTile, (tell) => core.fitNodes(callId, scanId, plan, known, tell)),
    fitRows: (callId, scanId, plan, nodes, usualChi2r, known, onTile) =>
      thenLetGoOf(onTile, (tell) =>
        core.fitRows(callId, scanId, plan, nodes, usualChi2r, known, tell),
      ),
  };
  expose(served, endpoint);
}

/** A proxied callback holds a port until it is released. */
async function thenLetGo<T>(
  onProgress: OnProgress,
  work: (report: OnProgress) => Promise<T>,
): Promise<T> {
  try {
    return await work((share) => {
      // Nobody waits for the page to have seen it; a page that is gone does not matter.
      Promise.resolve(onProgress(share)).catch(() => undefined);
    });
  } finally {
    (onProgress as OnProgress & Partial<Remote<ProxyMarked>>)[releaseProxy]?.();
  }
}

type OnTile = (tile: FitTile) => Promise<void>;

/** The same for tiles, which are moved; whoever sends one may wait until it has arrived. */
async function thenLetGoOf<T>(onTile: OnTile, work: (tell: OnTile) => Promise<T>): Promise<T> {
  try {
    return await work((tile) => onTile(transfer(tile, [tile.pixels.buffer, tile.records.buffer])));
  } finally {
    (onTile as OnTile & Partial<Remote<ProxyMarked>>)[releaseProxy]?.();
  }
}

export interface EngineConnection {
  readonly engine: WorkerEngine;
  /** Lets go of the port. */
  close(): void;
}

/** The engine at the other end of a port. */
export function connectEngine(endpoint: Endpoint): EngineConnection {
  registerWireErrors();
  const remote = wrap<WireEngine>(endpoint);
  const engine: WorkerEngine = {
    inspect: async (...call) => {
      const found = await remote.inspect(...call);
      return { ...found, problems: found.problems.map(fromWire) };
    },
    preview: (...call) => remote.preview(...call),
    sha256: (callId, source, onProgress) => remote.sha256(callId, source, proxy(onProgress)),
    load: (callId, scanId, inputs, plan, rows, onProgress) =>
      remote.load(callId, scanId, inputs, plan, rows, proxy(onProgress)),
    height: (...call) => remote.height(...call),
    bandMaps: (...call) => remote.bandMaps(...call),
    spectrum: (...call) => remote.spectrum(...call),
    maskedRowSums: (scanId, mask) => remote.maskedRowSums(scanId, transfer(mask, [mask.buffer])),
    fitNodes: (callId, scanId, plan, known, onTile) =>
      remote.fitNodes(callId, scanId, plan, known, proxy(onTile)),
    fitRows: (callId, scanId, plan, nodes, usualChi2r, known, onTile) =>
      remote.fitRows(callId, scanId, plan, nodes, usualChi2r, known, proxy(onTile)),
    release: (...call) => remote.release(...call),
    cancel: (...call) => remote.cancel(...call),
  };
  return { engine, close: () => remote[releaseProxy]() };
}
