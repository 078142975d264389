/** The progress of parallel parts as one share that only rises, and ends at 1. */

export interface CombinedProgress {
  /** The reporter of one part. */
  part(index: number): (share: number) => void;
  /** Everything is done; later reports of parts are ignored. */
  finish(): void;
  /** Nothing more is reported. */
  drop(): void;
}

/** @param weights - of each part's work */
export function combineProgress(
  weights: readonly number[],
  onProgress: ((share: number) => void) | undefined,
): CombinedProgress {
  const total = weights.reduce((sum, weight) => sum + weight, 0);
  const shares = weights.map(() => 0);
  let reported = -1;
  let isOver = onProgress === undefined;
  const report = (share: number): void => {
    if (isOver || share <= reported) return;
    reported = share;
    onProgress?.(share);
  };
  return {
    part: (index) => (share) => {
      // A part that is made again after a crash starts from 0: the whole waits until it has caught up.
      shares[index] = share;
      const done = shares.reduce((sum, one, at) => sum + one * weights[at], 0);
      report(Math.min(1, done / total));
    },
    finish: () => {
      report(1);
      isOver = true;
    },
    drop: () => {
      isOver = true;
    },
  };
}
