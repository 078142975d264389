import { describe, expect, it } from 'vitest';
import { dropInWords } from '../../../src/views/drop/drop-words';

describe('files that hover over the page', () => {
  it('are asked for as a scan or a recipe', () => {
    expect(dropInWords(null)).toMatch(/scan.*recipe/);
  });

  it('join the scan whose sheet is open, as they do when dropped', () => {
    const words = dropInWords('map.npy');
    expect(words).toContain('map.npy');
    expect(words).not.toContain('recipe');
  });
});
