/** A pixel pitch in the unit it is best read in. */
import type { ScanChoices } from '../../io/scan-choices';

type Pitch = NonNullable<ScanChoices['pixel']>;

/** What was found is kept in nm; steps of a micrometre and more are shown in µm. What the user stated is left. */
export function shownPitch(found: Pitch): Pitch {
  const { x, y, unit } = found;
  if (unit !== 'nm' || Math.min(x, y) < 1000) return found;
  // Twelve digits: 1500 × 0.001 is not to read 1.5000000000000002.
  const inUm = (nm: number): number => Number((nm / 1000).toPrecision(12));
  return { x: inUm(x), y: inUm(y), unit: 'um' };
}
