/** From the recipe's condition block to a chain of steps on one scan: defaults filled in, energies in eV, files at hand. */
import { RimlightError } from '../errors';
import type { Medium } from '../science/axis';
import type { ActiveStep, ChainStep } from '../science/condition/chain-step';
import type { RecordedReference } from '../science/condition/reference-recording';
import type { ResponseCurve } from '../science/condition/response';
import { bandToEnergy } from './band-energies';
import { defaults } from './default-values';
import type { Recipe } from './schema';

type RecipeStep = NonNullable<Recipe['condition']>[number];
type RecipeStepOf<Name extends RecipeStep['step']> = Extract<RecipeStep, { readonly step: Name }>;

/** What the files of the block hold, by their paths in the recipe; those of steps that are off are not needed. */
export interface ConditionFiles {
  readonly recordings: ReadonlyMap<string, RecordedReference>;
  readonly curves: ReadonlyMap<string, ResponseCurve>;
}

export interface ConditionContext {
  /** eV; null when unknown */
  readonly laserEv: number | null;
  /** of the scan's wavelengths, in which those of the block are read */
  readonly medium: Medium;
  readonly files: ConditionFiles;
}

/** A file the condition block names, and what is to be read from it. */
export interface ConditionFile {
  readonly path: string;
  readonly kind: 'recording' | 'curve';
  /** "condition[1].file" */
  readonly where: string;
}

/** The files of all steps that are on, in their order. */
export function conditionFiles(recipe: Recipe): readonly ConditionFile[] {
  return (recipe.condition ?? []).flatMap((step, index): readonly ConditionFile[] => {
    if (step.off === true || !('file' in step) || step.file === undefined) return [];
    const kind = step.step === 'response' ? 'curve' : 'recording';
    return [{ path: step.file, kind, where: `condition[${index}].file` }];
  });
}

/**
 * The steps as `planChain` takes them, one for each of the block's.
 *
 * @throws RimlightError 'recipe' - when a crop in cm-1 has no laser, or a file was not read
 */
export function chainSteps(recipe: Recipe, context: ConditionContext): readonly ChainStep[] {
  return (recipe.condition ?? []).map((step, index) =>
    step.off === true
      ? { isOff: true, step: step.step }
      : activeStep(step, context, `condition[${index}], ${step.step}`),
  );
}

function activeStep(step: RecipeStep, context: ConditionContext, where: string): ActiveStep {
  const { recordings, curves } = context.files;
  const isOff = false;
  switch (step.step) {
    case 'despike':
      return { isOff, ...defaults.despike, ...definedOnly(step), kept: [] };
    case 'offset':
      return {
        isOff,
        step: step.step,
        dark: step.file === undefined ? (step.counts ?? 0) : read(recordings, step.file, where),
      };
    case 'response':
      return { isOff, step: step.step, curve: read(curves, step.file, where) };
    case 'calibrate': {
      const { points, unit, degree = defaults.calibrate.degree } = step;
      return { isOff, step: step.step, points, unit, degree, medium: context.medium };
    }
    case 'farfield': {
      const { scale = defaults.farfield.scale, window: span = null } = step;
      const outside = read(recordings, step.file, where);
      return { isOff, step: step.step, outside, scale, window: span };
    }
    case 'baseline':
      return { isOff, ...baselineStep(step) };
    case 'denoise':
      return { isOff, step: step.step, rank: step.rank ?? defaults.denoise.rank };
    case 'align-rows': {
      const { max_shift_px: maxShiftPx = defaults.alignRows.max_shift_px } = step;
      return { isOff, step: step.step, maxShiftPx };
    }
    case 'crop':
      return { isOff, ...cropStep(step, context, where) };
    case 'bin': {
      const { x, y, k } = { ...defaults.bin, ...step };
      return { isOff, step: step.step, x, y, k };
    }
  }
}

function definedOnly({ step, method, threshold }: RecipeStepOf<'despike'>) {
  return {
    step,
    ...(method === undefined ? {} : { method }),
    ...(threshold === undefined ? {} : { threshold }),
  };
}

function baselineStep(step: RecipeStepOf<'baseline'>) {
  const { baseline } = defaults;
  switch (step.method) {
    case 'arpls': {
      const { smoothness = baseline.smoothness, iterations = baseline.iterations } = step;
      return { step: step.step, method: step.method, smoothness, iterations };
    }
    case 'asls': {
      const { smoothness = baseline.smoothness, iterations = baseline.iterations } = step;
      const { asymmetry = baseline.asymmetry } = step;
      return { step: step.step, method: step.method, smoothness, asymmetry, iterations };
    }
    case 'snip': {
      const { half_width: halfWidth = baseline.half_width } = step;
      return { step: step.step, method: step.method, halfWidth };
    }
    case 'polynomial': {
      const { degree = baseline.degree, windows = null } = step;
      return { step: step.step, method: step.method, degree, windows };
    }
  }
}

function cropStep(step: RecipeStepOf<'crop'>, context: ConditionContext, where: string) {
  const { axis, unit = defaults.crop.unit, x = null, y = null } = step;
  return { step: step.step, axisEv: axis === undefined ? null : cropEv(axis, unit), x, y };

  function cropEv(
    [from, to]: readonly [number, number],
    given: NonNullable<typeof unit>,
  ): readonly [number, number] {
    const band = { name: 'crop', from, to, unit: given } as const;
    const { fromEv, toEv } = bandToEnergy(band, context.laserEv, context.medium, where);
    return [fromEv, toEv];
  }
}

function read<Content>(files: ReadonlyMap<string, Content>, path: string, where: string): Content {
  const content = files.get(path);
  if (content !== undefined) return content;
  throw new RimlightError('recipe', {
    what: `${path} was not read`,
    where,
    hint: 'Put the file beside the recipe, under the name the recipe gives.',
  });
}
