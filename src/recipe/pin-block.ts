/** The recipe's `pins` block: marked pixels, lettered A, B, C… */
import * as z from 'zod';
import { indexSchema } from './schema-parts';

export const pinNamePattern = /^[A-Z]{1,2}$/;

export const pinSchema = z.strictObject({
  name: z
    .string()
    .regex(pinNamePattern, { error: 'one or two capital letters' })
    .describe("one or two capital letters; no other pin's"),
  x: indexSchema.describe('column of the pixel, from 0'),
  y: indexSchema.describe('row of the pixel, from 0'),
  label: z.string().max(200).describe('what the pin marks, in words').exactOptional(),
});

/** A to Z and AA to ZZ. */
export const mostPins = 26 + 26 * 26;

export const pinBlockSchema = z.array(pinSchema).max(mostPins);
