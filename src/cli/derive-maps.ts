/** Every map a recipe makes of an open scan, by their names in the contract. */
import type { OpenScan } from '../../workers/engine';
import { bandEnergies } from '../recipe/band-energies';
import { mediumOf } from '../recipe/defaults';
import { bandQuantityUnit } from '../recipe/offered-maps';
import type { Recipe } from '../recipe/schema';
import { bandQuantities, type EnergyBand } from '../science/bands/band';
import type { DerivedMap } from '../science/scan';

export interface DeriveOptions {
  readonly signal: AbortSignal;
  readonly onProgress: (share: number) => void;
}

/**
 * The maps in the order of the recipe: totals, height where there is one, then each band's.
 *
 * @throws RimlightError 'recipe' - when a band has no place on this scan; 'cancelled' - when stopped
 */
export async function deriveMaps(
  scan: OpenScan,
  recipe: Recipe,
  { signal, onProgress }: DeriveOptions,
): Promise<readonly DerivedMap[]> {
  const bands = bandEnergies(recipe, scan.overview.meta.laserEv, mediumOf(recipe));
  const maps: DerivedMap[] = [...(await scanMaps(scan, signal))];
  for (const [index, { name }] of (recipe.bands ?? []).entries()) {
    onProgress(index / bands.length);
    const request = { band: bands[index], quantities: bandQuantities };
    for (const { quantity, values, errors } of await scan.bandMaps(request, { signal })) {
      maps.push({
        name: `band.${name}.${quantity}`,
        unit: bandQuantityUnit(quantity, scan.overview.meta.quantity),
        ny: scan.overview.totals.ny,
        nx: scan.overview.totals.nx,
        values,
        errors,
      });
    }
  }
  onProgress(1);
  return maps;
}

async function scanMaps(scan: OpenScan, signal: AbortSignal): Promise<readonly DerivedMap[]> {
  const { totals, height } = scan.overview;
  const whole = { band: wholeAxis(scan), quantities: ['integral' as const] };
  const [integral] = await scan.bandMaps(whole, { signal });
  const unit = scan.overview.meta.quantity;
  const total = { name: 'scan.total', unit, ...totals, errors: integral?.errors ?? null };
  if (height === null) return [total];
  return [total, { name: 'scan.height', unit: 'nm', ...height, errors: null }];
}

/** All channels as one band, for the uncertainty of their sum. */
function wholeAxis({ overview }: OpenScan): EnergyBand {
  const { edgesEv } = overview.meta.axis;
  return { fromEv: edgesEv[0], toEv: edgesEv[edgesEv.length - 1], floor: 'none' };
}
