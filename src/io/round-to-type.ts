/** Single values as a person wrote them: 594.1 kept as float32 is 594.0999755859375 as a double. */
import type { ElementType } from './container';

/** The number with the fewest digits that is the same in the type it was stored in. */
export function roundedToType(value: number, type: ElementType): number {
  if (type !== 'float32' || !Number.isFinite(value)) return value;
  for (let digits = 1; digits < 9; digits++) {
    const shorter = Number(value.toPrecision(digits));
    if (Math.fround(shorter) === value) return shorter;
  }
  return value;
}
