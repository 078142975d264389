/**
 * Keeps the band maps in step with the recipe: whatever changed it (a drag, undo, a file), the maps
 * that are wanted and not known are asked of the engine, newest request first, old ones dropped.
 */
import { createLatestWins, type LatestWins } from '../../workers/latest-wins';
import { bandToEnergy } from '../recipe/band-energies';
import { parseMapName } from '../recipe/map-names';
import { bandQuantityUnit } from '../recipe/offered-maps';
import type { Recipe, RecipeBand } from '../recipe/schema';
import type { BandQuantity, EnergyBand } from '../science/bands/band';
import type { DerivedMap } from '../science/scan';
import { createRecentlyUsed } from './recently-used';
import type { CurrentScan } from './session-store';
import type { Workbench } from './workbench';

/** Always computed: the hung map and the values panel show both. */
const always: readonly BandQuantity[] = ['integral', 'centroid'];
/** Maps kept for undo and redo; a 256 × 256 map with errors is 1 MB. */
const mapsKept = 96;

export function followBands(workbench: Workbench): () => void {
  const { session, recipe, view, results, notices } = workbench;
  const known = createRecentlyUsed<string, DerivedMap>(mapsKept);
  const limiters = new Map<string, LatestWins>();

  const limiterOf = (name: string): LatestWins => {
    const limiter = limiters.get(name) ?? createLatestWins();
    limiters.set(name, limiter);
    return limiter;
  };

  const update = (): void => {
    const { scan, scanNumber } = session.getState();
    if (scan === null) return;
    const document = recipe.getState().recipe;
    dropStale(document);
    for (const band of document.bands ?? []) {
      const energies = energiesOf(band, document, scan);
      if (energies !== null) {
        follow(
          scan,
          scanNumber,
          band,
          energies,
          wantedQuantities(band.name, document, view.getState().leadMap),
        );
      }
    }
  };

  const energiesOf = (band: RecipeBand, document: Recipe, scan: CurrentScan): EnergyBand | null => {
    try {
      return bandToEnergy(band, scan.open.plan.meta.laserEv, document.scan?.axis?.medium ?? 'air');
    } catch (error) {
      notices.sayError(error);
      return null;
    }
  };

  const dropStale = (document: Recipe): void => {
    const names = new Set((document.bands ?? []).map((band) => band.name));
    results.remove((name) => {
      const parsed = parseMapName(name);
      return parsed?.kind === 'band' && !names.has(parsed.band);
    });
  };

  const follow = (
    scan: CurrentScan,
    scanNumber: number,
    band: RecipeBand,
    energies: EnergyBand,
    quantities: readonly BandQuantity[],
  ): void => {
    const keyOf = (quantity: BandQuantity): string =>
      JSON.stringify([scanNumber, band.name, energies, quantity]);
    const found = quantities.map((quantity) => known.get(keyOf(quantity)));
    if (found.every((map) => map !== undefined)) {
      putChanged(found.filter((map) => map !== undefined));
      limiterOf(band.name).clear();
      results.setPending(band.name, false);
      return;
    }
    results.setPending(band.name, true);
    limiterOf(band.name).run(async () => {
      const computed = await scan.open.bandMaps({ band: energies, quantities });
      const { ny, nx } = scan.open.plan.meta.shape;
      const maps = computed.map(({ quantity, values, errors }): DerivedMap => {
        const unit = bandQuantityUnit(quantity, scan.open.plan.meta.quantity);
        return { name: `band.${band.name}.${quantity}`, unit, ny, nx, values, errors };
      });
      for (const [index, map] of maps.entries()) {
        const quantity = quantities[index];
        if (quantity !== undefined) known.set(keyOf(quantity), map);
      }
      if (session.getState().scanNumber !== scanNumber) return;
      putChanged(maps);
      results.setPending(band.name, false);
    }, notices.sayError);
  };

  const putChanged = (maps: readonly DerivedMap[]): void => {
    const shown = results.getState().maps;
    const changed = maps.filter((map) => shown.get(map.name) !== map);
    if (changed.length > 0) results.put(changed);
  };

  const unsubscribers = [
    recipe.subscribe((now, before) => {
      if (now.recipe !== before.recipe) update();
    }),
    view.subscribe((now, before) => {
      if (now.leadMap !== before.leadMap) update();
    }),
    session.subscribe((now, before) => {
      if (now.scanNumber !== before.scanNumber) update();
    }),
  ];
  update();
  return () => {
    for (const unsubscribe of unsubscribers) unsubscribe();
  };
}

/** The quantities of one band that something on screen or in the recipe shows. */
function wantedQuantities(
  name: string,
  document: Recipe,
  leadMap: string,
): readonly BandQuantity[] {
  const wanted = new Set<BandQuantity>(always);
  const sources = [leadMap, ...(document.blend?.channels ?? []).map((channel) => channel.source)];
  for (const source of sources) {
    const parsed = parseMapName(source);
    if (parsed?.kind === 'band' && parsed.band === name) wanted.add(parsed.quantity);
  }
  return [...wanted];
}
