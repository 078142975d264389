/** Fitted pixels gathered into the maps of the contract. */
import { fitParameterUnit, isFitParameter } from '../src/recipe/shape-parameters';
import type { FitPlan } from '../src/science/fit/fit-plan';
import { qualityAt, type qualityNames, type RecordLayout } from '../src/science/fit/fit-record';
import type { DerivedMap, PixelMap, ScanShape } from '../src/science/scan';

/** One array for each number of a row, (ny × nx); NaN and status 0 where nothing was fitted yet. */
export class FitPlanes {
  readonly layout: RecordLayout;
  readonly #planes: readonly Float64Array[];
  readonly #shape: ScanShape;

  constructor(layout: RecordLayout, shape: ScanShape) {
    this.layout = layout;
    this.#shape = shape;
    this.#planes = Array.from({ length: layout.length }, () =>
      new Float64Array(shape.ny * shape.nx).fill(Number.NaN),
    );
    this.#planes[qualityAt(layout, 'status')].fill(0);
  }

  get statuses(): Float64Array {
    return this.#planes[qualityAt(this.layout, 'status')];
  }

  put(pixels: Int32Array, records: Float64Array): void {
    const { length } = this.layout;
    for (let i = 0; i < length; i++) {
      const plane = this.#planes[i];
      for (let p = 0; p < pixels.length; p++) plane[pixels[p]] = records[p * length + i];
    }
  }

  /** Rows of numbers of some pixels, one after the other. */
  records(pixels: ArrayLike<number>): Float64Array {
    const { length } = this.layout;
    const records = new Float64Array(pixels.length * length);
    for (let i = 0; i < length; i++) {
      const plane = this.#planes[i];
      for (let p = 0; p < pixels.length; p++) records[p * length + i] = plane[pixels[p]];
    }
    return records;
  }

  /**
   * The maps, which share their arrays with the planes.
   *
   * @param quantity - what the scan's values are: "counts", or another quantity
   */
  maps({ components }: FitPlan, quantity: string): readonly DerivedMap[] {
    const { quantities } = this.layout;
    const { ny, nx } = this.#shape;
    const fitted = quantities.map(({ component, name, kind }, i): DerivedMap => {
      const unit = isFitParameter(name) ? fitParameterUnit(name) : '';
      return {
        name: `fit.${components[component].name}.${name}`,
        unit: unit.replace(/^counts/, quantity),
        ny,
        nx,
        values: this.#planes[i],
        errors: kind === 'needed' ? null : this.#planes[quantities.length + i],
      };
    });
    const qualities = (['chi2r', 'status', 'iterations'] as const).map(
      (name): DerivedMap => ({ name: `fit.${name}`, unit: '', ...this.plane(name), errors: null }),
    );
    return [...fitted, ...qualities];
  }

  plane(name: (typeof qualityNames)[number]): PixelMap {
    const { ny, nx } = this.#shape;
    return { ny, nx, values: this.#planes[qualityAt(this.layout, name)] };
  }
}

/** The row of numbers of one pixel out of a fit's maps; qualities beyond the status are left NaN. */
export function recordOfMaps(
  layout: RecordLayout,
  maps: readonly DerivedMap[],
  pixel: number,
): Float64Array {
  const record = new Float64Array(layout.length).fill(Number.NaN);
  const count = layout.quantities.length;
  for (let i = 0; i < count; i++) {
    record[i] = maps[i].values[pixel];
    record[count + i] = maps[i].errors?.[pixel] ?? Number.NaN;
  }
  for (const [i, name] of (['chi2r', 'status', 'iterations'] as const).entries()) {
    record[qualityAt(layout, name)] = maps[count + i].values[pixel];
  }
  return record;
}
