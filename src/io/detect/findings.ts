/** What one look at a file has to go on, and what it has found so far. */
import { isRimlightError, type RimlightError } from '../../errors';
import type { Container } from '../container';
import type { ScanChoices } from '../scan-choices';
import type { Companion, Guess, GuessField } from '../scan-plan';
import type { RoledVector } from './agreement';
import type { Saying } from './sayings';

/** What the file offers, read once. */
export interface Evidence {
  readonly container: Container;
  readonly companions: readonly Companion[];
  readonly choices: ScanChoices;
  readonly fileName: string;
  readonly vectors: readonly RoledVector[];
  readonly sayings: readonly Saying[];
}

/** Guesses, problems and warnings as they come up. */
export interface Findings {
  readonly guesses: Map<GuessField, Guess>;
  readonly problems: RimlightError[];
  readonly warnings: string[];
}

/** Runs one step; a problem the user can mend is listed, anything else is thrown on. */
export function attempt<T>(findings: Findings, step: () => T): T | null {
  try {
    return step();
  } catch (error) {
    if (!isRimlightError(error) || error.kind === 'fault' || error.kind === 'cancelled')
      throw error;
    findings.problems.push(error);
    return null;
  }
}

export function note(findings: Findings, guess: Guess): void {
  findings.guesses.set(guess.field, guess);
}

export function missingGuess(field: GuessField, evidence: string): Guess {
  return { field, label: 'unknown', source: 'missing', evidence, alternatives: [] };
}
