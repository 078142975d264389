/** What Esc does where no sheet is open. */
import { initialView } from '../../state/view-store';
import type { Workbench } from '../../state/workbench';

/** Lets go of the selected band and of the crosshair: nothing is selected that a next key could act on. */
export function letGo({ view, crosshair }: Workbench): void {
  crosshair.set(null);
  if (view.getState().selection.kind === 'band')
    view.setState({ selection: initialView.selection });
}
