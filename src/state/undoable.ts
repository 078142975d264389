/** Says what was done with a way to take it back, for as long as undoing takes back just that. */
import type { Workbench } from './workbench';

/** Call right after the edit; the message goes with the next step of the history, whichever way. */
export function sayUndoable({ recipe, notices }: Workbench, text: string): void {
  const action = { label: 'Undo', run: recipe.undo };
  const id = notices.say('done', text, { action });
  const { past } = recipe.getState();
  const leave = recipe.subscribe((now) => {
    if (now.past === past) return;
    leave();
    notices.dismiss(id);
  });
}
