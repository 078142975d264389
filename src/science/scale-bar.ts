/** The scale bar of a map: a round length that fits. */
import { formatLength } from './format';
import type { PositionAxis } from './scan';

export interface ScaleBar {
  readonly lengthNm: number;
  /** share of the width shown, above 0 and at most `mostShare` */
  readonly share: number;
  /** "500 nm", "2 µm" */
  readonly label: string;
}

/** A bar is at most so much of the width; since round lengths step by 2.5 at most, at least 0.16 of it. */
export const mostShare = 0.4;

/**
 * The longest bar of 1, 2 or 5 times a power of ten nm that takes at most `mostShare` of the width.
 *
 * @param axis - along the width
 * @param pixelsAcross - pixels of the map across the width shown; need not be whole
 * @returns null where the pitch is unknown or is no length
 */
export function planScaleBar(axis: PositionAxis, pixelsAcross: number): ScaleBar | null {
  const widthNm = axis.pitch * pixelsAcross;
  if (!axis.isLength || !(widthNm > 0) || !Number.isFinite(widthNm)) return null;
  const lengthNm = roundLengthBelow(mostShare * widthNm);
  return { lengthNm, share: lengthNm / widthNm, label: formatLength(lengthNm) };
}

/** The largest of 1, 2, 5 times a power of ten that is not above a positive length. */
function roundLengthBelow(length: number): number {
  const exponent = Number(length.toExponential().split('e')[1]);
  // Written as text, so that 5 × 10⁻³ is the double nearest to it.
  const [longest = 0] = [`5e${exponent}`, `2e${exponent}`, `1e${exponent}`]
    .map(Number)
    .filter((candidate) => candidate <= length);
  return longest;
}
