/** `rimlight run`: replays a recipe on one scan or many. */

import { basename } from 'node:path';
import { inspect } from 'node:util';
import { createNodeEngine } from '../../workers/node-engine';
import { ensureRimlightError, RimlightError, throwIfAborted } from '../errors';
import { assertExecutable } from '../recipe/executable';
import type { RunCommand } from './command';
import { errorLine } from './error-line';
import { done, someFailed } from './exit-codes';
import { findCompanions, readRecipeFile } from './recipe-file';
import { parseRunRequest, type ScanTask } from './run-request';
import { type RunTools, runScan } from './run-scan';

/** With several scans, one that fails is told and the others are done. */
export const runRun: RunCommand = async (call, context) => {
  const request = parseRunRequest(call);
  const recipeFile = await readRecipeFile(request.recipePath);
  assertExecutable(recipeFile.recipe);
  const companions = await findCompanions(recipeFile);
  const engine = createNodeEngine(request.workers === null ? {} : { workerCount: request.workers });
  try {
    const tools = { request, recipeFile, companions, engine, context };
    return await runAll(request.tasks, tools, call.options.has('debug'));
  } finally {
    await engine.close();
  }
};

async function runAll(
  tasks: readonly ScanTask[],
  tools: RunTools,
  isDebug: boolean,
): Promise<number> {
  const { context } = tools;
  let failed = 0;
  for (const task of tasks) {
    try {
      context.print(await runScan(task, tools));
    } catch (error) {
      if (tasks.length === 1) throw error;
      // Stopped by the user: the other scans are not wanted either.
      throwIfAborted(context.signal, 'the run');
      context.say(errorLine(ofScan(ensureRimlightError(error), task.scanPath)));
      if (isDebug) context.say(inspect(error));
      failed++;
    }
  }
  if (failed === 0) return done;
  context.say(`rimlight: ${failed} of ${tasks.length} scans failed; the others are done.`);
  return someFailed;
}

/** Among several scans an error says which one it is of. */
function ofScan(error: RimlightError, scanPath: string): RimlightError {
  const { kind, what, where, hint } = error;
  if (where.includes(basename(scanPath))) return error;
  const place = where === '' ? scanPath : `${scanPath}: ${where}`;
  return new RimlightError(kind, { what, where: place, hint }, { cause: error });
}
