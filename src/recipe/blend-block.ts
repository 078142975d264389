/** The recipe's `blend` block: maps mixed into one false-colour picture. */
import * as z from 'zod';
import { defaults } from './default-values';
import { colourSchema, mapNameSchema, positiveSchema, withRule } from './schema-parts';

export const mostChannels = 6;

const percentilePattern = /^p(?:100(?:\.0+)?|\d{1,2}(?:\.\d+)?)$/;

const limitExpected = 'a number in the unit of the map, or a percentile from "p0" to "p100"';

const limitSchema = z.union(
  [
    z.number(),
    z
      .templateLiteral(['p', z.number()], { error: limitExpected })
      .check(z.regex(percentilePattern, { error: limitExpected }))
      .meta({ pattern: percentilePattern.source }),
  ],
  { error: limitExpected },
);

/** A percentile of the map ("p99.5") as a number, 0 to 100; null for anything else. */
export function percentileOf(limit: unknown): number | null {
  if (typeof limit !== 'string' || !percentilePattern.test(limit)) return null;
  return Number(limit.slice(1));
}

export const channelSchema = withRule(
  z.strictObject({
    source: mapNameSchema.describe('name of the map, such as "band.tail.integral"'),
    colour: colourSchema.describe('colour at the high limit, "#rrggbb"'),
    low: limitSchema
      .describe(
        `value shown black: a number in the map's unit, or a percentile of the map; default "${defaults.channel.low}"`,
      )
      .exactOptional(),
    high: limitSchema
      .describe(
        `value shown in full colour: a number in the map's unit, or a percentile of the map; default "${defaults.channel.high}"`,
      )
      .exactOptional(),
    gamma: positiveSchema
      .describe(
        `exponent of the brightness between the limits, above 1 darker, below 1 lighter; default ${defaults.channel.gamma}`,
      )
      .exactOptional(),
  }),
  (channel, object) => {
    const low = channel.low ?? defaults.channel.low;
    const high = channel.high ?? defaults.channel.high;
    const field = channel.high === undefined ? 'low' : 'high';
    const expected =
      field === 'high' ? `above "low", ${String(low)}` : `below "high", ${String(high)}`;
    if (typeof low === 'number' && typeof high === 'number' && low >= high) {
      object([field], `a number ${expected}`);
    }
    const [lowShare, highShare] = [percentileOf(low), percentileOf(high)];
    if (lowShare !== null && highShare !== null && lowShare >= highShare) {
      object([field], `a percentile ${expected}`);
    }
  },
);

export const blendBlockSchema = z.strictObject({
  mode: z
    .enum(['additive', 'screen'])
    .describe(
      'how the colours are mixed: "additive" adds them and cuts off what is too bright; "screen" multiplies what each leaves dark, so that nothing is cut off',
    ),
  channels: z
    .array(channelSchema)
    .min(1)
    .max(mostChannels)
    .describe(`one to ${mostChannels} maps, each in a colour`),
});
