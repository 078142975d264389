/**
 * How pins look, on maps and as lines of spectra: six colours that stay told apart with every kind of
 * colour vision, then the same six with a dashed and a dotted ring; the letter always stands beside.
 */
import { linearFromBytes, parseHexColour } from '../../science/colour/srgb';
import type { Theme } from '../../state/view-store';

/** Amber, sky, rose, lavender, moss, plum; at least 3 : 1 against the plot's ground of the theme. */
export const pinColours: Readonly<Record<Theme, readonly string[]>> = {
  dark: ['#f0b457', '#7fc8f8', '#e88fb4', '#ad74ff', '#3e6c1d', '#8a46a7'],
  light: ['#a06604', '#1777b8', '#ca488f', '#252fb1', '#604008', '#73176f'],
};

/** Lengths of dash and gap of the ring, px; empty for a whole ring. */
const rings: readonly (readonly number[])[] = [[], [5, 3], [2, 2]];

/** The colour of the pin of this name; the seventh has the first one's again. */
export function pinColour(name: string, theme: Theme = 'dark'): string {
  const colours = pinColours[theme];
  return colours[pinNumber(name) % colours.length] ?? '#f0b457';
}

/** Dashes of the ring: whole for A to F, dashed for G to L, dotted for M to R, then from the start. */
export function pinRing(name: string): readonly number[] {
  return rings[Math.floor(pinNumber(name) / pinColours.dark.length) % rings.length] ?? [];
}

/** A 0, B 1, … Z 25, AA 26, … */
function pinNumber(name: string): number {
  let number = 0;
  for (const letter of name) number = number * 26 + (letter.charCodeAt(0) - 64);
  return Math.max(number - 1, 0);
}

/** Whether a "#rrggbb" needs something light around it to stand out from any picture. */
export function isDark(colour: string): boolean {
  const [red, green, blue] = linearFromBytes(parseHexColour(colour));
  return 0.2126 * red + 0.7152 * green + 0.0722 * blue < 0.25;
}
