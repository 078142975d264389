/** The words of the import sheet: what each guess is about, where it comes from, what is still needed. */
import type { Alternative, Guess, GuessField, Inspection } from '../../io/scan-plan';
import { shownGuesses } from './shown-guesses';

export const fieldWords: Readonly<Record<GuessField, string>> = {
  data: 'Spectra',
  order: 'Order of axes',
  axis: 'Spectral axis',
  kind: 'Kind of axis',
  unit: 'Unit of axis',
  medium: 'Medium',
  laser: 'Laser',
  pixel: 'Pixel pitch',
  height: 'Height map',
  serpentine: 'Rows',
  exposure: 'Exposure',
  noise: 'Noise',
};

export const sourceWords: Readonly<Record<Guess['source'], string>> = {
  stated: 'stated',
  file: 'from the file',
  guess: 'guessed',
  missing: 'needed',
  absent: 'not known',
};

/**
 * Evidence as a sentence beside its source; the evidence of what is stated says so by itself. On the sheet
 * it is as a rule the user who stated it, by whom the recipe is not yet seen as one.
 */
export function evidenceInWords({ source, evidence }: Guess): string {
  if (source === 'stated') return evidence.replace(/^stated by the recipe/, 'as stated');
  return `${sourceWords[source]}: ${evidence}`;
}

/** "xyk: rows and columns exchanged" */
export function alternativeInWords({ label, evidence }: Alternative): string {
  return evidence === '' ? label : `${label}: ${evidence}`;
}

/** Why a scan cannot be opened yet: "Needed: spectral axis, laser"; "" when it can. */
export function hindranceInWords(inspection: Inspection | null): string {
  if (inspection === null || inspection.plan !== null) return '';
  const { missing } = shownGuesses(inspection);
  if (missing.length === 0) return 'It cannot be opened as it is: see above.';
  return `Needed: ${missing.map((field) => fieldWords[field].toLowerCase()).join(', ')}`;
}

/** What the user can do about what is needed; "" where no field of the sheet asks for it. */
export function answerInWords(missing: readonly GuessField[]): string {
  if (missing.length === 0) return '';
  return missing.includes('axis')
    ? 'State it here, or add a file that holds it.'
    : 'State it here.';
}

/** A sentence begins with a capital, but a file's name or path is left as it is. */
export function capitalised(text: string): string {
  const [word = ''] = text.split(' ', 1);
  return /[./_]/.test(word) ? text : text.replace(/^./, (first) => first.toUpperCase());
}
