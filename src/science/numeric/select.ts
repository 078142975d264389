/** The middle of unsorted numbers, without sorting them. */

/**
 * Median of the first `length` numbers; the mean of the middle two where there is an even number. Changes
 * their order. NaN for none; numbers must not be NaN.
 */
export function medianInPlace(values: Float64Array, length = values.length): number {
  if (length === 0) return Number.NaN;
  const middle = length >> 1;
  const upper = selectInPlace(values, length, middle);
  if (length % 2 === 1) return upper;
  // What was put before the middle is no greater than it: the other middle one is the greatest there.
  let lower = Number.NEGATIVE_INFINITY;
  for (let i = 0; i < middle; i++) if (values[i] > lower) lower = values[i];
  return lower + (upper - lower) / 2;
}

/**
 * The number that would stand at `rank` were the first `length` sorted; those before it are then no
 * greater, those after it no less.
 *
 * @see C. A. R. Hoare, Algorithm 65: find, Commun. ACM 4, 321 (1961); pivot the median of three
 */
export function selectInPlace(values: Float64Array, length: number, rank: number): number {
  let low = 0;
  let high = length - 1;
  while (low < high) {
    const pivot = medianOfThree(values[low], values[(low + high) >> 1], values[high]);
    let i = low;
    let j = high;
    while (i <= j) {
      while (values[i] < pivot) i++;
      while (values[j] > pivot) j--;
      if (i > j) break;
      const swapped = values[i];
      values[i] = values[j];
      values[j] = swapped;
      i++;
      j--;
    }
    if (rank <= j) high = j;
    else if (rank >= i) low = i;
    else break;
  }
  return values[rank];
}

function medianOfThree(a: number, b: number, c: number): number {
  return Math.max(Math.min(a, b), Math.min(Math.max(a, b), c));
}
