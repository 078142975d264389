/** A dark or tip-out recording on its way through the steps before it is taken off. */
import { binSpectrum } from './bin';
import { type ConditionedSlab, conditionedFrom, type Grid, rowsOf } from './conditioned';
import type { Crop } from './crop';
import { cropSlab } from './crop';
import {
  assertReferenceShape,
  hasRecordedNoise,
  type RecordedReference,
  type ReferenceRecording,
} from './reference-recording';
import type { StepPlace } from './step-errors';
import { stepError } from './step-errors';
import { noState, type PlannedStep, type RowSpan } from './step-plan';

/**
 * How a spectrum that stands for all pixels goes through a step; null where the step treats it like any
 * slab. `by-pixel`: it cannot, since the step is different at every pixel.
 */
export type SpectrumWay =
  | { readonly kind: 'by-pixel' }
  | { readonly kind: 'bin'; readonly options: Parameters<typeof binSpectrum>[1] }
  | { readonly kind: 'crop'; readonly crop: Crop };

export interface StepBefore {
  readonly planned: PlannedStep;
  readonly spectrumWay: SpectrumWay | null;
}

/**
 * The recording as it is to be subtracted from rows of the present grid: raw as it is, it goes through the
 * steps before that speak of the detector (offset, response) or of the grid (calibrate, crop, bin).
 */
export class PlannedReference {
  readonly kind: 'spectrum' | 'cube';
  readonly #recorded: RecordedReference;
  readonly #recordedGrid: Grid;
  readonly #steps: readonly StepBefore[];
  readonly #place: StepPlace;
  #spectrum: ReferenceRecording | null = null;

  /**
   * @param recordedGrid - of the scan as recorded, before the first step
   * @throws RimlightError 'recipe' - when it is of another shape than the scan as recorded
   */
  constructor(
    recorded: RecordedReference,
    recordedGrid: Grid,
    before: readonly StepBefore[],
    place: StepPlace,
  ) {
    this.kind = assertReferenceShape(recorded, recordedGrid, place);
    this.#recorded = recorded;
    const noise = hasRecordedNoise(recorded.values)
      ? recordedGrid.noise
      : ({ kind: 'none' } as const);
    this.#recordedGrid = { ...recordedGrid, noise };
    this.#steps = before.filter(({ planned }) => planned.isOfDetector);
    this.#place = place;
    const byPixel = this.#steps.find(({ spectrumWay }) => spectrumWay?.kind === 'by-pixel');
    if (this.kind === 'spectrum' && byPixel !== undefined) {
      throw stepError(
        place,
        `${recorded.name} is one spectrum, and ${byPixel.planned.place} takes a dark cube off, which differs from pixel to pixel`,
        'Give a cube here, or a dark spectrum there.',
      );
    }
  }

  get name(): string {
    return this.#recorded.name;
  }

  /** Whether it brings noise of its own. */
  get hasNoise(): boolean {
    return this.#recordedGrid.noise.kind !== 'none';
  }

  /** For rows of the present grid. */
  at(rows: RowSpan): ReferenceRecording {
    if (this.kind === 'spectrum') {
      this.#spectrum ??= { kind: 'spectrum', rows: this.#throughAsSpectrum(), name: this.name };
      return this.#spectrum;
    }
    const needed = [rows];
    for (const { planned } of this.#steps.toReversed()) {
      needed.unshift(planned.rowsFor(needed[0]));
    }
    let slab = this.#recordedRows(needed[0]);
    this.#steps.forEach(({ planned }, i) => {
      slab = planned.apply(slab, needed[i + 1], noState).slab;
    });
    return { kind: 'cube', rows: rowsOf(slab, rows.y0, rows.y1), name: this.name };
  }

  #throughAsSpectrum(): ConditionedSlab {
    const { nk } = this.#recordedGrid.shape;
    const shape = { ny: 1, nx: 1, nk };
    const counts = Float64Array.from(this.#recorded.values);
    let slab = conditionedFrom({ y0: 0, shape, counts }, this.#recordedGrid);
    for (const { planned, spectrumWay } of this.#steps) {
      if (spectrumWay?.kind === 'bin') slab = binSpectrum(slab, spectrumWay.options);
      else if (spectrumWay?.kind === 'crop') {
        const one = { first: 0, end: 1 };
        slab = cropSlab(slab, { ...spectrumWay.crop, x: one, y: one });
      } else slab = planned.apply(slab, { y0: 0, y1: 1 }, noState).slab;
    }
    return slab;
  }

  #recordedRows({ y0, y1 }: RowSpan): ConditionedSlab {
    const { nx, nk } = this.#recordedGrid.shape;
    const from = (y0 - this.#recorded.y0) * nx * nk;
    const length = Math.max(0, y1 - y0) * nx * nk;
    if (from < 0 || from + length > this.#recorded.values.length) {
      throw stepError(
        this.#place,
        `${this.name} was not read at rows ${y0} to ${y1 - 1}`,
        'Please report this.',
      );
    }
    const counts = Float64Array.from({ length }, (_, i) => this.#recorded.values[from + i]);
    const shape = { ny: Math.max(0, y1 - y0), nx, nk };
    return conditionedFrom({ y0, shape, counts }, this.#recordedGrid);
  }
}
