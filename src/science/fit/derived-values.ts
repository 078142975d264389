/** What follows from a component's parameters: height, whole width, Raman shift, each with its error. */
import type { FitGrid, Shape } from '../peaks/shape';
import { tailedSummit } from '../peaks/whole-width';
import { voigtFwhm } from '../peaks/widths';
import { cm1PerEv, shiftCm1FromEv } from '../units';
import type { FitModel } from './fit-model';
import type { FitQuantity } from './fit-record';

/** A value and its derivative by each parameter of the component. */
export interface Derived {
  value: number;
  readonly gradient: Float64Array;
}

export class DerivedValues {
  readonly #model: FitModel;
  /** one channel, as wide as the scan's at the peak */
  readonly #channel: FitGrid = {
    centresEv: new Float64Array(1),
    widthsEv: new Float64Array(1),
    edgesEv: new Float64Array(2),
  };
  readonly #counts = new Float64Array(1);
  readonly #columns: readonly Float64Array[];
  readonly #derived: Derived;

  constructor(model: FitModel) {
    const most = Math.max(1, ...model.plan.components.map(({ count }) => count));
    this.#model = model;
    this.#columns = Array.from({ length: most }, () => new Float64Array(1));
    this.#derived = { value: Number.NaN, gradient: new Float64Array(most) };
  }

  /**
   * @param own - the component's parameters
   * @returns the same object at every call
   */
  of({ component, kind }: FitQuantity, own: Float64Array): Derived {
    const derived = this.#derived;
    const { shapes, plan } = this.#model;
    derived.gradient.fill(0);
    if (kind === 'height') this.#height(shapes[component], own);
    else if (kind === 'fwhm') wholeWidth(own, derived);
    else if (kind === 'centre_cm1') {
      derived.value = shiftCm1FromEv(own[1], plan.laserEv ?? Number.NaN);
      derived.gradient[1] = -cm1PerEv;
    }
    return derived;
  }

  /** Expected counts of a channel at the peak's highest place, as wide as the scan's are there. */
  #height(shape: Shape, own: Float64Array): void {
    const derived = this.#derived;
    const columns = this.#columns.slice(0, shape.parameters.length);
    this.#at(shape, own, this.#summit(shape, own), columns);
    derived.value = this.#counts[0];
    // The place follows the highest point, where moving it changes nothing.
    for (const [i, column] of columns.entries()) derived.gradient[i] = i === 1 ? 0 : column[0];
  }

  #summit(shape: Shape, own: Float64Array): number {
    const [, centre, width, last] = own;
    // ε = 1/q, half the width from the centre
    if (shape.name === 'fano') return last === 0 ? centre : centre + width / (2 * last);
    return shape.name === 'tailed' ? centre + tailedSummit(width, last) : centre;
  }

  #at(shape: Shape, own: Float64Array, energyEv: number, columns: readonly Float64Array[]): void {
    const { centresEv, widthsEv, edgesEv } = this.#channel;
    const width = this.#widthAt(energyEv);
    centresEv[0] = energyEv;
    widthsEv[0] = width;
    edgesEv[0] = energyEv - width / 2;
    edgesEv[1] = energyEv + width / 2;
    this.#counts[0] = 0;
    for (const column of columns) column[0] = 0;
    shape.evaluate(this.#channel, own, this.#counts, columns);
  }

  /** Width of the channel an energy lies in, of the outermost beyond them. */
  #widthAt(energyEv: number): number {
    const { edgesEv, widthsEv } = this.#model.grid;
    let low = 0;
    let high = widthsEv.length - 1;
    while (low < high) {
      const middle = (low + high) >> 1;
      if (edgesEv[middle + 1] > energyEv) high = middle;
      else low = middle + 1;
    }
    return widthsEv[low];
  }
}

/** 0.5346 l + √(0.2166 l² + g²) */
function wholeWidth(own: Float64Array, derived: Derived): void {
  const [, , g, l] = own;
  const root = Math.sqrt(0.2166 * l * l + g * g);
  derived.value = voigtFwhm(g, l);
  derived.gradient[2] = root > 0 ? g / root : 1;
  derived.gradient[3] = 0.5346 + (root > 0 ? (0.2166 * l) / root : 0);
}
