/** What the user states of a scan file, laid over what was stated before. */
import type { AxisChoice, HeightChoice, ScanChoices } from '../io/scan-choices';

/**
 * Choices with the newly stated ones laid over them, field by field. What a new choice makes stale
 * goes: another cube its old axis order, another source of the axis or another kind the old unit and
 * kind, another height map its unit. Unchanged choices are shared.
 */
export function mergeScanChoices(before: ScanChoices, stated: ScanChoices): ScanChoices {
  const { order, ...orderless } = before;
  const isOtherCube = stated.data !== undefined && stated.data !== before.data;
  const kept = isOtherCube || order === undefined ? orderless : before;
  return {
    ...kept,
    ...stated,
    ...(stated.axis === undefined ? {} : { axis: mergedAxis(before.axis ?? {}, stated.axis) }),
    ...(stated.detector === undefined
      ? {}
      : { detector: { ...before.detector, ...stated.detector } }),
    ...(stated.height === undefined
      ? {}
      : { height: mergedHeight(before.height ?? {}, stated.height) }),
  };
}

function mergedAxis(before: AxisChoice, stated: AxisChoice): AxisChoice {
  const { kind, unit, medium, ...source } = before;
  const statesSource = ['data', 'values', 'file', 'from', 'to'].some((field) => field in stated);
  const isOtherSource = statesSource && !isSameSource(source, stated);
  if (isOtherSource) return { ...(medium === undefined ? {} : { medium }), ...stated };
  const isOtherKind = stated.kind !== undefined && stated.kind !== kind;
  return {
    ...source,
    ...(kind === undefined ? {} : { kind }),
    ...(unit === undefined || isOtherKind ? {} : { unit }),
    ...(medium === undefined ? {} : { medium }),
    ...stated,
  };
}

function isSameSource(before: AxisChoice, stated: AxisChoice): boolean {
  return (
    before.data === stated.data &&
    before.values === stated.values &&
    before.file === stated.file &&
    before.from === stated.from &&
    before.to === stated.to
  );
}

function mergedHeight(before: HeightChoice, stated: HeightChoice): HeightChoice {
  const { data, file, unit, shift_px } = before;
  const statesSource = stated.data !== undefined || stated.file !== undefined;
  const shift = shift_px === undefined ? {} : { shift_px };
  if (statesSource && (stated.data !== data || stated.file !== file))
    return { ...shift, ...stated };
  return {
    ...(data === undefined ? {} : { data }),
    ...(file === undefined ? {} : { file }),
    ...(unit === undefined ? {} : { unit }),
    ...shift,
    ...stated,
  };
}
