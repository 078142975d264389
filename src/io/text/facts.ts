/** What free lines above a table state: "laser: 532 nm". */
import { cellNumber } from './cell';
import { type Delimiter, isComment, splitCells } from './tokenise';

/** A line of the head of the file. */
export interface HeadLine {
  readonly text: string;
  /** character of the decoded head it begins at */
  readonly start: number;
  /** counted from 1, as editors do */
  readonly number: number;
}

export type Facts = Readonly<Record<string, string | number>>;

const mostFacts = 500;

/** The text of a line; without its mark where it is a comment. */
export function contentOf(line: HeadLine, delimiter: Delimiter): string {
  if (!isComment(line.text, delimiter)) return line.text;
  return line.text.replace(/^[ \t]*(?:#+|%+|\/\/+|;+)[ \t]?/, '');
}

/** The first statement of each name. */
export function factsOf(lines: readonly HeadLine[], delimiter: Delimiter): Facts {
  const facts = new Map<string, string | number>();
  for (const line of lines) {
    const fact = factOf(contentOf(line, delimiter), delimiter);
    if (fact === null || facts.has(fact.key) || facts.size >= mostFacts) continue;
    facts.set(fact.key, fact.value);
  }
  return Object.fromEntries(facts);
}

export interface Fact {
  readonly key: string;
  readonly value: string | number;
  /** written with a colon or an equals sign, so no names of two columns */
  readonly isStatement: boolean;
}

/** "laser: 532 nm", "laser = 532 nm", or two cells "laser", "532 nm"; null for any other line. */
export function factOf(text: string, delimiter: Delimiter): Fact | null {
  const named = /^\s*([^:=,;\t]{1,80}?)\s*[:=]\s*(\S.*)$/.exec(text);
  const cells =
    named !== null || delimiter === ' ' ? [] : withoutEmptyEnd(splitCells(text, delimiter));
  const key = named?.[1] ?? (cells.length === 2 ? cells[0].trim().replace(/\s*[:=]$/, '') : '');
  const value = named?.[2] ?? cells[1]?.trim() ?? '';
  if (!/\p{L}/u.test(key) || key.length > 80 || value === '' || /^sep$/i.test(key)) return null;
  const shown = value.replace(/[\s,;]+$/, '').slice(0, 500);
  const number = /^[+-]?\d/.test(shown) ? cellNumber(shown, '.') : undefined;
  const isStatement = named !== null;
  return { key, value: number === undefined || Number.isNaN(number) ? shown : number, isStatement };
}

export function withoutEmptyEnd(cells: readonly string[]): readonly string[] {
  let end = cells.length;
  while (end > 0 && cells[end - 1].trim() === '') end--;
  return cells.slice(0, end);
}
