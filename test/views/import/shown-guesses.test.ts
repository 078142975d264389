import { describe, expect, it } from 'vitest';
import { RimlightError } from '../../../src/errors';
import type { Guess, GuessField, Inspection } from '../../../src/io/scan-plan';
import {
  alternativeInWords,
  answerInWords,
  capitalised,
  evidenceInWords,
  hindranceInWords,
} from '../../../src/views/import/guess-words';
import { shownGuesses } from '../../../src/views/import/shown-guesses';

const guess = (field: GuessField, source: Guess['source'], label = 'x'): Guess => ({
  field,
  label,
  source,
  evidence: 'its name',
  alternatives: [],
});

const inspection = (guesses: readonly Guess[]): Inspection => ({
  fileName: 'scan.npy',
  format: 'npy',
  guesses,
  problems: [new RimlightError('scan', { what: 'no axis', where: 'scan.npy', hint: 'Give one.' })],
  warnings: [],
  plan: null,
});

const fields = (guesses: readonly Guess[]): readonly GuessField[] =>
  guesses.map(({ field }) => field);

describe('the rows of the import sheet', () => {
  const stuck = inspection([
    guess('data', 'file'),
    guess('axis', 'missing'),
    guess('laser', 'absent'),
    guess('pixel', 'absent', '–'),
  ]);

  it('begin with what is needed', () => {
    const { guesses, missing } = shownGuesses(stuck);
    expect(fields(guesses)).toEqual(['axis', 'data', 'laser']);
    expect(missing).toEqual(['axis']);
  });

  it('leave a row that was asked for in its place once it is answered', () => {
    const answered = inspection([guess('data', 'file'), guess('axis', 'stated')]);
    expect(fields(shownGuesses(answered, ['axis']).guesses)).toEqual(['axis', 'data']);
  });

  it('leave out what does not apply', () => {
    expect(fields(shownGuesses(stuck).guesses)).not.toContain('pixel');
  });

  it('are none before the file has been looked at', () => {
    expect(shownGuesses(null)).toEqual({ guesses: [], missing: [] });
  });

  it('are summed up as what keeps the scan from being opened', () => {
    expect(hindranceInWords(stuck)).toBe('Needed: spectral axis');
    expect(hindranceInWords(inspection([guess('data', 'file')]))).toMatch(/cannot be opened/);
    expect(hindranceInWords(null)).toBe('');
  });
});

describe('the words of the import sheet', () => {
  it('can be answered on the sheet, an axis also by a file', () => {
    expect(answerInWords(['laser'])).toBe('State it here.');
    expect(answerInWords(['axis', 'laser'])).toContain('file');
    expect(answerInWords([])).toBe('');
  });

  it('say where a guess comes from, but not twice', () => {
    expect(evidenceInWords(guess('axis', 'guess'))).toBe('guessed: its name');
    const stated = { ...guess('axis', 'stated'), evidence: 'stated by the recipe' };
    expect(evidenceInWords(stated)).toBe('as stated');
  });

  it('say of what it could be instead why, or what that would change', () => {
    const other = { label: 'xyk', evidence: 'rows and columns exchanged', choice: {} };
    expect(alternativeInWords(other)).toBe('xyk: rows and columns exchanged');
    expect(alternativeInWords({ ...other, evidence: '' })).toBe('xyk');
  });

  it('begin with a capital, but for the name of a file', () => {
    expect(capitalised('no axis was found')).toBe('No axis was found');
    expect(capitalised('axis.csv is left out')).toBe('axis.csv is left out');
    expect(capitalised('/scan/x is not evenly spaced')).toBe('/scan/x is not evenly spaced');
  });
});
