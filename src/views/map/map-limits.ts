/** Limits of maps, worked out once for each map: the hung map, the blend and the lead pane ask for the same percentiles. */
import type { Limits } from '../../science/colour/transfer';
import { type LimitSpec, resolveLimits } from '../../science/limits';

const known = new WeakMap<Float64Array, Map<string, Limits>>();

/** @param values - of a map; never changed once made, as no map's are */
export function limitsOf(values: Float64Array, low: LimitSpec, high: LimitSpec): Limits {
  const ofMap = known.get(values) ?? new Map<string, Limits>();
  known.set(values, ofMap);
  const key = `${low} ${high}`;
  const limits = ofMap.get(key) ?? resolveLimits(values, low, high);
  ofMap.set(key, limits);
  return limits;
}
