/** How long a run still takes, in words. */

/**
 * "0.4 s left", "3 min left"; "" until enough is done to tell.
 *
 * @param share - part done, 0 to 1
 * @param elapsedMs - time since its start
 */
export function timeLeft(share: number, elapsedMs: number): string {
  if (!(share > 0.02) || share >= 1) return '';
  const seconds = (elapsedMs * (1 - share)) / share / 1000;
  if (seconds < 9.95) return `${seconds.toFixed(1)} s left`;
  return seconds < 99.5 ? `${seconds.toFixed(0)} s left` : `${(seconds / 60).toFixed(0)} min left`;
}
