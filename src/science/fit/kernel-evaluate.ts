/** A model's components put together from the loops of a kernel, and from `peaks/` where the kernel has none. */
import type { ChannelSpan, Shape } from '../peaks/shape';
import { gaussianSpan, integrateGaussian, type KernelGrid, reachOfGaussian } from './kernel-shapes';

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

/**
 * Called in every step of every fit, so its values are read by index: taking a typed array apart makes garbage.
 * Adds one component to the model, with its derivatives in the columns from `first` on; returns the channels touched.
 */
export type EvaluateShape = (values: Float64Array, withColumns: boolean) => ChannelSpan;

/**
 * @param shape - as the model names it
 * @param first - the component's first parameter, whose column is the first of its own
 */
export function shapeEvaluator(shape: Shape, first: number, host: ShapeHost): EvaluateShape {
  const { grid, model, columns, loops } = host;
  const whole = { first: 0, end: grid.centresEv.length };
  const { length: size } = shape.parameters;
  const own = columns.slice(first, first + size);
  switch (shape.name) {
    case 'flat':
    case 'line':
    case 'parabola':
      fillPowers(grid, own);
      return (values) => {
        loops.polynomial(values[0], size > 1 ? values[1] : 0, size > 2 ? values[2] : 0);
        return whole;
      };
    case 'decay':
      return (values, withColumns) => {
        loops.decay(first, withColumns, values[0], values[1]);
        return whole;
      };
    case 'gaussian':
      return gaussianEvaluator(host, first, own);
    case 'lorentzian':
      return (values, withColumns) => {
        loops.lorentzian(first, withColumns, values[0], values[1], values[2], 1, false);
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

/** By vectors where channels are narrow, integrated over each where they are not. */
function gaussianEvaluator(
  { grid, model, loops }: ShapeHost,
  first: number,
  own: readonly Float64Array[],
): EvaluateShape {
  const alone = threeArrays(grid);
  return (values, withColumns) => {
    const total = values[0];
    const middle = values[1];
    const fwhmEv = values[2];
    const narrow = gaussianSpan(grid, middle, fwhmEv);
    if (narrow !== null) {
      loops.gaussian(first, narrow, withColumns, total, middle, fwhmEv);
      return narrow;
    }
    const span = reachOfGaussian(grid, middle, fwhmEv);
    integrateGaussian(grid, span, middle, fwhmEv, alone);
    for (let k = span.first; k < span.end; k++) {
      model[k] += total * alone[0][k];
      if (!withColumns) continue;
      own[0][k] = alone[0][k];
      own[1][k] = total * alone[1][k];
      own[2][k] = total * alone[2][k];
    }
    return span;
  };
}

/** The Lorentzian's share everywhere, the Gaussian's where it reaches. */
function pseudoVoigt(
  { grid, model, loops }: ShapeHost,
  first: number,
  own: readonly Float64Array[],
): EvaluateShape {
  const whole = { first: 0, end: grid.centresEv.length };
  const alone = threeArrays(grid);
  return (values, withColumns) => {
    const total = values[0];
    const middle = values[1];
    const fwhmEv = values[2];
    const eta = values[3];
    loops.lorentzian(first, withColumns, total, middle, fwhmEv, eta, true);
    const span = reachOfGaussian(grid, middle, fwhmEv);
    integrateGaussian(grid, span, middle, fwhmEv, alone);
    const rest = total * (1 - eta);
    for (let k = span.first; k < span.end; k++) {
      const share = alone[0][k];
      model[k] += rest * share;
      if (!withColumns) continue;
      own[0][k] += (1 - eta) * share;
      own[1][k] += rest * alone[1][k];
      own[2][k] += rest * alone[2][k];
      own[3][k] -= total * share;
    }
    return whole;
  };
}

function threeArrays({ centresEv }: KernelGrid): readonly Float64Array[] {
  return [0, 1, 2].map(() => new Float64Array(centresEv.length));
}
