/** One scan of a run: look, load, derive, write. */
import { version } from '../../package.json';
import type { CallOptions, ScanEngine, ScanFit } from '../../workers/engine';
import type { Inspection, ScanPlan } from '../io/scan-plan';
import type { DerivedMap } from '../science/scan';
import { blendPicture } from './blend-picture';
import type { Context } from './command';
import { deriveMaps } from './derive-maps';
import { fitModel } from './fit-maps';
import { startProgress } from './progress';
import { type FoundFile, findScan, type RecipeFile } from './recipe-file';
import { ResultFolder } from './result-folder';
import type { RunRequest, ScanTask } from './run-request';
import { scanInputs } from './scan-inputs';
import { Stopwatch } from './stopwatch';
import { summaryText } from './summary';

/** What all scans of a call share. */
export interface RunTools {
  readonly request: RunRequest;
  readonly recipeFile: RecipeFile;
  readonly companions: readonly FoundFile[];
  readonly engine: ScanEngine;
  readonly context: Context;
}

/** Everything known of a scan before anything is written. */
interface Derived {
  readonly file: FoundFile;
  readonly inspection: Inspection;
  readonly plan: ScanPlan;
  readonly maps: readonly DerivedMap[];
  /** null for a recipe without a model; its maps are among `maps` */
  readonly fit: ScanFit | null;
  readonly sha256: string;
  readonly warnings: readonly string[];
}

/**
 * Replays the recipe on one scan and writes its results.
 *
 * @returns one line for the user
 * @throws RimlightError - naming the scan, when it cannot be read, or its results not be made or written
 */
export async function runScan({ scanPath, folder }: ScanTask, tools: RunTools): Promise<string> {
  const watch = new Stopwatch();
  const workerNotes: string[] = [];
  const forget = tools.engine.onWorkerReplaced(({ worker, reason }) => {
    const note = `worker ${worker + 1} stopped (${reason}) and was replaced; its rows were read again`;
    workerNotes.push(note);
    tools.context.say(`rimlight: ${note}.`);
  });
  try {
    const derived = await derive(scanPath, tools, watch);
    await write(derived, folder, tools, watch, workerNotes);
    return `${scanPath}: ${derived.maps.length} maps written to ${folder}`;
  } finally {
    forget();
  }
}

async function derive(scanPath: string, tools: RunTools, watch: Stopwatch): Promise<Derived> {
  const { engine, context, recipeFile, companions } = tools;
  const { recipe } = recipeFile;
  const file = await findScan(scanPath);
  const inputs = scanInputs(file, companions);
  const inspection = await engine.inspect(inputs, recipe.scan ?? {}, { signal: context.signal });
  const { plan, problems } = inspection;
  if (plan === null) throw problems[0];
  const scan = await engine.open(inputs, plan, options(context, `Reading ${file.name}`));
  watch.lap('read');
  try {
    const derived = await deriveMaps(scan, recipe, options(context, `Mapping ${file.name}`));
    watch.lap('maps');
    const fit = await fitModel(scan, recipe, options(context, `Fitting ${file.name}`));
    watch.lap('fit');
    const maps = [...derived, ...(fit?.maps ?? [])];
    const sha256 = await engine.sha256(inputs.scan, options(context, `Hashing ${file.name}`));
    watch.lap('hash');
    const warnings = [...inspection.warnings, ...scan.overview.warnings];
    return { file, inspection, plan, maps, fit, sha256, warnings };
  } finally {
    await scan.release();
  }
}

async function write(
  { file, inspection, plan, maps, fit, sha256, warnings }: Derived,
  folder: string,
  { request, recipeFile, engine, context }: RunTools,
  watch: Stopwatch,
  workerNotes: readonly string[],
): Promise<void> {
  const results = new ResultFolder(folder, request.parts, context.signal);
  const mapsFile = { meta: plan.meta, maps, recipeText: recipeFile.text, sha256, version };
  await results.prepare(maps);
  await results.writeMaps(maps);
  await results.writeHdf5(mapsFile);
  await results.writePixels(mapsFile);
  await results.writeBlend(blendPicture(recipeFile.recipe, maps));
  watch.lap('write');
  await results.writeSummary(() =>
    summaryText({
      version,
      inspection,
      meta: plan.meta,
      scanBytes: file.size,
      scanSha256: sha256,
      recipeFile,
      maps,
      fit,
      workers: engine.workerCount,
      timings: watch.laps(),
      warnings: [...warnings, ...workerNotes],
    }),
  );
}

function options(context: Context, label: string): Required<CallOptions> {
  return { signal: context.signal, onProgress: startProgress(context, label) };
}
