/** The recipe's blend as a picture, and which of its maps are not there. */
import { useEffect, useMemo, useRef } from 'react';
import type { FullChannel } from '../../recipe/defaults';
import type { Blend } from '../../recipe/schema';
import { type BlendLayer, composeBlend } from '../../science/blend/compose-blend';
import { parseHexColour } from '../../science/colour/srgb';
import { mapByName } from '../../science/map-by-name';
import type { DerivedMap } from '../../science/scan';
import { fullChannelsOf } from '../../state/blend-channels';
import { type MissingMap, missingMap } from '../../state/channel-words';
import { limitsOf } from '../map/map-limits';
import type { Picture } from '../map/use-map-image';

export interface BlendImage {
  /** null while a map is missing; one that is only being made again leaves the last picture */
  readonly image: Picture | null;
  readonly missing: readonly MissingMap[];
}

export function useBlendImage(
  blend: Blend | undefined,
  known: ReadonlyMap<string, DerivedMap>,
): BlendImage {
  const last = useRef<Picture | null>(null);
  const made = useMemo(() => blendImage(blend, known), [blend, known]);
  useEffect(() => {
    if (made.image !== null) last.current = made.image;
  }, [made]);
  const isWaiting = made.missing.length > 0 && made.missing.every(({ kind }) => kind === 'waiting');
  return isWaiting ? { ...made, image: last.current } : made;
}

function blendImage(blend: Blend | undefined, known: ReadonlyMap<string, DerivedMap>): BlendImage {
  const channels = fullChannelsOf(blend);
  const maps: DerivedMap[] = [];
  const missing: MissingMap[] = [];
  for (const { source } of channels) {
    const map = mapByName((name) => known.get(name), source);
    if (map === null) missing.push(missingMap(source, known));
    else maps.push(map);
  }
  const [first] = maps;
  if (blend === undefined || first === undefined || missing.length > 0) {
    return { image: null, missing };
  }
  const layers = maps.map((map, index) => layerOf(map, channels[index]));
  const rgba = composeBlend(layers, blend.mode);
  return { image: { rgba, nx: first.nx, ny: first.ny }, missing };
}

function layerOf({ values }: DerivedMap, { colour, low, high, gamma }: FullChannel): BlendLayer {
  return { values, limits: limitsOf(values, low, high), colour: parseHexColour(colour), gamma };
}
