/** A band: an interval of photon energy with its floor, and the quantities that can be asked of it. */

/** `ends`: a straight line under the band, between its ends, is subtracted; `none`: nothing is. */
export type BandFloor = 'none' | 'ends';

/** A recipe band after its unit was converted; fromEv < toEv. */
export interface EnergyBand {
  readonly fromEv: number;
  readonly toEv: number;
  readonly floor: BandFloor;
}

/** The last part of a derived map's name: band.NAME.integral … band.NAME.peak_at */
export type BandQuantity = 'integral' | 'centroid' | 'median' | 'spread' | 'peak' | 'peak_at';

export const bandQuantities: readonly BandQuantity[] = [
  'integral',
  'centroid',
  'median',
  'spread',
  'peak',
  'peak_at',
];
