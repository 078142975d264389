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

/**
 * A limit as typed: "p2", "2 %" or a number, with a point or comma; null for anything else.
 *
 * Percentiles are 0 to 100, kept to four decimals.
 */
export function parseLimit(text: string): LimitSpec | null {
  const plain = text.trim().replace('−', '-').replace(',', '.');
  const percent = /^(?:p\s*([\d.]+)|([\d.]+)\s*%)$/i.exec(plain);
  if (percent !== null) {
    const value = Number(Number(percent[1] ?? percent[2]).toFixed(4));
    return value >= 0 && value <= 100 ? `p${value}` : null;
  }
  const value = plain === '' ? Number.NaN : Number(plain);
  return Number.isFinite(value) ? value : null;
}

export interface LimitPair {
  readonly low: LimitSpec;
  readonly high: LimitSpec;
}

/** Percentiles of a scale are at least so far apart. */
const leastPercents = 0.1;

/**
 * The pair with its low limit below its high one: of two percentiles the one that was moved stops
 * before the other; numbers that cross are refused.
 *
 * @param values - of the map, to compare a number with a percentile; null where it is not known: then any such pair passes
 * @returns null where the pair is refused
 */
export function orderedLimits(
  { low, high }: LimitPair,
  moved: 'low' | 'high',
  values: Float64Array | null,
): LimitPair | null {
  const lowPercent = percentOf(low);
  const highPercent = percentOf(high);
  if (lowPercent !== null && highPercent !== null) {
    if (highPercent - lowPercent >= leastPercents) return { low, high };
    return moved === 'low'
      ? {
          low: percentile(highPercent - leastPercents),
          high: percentile(Math.max(highPercent, leastPercents)),
        }
      : {
          low: percentile(Math.min(lowPercent, 100 - leastPercents)),
          high: percentile(lowPercent + leastPercents),
        };
  }
  if (values === null && lowPercent !== highPercent) return { low, high };
  const limits = resolveLimits(values ?? new Float64Array(0), low, high);
  return limits.low >= limits.high ? null : { low, high };
}

function percentile(percent: number): LimitSpec {
  return `p${Number(Math.min(Math.max(percent, 0), 100).toFixed(4))}`;
}
