/** What the user does to the conditioning steps, each one edit of the recipe. */
import { toggleStep } from '../recipe/edits';
import type { Workbench } from './workbench';

export function switchStep({ recipe }: Workbench, index: number): void {
  const step = recipe.getState().recipe.condition?.[index];
  if (step === undefined) return;
  const verb = step.off === true ? 'Use' : 'Leave out';
  recipe.edit(`${verb} the ${step.step} step`, (now) => toggleStep(now, index));
}
