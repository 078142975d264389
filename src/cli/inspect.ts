/** `rimlight inspect`: what a scan file holds, what was guessed and why. */
import { createNodeEngine } from '../../workers/node-engine';
import type { RunCommand } from './command';
import { countStatistics } from './count-statistics';
import { done } from './exit-codes';
import { inspectionRecord } from './inspect-json';
import { inspectionText } from './inspect-text';
import { findCompanions, findScan, readRecipeFile } from './recipe-file';
import { scanInputs } from './scan-inputs';

/** Prints what was found even where the scan cannot be read; the first thing in the way is then the error. */
export const runInspect: RunCommand = async ({ operands, options }, context) => {
  const [scanPath = ''] = operands;
  const recipePath = options.get('recipe');
  const recipe = recipePath === undefined ? null : await readRecipeFile(recipePath);
  const inputs = scanInputs(
    await findScan(scanPath),
    recipe === null ? [] : await findCompanions(recipe),
  );
  const engine = createNodeEngine();
  try {
    const choices = recipe?.recipe.scan ?? {};
    const inspection = await engine.inspect(inputs, choices, { signal: context.signal });
    const { plan, problems } = inspection;
    const statistics = plan === null ? null : await countStatistics(engine, inputs, plan, context);
    context.print(
      options.has('json')
        ? JSON.stringify(inspectionRecord(inspection, statistics), null, 2)
        : inspectionText(inspection, statistics),
    );
    if (plan === null && problems[0] !== undefined) throw problems[0];
    return done;
  } finally {
    await engine.close();
  }
};
