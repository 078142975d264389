/** Spectra on screen: the hovered pixel's and the pins'. */
import { createStore, type StoreApi } from 'zustand/vanilla';
import type { Pixel } from '../../workers/engine';

export interface PixelSpectrum {
  readonly pixel: Pixel;
  /** (nk) counts per channel; NaN where there is no data */
  readonly counts: Float64Array;
}

export interface SpectraState {
  /** by pin name */
  readonly pins: ReadonlyMap<string, PixelSpectrum>;
  /** the pixel under the crosshair; null when there is none */
  readonly hovered: PixelSpectrum | null;
}

export type SpectraStore = StoreApi<SpectraState>;

export function createSpectraStore(): SpectraStore {
  return createStore<SpectraState>(() => ({ pins: new Map(), hovered: null }));
}
