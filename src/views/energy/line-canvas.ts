/**
 * Draws one spectrum as a line on a canvas, for what follows the cursor: a frame is too short for
 * the plotting library. Where there are more channels than device pixels, each pixel column shows
 * the least and greatest counts, so no narrow line is lost.
 */
export interface LineStyle {
  readonly colour: string;
  readonly widthPx: number;
  /** lengths of dashes and gaps; left out: a full line */
  readonly dashPx?: readonly number[];
}

export function clearCanvas(canvas: HTMLCanvasElement): void {
  canvas.getContext('2d')?.clearRect(0, 0, canvas.width, canvas.height);
}

/** Gives the canvas the size of its box in device pixels; drawing then speaks in CSS pixels. */
export function fitCanvas(canvas: HTMLCanvasElement, widthPx: number, heightPx: number): void {
  const ratio = window.devicePixelRatio;
  const width = Math.round(widthPx * ratio);
  const height = Math.round(heightPx * ratio);
  if (canvas.width !== width) canvas.width = width;
  if (canvas.height !== height) canvas.height = height;
  canvas.getContext('2d')?.setTransform(ratio, 0, 0, ratio, 0, 0);
}

export function drawLine(
  canvas: HTMLCanvasElement,
  xsPx: Float64Array,
  yOf: (counts: number) => number,
  counts: Float64Array,
  style: LineStyle,
): void {
  const context = canvas.getContext('2d');
  if (context === null) return;
  context.strokeStyle = style.colour;
  context.lineWidth = style.widthPx;
  context.lineJoin = 'round';
  context.setLineDash([...(style.dashPx ?? [])]);
  context.beginPath();
  let isDown = false;
  let column = Number.NaN;
  let low = 0;
  let high = 0;
  for (let k = 0; k < counts.length; k++) {
    const x = xsPx[k] ?? 0;
    const value = counts[k] ?? Number.NaN;
    if (Number.isNaN(value)) {
      isDown = false;
      column = Number.NaN;
      continue;
    }
    const y = yOf(value);
    const here = Math.round(x * 2);
    if (here === column) {
      if (y >= low && y <= high) continue;
      low = Math.min(low, y);
      high = Math.max(high, y);
    } else {
      column = here;
      low = y;
      high = y;
    }
    if (isDown) context.lineTo(x, y);
    else context.moveTo(x, y);
    isDown = true;
  }
  context.stroke();
}
