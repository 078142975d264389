/** What holds for every reader, on a small file of each layout. */
import { describe, expect, it } from 'vitest';
import { checkBlob, checkBlocks, checkRenamed, contentsOfCase } from '../check-reader';
import { textSamples } from '../text-samples';

describe.each(textSamples)('$name', (file) => {
  it('reads', async () => {
    const { entries } = await contentsOfCase(file);
    expect(entries.length).toBeGreaterThan(0);
  });

  it('is known by its content, whatever it is called', async () => {
    await checkRenamed(file);
  });

  it('reads the same from a Blob', async () => {
    await checkBlob(file);
  });

  it('reads the same in blocks', async () => {
    await checkBlocks(file);
  });
});
