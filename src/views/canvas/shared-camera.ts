/** The one camera of all maps: zoomed or moved on one pane, the others follow. Canvases subscribe and draw by themselves. */
import { createStore, type StoreApi } from 'zustand/vanilla';
import {
  type Camera,
  type CanvasPoint,
  type Field,
  fitted,
  oneToOne,
  panBy,
  type Viewport,
  zoomAbout,
} from './camera';

export interface SharedCamera extends StoreApi<Camera> {
  /** The whole map. */
  fit(): void;
  oneToOne(field: Field, viewport: Viewport): void;
  zoomAbout(factor: number, at: CanvasPoint, field: Field, viewport: Viewport): void;
  panBy(by: { readonly xPx: number; readonly yPx: number }, field: Field, viewport: Viewport): void;
}

export function createSharedCamera(): SharedCamera {
  const store = createStore<Camera>(() => fitted);
  const set = (camera: Camera): void => store.setState(camera);
  return Object.assign(store, {
    fit: () => set(fitted),
    oneToOne: (field: Field, viewport: Viewport) =>
      set(oneToOne(store.getState(), field, viewport)),
    zoomAbout: (factor: number, at: CanvasPoint, field: Field, viewport: Viewport) =>
      set(zoomAbout(store.getState(), factor, at, field, viewport)),
    panBy: (by: { xPx: number; yPx: number }, field: Field, viewport: Viewport) =>
      set(panBy(store.getState(), by, field, viewport)),
  });
}

/** Zoom and place are kept from scan to scan as shares of the map, never from visit to visit. */
export const sharedCamera: SharedCamera = createSharedCamera();
