/** The pseudo-Voigt peak: a Lorentzian and a Gaussian of one width, `eta` the Lorentzian's share. */
import { gaussian } from './gaussian';
import { lorentzian } from './lorentzian';
import { area, centre, fwhm, plainParameter } from './peak-parameters';
import type { Shape } from './shape';

/** Touches every channel, as its Lorentzian does; integrated over them as its parts are. */
export const pseudoVoigt: Shape = {
  name: 'pseudo-voigt',
  parameters: [area, centre, fwhm, plainParameter('eta')],
  evaluate(grid, values, counts, columns) {
    const count = grid.centresEv.length;
    const [total, middle, width, eta] = values;
    const alone = scratch(count);
    const one = alone.values;
    one[0] = 1;
    one[1] = middle;
    one[2] = width;
    // The shapes add counts, and the Gaussian leaves what is beyond its reach untouched.
    alone.gaussian.fill(0, 0, count);
    alone.lorentzian.fill(0, 0, count);
    for (const column of alone.ofGaussian) column.fill(0, 0, count);
    const isAsked = columns !== null;
    gaussian.evaluate(grid, one, alone.gaussian, isAsked ? alone.ofGaussian : null);
    lorentzian.evaluate(grid, one, alone.lorentzian, isAsked ? alone.ofLorentzian : null);
    for (let k = 0; k < count; k++) {
      const g = alone.gaussian[k];
      const l = alone.lorentzian[k];
      const share = g + eta * (l - g);
      counts[k] += total * share;
      if (columns === null) continue;
      columns[0][k] = share;
      for (const i of [1, 2] as const) {
        const ofGaussian = alone.ofGaussian[i][k];
        columns[i][k] = total * (ofGaussian + eta * (alone.ofLorentzian[i][k] - ofGaussian));
      }
      columns[3][k] = total * (l - g);
    }
    return { first: 0, end: count };
  },
};

interface Scratch {
  readonly values: Float64Array;
  readonly gaussian: Float64Array;
  readonly lorentzian: Float64Array;
  readonly ofGaussian: readonly Float64Array[];
  readonly ofLorentzian: readonly Float64Array[];
}

let kept: Scratch | null = null;

/** Room for the two parts, made anew only for a longer window. */
function scratch(count: number): Scratch {
  if (kept === null || kept.gaussian.length < count) {
    kept = {
      values: new Float64Array(3),
      gaussian: new Float64Array(count),
      lorentzian: new Float64Array(count),
      ofGaussian: threeColumns(count),
      ofLorentzian: threeColumns(count),
    };
  }
  return kept;
}

function threeColumns(count: number): readonly Float64Array[] {
  return Array.from({ length: 3 }, () => new Float64Array(count));
}
