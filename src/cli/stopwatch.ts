/** How long the stages of a run took. */
export class Stopwatch {
  #lapStart = performance.now();
  readonly #laps = new Map<string, number>();

  /** Ends a stage, which began where the one before ended. */
  lap(stage: string): void {
    const now = performance.now();
    this.#laps.set(stage, (now - this.#lapStart) / 1000);
    this.#lapStart = now;
  }

  /** Seconds of each stage, to the millisecond. */
  laps(): Readonly<Record<string, number>> {
    return Object.fromEntries(
      [...this.#laps].map(([stage, seconds]) => [stage, Number(seconds.toFixed(3))]),
    );
  }
}
