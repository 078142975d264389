/** One pixel's fit over its spectrum: components on what they stand on, their sum, and what is left. */
import type { PixelFit } from '../../../workers/engine';
import { drawLine } from './line-canvas';

export interface FitDrawing {
  readonly fit: PixelFit;
  /** (nk) counts of the pixel, all channels of the scan, and where the fit's channels begin in them */
  readonly counts: Float64Array;
  readonly firstChannel: number;
  readonly colours: ReadonlyMap<string, string>;
  readonly evToX: (energyEv: number) => number;
  readonly yOf: (counts: number) => number;
  /** of the strip of residuals, px */
  readonly strip: { readonly top: number; readonly height: number };
  readonly ink: string;
  readonly accent: string;
}

/** Residuals beyond so many standard deviations are cut off. */
const mostSigmas = 5;

export function drawFit(canvas: HTMLCanvasElement, drawing: FitDrawing): void {
  const { fit, colours, evToX, yOf } = drawing;
  const xsPx = fit.centresEv.map((energyEv) => evToX(energyEv));
  const standing = backgroundOf(fit);
  for (const { name, isIn, counts } of fit.curves) {
    if (!isIn) continue;
    const isFloor = !hasCentre(fit, name);
    const shown = isFloor ? counts : counts.map((value, k) => value + (standing[k] ?? 0));
    const colour = colours.get(name) ?? drawing.ink;
    drawLine(canvas, xsPx, yOf, shown, { colour, widthPx: 1, dashPx: [4, 3] });
  }
  drawLine(canvas, xsPx, yOf, fit.total, { colour: drawing.accent, widthPx: 1.5 });
  drawResiduals(canvas, drawing, xsPx);
}

/** Sum of the components that have no centre. */
export function backgroundOf(fit: PixelFit): Float64Array {
  const sum = new Float64Array(fit.centresEv.length);
  for (const { name, counts } of fit.curves) {
    if (hasCentre(fit, name)) continue;
    for (let k = 0; k < sum.length; k++) sum[k] = (sum[k] ?? 0) + (counts[k] ?? 0);
  }
  return sum;
}

/** (n) counts less the model over the model's standard deviation. */
export function residualsOf({ fit, counts, firstChannel }: FitDrawing): Float64Array {
  const { noise } = fit.plan;
  return fit.total.map((expected, k) => {
    const left = (counts[firstChannel + k] ?? Number.NaN) - expected;
    if (noise.kind === 'uniform') return left;
    const { slope, offset, floor } = noise.line;
    return left / Math.sqrt(Math.max(slope * (expected - offset) + floor, 1e-12));
  });
}

function drawResiduals(canvas: HTMLCanvasElement, drawing: FitDrawing, xsPx: Float64Array): void {
  const context = canvas.getContext('2d');
  if (context === null) return;
  const { top, height } = drawing.strip;
  const residuals = residualsOf(drawing);
  const scale = drawing.fit.plan.noise.kind === 'uniform' ? largest(residuals) : mostSigmas;
  const middle = top + height / 2;
  const yOf = (value: number): number =>
    middle - (Math.min(Math.max(value / scale, -1), 1) * height) / 2;
  context.globalAlpha = 0.75;
  drawLine(canvas, xsPx, yOf, residuals, { colour: drawing.ink, widthPx: 0.8 });
  context.globalAlpha = 1;
}

function largest(values: Float64Array): number {
  return values.reduce((most, value) => Math.max(most, Math.abs(value)), 1e-12);
}

function hasCentre({ plan }: PixelFit, name: string): boolean {
  const component = plan.components.find((candidate) => candidate.name === name);
  if (component === undefined) return false;
  const { first, count } = component;
  return plan.parameters.slice(first, first + count).some((one) => one.name === 'centre');
}
