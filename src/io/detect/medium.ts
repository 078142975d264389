/** Whether the file itself says that its wavelengths are those in air or in vacuum. */
import type { Medium } from '../../science/axis';
import type { ArrayEntry } from '../container';
import type { Saying } from './sayings';
import { entryWords, textAttribute } from './words';

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
