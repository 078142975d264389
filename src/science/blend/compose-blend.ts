/** Mixes maps into one false-colour picture, in linear light. */
import type { RgbBytes } from '../colour/srgb';
import { encodedFromLinear } from '../colour/srgb';
import type { Limits } from '../colour/transfer';
import { channelLight, lightSteps } from './channel-light';

/** `additive`: light adds up and is cut off at full; `screen`: what each leaves dark is multiplied. */
export type BlendMixing = 'additive' | 'screen';

/** One map in a blend. */
export interface BlendLayer {
  /** (ny, nx), C order; NaN where there is no value */
  readonly values: Float64Array;
  /** value shown black and value shown in full colour, in the map's unit */
  readonly limits: Limits;
  readonly colour: RgbBytes;
  /** exponent of the brightness, above 0 */
  readonly gamma: number;
}

/**
 * The picture of one or more maps of the same shape.
 *
 * Where a map has no value (NaN) it adds no light; where none has one, the picture is transparent.
 * Equal limits give a step: black up to them, full colour above. A low limit above the high one
 * turns the channel round.
 *
 * @param layers - at least one; the order changes nothing but the last bit
 * @returns (ny, nx, 4) red, green, blue, opacity
 */
export function composeBlend(
  layers: readonly BlendLayer[],
  mixing: BlendMixing,
): Uint8ClampedArray {
  const count = layers[0]?.values.length ?? 0;
  const light = new Float64Array(3 * count);
  const isKnown = new Uint8Array(count);
  for (const layer of layers) addLayer(layer, mixing, light, isKnown);
  return encodePicture(light, isKnown);
}

/** Additive: light += own. Screen: light = 1 − (1 − light)(1 − own), the same as light += own (1 − light). */
function addLayer(
  { values, limits, colour, gamma }: BlendLayer,
  mixing: BlendMixing,
  light: Float64Array,
  isKnown: Uint8Array,
): void {
  const table = channelLight(colour, gamma);
  const { low, high } = limits;
  const isStep = !(low !== high);
  const last = lightSteps;
  const scale = last / (high - low);
  const cover = mixing === 'screen' ? 1 : 0;
  for (let i = 0; i < values.length; i++) {
    const value = values[i];
    const steps = isStep ? stepAbove(value, low) : (value - low) * scale;
    // NaN, of values as of limits
    if (Number.isNaN(steps)) continue;
    isKnown[i] = 1;
    const at = 3 * (steps <= 0 ? 0 : steps >= last ? last : (steps + 0.5) | 0);
    const to = 3 * i;
    light[to] += table[at] * (1 - cover * light[to]);
    light[to + 1] += table[at + 1] * (1 - cover * light[to + 1]);
    light[to + 2] += table[at + 2] * (1 - cover * light[to + 2]);
  }
}

function stepAbove(value: number, edge: number): number {
  return Number.isNaN(value) ? value : value > edge ? lightSteps : 0;
}

/** Steps of linear light that are told apart when bytes are made: 20 to the darkest byte. */
const encodeSteps = 65_535;
let encodeTable: Uint8Array | null = null;

function encodedBytes(): Uint8Array {
  encodeTable ??= Uint8Array.from({ length: encodeSteps + 1 }, (_, step) =>
    Math.round(255 * encodedFromLinear(step / encodeSteps)),
  );
  return encodeTable;
}

function encodePicture(light: Float64Array, isKnown: Uint8Array): Uint8ClampedArray {
  const bytes = encodedBytes();
  const picture = new Uint8ClampedArray(4 * isKnown.length);
  for (let i = 0; i < isKnown.length; i++) {
    if (isKnown[i] === 0) continue;
    const from = 3 * i;
    const to = 4 * i;
    picture[to] = bytes[encodeStep(light[from])];
    picture[to + 1] = bytes[encodeStep(light[from + 1])];
    picture[to + 2] = bytes[encodeStep(light[from + 2])];
    picture[to + 3] = 255;
  }
  return picture;
}

/** Light from 0 upwards; more than full is cut off. */
function encodeStep(level: number): number {
  return level >= 1 ? encodeSteps : (level * encodeSteps + 0.5) | 0;
}
