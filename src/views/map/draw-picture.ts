/** Draws a picture's pixels as squares (or oblongs) on a canvas, and the ground where there is no data. */
import type { Placement } from '../canvas/camera';
import type { Picture } from './use-map-image';

/** Pictures as canvases of one pixel each, made once for each picture. */
const sheets = new WeakMap<Picture, HTMLCanvasElement>();

function sheetOf(picture: Picture): HTMLCanvasElement {
  const known = sheets.get(picture);
  if (known !== undefined) return known;
  const sheet = document.createElement('canvas');
  sheet.width = picture.nx;
  sheet.height = picture.ny;
  const context = sheet.getContext('2d');
  const image = context?.createImageData(picture.nx, picture.ny);
  if (context && image) {
    image.data.set(picture.rgba);
    context.putImageData(image, 0, 0);
  }
  sheets.set(picture, sheet);
  return sheet;
}

/** Distance of the ground's strokes, CSS pixels. */
const hatchPx = 6;

/** The part of the canvas a map takes: strokes, which show wherever the picture is transparent. */
function drawGround(
  context: CanvasRenderingContext2D,
  box: { left: number; top: number; width: number; height: number },
  colours: { readonly ground: string; readonly strokes: string },
): void {
  context.save();
  context.beginPath();
  context.rect(box.left, box.top, box.width, box.height);
  context.clip();
  context.fillStyle = colours.ground;
  context.fillRect(box.left, box.top, box.width, box.height);
  context.strokeStyle = colours.strokes;
  context.beginPath();
  for (let at = -box.height; at < box.width; at += hatchPx) {
    context.moveTo(box.left + at, box.top + box.height);
    context.lineTo(box.left + at + box.height, box.top);
  }
  context.stroke();
  context.restore();
}

/**
 * Draws the picture as placed; the canvas speaks in CSS pixels. Pixels of the map stay crisp, except
 * where several share one of the screen: there they are averaged, for none may be lost.
 */
export function drawPicture(
  canvas: HTMLCanvasElement,
  picture: Picture | null,
  { leftPx, topPx, columnPx, rowPx }: Placement,
  colours: { readonly ground: string; readonly strokes: string },
): void {
  const context = canvas.getContext('2d');
  if (context === null) return;
  const ratio = canvas.width / Math.max(canvas.clientWidth, 1);
  context.clearRect(0, 0, canvas.clientWidth, canvas.clientHeight);
  if (picture === null) return;
  const width = columnPx * picture.nx;
  const height = rowPx * picture.ny;
  const right = Math.min(leftPx + width, canvas.clientWidth);
  const bottom = Math.min(topPx + height, canvas.clientHeight);
  const left = Math.max(leftPx, 0);
  const top = Math.max(topPx, 0);
  drawGround(context, { left, top, width: right - left, height: bottom - top }, colours);
  context.imageSmoothingEnabled = Math.min(columnPx, rowPx) * ratio < 1;
  context.imageSmoothingQuality = 'high';
  context.drawImage(sheetOf(picture), leftPx, topPx, width, height);
}
