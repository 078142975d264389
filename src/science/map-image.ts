/** A map as a picture: each value's colour from a table, by limits and a transfer curve. */
import { type Limits, planTransfer, type Transfer } from './colour/transfer';

export interface MapImageRequest {
  /** (ny, nx), C order; NaN where there is no value */
  readonly values: Float64Array;
  /** (n, 3) red, green, blue of each entry, low to high */
  readonly table: Uint8Array;
  readonly limits: Limits;
  readonly transfer: Transfer;
}

/**
 * Red, green, blue, opacity of each pixel; transparent where there is no value.
 *
 * Values beyond the limits get the colour of the nearer one. Limits that are NaN (a map without
 * values) make all transparent.
 *
 * @returns (ny, nx, 4)
 */
export function mapImage({ values, table, limits, transfer }: MapImageRequest): Uint8ClampedArray {
  const { shareOf } = planTransfer(transfer, limits);
  const last = table.length / 3 - 1;
  const picture = new Uint8ClampedArray(4 * values.length);
  for (let i = 0; i < values.length; i++) {
    const share = shareOf(values[i]);
    if (Number.isNaN(share)) continue;
    const from = 3 * Math.round(share * last);
    const to = 4 * i;
    picture[to] = table[from];
    picture[to + 1] = table[from + 1];
    picture[to + 2] = table[from + 2];
    picture[to + 3] = 255;
  }
  return picture;
}
