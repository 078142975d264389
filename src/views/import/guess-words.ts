/** The words of the import sheet: what each guess is about, and where it comes from. */
import type { Guess, GuessField } from '../../io/scan-plan';

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

/** Evidence as a sentence beside its source; the evidence of what is stated says so by itself. */
export function evidenceInWords({ source, evidence }: Guess): string {
  return source === 'stated' ? evidence : `${sourceWords[source]}: ${evidence}`;
}
