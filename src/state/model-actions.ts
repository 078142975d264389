/** What the user does to the peak model, each one edit of the recipe; a drag is one undo step. */
import { energyToBandUnit } from '../recipe/band-energies';
import { mediumOf } from '../recipe/defaults';
import {
  addComponent,
  nextComponentName,
  removeComponent,
  renameComponent,
  setComponent,
  setModel,
  setModelWindow,
} from '../recipe/model-edits';
import type { ModelComponent, ParameterSpec, PeakModel, Recipe } from '../recipe/schema';
import { type ComponentShape, isPeakShape, shapeParameters } from '../recipe/shape-parameters';
import { cm1FromEv } from '../science/units';
import { sayUndoable } from './undoable';
import type { Workbench } from './workbench';

/** The settings of one parameter; null takes the setting away. */
export interface ParameterChange {
  readonly start?: number | null;
  readonly min?: number | null;
  readonly max?: number | null;
  readonly fixed?: boolean;
}

type FullSpec = Exclude<ParameterSpec, number>;

export function selectModel({ view }: Workbench): void {
  view.setState({ selection: { kind: 'model' } });
}

export function selectComponent({ view }: Workbench, name: string): void {
  view.setState({ selection: { kind: 'component', name } });
}

/** A peak where the user points; the first one brings a straight line to stand on. */
export function addPeakAt(workbench: Workbench, energyEv: number, fwhmEv: number): void {
  const { recipe } = workbench;
  const name = nextComponentName(recipe.getState().recipe, 'peak');
  const peak: ModelComponent = {
    name,
    shape: 'gaussian',
    centre: rounded(energyEv, 5),
    fwhm: rounded(fwhmEv, 5),
  };
  recipe.edit(`Add ${name}`, (now) => {
    const standing =
      now.model === undefined ? addComponent(now, { name: 'floor', shape: 'line' }) : now;
    return addComponent(standing, peak);
  });
  selectComponent(workbench, name);
}

/** Another background, beside what is there. */
export function addFloor(workbench: Workbench): void {
  const name = nextComponentName(workbench.recipe.getState().recipe, 'floor');
  workbench.recipe.edit(`Add ${name}`, (now) => addComponent(now, { name, shape: 'line' }));
  selectComponent(workbench, name);
}

export function deleteComponent(workbench: Workbench, name: string): void {
  const { recipe } = workbench;
  recipe.edit(`Delete ${name}`, (now) => removeComponent(now, name));
  selectModel(workbench);
  sayUndoable(workbench, `Component ${name} was deleted.`);
}

export function setComponentName(workbench: Workbench, from: string, to: string): void {
  workbench.recipe.edit(`Rename ${from}`, (now) => renameComponent(now, from, to));
  selectComponent(workbench, to);
}

/** Another shape; parameters both shapes have are kept. */
export function setComponentShape(workbench: Workbench, name: string, shape: ComponentShape): void {
  change(workbench, name, `Give ${name} another shape`, (component) => {
    const kept = new Set<string>(shapeParameters(shape));
    const entries = Object.entries(component).filter(
      ([field]) => ['name', 'role', 'optional'].includes(field) || kept.has(field),
    );
    return { ...Object.fromEntries(entries), name, shape } as ModelComponent;
  });
}

export function setComponentRole(
  workbench: Workbench,
  name: string,
  role: ModelComponent['role'] | null,
): void {
  change(workbench, name, `Say what ${name} is`, (component) => {
    const { role: _, ...rest } = component;
    return (role === null || role === undefined ? rest : { ...rest, role }) as ModelComponent;
  });
}

export function setComponentOptional(
  workbench: Workbench,
  name: string,
  isOptional: boolean,
): void {
  const words = isOptional ? `Keep ${name} only where it is needed` : `Keep ${name} everywhere`;
  change(workbench, name, words, (component) => {
    const { optional: _, ...rest } = component;
    return (isOptional ? { ...rest, optional: true } : rest) as ModelComponent;
  });
}

/** Start, bounds or hold of one parameter, in its own unit. */
export function setComponentParameter(
  workbench: Workbench,
  name: string,
  parameter: string,
  changed: ParameterChange,
): void {
  change(workbench, name, `Set ${name}.${parameter}`, (component) => {
    const spec = specOf(component, parameter);
    const { [parameter]: _, ...rest } = component as Readonly<Record<string, unknown>>;
    const next = simplest(withChange(spec, changed));
    return (next === null ? rest : { ...rest, [parameter]: next }) as ModelComponent;
  });
}

