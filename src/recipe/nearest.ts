/** The known word nearest to one that was mistyped. */

/**
 * Number of single-letter insertions, deletions, replacements and swaps of neighbours between two
 * words, none of them editing the same place twice (optimal string alignment).
 *
 * @see F. J. Damerau, Commun. ACM 7, 171 (1964); the recursion of R. A. Wagner and M. J. Fischer,
 * J. ACM 21, 168 (1974) with a term for the swap
 */
export function editDistance(a: string, b: string): number {
  let beforeLast: number[] = [];
  let last = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const row = [i];
    for (let j = 1; j <= b.length; j++) {
      const isSame = a[i - 1] === b[j - 1];
      let least = Math.min(last[j] + 1, row[j - 1] + 1, last[j - 1] + (isSame ? 0 : 1));
      if (i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1]) {
        least = Math.min(least, beforeLast[j - 2] + 1);
      }
      row.push(least);
    }
    beforeLast = last;
    last = row;
  }
  return last[b.length];
}

/** Longer words are not compared: no field, word or map name comes near it. */
const longestCompared = 200;

/**
 * The candidate a word was most likely meant as, or null when none is near: capitals and `_`, `-`,
 * spaces count for nothing, a beginning of at least three letters counts as one letter and a half,
 * otherwise at most one letter in three may differ (one in words of up to five letters).
 */
export function nearestWord(word: unknown, candidates: readonly string[]): string | null {
  if (typeof word !== 'string' || word.length > longestCompared) return null;
  const given = simplified(word);
  let best: string | null = null;
  let bestDistance = Number.POSITIVE_INFINITY;
  for (const candidate of candidates) {
    const known = simplified(candidate);
    const isBeginning =
      given.length >= 3 &&
      known.length >= 3 &&
      (known.startsWith(given) || given.startsWith(known));
    const edits = editDistance(given, known);
    const distance = isBeginning ? Math.min(edits, 1.5) : edits;
    const most = isBeginning
      ? 1.5
      : Math.max(1, Math.floor(Math.max(given.length, known.length) / 3));
    if (distance <= most && distance < bestDistance && given !== '' && known !== '') {
      best = candidate;
      bestDistance = distance;
    }
  }
  return best;
}

function simplified(word: string): string {
  return word.toLowerCase().replace(/[_\s^-]/g, '');
}
