/** Writes a picture as PNG. */
import { encode } from 'fast-png';
import { RimlightError } from '../../errors';

/**
 * @param rgba - red, green, blue and opacity of each pixel, 8 bits each, rows downwards, (height × width × 4)
 * @throws RimlightError 'fault' - when the size does not match
 */
export function encodePng(
  rgba: Uint8Array | Uint8ClampedArray,
  width: number,
  height: number,
): Uint8Array {
  if (rgba.length !== width * height * 4 || rgba.length === 0) {
    throw new RimlightError('fault', {
      what: `${rgba.length} bytes are not a picture of ${width} × ${height} pixels`,
      where: 'writing PNG',
      hint: 'Please report this.',
    });
  }
  return encode({ width, height, data: rgba, channels: 4, depth: 8 });
}
