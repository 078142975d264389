/**
 * Transfer curves between a map's values and its colour scale: which share of the scale, 0 to 1, a
 * value gets, and back for the colour bar's marks.
 */
import { exp, log } from '../numeric/elementary';

/**
 * `linear`; `sqrt`: square root of the share between the limits (evens out shot noise); `log`:
 * logarithm of the value, over three decades where the low limit is not above zero.
 */
export type Transfer = 'linear' | 'sqrt' | 'log';

/** Ends of a colour scale in the map's unit. `low` may lie above `high`: the scale is then turned round. */
export interface Limits {
  readonly low: number;
  readonly high: number;
}

export interface TransferCurve {
  /** Share of the scale, 0 to 1, clipped; NaN for NaN. Where the limits are equal: 0 up to them, 1 above. */
  shareOf(value: number): number;
  /** Value at a share of the scale; the inverse of `shareOf` between the limits. */
  valueAt(share: number): number;
}

/** Where low ≤ 0 < high, a logarithmic scale starts at this part of high. */
const logFloor = 1e-3;

/**
 * The curve of one transfer between two limits.
 *
 * A logarithm needs values above zero: where one limit is not, the scale starts at a thousandth of
 * the other; where neither is, it is linear.
 */
export function planTransfer(transfer: Transfer, limits: Limits): TransferCurve {
  const { low, high } = limits;
  if (!(low !== high)) return stepAt(low);
  if (transfer === 'log' && Math.max(low, high) > 0) {
    const floor = logFloor * Math.max(low, high);
    return logarithmic(low > 0 ? low : floor, high > 0 ? high : floor);
  }
  const span = high - low;
  const isRoot = transfer === 'sqrt';
  return {
    shareOf(value) {
      const share = clip((value - low) / span);
      return isRoot ? Math.sqrt(share) : share;
    },
    valueAt: (share) => low + span * (isRoot ? share * share : share),
  };
}

function logarithmic(low: number, high: number): TransferCurve {
  const logLow = log(low);
  const span = log(high) - logLow;
  const least = Math.min(low, high);
  return {
    shareOf: (value) => clip((log(Math.max(value, least)) - logLow) / span),
    valueAt: (share) => exp(logLow + share * span),
  };
}

function stepAt(edge: number): TransferCurve {
  return {
    shareOf: (value) => (Number.isNaN(value) ? Number.NaN : value > edge ? 1 : 0),
    valueAt: () => edge,
  };
}

/** Into 0 to 1; NaN stays NaN. */
function clip(share: number): number {
  return share < 0 ? 0 : Math.min(share, 1);
}
