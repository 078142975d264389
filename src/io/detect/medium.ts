/** Whether wavelengths are those in air or in vacuum: stated, said by the file, told by two axes, or air by custom. */
import type { AxisKind, Medium } from '../../science/axis';
import type { ArrayEntry } from '../container';
import type { Guess } from '../scan-plan';
import type { Agreement } from './agreement';
import type { Saying } from './sayings';
import { entryWords, textAttribute } from './words';

/** What the axis or the file says of it; null when nothing does. */
export function mediumSaid(
  axis: ArrayEntry | null,
  sayings: readonly Saying[],
): { readonly value: Medium; readonly evidence: string } | null {
  if (axis !== null) {
    const stated = textAttribute(axis.attributes, 'medium');
    const inWords = mediumOf(stated ?? entryWords(axis));
    if (inWords !== null) {
      return {
        value: inWords,
        evidence: stated === null ? 'its name says so' : `medium = “${stated}”`,
      };
    }
  }
  for (const { words, text, of, shown } of sayings) {
    if (
      !/\bmedium\b/.test(words) ||
      (of !== '' && of !== '/' && axis?.path.startsWith(of) !== true)
    )
      continue;
    const value = mediumOf(text);
    if (value !== null) return { value, evidence: `the file states ${shown}` };
  }
  return null;
}

function mediumOf(text: string): Medium | null {
  const isVacuum = /\bvac(uum)?\b/i.test(text);
  const isAir = /\bair\b/i.test(text);
  if (isVacuum === isAir) return null;
  return isVacuum ? 'vacuum' : 'air';
}

/** Wavelengths in air or vacuum; also what a laser given in nm is read in. */
export function findMedium(
  kind: AxisKind | null,
  stated: Medium | undefined,
  agreement: Agreement,
  fileSays: { readonly value: Medium; readonly evidence: string } | null,
  isLaserInNm: boolean,
): { readonly medium: Medium; readonly guess: Guess } {
  const other = (medium: Medium): Medium => (medium === 'air' ? 'vacuum' : 'air');
  const answer = (medium: Medium, source: Guess['source'], evidence: string) => ({
    medium,
    guess: {
      field: 'medium' as const,
      label: medium,
      source,
      evidence,
      alternatives:
        source === 'absent'
          ? []
          : [
              {
                label: other(medium),
                evidence: 'moves a wavelength of 600 nm by 0.166 nm, its photon energy by 0.57 meV',
                choice: { axis: { medium: other(medium) } },
              },
            ],
    },
  });
  if (stated !== undefined) return answer(stated, 'stated', 'stated by the recipe');
  if (kind !== 'wavelength' && !isLaserInNm) {
    const { guess } = answer('air', 'absent', 'no wavelength is involved');
    return { medium: 'air', guess: { ...guess, label: '–' } };
  }
  if (fileSays !== null) return answer(fileSays.value, 'file', fileSays.evidence);
  if (agreement.medium !== null && kind === 'wavelength') {
    return answer(agreement.medium.value, 'file', agreement.medium.evidence);
  }
  const whose =
    kind === 'wavelength'
      ? 'spectrographs are usually calibrated'
      : 'lasers are usually named by their wavelength';
  return answer('air', 'guess', `not stated; ${whose} in air (common practice)`);
}
