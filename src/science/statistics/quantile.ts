/** Quantiles of a map's values, quick enough to be asked for on every move of a band. */
import { log } from '../numeric/elementary';

/**
 * Quantiles by linear interpolation between order statistics.
 *
 * NaN values are left out; NaN where nothing is left. Takes time in proportion to the number of
 * values: they are not sorted, only parted around the ranks asked for.
 *
 * @param values - in any order; not changed
 * @param shares - each 0 to 1, in any order
 * @returns one for each share, in the unit of the values
 * @see R. J. Hyndman and Y. Fan, Am. Stat. 50, 361 (1996), definition 7
 */
export function quantiles(values: Float64Array, shares: readonly number[]): number[] {
  const kept = withoutNaN(values);
  const found = new Array<number>(shares.length).fill(Number.NaN);
  if (kept.length === 0) return found;
  const ascending = shares.map((_, index) => index).sort((a, b) => shares[a] - shares[b]);
  // What lies left of the last rank found is not larger, so later ranks need not look there.
  let left = 0;
  for (const index of ascending) {
    const position = Math.min(Math.max(shares[index], 0), 1) * (kept.length - 1);
    const rank = Math.floor(position);
    placeRank(kept, left, kept.length - 1, rank);
    left = rank;
    found[index] = between(kept, rank, position - rank);
  }
  return found;
}

function withoutNaN(values: Float64Array): Float64Array {
  const kept = new Float64Array(values.length);
  let count = 0;
  for (let i = 0; i < values.length; i++) {
    const value = values[i];
    kept[count] = value;
    if (!Number.isNaN(value)) count++;
  }
  return kept.subarray(0, count);
}

/** Between the value at `rank`, which stands in its place, and the least of those behind it. */
function between(kept: Float64Array, rank: number, share: number): number {
  const lower = kept[rank];
  if (share === 0) return lower;
  let upper = kept[rank + 1];
  for (let i = rank + 2; i < kept.length; i++) if (kept[i] < upper) upper = kept[i];
  if (upper === lower) return lower;
  // From the nearer end, so that rounding never leads beyond either.
  const span = upper - lower;
  return share < 0.5 ? lower + share * span : upper - (1 - share) * span;
}

/**
 * Moves values of left … right about until the one of this rank stands in its place, nothing larger
 * before it and nothing smaller behind.
 *
 * @see C. A. R. Hoare, Commun. ACM 4, 321 (1961), algorithm 65; D. R. Musser, Softw. Pract. Exp. 27,
 *   983 (1997) for sorting what resists being parted
 */
function placeRank(kept: Float64Array, left: number, right: number, rank: number): void {
  let passesLeft = 2 * (log(right - left + 1) / Math.LN2 + 4);
  while (left < right) {
    if (passesLeft-- < 0) {
      kept.subarray(left, right + 1).sort();
      return;
    }
    const pivot = middleOf(kept[left], kept[(left + right) >>> 1], kept[right]);
    let i = left;
    let j = right;
    while (i <= j) {
      while (kept[i] < pivot) i++;
      while (kept[j] > pivot) j--;
      if (i > j) break;
      const swapped = kept[i];
      kept[i++] = kept[j];
      kept[j--] = swapped;
    }
    if (rank <= j) right = j;
    else if (rank >= i) left = i;
    else return;
  }
}

function middleOf(a: number, b: number, c: number): number {
  return Math.max(Math.min(a, b), Math.min(Math.max(a, b), c));
}
