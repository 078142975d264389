/** Text that is no table of numbers, or a damaged one: one sentence saying what, where and what to do. */
import { describe, expect, it } from 'vitest';
import { errorSentence, isRimlightError, type RimlightError } from '../../../src/errors';
import { memorySource } from '../../../src/io/byte-source';
import { textReader } from '../../../src/io/text/text-reader';

async function refusal(content: string | Uint8Array, name = 'scan.csv'): Promise<RimlightError> {
  const bytes = typeof content === 'string' ? new TextEncoder().encode(content) : content;
  const error = await textReader.open(memorySource(name, bytes)).then(
    (file) => `opened: ${file.entries.map(({ path, shape }) => `${path} ${shape.join('×')}`)}`,
    (caught: unknown) => caught,
  );
  if (!isRimlightError(error)) throw new Error(`no refusal but ${String(error)}`);
  expect(error.kind).toBe('scan');
  expect(error.where).toContain(name);
  expect(error.hint).toMatch(/^[A-Z].*\.$/);
  expect(error.what).not.toMatch(/undefined|NaN\b.*NaN|\[object/);
  expect(errorSentence(error).split('\n')).toHaveLength(1);
  return error;
}

describe('text is refused', () => {
  it.each<[string, string, string, string]>([
    ['an empty file', '', 'the file is empty', 'scan.csv'],
    ['blank lines', ' \n\n\t\n', 'the file holds blank lines only', 'scan.csv'],
    ['words', 'This is\nall text\n', 'no row of numbers was found in 2 lines of text', 'scan.csv'],
    [
      'a header without rows',
      'x,y,600,601,602\n',
      'no row of numbers was found in 1 line of text',
      'scan.csv',
    ],
    [
      'names without rows',
      'wavelength,counts\n',
      'no row of numbers was found in 1 line of text',
      'scan.csv',
    ],
    [
      'a web page',
      '<!DOCTYPE html>\n<p>1,2</p>\n',
      'the file is a web page or XML, not a table of numbers',
      'scan.csv',
    ],
    ['a recipe', '{\n  "recipe": 1\n}\n', 'the file is JSON, not a table of numbers', 'scan.csv'],
    [
      'nothing but no data',
      'a,b\nNaN,NaN\nNaN,NaN\n',
      'no row holds a number: every value is missing',
      'scan.csv',
    ],
    [
      'channels without data',
      'x,y,600,601\n0,0,NaN,\n1,0,NaN,NA\n',
      'every value is missing: no channel of any row holds a number',
      'scan.csv',
    ],
    [
      'an axis without data',
      'nm,counts\n600,\n601,NaN\n',
      'every value is missing: no channel of any row holds a number',
      'scan.csv',
    ],
    [
      'long rows without data',
      'x,y,nm,counts\n0,0,600,\n0,0,601,\n',
      'every value is missing: no channel of any row holds a number',
      'scan.csv',
    ],
    [
      'a short row',
      'a,b,c\n1,2,3\n4,5\n6,7,8\n',
      'a row has 2 cells where the others have 3',
      'scan.csv: line 3',
    ],
    [
      'a short first row',
      'a,b,c\n1,2\n4,5,6\n6,7,8\n',
      'a row has 2 cells where the others have 3',
      'scan.csv: line 2',
    ],
    [
      'a long row',
      'a,b\n1,2\n3,4\n5,6,7\n',
      'a row has 3 cells where the others have 2',
      'scan.csv: line 4',
    ],
    [
      'a line after the table',
      'a,b\n1,2\n3,4\nend of file\n',
      'a row has 1 cell where the others have 2',
      'scan.csv: line 4',
    ],
    [
      'a row cut off',
      'a,b,c\n1,2,3\n4,5,6\n7,8',
      'the last row has 2 of 3 cells and no end of line, so the file was probably cut off',
      'scan.csv: line 4',
    ],
    [
      'a word among numbers',
      'a,b\n1,2\n3,4\n5,high\n7,8\n',
      '“high” is not a number',
      'scan.csv: line 4, b',
    ],
    [
      'two marks',
      'a;b\n1.5;2.5\n3.5;4,5\n',
      '“4,5” has a decimal comma where the other numbers have points',
      'scan.csv: line 3, b',
    ],
    [
      'two marks',
      'a;b\n1,5;2,5\n3,5;4.5\n2,5;1,5\n',
      '“4.5” has a decimal point where the other numbers have commas',
      'scan.csv: line 3, b',
    ],
    [
      'two separators',
      'a,b\n1,2\n3,4\n5;6\n',
      '“5;6” separates its columns in another way than the other lines',
      'scan.csv: line 4',
    ],
    [
      'two separators',
      'a,b,c\n1,2,3\n3,4,5\n5,6;7,8\n',
      '“6;7” separates its columns in another way than the other lines',
      'scan.csv: line 4, b',
    ],
    [
      'thousands separators',
      'a;b\n1;2.5\n2;1,234.5\n',
      'the number “1,234.5” has thousands separators',
      'scan.csv: line 3, b',
    ],
    [
      'thousands separators',
      'a;b\n600;1.234,5\n601;2.345,6\n',
      'the number “1.234,5” has thousands separators',
      'scan.csv',
    ],
    [
      'thousands separators',
      'a\tb\n600.5\t1,234,567\n601.5\t2,345,678\n',
      'the number “1,234,567” has thousands separators',
      'scan.csv',
    ],
    [
      'thousands separators',
      'a\tb\n600.5\t12 345\n601.5\t13 456\n',
      'the number “12 345” has thousands separators',
      'scan.csv: line 2',
    ],
    [
      'two rows at one place',
      'x,y,600,601\n0,0,1,2\n1,0,3,4\n\n0,0,5,6\n',
      'a second row is at x = 0, y = 0',
      'scan.csv: line 5',
    ],
    [
      'two heights at one place',
      'x,y,height,phase\n0,0,1,2\n1,0,3,4\n0,0,5,6\n',
      'a second row is at x = 0, y = 0',
      'scan.csv: line 4',
    ],
    [
      'a row without a place',
      'x,y,600,601\n0,0,1,2\n,0,3,4\n',
      'a row has no position: its x or y is missing',
      'scan.csv: line 3',
    ],
    [
      'an open quotation mark',
      'a,b\n1,2\n3,"4\n5,6\n7,8\n',
      'a quotation mark opens a cell that is never closed',
      'scan.csv: line 3',
    ],
  ])('%s', async (_, text, what, where) => {
    const error = await refusal(text);
    expect(error.what).toBe(what);
    expect(error.where).toBe(where);
  });

  it('a binary file with the ending of text', async () => {
    const png = Uint8Array.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a, 0, 0, 0, 13]);
    expect((await refusal(png)).what).toBe('the file is not text: it holds bytes that no text has');
  });

  it('text that turns to bytes, naming where', async () => {
    const text = `a,b\n${'1,2\n'.repeat(60_000)}`;
    const error = await refusal(`${text}\u0000\u0000\u0001`);
    expect(error.what).toMatch(/^the bytes from \d+ on are no text$/);
  });

  it('a table with a million columns', async () => {
    const line = `${'1,'.repeat(999_999)}1\n`;
    const error = await refusal(line.repeat(2));
    expect(error.what).toContain('1000000 columns');
    expect(error.where).toBe('scan.csv: line 1');
  });

  it('a line without end', async () => {
    const error = await refusal(new Uint8Array(40 << 20).fill(0x31));
    expect(error.what).toContain('a line is longer than 32 MB');
  });

  it('a line without end far down in the file', async () => {
    const head = new TextEncoder().encode('a,b\n1,2\n'.padEnd(200_000, '3,4\n'));
    const bytes = new Uint8Array((34 << 20) + head.length).fill(0x31);
    bytes.set(head);
    expect((await refusal(bytes)).what).toContain('a line is longer than 32 MB');
  });

  it('more rows than a spectrum can have', async () => {
    const bytes = new TextEncoder().encode(`a,b\n${'1,2\n'.repeat((4 << 20) + 1)}`);
    expect((await refusal(bytes)).what).toBe(
      'the table has more than 4194304 rows of 2 columns, which is no spectrum',
    );
  });
});
