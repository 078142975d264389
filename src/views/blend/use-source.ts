/** The map a channel shows, as it is now; null while there is none. */
import { useMemo } from 'react';
import { mapByName } from '../../science/map-by-name';
import type { DerivedMap } from '../../science/scan';
import { useResults } from '../workbench-context';

export function useSource(source: string): DerivedMap | null {
  // Looked up by its plain name first, so that other maps' changes are none of its business.
  const map = useResults(({ maps }) => maps.get(source.replace(/\.err$/, '')));
  return useMemo(() => mapByName(() => map, source), [map, source]);
}
