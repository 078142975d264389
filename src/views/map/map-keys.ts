/** What keys do on a map that has the focus. */
import type { Pixel } from '../../state/crosshair';
import { togglePinAt } from '../../state/pin-actions';
import type { Workbench } from '../../state/workbench';
import { middleOf, pixelAt, place } from '../canvas/camera';
import { sharedCamera } from '../canvas/shared-camera';
import type { Ground } from './map-hand';

const arrows: Readonly<Record<string, readonly [dx: number, dy: number]>> = {
  ArrowLeft: [-1, 0],
  ArrowRight: [1, 0],
  ArrowUp: [0, -1],
  ArrowDown: [0, 1],
};

const stepWithShift = 10;
const zoomStep = 1.25;

export interface KeyPress {
  readonly key: string;
  readonly shiftKey: boolean;
  readonly ctrlKey: boolean;
  readonly metaKey: boolean;
  readonly altKey: boolean;
}

/** Does what the key means here; false when it means nothing to a map. */
export function pressMapKey(workbench: Workbench, ground: Ground, press: KeyPress): boolean {
  if (press.ctrlKey || press.metaKey || press.altKey) return false;
  const { crosshair } = workbench;
  const arrow = arrows[press.key];
  if (arrow !== undefined) {
    const step = press.shiftKey ? stepWithShift : 1;
    const from = crosshair.get();
    const to = from === null ? middlePixel(ground) : moved(from, arrow, step, ground);
    crosshair.set(to);
    reveal(to, ground);
    return true;
  }
  const here = crosshair.get();
  switch (press.key) {
    case 'Enter':
    case 'p':
    case 'P':
      if (here !== null) togglePinAt(workbench, here);
      return here !== null;
    case '+':
    case '=':
      zoom(here, zoomStep, ground);
      return true;
    case '-':
      zoom(here, 1 / zoomStep, ground);
      return true;
    case 'Escape':
      if (here !== null) crosshair.set(null);
      return here !== null;
    default:
      return false;
  }
}

function moved(
  { y, x }: Pixel,
  [dx, dy]: readonly [dx: number, dy: number],
  step: number,
  { field }: Ground,
): Pixel {
  return {
    x: Math.min(Math.max(x + dx * step, 0), field.nx - 1),
    y: Math.min(Math.max(y + dy * step, 0), field.ny - 1),
  };
}

/** The pixel in the middle of what is shown. */
function middlePixel({ field, viewport }: Ground): Pixel {
  const placement = place(sharedCamera.getState(), field, viewport);
  const middle = { xPx: viewport.widthPx / 2, yPx: viewport.heightPx / 2 };
  return (
    pixelAt(middle, placement, field) ?? {
      x: Math.floor(field.nx / 2),
      y: Math.floor(field.ny / 2),
    }
  );
}

/** Moves the map so that the pixel is in the pane. */
function reveal(pixel: Pixel, { field, viewport }: Ground): void {
  const placement = place(sharedCamera.getState(), field, viewport);
  const { xPx, yPx } = middleOf(pixel, placement);
  const by = {
    xPx: overshoot(xPx, placement.columnPx / 2, viewport.widthPx),
    yPx: overshoot(yPx, placement.rowPx / 2, viewport.heightPx),
  };
  if (by.xPx !== 0 || by.yPx !== 0) sharedCamera.panBy(by, field, viewport);
}

function overshoot(at: number, halfPx: number, roomPx: number): number {
  if (at - halfPx < 0) return halfPx - at;
  return at + halfPx > roomPx ? roomPx - halfPx - at : 0;
}

function zoom(here: Pixel | null, factor: number, { field, viewport }: Ground): void {
  const placement = place(sharedCamera.getState(), field, viewport);
  const middle = { xPx: viewport.widthPx / 2, yPx: viewport.heightPx / 2 };
  const at = here === null ? middle : middleOf(here, placement);
  sharedCamera.zoomAbout(factor, at, field, viewport);
}
