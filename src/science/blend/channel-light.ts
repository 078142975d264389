/** The light one channel of a blend adds, as a table over its share between the limits. */
import type { RgbBytes } from '../colour/srgb';
import { linearFromBytes } from '../colour/srgb';
import { pow } from '../numeric/elementary';

/** Steps of the table from the low limit to the high one: a quarter of what one byte of a screen can show. */
export const lightSteps = 1024;

/**
 * Linear light at each step of a channel.
 *
 * The colour's light at the share t of the way from low to high is t^(3·gamma) of the full one: the
 * cube makes equal steps of t look equal, since lightness goes with the cube root of light (OKLab,
 * Ottosson 2020), so that with gamma 1 a channel alone looks as its single-hue ramp does.
 *
 * @param gamma - above 0; above 1 darker, below 1 lighter
 * @returns (lightSteps + 1, 3) red, green, blue, 0 to 1
 */
export function channelLight(colour: RgbBytes, gamma: number): Float64Array {
  const [red, green, blue] = linearFromBytes(colour);
  const light = new Float64Array(3 * (lightSteps + 1));
  for (let step = 0; step <= lightSteps; step++) {
    const brightness = pow(step / lightSteps, 3 * gamma);
    light[3 * step] = brightness * red;
    light[3 * step + 1] = brightness * green;
    light[3 * step + 2] = brightness * blue;
  }
  return light;
}
