/** The first part of a text file: enough lines to see how it is written. */

import { throwIfAborted } from '../../errors';
import { readExactly } from '../byte-source';
import type { ByteSource, ReadOptions } from '../container';
import { scanError } from '../scan-error';
import { bytesOfText, decodeText, encodingOf, endOfLastLine, isBinary } from './encoding';
import type { HeadLine } from './facts';
import { endlessLine, longestLineBytes, type TextFile } from './pieces';

export interface Head {
  readonly file: TextFile;
  /** without blank lines */
  readonly lines: readonly HeadLine[];
  /** byte of the file at which a line begins */
  byteOf(line: HeadLine): number;
}

/** Lines above a table seldom take more; at least a few lines are seen even where they are long. */
const headBytes = 128 << 10;
const fewLines = 5;

/** @throws RimlightError 'scan' - when the file is empty, no text, or of one endless line */
export async function readHead(source: ByteSource, { signal }: ReadOptions): Promise<Head> {
  const { name, size } = source;
  if (size === 0) {
    throw scanError('the file is empty', name, 'Check that it was copied or saved completely.');
  }
  for (let reach = headBytes; ; reach *= 4) {
    throwIfAborted(signal, `reading ${name}`);
    const end = Math.min(reach, size);
    const head = headOf(source, await readExactly(source, 0, end), end === size);
    if (end === size || (head !== null && head.lines.length >= fewLines)) {
      if (head !== null && head.lines.length > 0) return head;
      throw scanError(
        'the file holds blank lines only',
        name,
        'Check that it was saved completely.',
      );
    }
    if (reach >= longestLineBytes) throw endlessLine(name);
  }
}

/** @returns null when the bytes hold no whole line */
function headOf(source: ByteSource, bytes: Uint8Array, isWhole: boolean): Head | null {
  const { encoding, markBytes } = encodingOf(bytes);
  const content = bytes.subarray(markBytes);
  const feeds = endOfLastLine(content, encoding, '\n');
  const lineEnd = feeds === 0 ? '\r' : '\n';
  const end = isWhole ? content.length : feeds || endOfLastLine(content, encoding, '\r');
  if (end === 0) return null;
  const text = decodeText(content.subarray(0, end), encoding);
  if (isBinary(text)) {
    throw scanError(
      'the file is not text: it holds bytes that no text has',
      source.name,
      'Give it the ending of its own format, or export it as text again.',
    );
  }
  return {
    file: { source, encoding, lineEnd },
    lines: linesOf(text),
    byteOf: ({ start }) => markBytes + bytesOfText(text.slice(0, start), encoding),
  };
}

/** A heading between quotes may run over several lines: they count as one here. */
const quotedOverLines = /(^|[,;\t\n\r])"(?:[^"]|""){0,200}"(?=[ ]*(?:[,;\t\n\r]|$))/g;

function linesOf(text: string): readonly HeadLine[] {
  // A vertical tab stands for each line end inside quotes, so that no character moves.
  const joined = text.includes('"')
    ? text.replace(
        quotedOverLines,
        (part, before: string) =>
          before +
          part
            .slice(before.length)
            .replace(/\r\n/g, '\v ')
            .replace(/[\r\n]/g, '\v'),
      )
    : text;
  const lines: HeadLine[] = [];
  let number = 1;
  for (const match of joined.matchAll(/([^\r\n]*)(\r\n|\r|\n|$)/g)) {
    const line = match[1];
    if (line.trim() !== '' && line !== '\u001a') {
      lines.push({ text: line, start: match.index, number });
    }
    number += 1 + (line.match(/\v/g)?.length ?? 0);
  }
  return lines;
}
