/** The recipe's `features` block: bright or high places found on a map, one row of a table each. */
import * as z from 'zod';
import { defaults } from './default-values';
import { countSchema, mapNameSchema } from './schema-parts';

export const featureBlockSchema = z.strictObject({
  source: mapNameSchema.describe('map the features are found on, such as "scan.height"'),
  threshold: z
    .union([z.number(), z.literal('otsu')], { error: 'a number in the unit of the map, or "otsu"' })
    .describe(
      `value a feature lies above, in the map's unit, or "otsu": found from the histogram; default "${defaults.features.threshold}"`,
    )
    .exactOptional(),
  min_area_px: countSchema
    .describe(`smallest feature kept, pixels; default ${defaults.features.min_area_px}`)
    .exactOptional(),
  split: z
    .boolean()
    .describe(
      `true: touching features are parted at their necks; default ${defaults.features.split}`,
    )
    .exactOptional(),
});
