/**
 * What peaks stand on, counts per channel. Energies are counted from the middle of the window, so
 * that level and slope say different things.
 */
import { exp } from '../numeric/elementary';
import type { ChannelSpan, FitGrid, Shape, ShapeParameter } from './shape';

const level: ShapeParameter = { name: 'level', isLinear: true, unit: 'counts/channel' };
const slope: ShapeParameter = { name: 'slope', isLinear: true, unit: 'counts/channel/eV' };
const curvature: ShapeParameter = {
  name: 'curvature',
  isLinear: true,
  unit: 'counts/channel/eV²',
};

/** level + slope x + curvature x²; as many of them as `parameters` has. */
function polynomial(name: string, parameters: readonly ShapeParameter[]): Shape {
  return {
    name,
    parameters,
    evaluate(grid, values, counts, columns) {
      const { centresEv } = grid;
      const middle = middleOf(grid);
      const degree = parameters.length - 1;
      for (let k = 0; k < centresEv.length; k++) {
        const x = centresEv[k] - middle;
        let power = 1;
        for (let i = 0; i <= degree; i++) {
          counts[k] += values[i] * power;
          if (columns !== null) columns[i][k] = power;
          power *= x;
        }
      }
      return wholeSpan(grid);
    },
  };
}

/** The same counts in every channel. */
export const flat = polynomial('flat', [level]);
/** A straight line. */
export const line = polynomial('line', [level, slope]);
/** A parabola. */
export const parabola = polynomial('parabola', [level, slope, curvature]);

/** level · exp(−x/decay); a negative decay falls toward low energy. */
export const decay: Shape = {
  name: 'decay',
  parameters: [level, { name: 'decay', isLinear: false, unit: 'eV' }],
  evaluate(grid, values, counts, columns) {
    const { centresEv } = grid;
    const middle = middleOf(grid);
    const [height, length] = values;
    for (let k = 0; k < centresEv.length; k++) {
      const x = centresEv[k] - middle;
      const falling = exp(-x / length);
      counts[k] += height * falling;
      if (columns === null) continue;
      columns[0][k] = falling;
      columns[1][k] = (height * falling * x) / (length * length);
    }
    return wholeSpan(grid);
  },
};

function middleOf({ edgesEv }: FitGrid): number {
  return 0.5 * (edgesEv[0] + edgesEv[edgesEv.length - 1]);
}

function wholeSpan({ centresEv }: FitGrid): ChannelSpan {
  return { first: 0, end: centresEv.length };
}
