/** What lies over a map: crosshair, pins, scale bar. White and dark together, so that they show on any picture. */
import { planScaleBar } from '../../science/scale-bar';
import type { ScanMeta } from '../../science/scan';
import type { Pixel } from '../../state/crosshair';
import type { Theme } from '../../state/view-store';
import { type Field, middleOf, type Placement, type Viewport } from '../canvas/camera';
import { isDark, pinColour, pinRing } from './pin-styles';

export interface PinMark extends Pixel {
  readonly name: string;
}

export interface OverlayScene {
  readonly placement: Placement;
  readonly field: Field;
  readonly viewport: Viewport;
  readonly meta: ScanMeta;
  readonly crosshair: Pixel | null;
  readonly pins: readonly PinMark[];
  readonly theme: Theme;
  /** font family of numbers */
  readonly font: string;
}

const light = 'rgb(255 255 255 / 0.85)';
const shade = 'rgb(0 0 0 / 0.55)';
export const pinRadiusPx = 6;

interface Box {
  readonly left: number;
  readonly top: number;
  readonly right: number;
  readonly bottom: number;
}

export function drawOverlay(canvas: HTMLCanvasElement, scene: OverlayScene): void {
  const context = canvas.getContext('2d');
  if (context === null) return;
  context.clearRect(0, 0, scene.viewport.widthPx, scene.viewport.heightPx);
  const box = visibleBox(scene);
  if (box.right <= box.left || box.bottom <= box.top) return;
  if (scene.crosshair !== null) drawCrosshair(context, scene.crosshair, box, scene.placement);
  drawScaleBar(context, box, scene);
  for (const pin of scene.pins) drawPin(context, pin, scene);
}

/** The part of the pane that the map takes. */
export function visibleBox({
  placement: { leftPx, topPx, columnPx, rowPx },
  field,
  viewport,
}: Pick<OverlayScene, 'placement' | 'field' | 'viewport'>): Box {
  return {
    left: Math.max(leftPx, 0),
    top: Math.max(topPx, 0),
    right: Math.min(leftPx + columnPx * field.nx, viewport.widthPx),
    bottom: Math.min(topPx + rowPx * field.ny, viewport.heightPx),
  };
}

function drawCrosshair(
  context: CanvasRenderingContext2D,
  pixel: Pixel,
  box: Box,
  placement: Placement,
): void {
  const { xPx, yPx } = middleOf(pixel, placement);
  const across = Math.round(xPx) + 0.5;
  const down = Math.round(yPx) + 0.5;
  context.save();
  context.lineWidth = 1;
  context.setLineDash([3, 3]);
  for (const [offset, colour] of [
    [3, 'rgb(0 0 0 / 0.4)'],
    [0, 'rgb(255 255 255 / 0.6)'],
  ] as const) {
    context.lineDashOffset = offset;
    context.strokeStyle = colour;
    context.beginPath();
    if (across > box.left && across < box.right) {
      context.moveTo(across, box.top);
      context.lineTo(across, box.bottom);
    }
    if (down > box.top && down < box.bottom) {
      context.moveTo(box.left, down);
      context.lineTo(box.right, down);
    }
    context.stroke();
  }
  context.restore();
  outlinePixel(context, pixel, placement);
}

/** Smaller pixels are covered by their own outline. */
const leastOutlinedPx = 5;

function outlinePixel(
  context: CanvasRenderingContext2D,
  { y, x }: Pixel,
  { leftPx, topPx, columnPx, rowPx }: Placement,
): void {
  if (Math.min(columnPx, rowPx) < leastOutlinedPx) return;
  context.lineWidth = 1;
  context.strokeStyle = light;
  context.strokeRect(leftPx + x * columnPx + 0.5, topPx + y * rowPx + 0.5, columnPx - 1, rowPx - 1);
}

function drawPin(
  context: CanvasRenderingContext2D,
  pin: PinMark,
  { placement, field, theme, font }: OverlayScene,
): void {
  if (pin.x >= field.nx || pin.y >= field.ny) return;
  const { xPx, yPx } = middleOf(pin, placement);
  const colour = pinColour(pin.name, theme);
  const halo = isDark(colour) ? 'rgb(255 255 255 / 0.75)' : shade;
  context.save();
  context.beginPath();
  context.arc(xPx, yPx, pinRadiusPx, 0, 2 * Math.PI);
  context.lineWidth = 4;
  context.strokeStyle = halo;
  context.stroke();
  context.setLineDash([...pinRing(pin.name)]);
  context.lineWidth = 2;
  context.strokeStyle = colour;
  context.stroke();
  context.setLineDash([]);
  writeText(context, pin.name, { xPx: xPx + 10, yPx: yPx + 4 }, colour, {
    halo,
    font: `600 12px ${font}`,
  });
  context.restore();
}

const barHeightPx = 4;
const barInsetPx = 12;

function drawScaleBar(context: CanvasRenderingContext2D, box: Box, scene: OverlayScene): void {
  const widthPx = box.right - box.left;
  const bar = planScaleBar(scene.meta.x, widthPx / scene.placement.columnPx);
  if (bar === null || widthPx < 60) return;
  const left = box.left + barInsetPx;
  const top = box.bottom - barInsetPx - barHeightPx - 4;
  context.fillStyle = shade;
  context.fillRect(left - 1, top - 1, bar.share * widthPx + 2, barHeightPx + 2);
  context.fillStyle = '#ffffff';
  context.fillRect(left, top, bar.share * widthPx, barHeightPx);
  writeText(context, bar.label, { xPx: left, yPx: top - 6 }, '#ffffff', {
    halo: shade,
    font: `10.5px ${scene.font}`,
  });
}

function writeText(
  context: CanvasRenderingContext2D,
  text: string,
  { xPx, yPx }: { readonly xPx: number; readonly yPx: number },
  colour: string,
  { halo, font }: { readonly halo: string; readonly font: string },
): void {
  context.font = font;
  context.lineWidth = 3;
  context.lineJoin = 'round';
  context.strokeStyle = halo;
  context.strokeText(text, xPx, yPx);
  context.fillStyle = colour;
  context.fillText(text, xPx, yPx);
}
