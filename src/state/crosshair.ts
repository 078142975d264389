/**
 * The one crosshair: the pixel under the cursor on any map. Kept apart from the React stores because
 * it changes with every pointer move; canvases subscribe and draw by themselves.
 */
import type { Pixel } from '../../workers/engine';

export type { Pixel };

export interface Crosshair {
  /** null when the cursor is over no map and no key moved it */
  get(): Pixel | null;
  set(pixel: Pixel | null): void;
  subscribe(listener: () => void): () => void;
}

export function createCrosshair(): Crosshair {
  let current: Pixel | null = null;
  const listeners = new Set<() => void>();
  return {
    get: () => current,
    set(pixel) {
      if (pixel?.y === current?.y && pixel?.x === current?.x) return;
      current = pixel;
      for (const listener of listeners) listener();
    },
    subscribe(listener) {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
  };
}
