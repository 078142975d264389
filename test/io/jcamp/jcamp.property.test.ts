/** Any series of whole numbers reads back equal from every form; a damaged table is never read as another. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { memorySource } from '../../../src/io/byte-source';
import { jcampReader } from '../../../src/io/jcamp/jcamp-reader';
import { outcomeOf } from '../check-reader';
import { type Form, type JcampFile, jcampText } from './write-jcamp';

const forms: readonly Form[] = ['AFFN', 'PAC', 'SQZ', 'DIF', 'DIFDUP'];

async function read(text: string): Promise<{ readonly x: number[]; readonly y: number[] }> {
  const file = await jcampReader.open(memorySource('a.jdx', new TextEncoder().encode(text)));
  const count = file.entries[0].shape;
  return {
    x: Array.from(await file.read('x', [0], count)),
    y: Array.from(await file.read('y', [0], count)),
  };
}

const file: fc.Arbitrary<JcampFile> = fc.record({
  form: fc.constantFrom(...forms),
  ordinates: fc.array(
    fc.oneof(fc.integer({ min: -3, max: 3 }), fc.integer({ min: -99_999, max: 99_999 })),
    { minLength: 1, maxLength: 120 },
  ),
  firstX: fc.integer({ min: -4000, max: 4000 }),
  step: fc.constantFrom(1, -1, 0.5, -2.25, 7),
  perLine: fc.integer({ min: 2, max: 20 }),
  xFactor: fc.constantFrom(1, 0.5, 0.0625),
  yFactor: fc.constantFrom(1, 0.5, 2 ** -20),
});

describe('a table', () => {
  it('reads back equal, whatever its form and factors', async () => {
    await fc.assert(
      fc.asyncProperty(file, async (one) => {
        const { x, y } = await read(jcampText(one));
        expect(y).toEqual(one.ordinates.map((value) => value * (one.yFactor ?? 1) + 0));
        expect(x).toHaveLength(y.length);
        x.forEach((value, i) => {
          expect(Math.abs(value - (one.firstX + i * one.step))).toBeLessThan(1e-9);
        });
      }),
      { numRuns: 300 },
    );
  });

  it('is refused where a line of differences is missing or one value of it is changed', async () => {
    const checked = file.filter(({ form, ordinates, perLine }) => {
      return (form === 'DIF' || form === 'DIFDUP') && ordinates.length > 2 * perLine;
    });
    await fc.assert(
      fc.asyncProperty(checked, fc.nat(), async (one, pick) => {
        const lines = jcampText(one).split('\n');
        const first = lines.indexOf('##XYDATA= (X++(Y..Y))') + 1;
        const last = lines.indexOf('##END=') - 1;
        const at = first + (pick % (last - first));
        const without = await outcomeOf(() => read(lines.toSpliced(at, 1).join('\n')));
        expect(without.error).toMatchObject({ kind: 'scan' });
        // One more in the last difference of a line: its next line does not begin with that.
        const changed = lines.with(at, `${lines[at]}J`);
        const outcome = await outcomeOf(() => read(changed.join('\n')));
        expect(outcome.error).toMatchObject({ kind: 'scan' });
      }),
      { numRuns: 200 },
    );
  });
});
