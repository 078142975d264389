import { describe, expect, it } from 'vitest';
import {
  actionOf,
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
  it('gives no key two meanings', () => {
    const written = keyBindings.map(keyInWords);
    expect(new Set(written).size).toBe(written.length);
  });

  it('writes keys as they are printed on them', () => {
    const redo = keyBindings.filter(({ action }) => action === 'redo').map(keyInWords);
    expect(redo).toEqual(['Ctrl+Shift+Z', 'Ctrl+Y']);
    expect(keyBindings.filter(({ action }) => action === 'deleteBand').map(keyInWords)).toEqual([
      'Delete',
    ]);
  });
});
