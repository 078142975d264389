/**
 * What one worker does, knowing nothing of where it runs: files come through `toByteSource`. Holds the
 * slabs loaded into it, and the calls in progress so that they can be stopped.
 */
import { sha256 } from '@noble/hashes/sha2.js';
import { bytesToHex } from '@noble/hashes/utils.js';
import { RimlightError, throwIfAborted } from '../src/errors';
import { detectScan } from '../src/io/detect/detect-scan';
import { loadHeight } from '../src/io/load-height';
import { loadSlab } from '../src/io/load-slab';
import { previewScan } from '../src/io/preview';
import type { ScanPlan } from '../src/io/scan-plan';
import { maskedRowSums } from '../src/science/bands/row-sums';
import { SlabBands } from '../src/science/bands/slab-bands';
import { prepareSlab, type SlabData } from '../src/science/bands/slab-data';
import { pixelSpectrum, tilePixelsFor } from '../src/science/bands/tiled-counts';
import type { FitPlan } from '../src/science/fit/fit-plan';
import type { Slab } from '../src/science/scan';
import { elementContexts } from './element-context';
import type { Pixel, RowRange, SlabSummary, SourceHandle, WorkerEngine } from './engine';
import { companionNamed, type ToByteSource, withCompanions, withContainer } from './file-access';
import { createMomentKernel } from './kernel/moment-kernel';
import { SlabFit } from './slab-fit';
import { nextTurn } from './turn';

/** Reading takes about two thirds of loading, summing up the rest. */
const readingShare = 0.65;
/** Values summed up between looks at the messages, about 50 ms. */
const valuesPerTurn = 4 << 20;
/** Bytes hashed between looks at the messages, about 5 ms. */
const hashBytes = 1 << 20;

/** One loaded slab. */
interface Loaded {
  readonly rows: RowRange;
  readonly ny: number;
  readonly nx: number;
  readonly bands: SlabBands;
}

export function createEngineCore(toByteSource: ToByteSource): WorkerEngine {
  const calls = new Map<number, AbortController>();
  const slabs = new Map<number, Loaded>();

  const stoppable = async <T>(
    callId: number,
    work: (signal: AbortSignal) => Promise<T>,
  ): Promise<T> => {
    const controller = new AbortController();
    calls.set(callId, controller);
    try {
      return await work(controller.signal);
    } finally {
      if (calls.get(callId) === controller) calls.delete(callId);
    }
  };

  const slabOf = (scanId: number): Loaded => {
    const loaded = slabs.get(scanId);
    if (loaded !== undefined) return loaded;
    throw new RimlightError('fault', {
      what: `scan ${scanId} is not loaded in this worker`,
      where: '',
      hint: 'Open the scan again.',
    });
  };

  const slabFit = (scanId: number, plan: FitPlan): SlabFit => {
    const { bands, ...place } = slabOf(scanId);
    const { tiled, context } = bands.data;
    return new SlabFit({ ...place, tiled, axis: context.axis }, plan);
  };

  return {
    inspect: (callId, inputs, choices) =>
      stoppable(callId, (signal) =>
        withContainer(toByteSource, inputs.scan, signal, (container) =>
          withCompanions(toByteSource, inputs.companions, signal, async (opened) => {
            const { name } = inputs.scan;
            const options = { signal };
            const found = await detectScan(container, opened.companions, choices, name, options);
            return { ...found, warnings: [...opened.warnings, ...found.warnings] };
          }),
        ),
      ),

    preview: (callId, inputs, plan) =>
      stoppable(callId, (signal) =>
        withContainer(toByteSource, inputs.scan, signal, (container) =>
          previewScan(container, plan, { signal }),
        ),
      ),

    sha256: (callId, source, onProgress) =>
      stoppable(callId, (signal) => hashSource(toByteSource, source, signal, onProgress)),

    load: (callId, scanId, inputs, plan, rows, onProgress) =>
      stoppable(callId, (signal) =>
        withContainer(toByteSource, inputs.scan, signal, async (container) => {
          const slab = await loadSlab(container, plan, rows, {
            signal,
            onProgress: (share) => onProgress(readingShare * share),
          });
          const type = container.entries.find(({ path }) => path === plan.cube.path)?.type;
          const context = { ...plan.meta, ...elementContexts[type ?? 'float64'] };
          const { nk } = slab.shape;
          const kernel = createMomentKernel(tilePixelsFor(nk), nk);
          const steps = prepareSlab(slab, context, kernel);
          const data = await prepare(steps, slab, signal, (share) =>
            onProgress(readingShare + (1 - readingShare) * share),
          );
          const { ny, nx } = plan.meta.shape;
          const loaded = { rows, ny, nx, bands: new SlabBands(data, kernel) };
          slabs.set(scanId, loaded);
          return summaryOf(loaded);
        }),
      ),

    height: (callId, inputs, plan) =>
      stoppable(callId, (signal) =>
        withContainer(toByteSource, heightSource(inputs, plan), signal, (container) =>
          loadHeight(plan, container, { signal }),
        ),
      ),

    bandMaps: async (scanId, { band, quantities }, withErrors) =>
      slabOf(scanId).bands.maps(band, quantities, withErrors),

    spectrum: async (scanId, pixel) => {
      const { rows, nx, bands } = slabOf(scanId);
      const { tiled } = bands.data;
      return pixelSpectrum(tiled, pixelIndex(pixel, rows, nx), new Float64Array(tiled.nk));
    },

    maskedRowSums: async (scanId, mask) => {
      const { bands, nx } = slabOf(scanId);
      return maskedRowSums(bands.data.tiled, nx, mask);
    },

    fitNodes: (callId, scanId, plan, known, onTile) =>
      stoppable(callId, (signal) => slabFit(scanId, plan).nodes(known, signal, onTile)),

    fitRows: (callId, scanId, plan, nodes, usualChi2r, known, onTile) =>
      stoppable(callId, (signal) =>
        slabFit(scanId, plan).rows(nodes, usualChi2r, known, signal, onTile),
      ),

    release: async (scanId) => {
      slabs.delete(scanId);
    },

    cancel: async (callId) => {
      calls.get(callId)?.abort();
    },
  };
}

