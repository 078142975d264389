/** What the user does to pins, each one edit of the recipe. */
import { addPin, labelPin, movePin, removePin as removePinFrom } from '../recipe/edits';
import type { Pin } from '../recipe/schema';
import type { Pixel } from './crosshair';
import { sayUndoable } from './undoable';
import type { Workbench } from './workbench';

/** The pin that marks a pixel; null where there is none. */
export function pinAt({ recipe }: Workbench, { y, x }: Pixel): Pin | null {
  return recipe.getState().recipe.pins?.find((pin) => pin.x === x && pin.y === y) ?? null;
}

/** Pins a pixel under the next free letter; one that is pinned stays as it is. */
export function addPinAt(workbench: Workbench, pixel: Pixel): void {
  if (pinAt(workbench, pixel) !== null) return;
  const { recipe, notices } = workbench;
  try {
    const { y, x } = pixel;
    recipe.edit(`Pin pixel ${x}, ${y}`, (now) => addPin(now, { x, y }));
  } catch (error) {
    notices.sayError(error);
  }
}

/** Pins a pixel, or lets go of the pin that is there. */
export function togglePinAt(workbench: Workbench, pixel: Pixel): void {
  const pin = pinAt(workbench, pixel);
  if (pin === null) addPinAt(workbench, pixel);
  else removePin(workbench, pin.name);
}

export function removePin(workbench: Workbench, name: string): void {
  const { recipe } = workbench;
  const before = recipe.getState().recipe;
  recipe.edit(`Let go of pin ${name}`, (now) => removePinFrom(now, name));
  if (recipe.getState().recipe === before) return;
  sayUndoable(workbench, `Pin ${name} was let go.`);
}

/** Moves a pin; until the gesture ends all moves are one undo step. A pixel that is pinned already stays the other pin's. */
export function movePinTo(workbench: Workbench, name: string, pixel: Pixel): void {
  const { y, x } = pixel;
  if (pinAt(workbench, pixel) !== null) return;
  workbench.recipe.edit(
    `Move pin ${name}`,
    (now) => movePin(now, name, { y, x }),
    `move-pin-${name}`,
  );
}

/** Says what a pin marks; an empty text takes the words away. */
export function labelPinAs(workbench: Workbench, name: string, label: string): void {
  const { recipe, notices } = workbench;
  try {
    recipe.edit(`Label pin ${name}`, (now) => labelPin(now, name, label));
  } catch (error) {
    notices.sayError(error);
  }
}
