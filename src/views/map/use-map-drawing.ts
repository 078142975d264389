/** Keeps a map's two canvases drawn: by React when data change, by subscription when cursor or camera move. */
import { type RefObject, useEffect, useRef } from 'react';
import type { ScanMeta } from '../../science/scan';
import { type Field, place, type Viewport } from '../canvas/camera';
import { sharedCamera } from '../canvas/shared-camera';
import { fitCanvas } from '../energy/line-canvas';
import { readTokens } from '../read-tokens';
import { useView, useWorkbench } from '../workbench-context';
import { drawOverlay, type PinMark, visibleBox } from './draw-overlay';
import { drawPicture } from './draw-picture';
import type { Picture } from './use-map-image';

export interface MapCanvases {
  readonly picture: RefObject<HTMLCanvasElement | null>;
  readonly overlay: RefObject<HTMLCanvasElement | null>;
  /** what hangs in the map's upper right corner, wherever that is in the pane */
  readonly corner: RefObject<HTMLDivElement | null>;
}

export interface MapScene {
  readonly image: Picture | null;
  readonly meta: ScanMeta;
  readonly field: Field;
  readonly viewport: Viewport;
  readonly pins: readonly PinMark[];
}

export function useMapDrawing({ picture, overlay, corner }: MapCanvases, scene: MapScene): void {
  const { crosshair } = useWorkbench();
  const theme = useView((view) => view.theme);
  const { image, meta, field, viewport, pins } = scene;
  const drawOver = useRef<() => void>(() => undefined);

  useEffect(() => {
    const canvas = picture.current;
    if (canvas === null || !isVisible(viewport)) return;
    const tokens = readTokens(theme);
    fitCanvas(canvas, viewport.widthPx, viewport.heightPx);
    const draw = (): void => {
      const placement = place(sharedCamera.getState(), field, viewport);
      drawPicture(canvas, image, placement, { ground: tokens.plot, strokes: tokens.grid });
      const { right } = visibleBox({ placement, field, viewport });
      corner.current?.style.setProperty('right', `${viewport.widthPx - right}px`);
    };
    draw();
    return sharedCamera.subscribe(draw);
  }, [picture, corner, image, field, viewport, theme]);

  useEffect(() => {
    const canvas = overlay.current;
    if (canvas === null || !isVisible(viewport)) return;
    const font = readTokens(theme).mono;
    fitCanvas(canvas, viewport.widthPx, viewport.heightPx);
    drawOver.current = () => {
      const placement = place(sharedCamera.getState(), field, viewport);
      const here = crosshair.get();
      drawOverlay(canvas, { placement, field, viewport, meta, crosshair: here, pins, theme, font });
    };
    drawOver.current();
  }, [overlay, crosshair, field, viewport, meta, pins, theme]);

  useEffect(() => {
    // The pointer may move several times in a frame; one drawing is enough.
    let frame = 0;
    const schedule = (): void => {
      if (frame !== 0) return;
      frame = requestAnimationFrame(() => {
        frame = 0;
        drawOver.current();
      });
    };
    const stops = [crosshair.subscribe(schedule), sharedCamera.subscribe(schedule)];
    return () => {
      cancelAnimationFrame(frame);
      for (const stop of stops) stop();
    };
  }, [crosshair]);
}

function isVisible({ widthPx, heightPx }: Viewport): boolean {
  return widthPx > 0 && heightPx > 0;
}
