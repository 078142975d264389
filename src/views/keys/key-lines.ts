/** The table of keys as it is read: by group, one line for each thing a key does. */
import { type HeldKey, type KeyGroup, keyBindings, keyInWords, keysInPlace } from './key-bindings';

export interface KeyLine {
  /** each a way to do it: "Ctrl+Shift+Z", "Ctrl+Y" */
  readonly keys: readonly string[];
  readonly words: string;
}

export interface KeyLines {
  readonly group: KeyGroup;
  readonly lines: readonly KeyLine[];
}

const groups: readonly KeyGroup[] = ['Document', 'Maps', 'Spectrum', 'Screen'];

/** Keys that do the same stand on one line. */
export function keyLines(held: HeldKey): readonly KeyLines[] {
  const all = [
    ...keyBindings.map((binding) => ({ ...binding, keys: keyInWords(binding, held) })),
    ...keysInPlace,
  ];
  return groups.map((group) => {
    const own = all.filter((line) => line.group === group);
    const distinct = [...new Set(own.map(({ words }) => words))];
    const keysFor = (wanted: string): readonly string[] =>
      own.filter(({ words }) => words === wanted).map(({ keys }) => keys);
    return { group, lines: distinct.map((words) => ({ keys: keysFor(words), words })) };
  });
}

/** @param platform - as navigator.platform has it */
export function heldKeyOn(platform: string): HeldKey {
  return /^(mac|iphone|ipad)/i.test(platform) ? 'Cmd' : 'Ctrl';
}
