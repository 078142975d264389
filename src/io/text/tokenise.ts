/** Lines as rows of cells. Everything up to here is text; what a cell means is decided in cell.ts. */
import Papa from 'papaparse';
import type { DecimalMark } from './cell';

/** ' ' stands for runs of spaces and tabs. */
export type Delimiter = '\t' | ';' | ',' | ' ';

export interface Dialect {
  readonly delimiter: Delimiter;
  readonly mark: DecimalMark;
}

/** Comment lines; "#N/A" is a cell without a value. A semicolon begins one where it separates nothing. */
export function isComment(line: string, delimiter: Delimiter): boolean {
  return commentOf(delimiter).test(line);
}

const commentLine = /^[ \t]*(?:#(?!N\/A)|%|\/\/)/i;
const commentOrSemicolonLine = /^[ \t]*(?:#(?!N\/A)|%|\/\/|;)/i;

function commentOf(delimiter: Delimiter): RegExp {
  return delimiter === ';' ? commentLine : commentOrSemicolonLine;
}

/** One line as cells, as they stand; quotes taken off. */
export function splitCells(line: string, delimiter: Delimiter): string[] {
  if (!line.includes('"')) return delimiter === ' ' ? splitAtSpaces(line) : line.split(delimiter);
  return parsed(delimiter === ' ' ? tabbed(line) : line, delimiter).data[0] ?? [];
}

function splitAtSpaces(line: string): string[] {
  const trimmed = line.trim();
  return trimmed === '' ? [] : trimmed.split(/[ \t]+/);
}

export interface TokenisedLines {
  /** cells of each line in turn; a blank or comment line has one empty cell */
  readonly rows: readonly string[][];
  /** line each row begins in, counted from the first line of the text as 0; null where row i is line i */
  readonly lines: Int32Array | null;
  /** row with a quoted cell that never closes; -1 without one */
  readonly unclosed: number;
}

/** @param text - whole lines, ended by \n */
export function tokenise(text: string, delimiter: Delimiter): TokenisedLines {
  const plain = withoutComments(text, delimiter);
  const { data, errors } = parsed(delimiter === ' ' ? tabbed(plain) : plain, delimiter);
  const unclosed = errors.find(({ code }) => code === 'MissingQuotes')?.row ?? -1;
  return { rows: data, lines: plain.includes('"') ? linesOfRows(data) : null, unclosed };
}

function parsed(text: string, delimiter: Delimiter): Papa.ParseResult<string[]> {
  return Papa.parse<string[]>(text, {
    delimiter: delimiter === ' ' ? '\t' : delimiter,
    newline: '\n',
    // Papa sets its own quick way by the first lines of a file; here every text is short.
    fastMode: !text.includes('"'),
  });
}

/** Comment lines emptied, so that a quotation mark in one opens no cell. */
function withoutComments(text: string, delimiter: Delimiter): string {
  const hasAny = /[#%]|\/\//.test(text) || (delimiter !== ';' && text.includes(';'));
  if (!hasAny) return text;
  const pattern = commentOf(delimiter);
  return text
    .split('\n')
    .map((line) => (pattern.test(line) ? '' : line))
    .join('\n');
}

/** Runs of spaces as single tabs, outside quotes. */
function tabbed(text: string): string {
  const runs = text.includes('"')
    ? text.replace(/"(?:[^"\n]|"")*"|[ \t]+/g, (part) => (part.startsWith('"') ? part : '\t'))
    : text.replace(/[ \t]+/g, '\t');
  return runs.replace(/^\t|\t$/gm, '');
}

/** Cells between quotes may hold line ends. */
function linesOfRows(rows: readonly string[][]): Int32Array {
  const lines = new Int32Array(rows.length);
  let line = 0;
  rows.forEach((row, i) => {
    lines[i] = line++;
    for (const cell of row) {
      for (let at = cell.indexOf('\n'); at >= 0; at = cell.indexOf('\n', at + 1)) line++;
    }
  });
  return lines;
}
