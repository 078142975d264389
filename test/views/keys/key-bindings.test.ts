import { describe, expect, it } from 'vitest';
import {
  actionOf,
  type HeldKey,
  type KeyAction,
  type KeyPress,
  keyBindings,
  keyInWords,
} from '../../../src/views/keys/key-bindings';

const press = (key: string, held: Partial<KeyPress> = {}): KeyPress => ({
  key,
  ctrlKey: false,
  metaKey: false,
  altKey: false,
  shiftKey: false,
  ...held,
});

describe('a key press', () => {
  it.each([
    ['o', 'open'],
    ['p', 'pin'],
    ['Delete', 'deleteBand'],
    ['[', 'previousLeadMap'],
    [']', 'nextLeadMap'],
    ['0', 'fitMaps'],
    ['l', 'logCounts'],
    ['e', 'wholeAxis'],
    ['t', 'theme'],
    ['Backspace', 'deleteBand'],
    ['Escape', 'letGo'],
  ])('%s asks for %s', (key, action) => {
    expect(actionOf(press(key))).toBe(action);
  });

  it('with Ctrl or Cmd asks for the same', () => {
    for (const held of [{ ctrlKey: true }, { metaKey: true }]) {
      expect(actionOf(press('s', held))).toBe('save');
      expect(actionOf(press('z', held))).toBe('undo');
      expect(actionOf(press('Z', { ...held, shiftKey: true }))).toBe('redo');
      expect(actionOf(press('y', held))).toBe('redo');
    }
  });

  it('finds "?" with Shift and without, as keyboards have it', () => {
    expect(actionOf(press('?', { shiftKey: true }))).toBe('keys');
    expect(actionOf(press('?'))).toBe('keys');
  });

  it('leaves the browser its own', () => {
    expect(actionOf(press('o', { ctrlKey: true }))).toBeNull();
    expect(actionOf(press('p', { ctrlKey: true }))).toBeNull();
    expect(actionOf(press('t', { metaKey: true }))).toBeNull();
    expect(actionOf(press('0', { ctrlKey: true }))).toBeNull();
    expect(actionOf(press('s', { ctrlKey: true, shiftKey: true }))).toBeNull();
    expect(actionOf(press('o', { altKey: true }))).toBeNull();
    expect(actionOf(press('P', { shiftKey: true }))).toBeNull();
    expect(actionOf(press('x'))).toBeNull();
  });
});

describe('the table of keys', () => {
  const written = keyBindings.map((binding) => keyInWords(binding, 'Ctrl'));

  it('gives no key two meanings', () => {
    expect(new Set(written).size).toBe(written.length);
  });

  it('finds each of its own keys again', () => {
    for (const { key, withControl, withShift, action } of keyBindings) {
      expect(actionOf(press(key, { ctrlKey: withControl, shiftKey: withShift }))).toBe(action);
    }
  });

  it('writes keys as they are printed on them', () => {
    const keysOf = (wanted: KeyAction, held: HeldKey): readonly string[] =>
      keyBindings
        .filter(({ action }) => action === wanted)
        .map((binding) => keyInWords(binding, held));
    expect(keysOf('redo', 'Ctrl')).toEqual(['Ctrl+Shift+Z', 'Ctrl+Y']);
    expect(keysOf('save', 'Cmd')).toEqual(['Cmd+S']);
    expect(keysOf('deleteBand', 'Ctrl')).toEqual(['Delete', 'Backspace']);
    expect(keysOf('letGo', 'Ctrl')).toEqual(['Esc']);
  });
});
