/**
 * Text damaged as text is: signs put in, taken out, exchanged; lines doubled, moved, glued. It reads or
 * is refused with one clear sentence, and no pattern takes long on hostile text.
 */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { memorySource } from '../../../src/io/byte-source';
import { textReader } from '../../../src/io/text/text-reader';
import { contentsOfCase, expectScanError, outcomeOf } from '../check-reader';
import { textSamples } from '../text-samples';

const sign = fc.constantFrom(
  ...',;\t \n\r"#%/:=.-+eEdDxyNaA0159µ\u00a0\v\u001a@JS?$()[]',
  '\r\n',
  '##',
  '$$',
  '""',
  'NaN',
  'inf',
  '1e999',
  '-',
  '999999999',
);

type Edit = {
  readonly at: number;
  readonly take: number;
  readonly put: readonly string[];
};

const edits = fc.array(
  fc.record({
    at: fc.double({ min: 0, max: 1, noNaN: true, maxExcluded: true }),
    take: fc.integer({ min: 0, max: 3 }),
    put: fc.array(sign, { maxLength: 3 }),
  }),
  { minLength: 1, maxLength: 5 },
);
const lineEdit = fc.record({
  kind: fc.constantFrom('double', 'move', 'glue', 'drop'),
  line: fc.nat(),
  to: fc.nat(),
});

function edited(text: string, list: readonly Edit[]): string {
  return list.reduce((now, { at, take, put }) => {
    const from = Math.floor(at * now.length);
    return now.slice(0, from) + put.join('') + now.slice(from + take);
  }, text);
}

function moved(text: string, { kind, line, to }: { kind: string; line: number; to: number }) {
  const lines = text.split('\n');
  const at = line % lines.length;
  const target = to % lines.length;
  if (kind === 'double') return lines.toSpliced(target, 0, lines[at]).join('\n');
  if (kind === 'drop') return lines.toSpliced(at, 1).join('\n');
  if (kind === 'glue') return lines.map((one, i) => (i === at ? one : `${one}\n`)).join('');
  return lines.toSpliced(at, 1).toSpliced(target, 0, lines[at]).join('\n');
}

describe.each(textSamples)('$name', ({ name, bytes, reader }) => {
  const isWide = bytes[0] === 0xff;
  const text = new TextDecoder(isWide ? 'utf-16le' : 'utf-8').decode(bytes);

  it('reads after any edit, or is refused with one clear sentence', async () => {
    const edit = fc.oneof(
      edits.map((list) => edited(text, list)),
      lineEdit.map((one) => moved(text, one)),
    );
    await fc.assert(
      fc.asyncProperty(edit, async (changed) => {
        const file = { name, bytes: new TextEncoder().encode(changed), reader };
        const { error } = await outcomeOf(() => contentsOfCase(file));
        if (error !== null) expectScanError(error);
      }),
      { numRuns: 500 },
    );
  });
});

describe('hostile text', () => {
  const size = 1 << 20;
  it.each([
    ['quotation marks', '"'.repeat(size)],
    ['quotation marks in cells', '"",'.repeat(size / 3)],
    ['opened quotation marks', ',"a\n'.repeat(size / 4)],
    ['blanks', `${' '.repeat(size)}1`],
    ['blanks and tabs', `1${' \t'.repeat(size / 2)}2\n`.repeat(3)],
    ['digits', '1'.repeat(size)],
    ['commas', ','.repeat(size)],
    ['comment marks', '#'.repeat(size)],
    ['lines of one sign', '-\n'.repeat(size / 2)],
    ['brackets', '('.repeat(size)],
    ['one heading without end', `${'x '.repeat(size / 4)}\n1 2\n3 4\n5 6\n`],
    ['names and equals signs', 'a=b '.repeat(size / 4)],
    ['groups of three digits', `${',123'.repeat(size / 8)};1\n`.repeat(2)],
    ['line ends', '\n'.repeat(size)],
    ['returns', '\r'.repeat(size)],
    ['vertical tabs', '\v'.repeat(size)],
    ['minus signs of print', '−'.repeat(size / 4)],
  ])('is done with soon: %s', async (_, text) => {
    const started = performance.now();
    const source = memorySource('a.csv', new TextEncoder().encode(text));
    const { error } = await outcomeOf(() => textReader.open(source));
    if (error !== null) expectScanError(error);
    expect(performance.now() - started).toBeLessThan(10_000);
  });
});
