/** The pseudo-Voigt peak: a Lorentzian and a Gaussian of one width, `eta` the Lorentzian's share. */
import { gaussian } from './gaussian';
import { lorentzian } from './lorentzian';
import { area, centre, fwhm, plainParameter } from './peak-parameters';
import type { Shape } from './shape';

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
    alone.gaussian.fill(0);
    alone.lorentzian.fill(0);
    for (const column of alone.columns) column.fill(0);
    const wanted = columns === null ? null : alone.columns;
    gaussian.evaluate(grid, one, alone.gaussian, wanted?.slice(0, 3));
    lorentzian.evaluate(grid, one, alone.lorentzian, wanted?.slice(3));
    for (let k = 0; k < count; k++) {
      const g = alone.gaussian[k];
      const l = alone.lorentzian[k];
      const share = g + eta * (l - g);
      counts[k] += total * share;
      if (columns === null) continue;
      columns[0][k] = share;
      for (const i of [1, 2] as const) {
        const ofGaussian = alone.columns[i][k];
        columns[i][k] = total * (ofGaussian + eta * (alone.columns[3 + i][k] - ofGaussian));
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
  readonly columns: readonly Float64Array[];
}

let kept: Scratch | null = null;

/** Room for the two parts, made once for each length of the window. */
function scratch(count: number): Scratch {
  if (kept === null || kept.gaussian.length !== count) {
    kept = {
      values: new Float64Array(3),
      gaussian: new Float64Array(count),
      lorentzian: new Float64Array(count),
      columns: Array.from({ length: 6 }, () => new Float64Array(count)),
    };
  }
  return kept;
}
