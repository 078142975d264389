/**
 * Diverging colour scales, built as two straight lines in OKLab from a neutral centre: equal
 * distances from zero look equally strong on either side, and orange against blue stays told apart
 * without red-green vision.
 */
import type { Oklab } from './oklab';
import { linearFromOklab } from './oklab';
import { bytesFromLinear } from './srgb';

export type DivergingName = 'blue-orange' | 'blue-orange-dark';

interface Arms {
  readonly centre: Oklab;
  /** below zero, as far as the farther limit */
  readonly below: Oklab;
  /** above zero; same lightness and chroma as `below` */
  readonly above: Oklab;
}

/** `blue-orange` has a pale centre, for print; `blue-orange-dark` a dark one, in which zero recedes on a dark screen. */
export const divergingArms: Readonly<Record<DivergingName, Arms>> = {
  'blue-orange': {
    centre: { lightness: 0.97, a: 0, b: 0 },
    below: { lightness: 0.42, a: -0.0261, b: -0.1048 },
    above: { lightness: 0.42, a: 0.0665, b: 0.0851 },
  },
  'blue-orange-dark': {
    centre: { lightness: 0.2, a: 0, b: 0 },
    below: { lightness: 0.8, a: -0.055, b: -0.0953 },
    above: { lightness: 0.8, a: 0.0465, b: 0.0997 },
  },
};

const entries = 256;

export function isDivergingName(name: string): name is DivergingName {
  return Object.hasOwn(divergingArms, name);
}

/**
 * A diverging table with its neutral colour at zero, wherever zero lies between the limits.
 *
 * The limit farther from zero gets the full colour of its arm; the nearer one only as much as its
 * distance deserves, so that the table has one slope everywhere.
 *
 * @param zeroShare - (zero − low) / (high − low); outside 0 to 1 only one arm is used; not finite: taken as 0.5
 * @returns (256 × 3)
 */
export function divergingTable(name: DivergingName, zeroShare: number): Uint8Array {
  const { centre, below, above } = divergingArms[name];
  const zero = Number.isFinite(zeroShare) ? zeroShare : 0.5;
  const reach = Math.max(Math.abs(zero), Math.abs(1 - zero));
  const table = new Uint8Array(3 * entries);
  for (let i = 0; i < entries; i++) {
    const distance = (i / (entries - 1) - zero) / reach;
    const colour = between(centre, distance < 0 ? below : above, Math.abs(distance));
    table.set(bytesFromLinear(linearFromOklab(colour)), 3 * i);
  }
  return table;
}

function between(from: Oklab, to: Oklab, share: number): Oklab {
  return {
    lightness: from.lightness + share * (to.lightness - from.lightness),
    a: from.a + share * (to.a - from.a),
    b: from.b + share * (to.b - from.b),
  };
}
