/** Refusals of the conditioning steps: which step of the recipe, what is wrong with it, what to do. */
import { RimlightError } from '../../errors';

/** Where a step stands: "condition[2], response". */
export type StepPlace = string;

/** A step that cannot be done with these settings, files or data. */
export function stepError(place: StepPlace, what: string, hint: string): RimlightError {
  return new RimlightError('recipe', { what, where: place, hint });
}
