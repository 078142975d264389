/** Pixels worth pinning: the best one by some merit. */
import type { ScanShape } from '../scan';
import type { Landmark } from './plan';

/**
 * The pixel of highest merit, the first of equals; the outermost sixteenth of the field is left out, so that a pin
 * has surroundings.
 *
 * @param merit - of pixel i = y · nx + x
 */
export function bestPixel(
  label: string,
  { ny, nx }: ScanShape,
  merit: (i: number) => number,
): Landmark {
  const [marginY, marginX] = [Math.floor(ny / 16), Math.floor(nx / 16)];
  let best: Landmark = { label, y: marginY, x: marginX };
  let highest = -Infinity;
  for (let y = marginY; y < ny - marginY; y++) {
    for (let x = marginX; x < nx - marginX; x++) {
      const value = merit(y * nx + x);
      if (value <= highest) continue;
      highest = value;
      best = { label, y, x };
    }
  }
  return best;
}
