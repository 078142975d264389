/** The recipe's bands with their ends in eV on the open scan, in order of energy. */
import { bandToEnergy } from '../recipe/band-energies';
import type { Recipe } from '../recipe/schema';
import type { EnergyBand } from '../science/bands/band';
import type { CurrentScan } from './session-store';

export interface PlacedBand extends EnergyBand {
  readonly name: string;
}

/** Bands that cannot be placed (cm-1 without a laser) are left out; their problem is told where they are computed. */
export function placedBands(recipe: Recipe, scan: CurrentScan): readonly PlacedBand[] {
  const { laserEv } = scan.open.plan.meta;
  const medium = recipe.scan?.axis?.medium ?? 'air';
  const placed: PlacedBand[] = [];
  for (const band of recipe.bands ?? []) {
    try {
      placed.push({ name: band.name, ...bandToEnergy(band, laserEv, medium) });
    } catch {
      // Told by `followBands`, which meets the same band.
    }
  }
  return placed.sort((a, b) => a.fromEv + a.toEv - (b.fromEv + b.toEv));
}
