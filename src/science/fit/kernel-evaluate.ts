/** A model's components put together from the loops of a kernel, and from `peaks/` where the kernel has none. */
import { gaussian } from '../peaks/gaussian';
import type { ChannelSpan, Shape } from '../peaks/shape';
import { gaussianSpan, type KernelGrid } from './kernel-shapes';

/** The loops of one kernel; columns are those from `first` on. */
export interface ShapeLoops {
  polynomial(a: number, b: number, c: number): void;
  decay(first: number, withColumns: boolean, level: number, length: number): void;
  gaussian(
    first: number,
    span: ChannelSpan,
    withColumns: boolean,
    total: number,
    middle: number,
    fwhmEv: number,
  ): void;
  lorentzian(
    first: number,
    withColumns: boolean,
    total: number,
    middle: number,
    fwhmEv: number,
    weight: number,
    hasShare: boolean,
  ): void;
}

/** What a kernel gives: its arrays and its loops. */
export interface ShapeHost {
  readonly grid: KernelGrid;
  readonly model: Float64Array;
  readonly columns: readonly Float64Array[];
  readonly loops: ShapeLoops;
}

/** Adds one component to the model, with its derivatives in the columns from `first` on; returns the channels touched. */
export type EvaluateShape = (values: Float64Array, withColumns: boolean) => ChannelSpan;

/**
 * @param shape - as the model names it
 * @param first - the component's first parameter, whose column is the first of its own
 */
export function shapeEvaluator(shape: Shape, first: number, host: ShapeHost): EvaluateShape {
  const { grid, model, columns, loops } = host;
  const whole = { first: 0, end: grid.centresEv.length };
  const own = columns.slice(first, first + shape.parameters.length);
  switch (shape.name) {
    case 'flat':
    case 'line':
    case 'parabola':
      fillPowers(grid, own);
      return (values) => {
        const [a, b = 0, c = 0] = values;
        loops.polynomial(a, b, c);
        return whole;
      };
    case 'decay':
      return ([level, length], withColumns) => {
        loops.decay(first, withColumns, level, length);
        return whole;
      };
    case 'gaussian':
      return (values, withColumns) => {
        const [total, middle, fwhmEv] = values;
        const span = gaussianSpan(grid, middle, fwhmEv);
        if (span === null) return shape.evaluate(grid, values, model, withColumns ? own : null);
        loops.gaussian(first, span, withColumns, total, middle, fwhmEv);
        return span;
      };
    case 'lorentzian':
      return ([total, middle, fwhmEv], withColumns) => {
        loops.lorentzian(first, withColumns, total, middle, fwhmEv, 1, false);
        return whole;
      };
    case 'pseudo-voigt':
      return pseudoVoigt(host, first, own);
    default:
      return (values, withColumns) => shape.evaluate(grid, values, model, withColumns ? own : null);
  }
}

/** Derivatives of a polynomial do not depend on its values. */
function fillPowers({ offsetsEv }: KernelGrid, own: readonly Float64Array[]): void {
  for (const [power, column] of own.entries()) {
    for (let k = 0; k < offsetsEv.length; k++) {
      const x = offsetsEv[k];
      column[k] = power === 0 ? 1 : power === 1 ? x : x * x;
    }
  }
}

/** The Lorentzian's share everywhere, the Gaussian's where it reaches. */
function pseudoVoigt(
  { grid, model, loops }: ShapeHost,
  first: number,
  own: readonly Float64Array[],
): EvaluateShape {
  const whole = { first: 0, end: grid.centresEv.length };
  const alone = new Float64Array(grid.centresEv.length);
  const ofGaussian = [0, 1, 2].map(() => new Float64Array(grid.centresEv.length));
  const unit = new Float64Array(3);
  return ([total, middle, fwhmEv, eta], withColumns) => {
    loops.lorentzian(first, withColumns, total, middle, fwhmEv, eta, true);
    unit[0] = 1;
    unit[1] = middle;
    unit[2] = fwhmEv;
    const span = gaussian.evaluate(grid, unit, alone, withColumns ? ofGaussian : null);
    const rest = total * (1 - eta);
    for (let k = span.first; k < span.end; k++) {
      const share = alone[k];
      alone[k] = 0;
      model[k] += rest * share;
      if (!withColumns) continue;
      own[0][k] += (1 - eta) * share;
      own[1][k] += rest * ofGaussian[1][k];
      own[2][k] += rest * ofGaussian[2][k];
      own[3][k] -= total * share;
    }
    return whole;
  };
}
