/** One line that tells how far a long call is and how long it will take; on a terminal only. */
import type { Context } from './command';

const millisecondsBetween = 100;

/**
 * @param label - "Reading tent-field.h5"
 * @returns to be told the share done, 0 to 1; shows it at most ten times a second
 */
export function startProgress(context: Context, label: string): (share: number) => void {
  const { progressLine } = context;
  if (progressLine === null) return () => {};
  const startedAt = performance.now();
  let shownAt = Number.NEGATIVE_INFINITY;
  return (share) => {
    const now = performance.now();
    if (now - shownAt < millisecondsBetween && share < 1) return;
    shownAt = now;
    progressLine(`${label}: ${Math.floor(share * 100)} %${timeLeft(now - startedAt, share)}`);
  };
}

/** Nothing in the first second, when any guess would be wild. */
function timeLeft(elapsedMs: number, share: number): string {
  if (elapsedMs < 1000 || share <= 0 || share >= 1) return '';
  const seconds = Math.ceil((elapsedMs * (1 - share)) / share / 1000);
  return seconds < 120 ? `, ${seconds} s left` : `, ${Math.ceil(seconds / 60)} min left`;
}
