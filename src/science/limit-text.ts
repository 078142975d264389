/** The two ends of a colour scale as text, with as many digits as tell them apart. */
import type { Limits } from './colour/transfer';
import { formatCount, formatEnergy, formatSignificant, noValue, withUnit } from './format';

export interface LimitText {
  /** without unit */
  readonly low: string;
  readonly high: string;
  /** the high one with its unit */
  readonly highWithUnit: string;
}

/**
 * Both limits to about a hundredth of their distance: "1.893" and "1.952 eV", "210" and "12k counts".
 *
 * @param unit - of a map: "counts", "eV", "nm", …
 */
export function formatLimits({ low, high }: Limits, unit: string): LimitText {
  const written = (value: number): string => formatLimit(value, Math.abs(high - low), unit);
  return { low: written(low), high: written(high), highWithUnit: withUnit(written(high), unit) };
}

/** One value on a scale of this span, without its unit. */
export function formatLimit(value: number, span: number, unit: string): string {
  if (Number.isNaN(value)) return noValue;
  if (unit === 'counts' && Math.abs(value) >= 1000 && span >= 0.1 * Math.abs(value)) {
    return formatCount(value);
  }
  if (!(span > 0) || !Number.isFinite(span)) return formatSignificant(value, 5);
  if (unit === 'eV') return formatEnergy(value, span / 20).replace(/ eV$/, '');
  return formatSignificant(value, digitsFor(value, span));
}

/** Significant digits so that the last one stands for at most a hundredth of the span; 2 to 9. */
function digitsFor(value: number, span: number): number {
  const exponentOf = (x: number): number => Number(x.toExponential(0).split('e')[1]);
  if (value === 0) return 2;
  const digits = exponentOf(Math.abs(value)) - exponentOf(span / 100) + 1;
  return Math.min(Math.max(digits, 2), 9);
}
