/** `rimlight run`: replays a recipe on one scan or many. */
import type { ScanEngine } from '../../workers/engine';
import { ensureRimlightError, throwIfAborted } from '../errors';
import { assertExecutable } from '../recipe/executable';
import type { Context, RunCommand } from './command';
import { startEngine } from './engine';
import { errorLine } from './error-line';
import { done, someFailed } from './exit-codes';
import { type FoundFile, findCompanions, type RecipeFile, readRecipeFile } from './recipe-file';
import { parseRunRequest, type RunRequest, type ScanTask } from './run-request';
import { runScan } from './run-scan';

/** What all scans of a call share. */
export interface RunTools {
  readonly request: RunRequest;
  readonly recipeFile: RecipeFile;
  readonly companions: readonly FoundFile[];
  readonly engine: ScanEngine;
  readonly context: Context;
}

/** With several scans, one that fails is told and the others are done. */
export const runRun: RunCommand = async (call, context) => {
  const request = parseRunRequest(call);
  const recipeFile = await readRecipeFile(request.recipePath);
  assertExecutable(recipeFile.recipe);
  const companions = await findCompanions(recipeFile);
  const engine = await startEngine(request.workers);
  engine.onWorkerReplaced(({ worker, reason }) => {
    context.say(
      `rimlight: worker ${worker + 1} stopped (${reason}) and was replaced; its rows are read again.`,
    );
  });
  try {
    const tools = { request, recipeFile, companions, engine, context };
    return await runAll(request.tasks, tools);
  } finally {
    await engine.close();
  }
};

async function runAll(tasks: readonly ScanTask[], tools: RunTools): Promise<number> {
  const { context } = tools;
  let failed = 0;
  for (const task of tasks) {
    try {
      context.print(await runScan(task, tools));
    } catch (error) {
      if (tasks.length === 1) throw error;
      // Stopped by the user: the other scans are not wanted either.
      throwIfAborted(context.signal, 'the run');
      context.say(errorLine(ensureRimlightError(error)));
      failed++;
    }
  }
  if (failed === 0) return done;
  context.say(`rimlight: ${failed} of ${tasks.length} scans failed; the others are done.`);
  return someFailed;
}
