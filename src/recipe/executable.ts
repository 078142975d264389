/**
 * What of a recipe this build can run. A block that can be written but not run yet is an error where
 * results are made, never skipped in silence. The two lists shrink as the program grows.
 */
import { RimlightError } from '../errors';
import type { Recipe, StepName } from './schema';

/** Steps of `condition` that this build cannot run. */
const unbuiltSteps: ReadonlySet<StepName> = new Set<StepName>([
  'despike',
  'offset',
  'response',
  'calibrate',
  'farfield',
  'baseline',
  'denoise',
  'align-rows',
  'crop',
  'bin',
]);

/** Blocks that this build cannot run, and what they would make. */
const unbuiltFields = {
  strain: 'the strain maps',
  features: 'the features',
} as const satisfies Partial<Record<keyof Recipe, string>>;

export interface UnbuiltBlock {
  /** "condition[0]", "model" */
  readonly path: string;
  /** "the despike step", "the peak model" */
  readonly title: string;
}

/** The blocks and steps of the recipe that this build cannot run, in the order of the recipe; steps that are off do not count. */
export function unbuiltBlocks(recipe: Recipe): readonly UnbuiltBlock[] {
  const steps = (recipe.condition ?? []).flatMap(({ step, off }, index) =>
    off !== true && unbuiltSteps.has(step)
      ? [{ path: `condition[${index}]`, title: `the ${step} step` }]
      : [],
  );
  const blocks = Object.entries(unbuiltFields).flatMap(([path, title]) =>
    recipe[path as keyof typeof unbuiltFields] === undefined ? [] : [{ path, title }],
  );
  return [...steps, ...blocks];
}

/** @throws RimlightError 'recipe' - naming the blocks and steps that this build cannot run */
export function assertExecutable(recipe: Recipe): void {
  const unbuilt = unbuiltBlocks(recipe);
  if (unbuilt.length === 0) return;
  const isStep = unbuilt.some(({ path }) => path.startsWith('condition'));
  throw new RimlightError('recipe', {
    what: `this build cannot run ${listed(unbuilt.map(({ title }) => title))} yet`,
    where: unbuilt.map(({ path }) => path).join(', '),
    hint: isStep
      ? 'Set "off": true in the steps to keep them for later, and take out the other blocks.'
      : 'Take it out of the recipe to run the rest.',
  });
}

function listed(titles: readonly string[]): string {
  const last = titles.at(-1) ?? '';
  return titles.length < 2 ? last : `${titles.slice(0, -1).join(', ')} and ${last}`;
}
