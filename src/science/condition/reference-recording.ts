/** A dark or tip-out recording that is subtracted: one spectrum for all pixels, or a cube like the scan. */
import {
  type ConditionedArray,
  type ConditionedSlab,
  type Grid,
  rowsOf,
  type Subtrahend,
} from './conditioned';
import { type StepPlace, stepError } from './step-errors';

/**
 * `rows` holds one pixel for a spectrum, and rows y0 … of the scan for a cube, treated by the same steps
 * as the scan before it is subtracted.
 */
export interface ReferenceRecording {
  readonly kind: 'spectrum' | 'cube';
  readonly rows: ConditionedSlab;
  /** file name, for messages */
  readonly name: string;
}

/** What a file that is subtracted holds, channels in ascending energy. */
export interface RecordedReference {
  readonly name: string;
  /** (nk) for a spectrum, (ny, nx, nk) for a cube */
  readonly shape: readonly number[];
  /** of a cube, the rows from `y0` on that were read, at least those that are asked for */
  readonly values: ArrayLike<number>;
  /** 0 for a spectrum */
  readonly y0: number;
}

/**
 * Whole numbers are a recording, with noise like the scan's; broken numbers are a mean of many, whose
 * noise is not known and reckoned as none.
 */
export function hasRecordedNoise(values: ArrayLike<number>): boolean {
  for (let i = 0; i < values.length; i++) {
    if (Number.isFinite(values[i]) && !Number.isInteger(values[i])) return false;
  }
  return true;
}

/** @throws RimlightError 'recipe' - when it is neither a spectrum of the scan's channels nor a cube of its shape */
export function assertReferenceShape(
  { name, shape }: RecordedReference,
  { shape: { ny, nx, nk } }: Pick<Grid, 'shape'>,
  place: StepPlace,
): 'spectrum' | 'cube' {
  const squeezed = shape.filter((length, axis) => length !== 1 || axis === shape.length - 1);
  if (squeezed.length === 1 && squeezed[0] === nk) {
    // A scan of one pixel has a cube that is a spectrum.
    return 'spectrum';
  }
  if (shape.length === 3 && shape[0] === ny && shape[1] === nx && shape[2] === nk) return 'cube';
  const found = shape.join(' × ');
  if (squeezed.length === 1) {
    throw stepError(
      place,
      `${name} has ${squeezed[0]} channels, and the scan has ${nk}`,
      `Give a spectrum of ${nk} channels, recorded with the same grating and detector settings.`,
    );
  }
  throw stepError(
    place,
    `${name} is ${found}, and the scan is ${ny} × ${nx} × ${nk} (rows, columns, channels)`,
    'Give a cube of the same shape as the scan, or one spectrum of its channels.',
  );
}

/** What is taken from each row of a slab, and the noise it brings. */
export interface Taken {
  readonly values: Subtrahend;
  readonly variances: ConditionedArray | null;
}

/** The recording where a slab lies; a cube must hold its rows. */
export function takenAt(reference: ReferenceRecording, slab: ConditionedSlab): Taken {
  if (reference.kind === 'spectrum') {
    const { counts, variances } = reference.rows;
    return {
      values: { kind: 'channel', values: Float64Array.from(counts) },
      variances: variances === null ? null : Float64Array.from(variances),
    };
  }
  const rows = rowsOf(reference.rows, slab.y0, slab.y0 + slab.shape.ny);
  return { values: { kind: 'pixel', values: rows.counts }, variances: rows.variances };
}
