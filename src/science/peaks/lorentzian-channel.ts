/** What integrals of Lorentzian lines over a channel are made of; series where the channel is a small part. */
import { atan2, log } from '../numeric/elementary';

/** Below it the series' next term is under 2e-17. */
const small = 0.05;

/** The angle whose tangent is across/along, 0 … π for across ≥ 0: as atan2, within 4e-16. */
export function angleOf(across: number, along: number): number {
  const t = across / along;
  if (!(t >= 0 && t < small && along > 0)) return atan2(across, along);
  const s = t * t;
  return t * (1 - s * (1 / 3 - s * (1 / 5 - s * (1 / 7 - s * (1 / 9 - s * (1 / 11))))));
}

/**
 * ln(high/low), within 4e-16.
 *
 * @param difference - high − low, without the rounding of that difference
 */
export function logOfRatio(low: number, high: number, difference: number): number {
  const r = difference / (low + high);
  if (!(r > -small && r < small)) return log(high / low);
  const s = r * r;
  return 2 * r * (1 + s * (1 / 3 + s * (1 / 5 + s * (1 / 7 + s * (1 / 9 + s * (1 / 11))))));
}
