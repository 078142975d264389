/** Every key of the program, once: what it is called, what it does, where it is listed. */

export type KeyAction =
  | 'open'
  | 'save'
  | 'undo'
  | 'redo'
  | 'pin'
  | 'deleteBand'
  | 'previousLeadMap'
  | 'nextLeadMap'
  | 'fitMaps'
  | 'logCounts'
  | 'wholeAxis'
  | 'theme'
  | 'letGo'
  | 'keys';

export type KeyGroup = 'Document' | 'Maps' | 'Spectrum' | 'Screen';

export interface KeyBinding {
  readonly action: KeyAction;
  /** as KeyboardEvent.key has it, lower case */
  readonly key: string;
  /** with Ctrl, or Cmd */
  readonly withControl: boolean;
  readonly withShift: boolean;
  readonly words: string;
  readonly group: KeyGroup;
}

const plain = (key: string, action: KeyAction, words: string, group: KeyGroup): KeyBinding => ({
  action,
  key,
  withControl: false,
  withShift: false,
  words,
  group,
});

const control = (key: string, action: KeyAction, words: string, withShift = false): KeyBinding => ({
  action,
  key,
  withControl: true,
  withShift,
  words,
  group: 'Document',
});

export const keyBindings: readonly KeyBinding[] = [
  plain('o', 'open', 'Open a scan or a recipe', 'Document'),
  control('s', 'save', 'Save the recipe'),
  control('z', 'undo', 'Undo'),
  control('z', 'redo', 'Redo', true),
  control('y', 'redo', 'Redo'),
  plain('p', 'pin', 'Pin the pixel under the crosshair, or let go of it', 'Maps'),
  plain('[', 'previousLeadMap', 'The map before as lead map', 'Maps'),
  plain(']', 'nextLeadMap', 'The next map as lead map', 'Maps'),
  plain('0', 'fitMaps', 'Fit the maps into their panes', 'Maps'),
  plain('l', 'logCounts', 'Counts on a logarithmic scale', 'Spectrum'),
  plain('e', 'wholeAxis', 'The whole energy axis', 'Spectrum'),
  plain('delete', 'deleteBand', 'Delete the selected band', 'Spectrum'),
  // What is called Delete on keyboards that have no other.
  plain('backspace', 'deleteBand', 'Delete the selected band', 'Spectrum'),
  plain('t', 'theme', 'Dark or light', 'Screen'),
  plain(
    'escape',
    'letGo',
    'Close a sheet; let go of the selected band and the crosshair',
    'Screen',
  ),
  plain('?', 'keys', 'This sheet', 'Screen'),
];

/** Keys that belong to what has the focus, listed beside the others. */
export const keysInPlace: readonly {
  readonly keys: string;
  readonly words: string;
  readonly group: KeyGroup;
}[] = [
  {
    keys: 'arrows',
    words: 'On a map: move the crosshair by a pixel; with Shift by ten',
    group: 'Maps',
  },
  {
    keys: 'Enter',
    words: 'On a map: pin the pixel under the crosshair, or let go of it',
    group: 'Maps',
  },
  { keys: '+ −', words: 'On a map: closer, or farther away', group: 'Maps' },
  {
    keys: '← →',
    words: 'On a band or its end: move it; with Shift ten times as far',
    group: 'Spectrum',
  },
];

/** The part of a keyboard event that decides. */
export interface KeyPress {
  readonly key: string;
  readonly ctrlKey: boolean;
  readonly metaKey: boolean;
  readonly altKey: boolean;
  readonly shiftKey: boolean;
}

/** The action a key press asks for; null when it asks for none. */
export function actionOf(press: KeyPress): KeyAction | null {
  if (press.altKey) return null;
  const key = press.key.toLowerCase();
  const withControl = press.ctrlKey || press.metaKey;
  const found = keyBindings.find(
    (binding) =>
      binding.key === key &&
      binding.withControl === withControl &&
      // "?" and "[" need Shift on some keyboards and not on others; letters with Shift are other keys.
      (binding.withShift === press.shiftKey || (!withControl && !/^[a-z]/.test(key))),
  );
  return found?.action ?? null;
}

/** The key that is held with letters: Cmd on a Mac, Ctrl elsewhere. Both work everywhere. */
export type HeldKey = 'Ctrl' | 'Cmd';

/** "Ctrl+Shift+Z", "P", "Delete" */
export function keyInWords({ key, withControl, withShift }: KeyBinding, held: HeldKey): string {
  const name = key === 'escape' ? 'Esc' : key.length === 1 ? key.toUpperCase() : capitalised(key);
  return [withControl ? held : '', withShift ? 'Shift' : '', name]
    .filter((part) => part !== '')
    .join('+');
}

function capitalised(word: string): string {
  return word.replace(/^./, (first) => first.toUpperCase());
}
