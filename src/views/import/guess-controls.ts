/** Which controls a guess of the import sheet gets: a list of what else it could be, fields for numbers, its label. */
import type { ScanChoices } from '../../io/scan-choices';
import type { Guess } from '../../io/scan-plan';

export type NumberFields = 'laser' | 'pixel' | 'exposure' | 'axis' | 'detector';

export interface GuessControls {
  readonly hasList: boolean;
  /** fields for numbers, or null */
  readonly numbers: NumberFields | null;
  /** the guess as plain words: where neither a list nor the fields show it */
  readonly hasLabel: boolean;
}

/** @param known - what is stated, and what was found where it was not */
export function controlsOf(guess: Guess, known: ScanChoices): GuessControls {
  const hasList = guess.alternatives.length > 0;
  const numbers = numbersOf(guess, known);
  return { hasList, numbers, hasLabel: !hasList && numbers === null };
}

function numbersOf({ field, source }: Guess, known: ScanChoices): NumberFields | null {
  const isUnknown = source === 'missing' || source === 'absent';
  switch (field) {
    case 'laser':
      return isUnknown || known.laser !== undefined ? 'laser' : null;
    // A step found that is no length, such as one in volts, is not to be entered as one.
    case 'pixel':
      return isUnknown || known.pixel !== undefined ? 'pixel' : null;
    case 'exposure':
      return isUnknown || known.exposure_s !== undefined ? 'exposure' : null;
    // The ends of an even axis; one that stands in a file is chosen, not typed.
    case 'axis':
      return source === 'missing' || known.axis?.from !== undefined ? 'axis' : null;
    case 'noise':
      return known.detector === undefined ? null : 'detector';
    default:
      return null;
  }
}
