/**
 * Where a map lies on its canvas: pure functions between three spaces, the map in pixels of the scan
 * (column, row; the first pixel reaches from 0 to 1), the canvas in CSS pixels, and the camera.
 */

/** What is looked at; the same for panes of any size and maps of any shape. */
export interface Camera {
  /** 1: the whole map just fits */
  readonly zoom: number;
  /** point of the map in the middle of the pane, 0 to 1 across and down */
  readonly centreX: number;
  readonly centreY: number;
}

/** The map's extent. */
export interface Field {
  readonly nx: number;
  readonly ny: number;
  /** height of a pixel over its width */
  readonly aspect: number;
}

export interface Viewport {
  readonly widthPx: number;
  readonly heightPx: number;
}

/** A place on the canvas, CSS pixels from its upper left corner. */
export interface CanvasPoint {
  readonly xPx: number;
  readonly yPx: number;
}

/** Where the map's upper left corner is, and how large one of its pixels is, CSS pixels. */
export interface Placement {
  readonly leftPx: number;
  readonly topPx: number;
  readonly columnPx: number;
  readonly rowPx: number;
}

export const fitted: Camera = { zoom: 1, centreX: 0.5, centreY: 0.5 };

const leastZoom = 0.25;
/** At the closest so many pixels of the map remain across the pane. */
const fewestColumns = 4;

/** Width of a pixel of the map when the whole map just fits, CSS pixels. */
export function fitColumnPx({ nx, ny, aspect }: Field, { widthPx, heightPx }: Viewport): number {
  return Math.min(widthPx / nx, heightPx / (ny * aspect));
}

/** The map on the canvas; it is never pulled further than its edge, and stays in the middle, at the top, where it is smaller. */
export function place(camera: Camera, field: Field, viewport: Viewport): Placement {
  const columnPx = fitColumnPx(field, viewport) * camera.zoom;
  const rowPx = columnPx * field.aspect;
  const width = columnPx * field.nx;
  const height = rowPx * field.ny;
  const leftPx = startOf(camera.centreX, width, viewport.widthPx, 0.5);
  const topPx = startOf(camera.centreY, height, viewport.heightPx, 0);
  return { leftPx, topPx, columnPx, rowPx };
}

/** @param rest - how a map smaller than the pane lies in it: 0 at its start, 0.5 in the middle */
function startOf(centre: number, length: number, room: number, rest: number): number {
  if (length <= room) return (room - length) * rest;
  return Math.min(0, Math.max(room - length, room / 2 - centre * length));
}

/** The camera that shows the map at this placement. */
function cameraOf(placement: Placement, field: Field, viewport: Viewport): Camera {
  const { leftPx, topPx, columnPx, rowPx } = placement;
  return {
    zoom: columnPx / fitColumnPx(field, viewport),
    centreX: within((viewport.widthPx / 2 - leftPx) / (columnPx * field.nx), 0, 1),
    centreY: within((viewport.heightPx / 2 - topPx) / (rowPx * field.ny), 0, 1),
  };
}

/** Zooms so that the point of the map under `at` stays there. */
export function zoomAbout(
  camera: Camera,
  factor: number,
  at: CanvasPoint,
  field: Field,
  viewport: Viewport,
): Camera {
  const before = place(camera, field, viewport);
  const most = Math.max(field.nx / fewestColumns, 4);
  const zoom = within(camera.zoom * factor, leastZoom, most);
  const growth = zoom / camera.zoom;
  const after = {
    leftPx: at.xPx - (at.xPx - before.leftPx) * growth,
    topPx: at.yPx - (at.yPx - before.topPx) * growth,
    columnPx: before.columnPx * growth,
    rowPx: before.rowPx * growth,
  };
  return { ...cameraOf(after, field, viewport), zoom };
}

/** Moves the map with the hand. */
export function panBy(
  camera: Camera,
  by: { readonly xPx: number; readonly yPx: number },
  field: Field,
  viewport: Viewport,
): Camera {
  const before = place(camera, field, viewport);
  const after = { ...before, leftPx: before.leftPx + by.xPx, topPx: before.topPx + by.yPx };
  const moved = cameraOf(place(cameraOf(after, field, viewport), field, viewport), field, viewport);
  return { ...moved, zoom: camera.zoom };
}

/** One column of the map on one CSS pixel. */
export function oneToOne(camera: Camera, field: Field, viewport: Viewport): Camera {
  return { ...camera, zoom: 1 / fitColumnPx(field, viewport) };
}

/** The pixel of the map under a point of the canvas; null beside the map. */
export function pixelAt(
  { xPx, yPx }: CanvasPoint,
  placement: Placement,
  field: Field,
): { readonly y: number; readonly x: number } | null {
  const x = Math.floor((xPx - placement.leftPx) / placement.columnPx);
  const y = Math.floor((yPx - placement.topPx) / placement.rowPx);
  return x >= 0 && x < field.nx && y >= 0 && y < field.ny ? { y, x } : null;
}

/** The middle of a pixel of the map on the canvas. */
export function middleOf(
  pixel: { readonly y: number; readonly x: number },
  { leftPx, topPx, columnPx, rowPx }: Placement,
): CanvasPoint {
  return { xPx: leftPx + (pixel.x + 0.5) * columnPx, yPx: topPx + (pixel.y + 0.5) * rowPx };
}

function within(value: number, low: number, high: number): number {
  return Math.min(Math.max(value, low), high);
}
