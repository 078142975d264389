/** The known names nearest to a mistyped one. */

/**
 * Known names in order of likeness, at most `most`: those sharing their last part or within a third
 * of their letters of the wanted one; all of them when none is near.
 */
export function nearestNames(
  wanted: string,
  known: readonly string[],
  most = 3,
): readonly string[] {
  const distances = known
    .map((name) => ({ name, distance: editDistance(wanted.toLowerCase(), name.toLowerCase()) }))
    .sort((a, b) => a.distance - b.distance);
  const limit = Math.max(2, Math.ceil(wanted.length / 3));
  const last = wanted.split('/').at(-1)?.toLowerCase();
  const near = distances.filter(
    ({ name, distance }) => distance <= limit || name.split('/').at(-1)?.toLowerCase() === last,
  );
  return (near.length > 0 ? near : distances).slice(0, most).map(({ name }) => name);
}

/** Levenshtein distance: letters to insert, delete or replace. */
function editDistance(a: string, b: string): number {
  let row = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const next = [i];
    for (let j = 1; j <= b.length; j++) {
      const replaced = row[j - 1] + (a[i - 1] === b[j - 1] ? 0 : 1);
      next.push(Math.min(row[j] + 1, next[j - 1] + 1, replaced));
    }
    row = next;
  }
  return row[b.length];
}
