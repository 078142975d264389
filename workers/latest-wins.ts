/**
 * One task in flight, the newest waiting, the others dropped: for dragging and hovering, where only
 * the last position matters.
 */

export interface LatestWins {
  /**
   * Runs the task now, or after the one in flight; a task that was waiting is dropped.
   *
   * @param onError - told what the task rejects with
   */
  run(task: () => Promise<void>, onError: (error: unknown) => void): void;
  /** Drops the waiting task; the one in flight goes on. */
  clear(): void;
}

interface Waiting {
  readonly task: () => Promise<void>;
  readonly onError: (error: unknown) => void;
}

export function createLatestWins(): LatestWins {
  let isBusy = false;
  let waiting: Waiting | null = null;

  const start = async ({ task, onError }: Waiting): Promise<void> => {
    isBusy = true;
    try {
      await task();
    } catch (error) {
      onError(error);
    } finally {
      isBusy = false;
      const next = waiting;
      waiting = null;
      if (next !== null) void start(next);
    }
  };

  return {
    run(task, onError) {
      if (isBusy) waiting = { task, onError };
      else void start({ task, onError });
    },
    clear() {
      waiting = null;
    },
  };
}
