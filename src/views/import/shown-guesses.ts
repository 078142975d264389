/** Which guesses the import sheet shows, and in which order. */
import type { Guess, GuessField, Inspection } from '../../io/scan-plan';

interface Shown {
  readonly guesses: readonly Guess[];
  /** what has to be stated before the scan can be opened */
  readonly missing: readonly GuessField[];
}

/**
 * Rows that are needed, or were when the sheet opened, come first: beside the sentence that asks for
 * them. What does not apply to this scan (the pitch or the height map of one spectrum) is no question.
 */
export function shownGuesses(
  inspection: Inspection | null,
  asked: readonly GuessField[] = [],
): Shown {
  if (inspection === null) return { guesses: [], missing: [] };
  const shape = inspection.plan?.meta.shape ?? null;
  const isOneSpectrum = shape !== null && shape.nx * shape.ny === 1;
  const applying = inspection.guesses.filter(
    ({ field, label, source }) =>
      label !== '–' && !(isOneSpectrum && field === 'height' && source === 'absent'),
  );
  const isAsked = ({ field, source }: Guess): boolean =>
    source === 'missing' || asked.includes(field);
  return {
    guesses: [...applying.filter(isAsked), ...applying.filter((guess) => !isAsked(guess))],
    missing: applying.filter(({ source }) => source === 'missing').map(({ field }) => field),
  };
}
