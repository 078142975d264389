/** The recipe's `strain` block: three independent ways to a strain map. */
import * as z from 'zod';
import { defaults } from './default-values';
import {
  isRecord,
  mapNameSchema,
  nameSchema,
  notNegativeSchema,
  positiveSchema,
  withRule,
} from './schema-parts';

const atRegion = z.strictObject({
  region: nameSchema.describe('region whose median is taken as unstrained'),
});

const poisson = z.number().gt(-1).max(0.5);

const plSchema = z.strictObject({
  source: mapNameSchema.describe('map of the peak energy, eV, such as "fit.exciton.centre"'),
  unstrained: z
    .union(
      [z.strictObject({ eV: positiveSchema.describe('energy without strain, eV') }), atRegion],
      {
        error: '{ "eV": energy } or { "region": name }',
      },
    )
    .describe('energy without strain: a number, or the median of a region'),
  gauge_meV_per_percent: withoutZero(
    'shift of the energy, meV per percent of strain; negative: red under tension',
  ),
  gauge_err: notNegativeSchema
    .describe(`1-σ uncertainty of the gauge, meV per percent; default ${defaults.strain.gauge_err}`)
    .exactOptional(),
});

const ramanSchema = withRule(
  z.strictObject({
    source: mapNameSchema.describe(
      'map of the line\'s energy, eV, or shift, cm-1, such as "fit.A1.centre"',
    ),
    unstrained: z
      .union(
        [
          z.strictObject({ 'cm-1': positiveSchema.describe('Raman shift without strain, cm-1') }),
          atRegion,
        ],
        { error: '{ "cm-1": shift } or { "region": name }' },
      )
      .describe('shift without strain: a number, or the median of a region'),
    grueneisen: withoutZero('Grüneisen parameter of the mode'),
    grueneisen_err: notNegativeSchema
      .describe(
        `1-σ uncertainty of the Grüneisen parameter; default ${defaults.strain.grueneisen_err}`,
      )
      .exactOptional(),
    state: z
      .enum(['biaxial', 'uniaxial'])
      .describe(`state of strain assumed; default "${defaults.strain.state}"`)
      .exactOptional(),
    poisson: poisson
      .describe("Poisson's ratio of the layer; needed for a uniaxial state")
      .exactOptional(),
  }),
  (raman, object) => {
    if (raman.state === 'uniaxial' && raman.poisson === undefined) {
      object(['poisson'], 'a number from -1 to 0.5, since the state is "uniaxial"');
    }
  },
);

const heightSchema = z.strictObject({
  poisson: poisson.describe("Poisson's ratio of the layer"),
  edges: z
    .enum(['held', 'relaxed'])
    .describe(`what the layer does at the edge of the scan; default "${defaults.strain.edges}"`)
    .exactOptional(),
  smooth_nm: notNegativeSchema
    .describe(
      `σ of the Gaussian the height map is smoothed with, nm; default ${defaults.strain.smooth_nm}`,
    )
    .exactOptional(),
});

export const strainBlockSchema = z.strictObject({
  pl: plSchema.describe('strain from the shift of the luminescence').exactOptional(),
  raman: ramanSchema.describe('strain from the shift of a Raman line').exactOptional(),
  height: heightSchema.describe('strain from the height map, as of a thin plate').exactOptional(),
});

function withoutZero(what: string) {
  return z
    .number()
    .refine((value) => value !== 0, { error: 'a number other than 0' })
    .meta({ description: what, not: { const: 0 } });
}

/** The region an `unstrained` field names; null where it gives a number. */
export function unstrainedRegion(unstrained: unknown): string | null {
  return isRecord(unstrained) && typeof unstrained.region === 'string' ? unstrained.region : null;
}
