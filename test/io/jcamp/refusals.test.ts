/** JCAMP-DX files that contradict themselves, are damaged, or hold no spectrum. */
import { describe, expect, it } from 'vitest';
import { errorSentence } from '../../../src/errors';
import { memorySource } from '../../../src/io/byte-source';
import { jcampReader } from '../../../src/io/jcamp/jcamp-reader';
import { expectScanError, outcomeOf } from '../check-reader';
import { spySource } from '../spy-source';
import { fileOf, open, refusal } from './four-points';

describe('a file is refused', () => {
  it.each<[string, readonly string[], string]>([
    [
      'with peaks only',
      fileOf({}, ['100, 1'], '##PEAK TABLE= (XY..XY)'),
      'the file holds a table of peaks, not a spectrum',
    ],
    ['with several variables', fileOf({}, ['1'], '##NTUPLES= NMR'), 'a table of several variables'],
    ['without a table', fileOf().slice(0, 13), 'the file holds no table of a spectrum'],
    [
      'with an unknown form',
      fileOf({}, ['1 2 3'], '##XYDATA= (X++(R..R))'),
      'a table of the form (X++(R..R)) is not read',
    ],
    ['with an empty table', fileOf({}, []), 'the table holds no points'],
    [
      'with fewer points than promised',
      fileOf({ NPOINTS: 6, LASTX: 110 }),
      '##NPOINTS= says 6, and the table has 4 points',
    ],
    [
      'with a line missing',
      fileOf({ NPOINTS: 6, LASTX: 110 }, ['100 1 2', '108 5 6']),
      '##NPOINTS= says 6, and the table has 4 points',
    ],
    [
      'with a line that begins elsewhere',
      fileOf({}, ['100 1 2', '108 3 4']),
      'the line begins at 108, and its first value is point 3, which lies at 104',
    ],
    [
      'with a wrong check',
      fileOf({}, ['100A J', '102C J', '104D']),
      'the line begins with the check value 3, and the differences before it lead to 2',
    ],
    [
      'cut off',
      fileOf({ NPOINTS: 6, LASTX: 110 }).slice(0, -1),
      'no ##END=, so the file was cut off',
    ],
    [
      'with words in the table',
      fileOf({}, ['100 1 2', '104 three']),
      '“three” is no part of a JCAMP-DX table',
    ],
  ])('%s', async (_, lines, what) => {
    expect(errorSentence(await refusal(lines))).toContain(what);
  });

  it('empty, or of bytes', async () => {
    for (const bytes of [new Uint8Array(0), Uint8Array.from([0x23, 0x23, 0, 1, 2])]) {
      const { error } = await outcomeOf(() => jcampReader.open(memorySource('a.jdx', bytes)));
      expectScanError(error);
    }
  });

  it('and let go of; an opened one when it is closed', async () => {
    const bytes = new TextEncoder().encode(fileOf().join('\n'));
    const good = spySource('a.jdx', bytes);
    (await jcampReader.open(good)).close();
    expect(good.seen.closed).toBe(1);
    const bad = spySource('a.jdx', bytes.slice(0, 100));
    await outcomeOf(() => jcampReader.open(bad));
    expect(bad.seen.closed).toBe(1);
  });

  it('when it is stopped', async () => {
    const signal = AbortSignal.abort();
    const source = memorySource('a.jdx', new TextEncoder().encode(fileOf().join('\n')));
    await expect(jcampReader.open(source, { signal })).rejects.toMatchObject({ kind: 'cancelled' });
  });
});

describe('hostile tables', () => {
  const size = 1 << 20;
  it.each([
    ['squeezed digits', `100${'A'.repeat(size)}`],
    ['digits', `100 ${'1'.repeat(size)}`],
    ['blanks', `100${' '.repeat(size)}x`],
    ['repeats', `100A${'s999'.repeat(size / 4)}`],
    ['points', '1'.padEnd(size, '.')],
    ['labels', '##A=1\n'.repeat(size / 6)],
    ['nested blocks', '##TITLE= a\n'.repeat(size / 11)],
  ])('are done with soon: %s', async (_, table) => {
    const started = performance.now();
    const { error } = await outcomeOf(() => open(fileOf({}, [table])));
    if (error !== null) expectScanError(error);
    expect(performance.now() - started).toBeLessThan(10_000);
  });
});
