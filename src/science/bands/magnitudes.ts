/** By how much the kept sums of a pixel can be off: by rounding of all that was added, from the axis' start to its end. */
import type { BlockSums } from './block-sums';
import type { SlabData } from './slab-data';

/**
 * What remains of a difference of kept sums is trusted where it is at least this part of them, 2⁻¹⁷:
 * their rounding, about 2⁻⁵², is then below 3e-11 of it.
 */
export const trusted = 1 / 131072;

export class Magnitudes {
  /** Σ |c|, of the slab's pixels */
  readonly counts: Float64Array | Uint32Array;
  /** of the slab's pixels; Σ v is slope · this + constant */
  readonly variances: Float64Array | Uint32Array;
  readonly slope: number;
  readonly constant: number;

  constructor({ pixelScale, affine, tiled }: SlabData, { counts, variances }: BlockSums) {
    const last = counts.length - 1;
    this.counts = pixelScale ?? counts[last][0];
    this.variances = variances?.[last][0] ?? this.counts;
    this.slope = variances === null ? (affine?.slope ?? 0) : 1;
    this.constant = variances === null ? (affine?.constant ?? 0) * tiled.nk : 0;
  }
}
