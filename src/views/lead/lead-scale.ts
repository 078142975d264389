/** The colour scale of the lead map: a diverging one only where the map has a zero between its limits. */
import { colourScale, namedScales } from '../../science/colour/colour-scales';
import type { Limits } from '../../science/colour/transfer';

const plainScale = 'viridis';

/** Names of the scales that suit a map with these limits. */
export function suitableScales(limits: Limits): readonly string[] {
  return namedScales
    .filter(({ kind }) => kind !== 'diverging' || hasZeroInside(limits))
    .map(({ name }) => name);
}

/** The wanted scale where it suits, else a plain one. */
export function shownScale(wanted: string, limits: Limits): string {
  return suitableScales(limits).includes(wanted) ? wanted : plainScale;
}

/** (256, 3); a diverging scale has its neutral colour at zero. */
export function scaleTable(name: string, { low, high }: Limits): Uint8Array {
  return colourScale(name, -low / (high - low)).table;
}

function hasZeroInside({ low, high }: Limits): boolean {
  return low < 0 && high > 0;
}
