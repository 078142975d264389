/** Gamma on its slider: equal steps double it, from a quarter to four. */

export function handOfGamma(gamma: number): number {
  return Math.min(Math.max(Math.log2(gamma), -2), 2);
}

/** To two decimals, which is as fine as an eye can tell. */
export function gammaOfHand(hand: number): number {
  return Number((2 ** hand).toFixed(2));
}
