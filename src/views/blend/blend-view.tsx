/** The blend of the recipe on the map's canvas. */
import { formatMeasured } from '../../science/format';
import { mapByName } from '../../science/map-by-name';
import type { ScanMeta } from '../../science/scan';
import { fullChannelsOf } from '../../state/blend-channels';
import { channelLabel, type MissingMap } from '../../state/channel-words';
import type { Pixel } from '../../state/crosshair';
import { MapCanvas } from '../map/map-canvas';
import { useRecipe, useResults } from '../workbench-context';
import { useBlendImage } from './use-blend-image';

export function BlendView({ meta }: { readonly meta: ScanMeta }): React.JSX.Element {
  const blend = useRecipe((document) => document.blend);
  const known = useResults((results) => results.maps);
  const { image, missing } = useBlendImage(blend, known);
  const sources = fullChannelsOf(blend).map(({ source }) => source);

  const describePixel = ({ y, x }: Pixel): string =>
    sources
      .map((source) => {
        const map = mapByName((name) => known.get(name), source);
        const index = y * (map?.nx ?? 0) + x;
        const value = map?.values[index] ?? Number.NaN;
        const text = formatMeasured(value, map?.errors?.[index] ?? null, map?.unit ?? '');
        return `${channelLabel(source)} ${text}`;
      })
      .join(', ');
  return (
    <MapCanvas
      meta={meta}
      image={image}
      label={sources.length === 0 ? 'Blend' : `Blend of ${sources.map(channelLabel).join(', ')}`}
      describePixel={describePixel}
      message={sentenceOf(sources.length, missing)}
    />
  );
}

/** What is missing, in a sentence; null when nothing is or it is being made. */
function sentenceOf(count: number, missing: readonly MissingMap[]): string | null {
  if (count === 0) return 'There is no blend yet. Add a channel in the settings at right.';
  const sentences = missing.flatMap((one) => (one.kind === 'none' ? [one.sentence] : []));
  if (sentences.length === 0) return null;
  return `${sentences.join(' ')} Choose another map for this channel, or take it out of the blend.`;
}
