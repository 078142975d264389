/** The recipe's `bands` block: named intervals of photon energy. */
import * as z from 'zod';
import { bandQuantities } from '../science/bands/band';
import { defaults } from './default-values';
import { energyUnits, nameSchema, objectToEmptyInterval, withRule } from './schema-parts';

export const bandSchema = withRule(
  z.strictObject({
    name: nameSchema.describe(
      `name of the band, the NAME of its maps band.NAME.${bandQuantities.join(', .')}; no other band's, whether in capitals or not`,
    ),
    from: z.number().describe('one end, in "unit"; the ends may stand in either order'),
    to: z.number().describe('the other end, in "unit"'),
    unit: z
      .enum(energyUnits)
      .describe(
        'eV, meV, nm (in air unless scan.axis.medium is "vacuum") or cm-1 (Raman shift, toward lower energy positive; needs the laser)',
      ),
    floor: z
      .enum(['none', 'ends'])
      .describe(
        `"ends" subtracts a straight line under the band, between its ends; default "${defaults.band.floor}"`,
      )
      .exactOptional(),
  }),
  (band, object) => {
    objectToEmptyInterval(band.from, band.to, () => object(['to'], 'a value other than "from"'));
    if (band.unit === 'cm-1') return;
    for (const end of ['from', 'to']) {
      const value = band[end];
      if (typeof value === 'number' && value <= 0) object([end], 'a number above 0');
    }
  },
);

/** Far more than a screen holds; bounds what validation compares. */
export const mostBands = 500;

export const bandBlockSchema = z.array(bandSchema).max(mostBands);
