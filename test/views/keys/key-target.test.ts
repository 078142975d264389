import { describe, expect, it } from 'vitest';
import { takesText } from '../../../src/views/keys/key-target';

const on = (tagName: string, type?: string, isContentEditable = false) =>
  takesText({ tagName, isContentEditable, ...(type === undefined ? {} : { type }) });

describe('what has the focus', () => {
  it.each(['text', 'search', 'number', 'email', 'url', 'password', 'date'])(
    'keeps the keys typed into an input of type %s',
    (type) => expect(on('INPUT', type)).toBe(true),
  );

  it.each(['range', 'checkbox', 'radio', 'button', 'file', 'color'])(
    'leaves the keys to the screen where it is an input of type %s',
    (type) => expect(on('INPUT', type)).toBe(false),
  );

  it('keeps what is typed into longer texts and native lists', () => {
    expect(on('TEXTAREA')).toBe(true);
    expect(on('SELECT', 'select-one')).toBe(true);
    expect(on('P', undefined, true)).toBe(true);
  });

  it('leaves the keys to the screen on buttons and maps', () => {
    expect(on('BUTTON', 'button')).toBe(false);
    expect(on('CANVAS')).toBe(false);
  });
});
