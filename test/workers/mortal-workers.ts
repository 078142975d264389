/** Workers in one process that a test can watch, hold up and kill. */
import type { WorkerEngine } from '../../workers/engine';
import { createEngineCore } from '../../workers/engine-core';
import type { ToByteSource } from '../../workers/file-access';
import { portableSource } from '../../workers/portable-source';
import type { SpawnedWorker } from '../../workers/seat';
import { serveEngine } from '../../workers/wire-engine';

export interface MortalWorker {
  /** what the worker offers; a test may replace methods before they are called */
  readonly core: { -readonly [Name in keyof WorkerEngine]: WorkerEngine[Name] };
  /** names of the methods called so far */
  readonly called: string[];
  die(reason: string): void;
}

export interface MortalWorkers {
  /** in the order they were started; the slab workers first, then the one for files, then replacements */
  readonly all: readonly MortalWorker[];
  readonly spawn: () => SpawnedWorker;
}

/** @param prepare - told of every worker before it serves */
export function mortalWorkers(
  toByteSource: ToByteSource = portableSource,
  prepare: (worker: MortalWorker, index: number) => void = () => undefined,
): MortalWorkers {
  const all: MortalWorker[] = [];
  const spawn = (): SpawnedWorker => {
    const { port1, port2 } = new MessageChannel();
    const called: string[] = [];
    const core = { ...createEngineCore(toByteSource) };
    let tell: (reason: string) => void = () => undefined;
    const close = (): void => {
      port1.close();
      port2.close();
    };
    const worker: MortalWorker = {
      core,
      called,
      die: (reason) => {
        close();
        tell(reason);
      },
    };
    all.push(worker);
    prepare(worker, all.length - 1);
    serveEngine(watched(core, called), port1);
    return { endpoint: port2, onDeath: (listener) => (tell = listener), terminate: close };
  };
  return { all, spawn };
}

/** Looks the method up at every call, and notes its name. */
function watched(core: MortalWorker['core'], called: string[]): WorkerEngine {
  const note = <Name extends keyof WorkerEngine>(name: Name): WorkerEngine[Name] => {
    const method = (...call: unknown[]): unknown => {
      called.push(name);
      return Reflect.apply(core[name], core, call);
    };
    return method as WorkerEngine[Name];
  };
  return {
    inspect: note('inspect'),
    preview: note('preview'),
    sha256: note('sha256'),
    load: note('load'),
    height: note('height'),
    bandMaps: note('bandMaps'),
    spectrum: note('spectrum'),
    maskedRowSums: note('maskedRowSums'),
    fitNodes: note('fitNodes'),
    fitRows: note('fitRows'),
    release: note('release'),
    cancel: note('cancel'),
  };
}

/** A promise and its key. */
export interface Gate {
  readonly passed: Promise<void>;
  open(): void;
}

export function gate(): Gate {
  let open: () => void = () => undefined;
  const passed = new Promise<void>((resolve) => {
    open = resolve;
  });
  return { passed, open };
}
