/** Spectra at scattered positions: kept side by side as one row. */
import type { PositionAxis } from '../../science/scan';
import type { RoledVector } from './agreement';
import { unknownAxis } from './pitch';
import type { FoundPixel, PixelQuestion } from './pixel-question';

/** A line of spectra whose x and y wander is no line in space: points, kept in the file's order. */
export function scatteredPoints(question: PixelQuestion): FoundPixel | null {
  const { nx, ny } = question;
  if (Math.min(nx, ny) !== 1 || Math.max(nx, ny) < 2) return null;
  const length = Math.max(nx, ny);
  const along = (which: 'x' | 'y'): RoledVector | undefined =>
    question.vectors.find(
      ({ vector, role }) =>
        vector.file === null &&
        role.kind === 'position' &&
        role.along === which &&
        vector.values.length === length,
    );
  const x = along('x');
  const y = along('y');
  if (x === undefined || y === undefined) return null;
  const point: PositionAxis = {
    label: 'point',
    unit: 'px',
    isLength: false,
    pitch: 1,
    values: null,
  };
  return {
    x: nx > 1 ? point : unknownAxis('x'),
    y: ny > 1 ? point : unknownAxis('y'),
    choice: undefined,
    warnings: [
      `The ${length} spectra lie at scattered positions (${x.vector.label}, ${y.vector.label}), not on a grid: they are shown side by side in the file’s order.`,
    ],
    guess: {
      field: 'pixel',
      label: `${length} scattered points`,
      source: 'file',
      evidence: `${x.vector.label} and ${y.vector.label} give a position for each spectrum`,
      alternatives: [],
    },
  };
}
