/** How a fit went, in a few lines. */

/** Words of the values of fit.status, in the order of the contract. */
const statusWords = [
  'not fitted',
  'converged',
  'with a parameter at its bound',
  'not converged',
  'too dim',
] as const;

/** "4096 px converged", "12 px too dim"; what does not occur is left out, what is good comes first. */
export function statusesInWords(statuses: Float64Array): readonly string[] {
  const counts = statusWords.map(() => 0);
  for (const status of statuses) {
    const index = Number.isInteger(status) ? status : 0;
    counts[index] = (counts[index] ?? 0) + 1;
  }
  return [1, 2, 3, 4, 0]
    .filter((status) => (counts[status] ?? 0) > 0)
    .map((status) => `${counts[status]} px ${statusWords[status]}`);
}
