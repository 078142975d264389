/** Channels of the blend in words: what they show, where their band lies, and why one cannot be shown. */
import { parseMapName } from '../recipe/map-names';
import type { DerivedMap } from '../science/scan';
import { labelOf } from './cursor-values';
import type { PlacedBand } from './placed-bands';

/** "tail" for the counts of a band, "tail centroid" for its other maps. */
export function channelLabel(source: string): string {
  const parsed = parseMapName(source);
  const words =
    parsed?.kind === 'band' && parsed.quantity === 'integral' ? parsed.band : labelOf(source);
  return parsed?.isError === true ? `${words}, uncertainty` : words;
}

/** "1.865–1.925", in eV, for a map of a band; "" for others. */
export function channelRange(source: string, bands: readonly PlacedBand[]): string {
  const parsed = parseMapName(source);
  if (parsed?.kind !== 'band') return '';
  const band = bands.find(({ name }) => name === parsed.band);
  return band === undefined ? '' : `${band.fromEv.toFixed(3)}–${band.toEv.toFixed(3)}`;
}

/** A source that has no map: `waiting` while it is being made, else why there will be none. */
export type MissingMap =
  | { readonly kind: 'waiting'; readonly source: string }
  | { readonly kind: 'none'; readonly source: string; readonly sentence: string };

/** Why the map of a source is not there. */
export function missingMap(source: string, known: ReadonlyMap<string, DerivedMap>): MissingMap {
  const parsed = parseMapName(source);
  const label = channelLabel(source);
  if (parsed?.isError === true && known.has(source.replace(/\.err$/, ''))) {
    const sentence = `There is no ${label}: the scan has no noise model.`;
    return { kind: 'none', source, sentence };
  }
  if (parsed?.kind === 'band') return { kind: 'waiting', source };
  const sentence =
    source === 'scan.height' ? 'This scan has no height map.' : `There is no map of ${label} yet.`;
  return { kind: 'none', source, sentence };
}