/** Moves a peak's start by hand; it stays between its bounds. */
export function movePeak(
  workbench: Workbench,
  name: string,
  to: { readonly centreEv?: number; readonly fwhmEv?: number },
): void {
  const { recipe, session } = workbench;
  const laserEv = session.getState().scan?.open.plan.meta.laserEv ?? null;
  const medium = mediumOf(recipe.getState().recipe);
  const moved = (component: ModelComponent): ModelComponent => {
    if (!isPeakShape(component.shape)) return component;
    const widthField = component.shape === 'voigt' ? 'fwhm_g' : 'fwhm';
    const fields: Record<string, unknown> = { ...component };
    if (to.centreEv !== undefined) {
      const spec = specOf(component, 'centre');
      const start = energyToBandUnit(to.centreEv, spec.unit ?? 'eV', laserEv, medium);
      fields.centre = simplest({ ...spec, start: within(rounded(start, 5), spec) });
    }
    if (to.fwhmEv !== undefined) {
      const spec = specOf(component, widthField);
      const start = widthIn(spec.unit ?? 'eV', to.fwhmEv);
      fields[widthField] = simplest({ ...spec, start: within(rounded(start, 6), spec) });
    }
    return fields as ModelComponent;
  };
  change(workbench, name, `Move ${name}`, moved, `move-${name}`);
}

export function setWindow(workbench: Workbench, window: readonly [number, number] | null): void {
  workbench.recipe.edit('Set the window of the fit', (now) => setModelWindow(now, window));
}

export function setNoise(workbench: Workbench, noise: PeakModel['noise'] | null): void {
  workbench.recipe.edit('Set the noise of the fit', (now) => {
    if (now.model === undefined) return now;
    const { noise: _, ...rest } = now.model;
    return setModel(now, noise === null || noise === undefined ? rest : { ...rest, noise });
  });
}

/** How a parameter is given, as an object. */
export function specOf(component: ModelComponent, parameter: string): FullSpec {
  const specs: Readonly<Record<string, unknown>> = component;
  const spec = specs[parameter] as ParameterSpec | undefined;
  return typeof spec === 'number' ? { start: spec } : (spec ?? {});
}

/** The parameters of a component, in the order they are written. */
export function parametersOf(component: ModelComponent): readonly string[] {
  return shapeParameters(component.shape);
}

function change(
  workbench: Workbench,
  name: string,
  label: string,
  of: (component: ModelComponent) => ModelComponent,
  gesture?: string,
): void {
  const edit = (now: Recipe): Recipe => {
    const component = now.model?.components.find((candidate) => candidate.name === name);
    return component === undefined ? now : setComponent(now, name, of(component));
  };
  try {
    workbench.recipe.edit(label, edit, gesture);
  } catch (error) {
    workbench.notices.sayError(error);
  }
}

function withChange(spec: FullSpec, changed: ParameterChange): FullSpec {
  const next: Record<string, unknown> = { ...spec };
  for (const field of ['start', 'min', 'max'] as const) {
    const value = changed[field];
    if (value === undefined) continue;
    if (value === null) delete next[field];
    else next[field] = value;
  }
  if (changed.fixed === true) next.fixed = true;
  if (changed.fixed === false) delete next.fixed;
  return next as FullSpec;
}

/** A bare number where nothing but the start is given; null where nothing is. */
function simplest(spec: FullSpec): ParameterSpec | null {
  const fields = Object.keys(spec);
  if (fields.length === 0) return null;
  return fields.length === 1 && spec.start !== undefined ? spec.start : spec;
}

function widthIn(unit: NonNullable<FullSpec['unit']>, widthEv: number): number {
  if (unit === 'meV') return widthEv * 1000;
  return unit === 'cm-1' ? cm1FromEv(widthEv) : widthEv;
}

function within(value: number, { min, max }: FullSpec): number {
  return Math.min(Math.max(value, min ?? value), max ?? value);
}

function rounded(value: number, decimals: number): number {
  return Number(value.toFixed(decimals));
}
