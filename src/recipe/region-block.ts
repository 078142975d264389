/** The recipe's `regions` block: named sets of pixels. */
import * as z from 'zod';
import { defaults } from './default-values';
import {
  countSchema,
  fileSchema,
  nameSchema,
  objectToMoreThanOne,
  positiveSchema,
  withRule,
} from './schema-parts';

const name = nameSchema.describe(
  "name of the region; no other region's, whether in capitals or not",
);

const span = z.tuple([z.number(), z.number()], { error: 'a list of two pixel positions' });
const point = z.tuple([z.number(), z.number()], { error: 'a point [x, y]' });

const rectangle = z.strictObject({
  name,
  shape: z.literal('rectangle').describe('pixels between two columns and two rows'),
  x: span.describe('first and last column, both included, from 0'),
  y: span.describe('first and last row, both included, from 0'),
});

const ellipse = z.strictObject({
  name,
  shape: z.literal('ellipse').describe('pixels whose centre lies in or on the ellipse'),
  x: z.number().describe('column of the centre, from 0'),
  y: z.number().describe('row of the centre, from 0'),
  rx: positiveSchema.describe('half the length of the first axis, pixels'),
  ry: positiveSchema.describe('half the length of the second axis, pixels'),
  angle: z
    .number()
    .describe(
      `turn of the first axis from the columns' direction toward the rows', degrees; default ${defaults.region.angle}`,
    )
    .exactOptional(),
});

const polygon = z.strictObject({
  name,
  shape: z.literal('polygon').describe('pixels whose centre lies inside the closed line'),
  points: z.array(point).min(3).describe('corners [x, y] in pixels, from 0'),
});

const mask = withRule(
  z.strictObject({
    name,
    shape: z.literal('mask').describe('pixels listed one by one'),
    file: fileSchema
      .describe('map of 0 and 1 of the size of the scan, beside the recipe; or "rle"')
      .exactOptional(),
    nx: countSchema.describe('columns of the mask, beside "rle"').exactOptional(),
    ny: countSchema.describe('rows of the mask, beside "rle"').exactOptional(),
    rle: z
      .array(z.number())
      .min(1)
      .describe(
        'lengths of runs in reading order, by turns outside and inside, the first outside (0 where the first pixel is inside); together nx × ny',
      )
      .exactOptional(),
  }),
  (region, object) => {
    objectToMoreThanOne(region, ['file', 'rle'], object);
    if (region.file === undefined && region.rle === undefined) {
      object(['rle'], 'run lengths, or a "file" instead');
    }
    const { nx, ny, rle } = region;
    for (const size of ['nx', 'ny'] as const) {
      if (rle !== undefined && region[size] === undefined) object([size], 'the size of the mask');
      if (rle === undefined && region[size] !== undefined)
        object([size], 'no size beside a "file"');
    }
    if (!Array.isArray(rle)) return;
    const wrong = rle.findIndex(
      (run) => typeof run === 'number' && !(Number.isInteger(run) && run >= 0),
    );
    if (wrong >= 0) object(['rle', wrong], 'a whole number of at least 0');
    else if (typeof nx === 'number' && typeof ny === 'number') {
      const sum = rle.reduce((total: number, run) => total + Number(run), 0);
      if (sum !== nx * ny)
        object(['rle'], `runs of ${nx * ny} pixels together (these have ${sum})`);
    }
  },
).meta({
  oneOf: [
    { required: ['file'], not: { anyOf: [{ required: ['nx'] }, { required: ['ny'] }] } },
    { required: ['rle', 'nx', 'ny'] },
  ],
});

export const regionSchema = z.discriminatedUnion('shape', [rectangle, ellipse, polygon, mask]);

export const regionBlockSchema = z.array(regionSchema);
