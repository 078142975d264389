/**
 * Edits of the peak model, in the manner of `edits.ts`: pure, parts that did not change are shared,
 * and a valid recipe stays valid or the edit is refused.
 */
import { assertNameIsFree, ensureFits } from './checked';
import { withoutDangling, withSources } from './edit-references';
import { formatMapName, parseMapName } from './map-names';
import { modelBlockSchema } from './model-block';
import { recipeError } from './problems';
import { referenceProblems } from './references';
import type { ModelComponent, PeakModel, Recipe } from './schema';
import { isRecord } from './schema-parts';

/** "peak-1", or the first such name no component has. */
export function nextComponentName(recipe: Recipe, stem: string): string {
  const names = new Set(recipe.model?.components.map(({ name }) => name.toLowerCase()));
  if (!names.has(stem.toLowerCase())) return stem;
  for (let number = 2; ; number++) {
    const name = `${stem}-${number}`;
    if (!names.has(name.toLowerCase())) return name;
  }
}

/**
 * Adds a component, or begins a model with it.
 *
 * @throws RimlightError 'recipe' - when it is not valid or its name is taken
 */
export function addComponent(recipe: Recipe, component: ModelComponent): Recipe {
  const components = recipe.model?.components ?? [];
  assertNameIsFree(components, component.name, ['model', 'components', components.length, 'name']);
  return withModel(recipe, { ...recipe.model, components: [...components, component] });
}

/**
 * Puts a component in place of the one of this name; the name stays.
 *
 * @throws RimlightError 'recipe' - when it is not valid
 */
export function setComponent(recipe: Recipe, name: string, component: ModelComponent): Recipe {
  const { model } = recipe;
  const index = indexOf(model, name);
  if (model === undefined || index < 0 || model.components[index] === component) return recipe;
  const changed = { ...component, name };
  return withoutDangling(
    withModel(recipe, { ...model, components: model.components.with(index, changed) }),
  );
}

/**
 * Renames a component, and its maps and ties wherever the recipe names them.
 *
 * @throws RimlightError 'recipe' - when the name is none or is taken
 */
export function renameComponent(recipe: Recipe, from: string, to: string): Recipe {
  const { model } = recipe;
  const index = indexOf(model, from);
  if (model === undefined || index < 0 || from === to) return recipe;
  assertNameIsFree(model.components, to, ['model', 'components', index, 'name'], from);
  const components = model.components.map((component) => {
    const tied = withTies(component, (target) => retargeted(target, from, to));
    return component.name === from ? { ...tied, name: to } : tied;
  });
  return withSources(withModel(recipe, { ...model, components }), (source) => {
    const name = parseMapName(source);
    return name?.kind === 'fit' && name.component === from
      ? formatMapName({ ...name, component: to })
      : source;
  });
}

/** Removes a component, the ties to it, and what was made from its maps; with the last one goes the model. */
export function removeComponent(recipe: Recipe, name: string): Recipe {
  const { model, ...rest } = recipe;
  if (model === undefined || indexOf(model, name) < 0) return recipe;
  const components = model.components
    .filter((component) => component.name !== name)
    .map((component) =>
      withTies(component, (target) => (target.startsWith(`${name}.`) ? null : target)),
    );
  if (components.length === 0) return withoutDangling(rest);
  return withoutDangling(withModel(recipe, { ...model, components }));
}

/** @param window - eV, lower end first; null for the whole axis. @throws RimlightError 'recipe' - when it is none */
export function setModelWindow(recipe: Recipe, window: readonly [number, number] | null): Recipe {
  const { model } = recipe;
  if (model === undefined) return recipe;
  const { window: _, ...rest } = model;
  return withModel(recipe, window === null ? rest : { ...rest, window });
}

/** The whole model at once: a proposal. @throws RimlightError 'recipe' - when it is not valid */
export function setModel(recipe: Recipe, model: PeakModel): Recipe {
  return withoutDangling(withModel(recipe, model));
}

function withModel(recipe: Recipe, model: PeakModel): Recipe {
  const changed = { ...recipe, model: ensureFits(modelBlockSchema, model, ['model']) };
  const problems = referenceProblems(changed).filter(({ path }) => path.startsWith('model'));
  if (problems.length > 0) throw recipeError(problems);
  return changed;
}

function indexOf(model: PeakModel | undefined, name: string): number {
  return model?.components.findIndex((component) => component.name === name) ?? -1;
}

function retargeted(target: string, from: string, to: string): string {
  return target.startsWith(`${from}.`) ? `${to}${target.slice(from.length)}` : target;
}

/** The component with each tie's target passed through `change`; null takes the tie away. */
function withTies(
  component: ModelComponent,
  change: (target: string) => string | null,
): ModelComponent {
  const changed: Record<string, unknown> = { ...component };
  let isSame = true;
  for (const [field, spec] of Object.entries(component)) {
    if (!isRecord(spec) || !isRecord(spec.tie) || typeof spec.tie.to !== 'string') continue;
    const to = change(spec.tie.to);
    if (to === spec.tie.to) continue;
    isSame = false;
    const { tie, ...untied } = spec;
    changed[field] = to === null ? untied : { ...spec, tie: { ...spec.tie, to } };
  }
  return isSame ? component : (changed as ModelComponent);
}
