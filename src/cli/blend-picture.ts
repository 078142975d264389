/** blend.png: the recipe's blend of one scan's maps. */
import { RimlightError } from '../errors';
import { encodePng } from '../io/write/png';
import { fullChannel } from '../recipe/defaults';
import type { Blend, Recipe } from '../recipe/schema';
import { type BlendLayer, composeBlend } from '../science/blend/compose-blend';
import { parseHexColour } from '../science/colour/srgb';
import { resolveLimits } from '../science/limits';
import { mapByName } from '../science/map-by-name';
import type { DerivedMap } from '../science/scan';

/**
 * How to make the picture; null where the recipe has no blend.
 *
 * @returns a function that gives the PNG's bytes, one pixel for one of the scan
 * @throws RimlightError 'recipe' - from that function, when the blend names a map this scan has not
 */
export function blendPicture(
  { blend }: Recipe,
  maps: readonly DerivedMap[],
): (() => Uint8Array) | null {
  if (blend === undefined) return null;
  return () => {
    const byName = new Map(maps.map((map) => [map.name, map]));
    const sources = blend.channels.map((_, index) => sourceOf(blend, index, byName));
    const layers = blend.channels.map((channel, index): BlendLayer => {
      const { colour, low, high, gamma } = fullChannel(channel);
      const { values } = sources[index];
      const limits = resolveLimits(values, low, high);
      return { values, limits, colour: parseHexColour(colour), gamma };
    });
    const [{ nx, ny }] = sources;
    return encodePng(composeBlend(layers, blend.mode), nx, ny);
  };
}

function sourceOf(
  { channels }: Blend,
  index: number,
  byName: ReadonlyMap<string, DerivedMap>,
): DerivedMap {
  const { source } = channels[index];
  const map = mapByName((name) => byName.get(name), source);
  if (map !== null) return map;
  const why = source.endsWith('.err') ? 'this scan has no noise model' : 'this scan has none';
  throw new RimlightError('recipe', {
    what: `the blend needs the map "${source}", and ${why}`,
    where: `blend.channels[${index}].source`,
    hint: 'Name another map, or run with --only and the results you need besides the blend.',
  });
}
