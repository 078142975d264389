/** The cube that is measured: 256 × 256 pixels of 1024 channels of 16-bit counts, the same in every run. */
import { createRandom } from '../../src/science/numeric/random';
import type { ScanShape } from '../../src/science/scan';

export const cubeShape: ScanShape = { ny: 256, nx: 256, nk: 1024 };

/** Vacuum wavelengths of the outermost channels, nm: energies are then not evenly spaced. */
export const wavelengths = { from: 580, to: 700 };

/**
 * A bright peak and a faint one on a background, each pixel's a little shifted, with noise as strong
 * as that of counts.
 *
 * @param rows - how many of the cube's rows to make
 */
export function syntheticCounts(rows = cubeShape.ny): Uint16Array {
  const { nx, nk } = cubeShape;
  const counts = new Uint16Array(rows * nx * nk);
  const random = createRandom(20240607);
  const shape = Float64Array.from({ length: 2 * nk }, (_, k) => {
    const bright = (k - 0.9 * nk) / 60;
    const faint = (k - 1.3 * nk) / 25;
    return 120 + 2400 / (1 + bright * bright) + 300 / (1 + faint * faint);
  });
  const sigma = shape.map(Math.sqrt);
  let at = 0;
  for (let pixel = 0; pixel < rows * nx; pixel++) {
    const shift = (nk >> 2) + (random.uint32() & 63);
    for (let k = 0; k < nk; k++) {
      // Two dice make noise with the right width, if not the right shape.
      const word = random.uint32();
      const dice = ((word >>> 16) + (word & 0xffff) - 65535) / 26755;
      counts[at++] = Math.max(0, Math.round(shape[k + shift] + dice * sigma[k + shift]));
    }
  }
  return counts;
}
