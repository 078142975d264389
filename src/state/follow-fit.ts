/**
 * Keeps the drawn fit in step with the crosshair and the model, takes away maps of components that
 * are gone and brings them back with their model. Maps of all pixels are made only when the user asks.
 */
import { createLatestWins } from '../../workers/latest-wins';
import { parseMapName } from '../recipe/map-names';
import { offeredMaps } from '../recipe/offered-maps';
import { fitKey, planOf, putFitMaps } from './fit-actions';
import type { Workbench } from './workbench';

export function followFit(workbench: Workbench): () => void {
  const { session, recipe, crosshair, results, fit, notices } = workbench;
  const drawing = createLatestWins();

  const isCurrent = (scanNumber: number): boolean => session.getState().scanNumber === scanNumber;
  const sayOf = (scanNumber: number) => (error: unknown) => {
    if (isCurrent(scanNumber)) notices.sayError(error);
  };

  const update = (): void => {
    const { scan, scanNumber } = session.getState();
    const document = recipe.getState().recipe;
    const lastPin = document.pins?.at(-1);
    const pixel =
      crosshair.get() ?? (lastPin === undefined ? null : { y: lastPin.y, x: lastPin.x });
    if (scan === null || pixel === null || document.model === undefined) {
      drawing.clear();
      if (fit.getState().fitted !== null) fit.setState({ fitted: null });
      return;
    }
    const { ny, nx } = scan.open.plan.meta.shape;
    if (pixel.y >= ny || pixel.x >= nx) return;
    drawing.run(async () => {
      const plan = planOf(document, scan);
      if (plan === null) return;
      const { scanFit, madeOf } = fit.getState();
      const isOfThis = scanFit !== null && madeOf === fitKey(scanNumber, document);
      const from = isOfThis ? scanFit : undefined;
      const fitted = { pixel, fit: await scan.open.fitPixel(plan, pixel, from) };
      // Late answers: of a scan that is gone, or of a model that was taken away meanwhile.
      if (isCurrent(scanNumber) && recipe.getState().recipe.model !== undefined) {
        fit.setState({ fitted });
      }
    }, sayOf(scanNumber));
  };

  const dropStale = (): void => {
    const offered = new Set(offeredMaps(recipe.getState().recipe).map(({ name }) => name));
    results.remove((name) => {
      const kind = parseMapName(name)?.kind;
      return (kind === 'fit' || kind === 'fit-quality') && !offered.has(name);
    });
  };

  /** Undo comes back to the model that was fitted: its maps need no second fit. */
  const bringBack = (): void => {
    const { madeOf, scanFit } = fit.getState();
    const { scanNumber } = session.getState();
    if (scanFit !== null && madeOf === fitKey(scanNumber, recipe.getState().recipe)) {
      putFitMaps(workbench, scanFit.maps);
    }
  };

  const unsubscribers = [
    crosshair.subscribe(update),
    recipe.subscribe((now, before) => {
      if (now.recipe.model !== before.recipe.model) {
        dropStale();
        bringBack();
      }
      if (now.recipe.model !== before.recipe.model || now.recipe.pins !== before.recipe.pins) {
        update();
      }
    }),
    session.subscribe((now, before) => {
      if (now.scanNumber === before.scanNumber) return;
      fit.setState({ madeOf: null, scanFit: null, fitted: null });
      update();
    }),
  ];
  return () => {
    for (const unsubscribe of unsubscribers) unsubscribe();
  };
}