async function prepare(
  steps: Generator<number, SlabData>,
  { shape }: Slab,
  signal: AbortSignal,
  onProgress: (share: number) => void,
): Promise<SlabData> {
  const values = shape.ny * shape.nx * shape.nk;
  let paused = 0;
  for (let step = steps.next(); ; step = steps.next()) {
    if (step.done) return step.value;
    if ((step.value - paused) * values < valuesPerTurn) continue;
    paused = step.value;
    onProgress(step.value);
    await nextTurn();
    throwIfAborted(signal, 'summing up the scan');
  }
}

function summaryOf({ rows, bands }: Loaded): SlabSummary {
  const { data, sumsBytes } = bands;
  const { survey, tiled } = data;
  return { rows, countsBytes: tiled.counts.byteLength, sumsBytes, ...survey };
}

function heightSource(inputs: Parameters<WorkerEngine['height']>[1], plan: ScanPlan): SourceHandle {
  const file = plan.height?.file ?? null;
  return file === null ? inputs.scan : companionNamed(inputs, file);
}

function pixelIndex({ y, x }: Pixel, rows: RowRange, nx: number): number {
  if (y >= rows.y0 && y < rows.y1 && x >= 0 && x < nx) return (y - rows.y0) * nx + x;
  throw new RimlightError('fault', {
    what: `pixel (${x}, ${y}) is not in rows ${rows.y0} to ${rows.y1 - 1}`,
    where: '',
    hint: 'Please report this.',
  });
}

/** SHA-256 of a file as lower-case hex, read piece by piece. */
async function hashSource(
  toByteSource: ToByteSource,
  handle: SourceHandle,
  signal: AbortSignal,
  onProgress: (share: number) => void,
): Promise<string> {
  const source = await toByteSource(handle);
  try {
    const hash = sha256.create();
    for (let at = 0; at < source.size; at += hashBytes) {
      hash.update(await source.read(at, Math.min(source.size, at + hashBytes)));
      onProgress(Math.min(1, (at + hashBytes) / source.size));
      await nextTurn();
      throwIfAborted(signal, `hashing ${handle.name}`);
    }
    return bytesToHex(hash.digest());
  } finally {
    source.close?.();
  }
}
