/**
 * Keeps the band maps in step with the recipe: whatever changed it (a drag, undo, a file), the maps
 * that are wanted and not known are asked of the engine, newest request first, old ones dropped.
 */
import type { BandMap } from '../../workers/engine';
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

  /** By band, the request the maps on screen are behind; none once they are there. */
  const behind = new Map<string, string>();

  const update = (): void => {
    const { scan, scanNumber } = session.getState();
    if (scan === null) return;
    const document = recipe.getState().recipe;
    const wanted = wantedQuantities(document, view.getState().leadMap);
    dropStale(wanted);
    for (const band of document.bands ?? []) {
      const energies = energiesOf(band, document, scan);
      if (energies === null) giveUp(band.name);
      else follow(scan, scanNumber, band.name, energies, [...(wanted.get(band.name) ?? always)]);
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

  /** A map nobody keeps in step would show old numbers beside new ends. */
  const dropStale = (wanted: ReadonlyMap<string, ReadonlySet<BandQuantity>>): void => {
    results.remove((name) => {
      const parsed = parseMapName(name);
      return parsed?.kind === 'band' && wanted.get(parsed.band)?.has(parsed.quantity) !== true;
    });
    for (const name of [...behind.keys()]) if (!wanted.has(name)) caughtUp(name);
  };

  const caughtUp = (name: string): void => {
    behind.delete(name);
    limiterOf(name).clear();
    results.setPending(name, false);
  };

  /** No numbers rather than those of other ends. */
  const giveUp = (name: string): void => {
    caughtUp(name);
    results.remove((map) => {
      const parsed = parseMapName(map);
      return parsed?.kind === 'band' && parsed.band === name;
    });
  };

  const follow = (
    scan: CurrentScan,
    scanNumber: number,
    name: string,
    energies: EnergyBand,
    quantities: readonly BandQuantity[],
  ): void => {
    const keyOf = (quantity: BandQuantity): string =>
      JSON.stringify([scanNumber, name, energies, quantity]);
    const found = quantities.map((quantity) => known.get(keyOf(quantity)));
    if (found.every((map) => map !== undefined)) {
      putChanged(found.filter((map) => map !== undefined));
      caughtUp(name);
      return;
    }
    const request = quantities.map(keyOf).join();
    behind.set(name, request);
    results.setPending(name, true);
    const compute = async (): Promise<void> => {
      const computed = await scan.open.bandMaps({ band: energies, quantities });
      const maps = asDerivedMaps(computed, name, scan);
      for (const [index, map] of maps.entries()) {
        const quantity = quantities[index];
        if (quantity !== undefined) known.set(keyOf(quantity), map);
      }
      // Maps on the way to newer ones are shown; once caught up (by an undo, say) late ones are not.
      if (session.getState().scanNumber !== scanNumber || !behind.has(name)) return;
      putChanged(maps);
      if (behind.get(name) === request) caughtUp(name);
    };
    limiterOf(name).run(compute, (error) => {
      if (session.getState().scanNumber !== scanNumber || behind.get(name) !== request) return;
      giveUp(name);
      notices.sayError(error);
    });
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

function asDerivedMaps(
  computed: readonly BandMap[],
  band: string,
  { open }: CurrentScan,
): readonly DerivedMap[] {
  const { shape, quantity: counted } = open.plan.meta;
  const { ny, nx } = shape;
  return computed.map(({ quantity, values, errors }) => {
    const unit = bandQuantityUnit(quantity, counted);
    return { name: `band.${band}.${quantity}`, unit, ny, nx, values, errors };
  });
}

/** By band, the quantities that something on screen or in the recipe shows. */
function wantedQuantities(
  document: Recipe,
  leadMap: string,
): ReadonlyMap<string, ReadonlySet<BandQuantity>> {
  const wanted = new Map((document.bands ?? []).map(({ name }) => [name, new Set(always)]));
  for (const source of [leadMap, ...(document.blend?.channels ?? []).map(({ source }) => source)]) {
    const parsed = parseMapName(source);
    if (parsed?.kind === 'band') wanted.get(parsed.band)?.add(parsed.quantity);
  }
  return wanted;
}
