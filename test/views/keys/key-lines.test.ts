import { describe, expect, it } from 'vitest';
import { keyBindings, keysInPlace } from '../../../src/views/keys/key-bindings';
import { heldKeyOn, keyLines } from '../../../src/views/keys/key-lines';

describe('the sheet of keys', () => {
  it('lists every key of the table once', () => {
    const listed = keyLines('Ctrl').flatMap(({ lines }) => lines.flatMap(({ keys }) => keys));
    expect(listed).toHaveLength(keyBindings.length + keysInPlace.length);
  });

  it('puts keys that do the same on one line, under their group', () => {
    const document = keyLines('Ctrl').find(({ group }) => group === 'Document')?.lines ?? [];
    expect(document.find(({ words }) => words === 'Redo')?.keys).toEqual([
      'Ctrl+Shift+Z',
      'Ctrl+Y',
    ]);
    const words = keyLines('Ctrl').flatMap(({ lines }) => lines.map((line) => line.words));
    expect(new Set(words).size).toBe(words.length);
  });

  it('leaves no group empty', () => {
    for (const { lines } of keyLines('Ctrl')) expect(lines.length).toBeGreaterThan(0);
  });

  // navigator.platform as browsers give it; from memory.
  it.each([
    ['MacIntel', 'Cmd'],
    ['iPad', 'Cmd'],
    ['Linux x86_64', 'Ctrl'],
    ['Win32', 'Ctrl'],
    ['', 'Ctrl'],
  ] as const)('names the key held on %s', (platform, held) => {
    expect(heldKeyOn(platform)).toBe(held);
  });
});
