/** The shapes a model may name. */
import { RimlightError } from '../../errors';
import { decay, flat, line, parabola } from './backgrounds';
import { fano } from './fano';
import { gaussian } from './gaussian';
import { lorentzian } from './lorentzian';
import { pseudoVoigt } from './pseudo-voigt';
import type { Shape } from './shape';
import { tailed } from './tailed';
import { voigt } from './voigt';

const shapes: ReadonlyMap<string, Shape> = new Map(
  [gaussian, lorentzian, pseudoVoigt, voigt, tailed, fano, flat, line, parabola, decay].map(
    (shape) => [shape.name, shape],
  ),
);

/** Peaks first, then what they stand on. */
export const shapeNames: readonly string[] = [...shapes.keys()];

/** @throws RimlightError 'recipe' - when there is no such shape */
export function shapeByName(name: string): Shape {
  const shape = shapes.get(name);
  if (shape !== undefined) return shape;
  throw new RimlightError('recipe', {
    what: `there is no shape "${name}"`,
    where: 'model',
    hint: `Use one of ${shapeNames.join(', ')}.`,
  });
}

/** Whether it has an area and a centre; backgrounds have neither. */
export function isPeak({ parameters }: Shape): boolean {
  return parameters[0].name === 'area';
}
