/** A map as a picture for the canvas, made anew only when something it depends on changes. */
import { useMemo } from 'react';
import type { Limits, Transfer } from '../../science/colour/transfer';
import { mapImage } from '../../science/map-image';
import type { DerivedMap } from '../../science/scan';
import type { Limit } from '../../state/view-store';
import { limitsOf } from './map-limits';

/** What a canvas draws. */
export interface Picture {
  /** (ny, nx, 4) */
  readonly rgba: Uint8ClampedArray;
  readonly nx: number;
  readonly ny: number;
}

export interface MapPicture extends Picture {
  /** of the colours, in the map's unit; NaN where the map has no value */
  readonly limits: Limits;
}

export function useMapImage(
  map: DerivedMap | null,
  table: Uint8Array,
  low: Limit,
  high: Limit,
  transfer: Transfer,
): MapPicture | null {
  return useMemo(() => {
    if (map === null) return null;
    const { values, nx, ny } = map;
    const limits = limitsOf(values, low, high);
    return { rgba: mapImage({ values, table, limits, transfer }), nx, ny, limits };
  }, [map, table, low, high, transfer]);
}
