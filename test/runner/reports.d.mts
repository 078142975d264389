export interface Tally {
  passed: number;
  failed: string[];
  notRun: string[];
}
export function emptyTally(): Tally;
export function addTally(total: Tally, tally: Tally): void;
export function readVitestReport(path: string, folder: string): Tally;
export function readPlaywrightReport(path: string): Tally;
