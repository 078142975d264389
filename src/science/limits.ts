/** Ends of a colour scale as they are asked for, a number or a percentile of the map, turned into numbers. */
import type { Limits } from './colour/transfer';
import { quantiles } from './statistics/quantile';

/** A number in the map's unit, or a percentile of the map: "p99.5". */
export type LimitSpec = number | `p${number}`;

/** The number in "p99.5"; null for a limit that is a number already. */
export function percentOf(limit: LimitSpec): number | null {
  return typeof limit === 'number' ? null : Number(limit.slice(1));
}

/**
 * Both limits in the unit of the values.
 *
 * NaN values are left out of percentiles; without any value percentiles are NaN.
 *
 * @param values - of the map, in any order
 */
export function resolveLimits(values: Float64Array, low: LimitSpec, high: LimitSpec): Limits {
  const lowPercent = percentOf(low);
  const highPercent = percentOf(high);
  if (lowPercent === null && highPercent === null) return { low: Number(low), high: Number(high) };
  const shares = [(lowPercent ?? 0) / 100, (highPercent ?? 100) / 100];
  const [lowest, highest] = quantiles(values, shares);
  return {
    low: lowPercent === null ? Number(low) : lowest,
    high: highPercent === null ? Number(high) : highest,
  };
}
