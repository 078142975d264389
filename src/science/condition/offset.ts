/** What the detector shows without light, taken off: a number, a dark spectrum or a dark cube. */
import { type ConditionedSlab, subtracted } from './conditioned';
import { type ReferenceRecording, takenAt } from './reference-recording';
import { type StepPlace, stepError } from './step-errors';

/**
 * Subtracts the same number of counts from every channel. The variance stays: the offset is the
 * electronics', and shot and read noise were in the counts before.
 *
 * @param counts - counts as they now are
 */
export function subtractOffset(slab: ConditionedSlab, counts: number): ConditionedSlab {
  const values = new Float64Array(slab.shape.nk).fill(counts);
  return subtracted(slab, { kind: 'channel', values });
}

/**
 * Subtracts a dark recording, pixel by pixel where it is a cube; its own variance, where it has one, is
 * added. A dark spectrum's noise is shared by all pixels: each one's error is right, their mean's is not.
 */
export function subtractDark(slab: ConditionedSlab, dark: ReferenceRecording): ConditionedSlab {
  const { values, variances } = takenAt(dark, slab);
  return subtracted(slab, values, variances);
}

/** @throws RimlightError 'recipe' - when it is not a number of counts */
export function assertOffset(counts: number, place: StepPlace): void {
  if (Number.isFinite(counts)) return;
  throw stepError(
    place,
    `an offset of ${counts} counts cannot be subtracted`,
    'Give a number of counts.',
  );
}
