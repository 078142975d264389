/** The extent of a scan's maps, with their pixels in proportion to the pitch. */
import type { ScanMeta } from '../../science/scan';
import type { Field } from './camera';

/** Where pixels have no proportion of their own, a map is at most so many times longer one way than the other. */
const mostElongated = 4;

/**
 * Pixels keep the proportion of their pitch where both ways are lengths. A lone row or column has no
 * breadth, and a quantity such as a voltage no length: such maps are stretched until they can be seen.
 */
export function fieldOf({ shape, x, y }: ScanMeta): Field {
  const { nx, ny } = shape;
  const isArea = x.isLength && y.isLength && nx > 1 && ny > 1;
  const aspect = y.isLength === x.isLength && x.pitch > 0 && y.pitch > 0 ? y.pitch / x.pitch : 1;
  if (isArea) return { nx, ny, aspect };
  const elongation = (ny * aspect) / nx;
  const wanted = Math.min(Math.max(elongation, 1 / mostElongated), mostElongated);
  return { nx, ny, aspect: (aspect * wanted) / elongation };
}
