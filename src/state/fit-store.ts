/** The fit on screen: whether its maps belong to the model as it is now, and one pixel's fit for drawing. */
import { createStore, type StoreApi } from 'zustand/vanilla';
import type { PixelFit, ScanFit } from '../../workers/engine';
import type { Pixel } from './crosshair';

export interface FittedPixel {
  readonly pixel: Pixel;
  readonly fit: PixelFit;
}

export interface FitState {
  /** what the fit maps on screen were made of; null when there are none */
  readonly madeOf: string | null;
  /** the fit the maps are of; not whole when it was stopped before every pixel had its turn */
  readonly scanFit: ScanFit | null;
  readonly isRunning: boolean;
  /** the pixel under the crosshair, or the pin made last; null without a model */
  readonly fitted: FittedPixel | null;
}

export type FitStore = StoreApi<FitState>;

const nothing: FitState = { madeOf: null, scanFit: null, isRunning: false, fitted: null };

export function createFitStore(): FitStore {
  return createStore<FitState>(() => nothing);
}
