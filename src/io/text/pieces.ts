/** A text file as pieces of whole lines, so that a file of any size is never one string. */
import { throwIfAborted } from '../../errors';
import { readExactly } from '../byte-source';
import type { ByteSource, ReadOptions } from '../container';
import { scanError } from '../scan-error';
import { decodeText, endOfLastLine, type LineEnd, type TextEncoding } from './encoding';

export interface TextFile {
  readonly source: ByteSource;
  readonly encoding: TextEncoding;
  readonly lineEnd: LineEnd;
}

export interface Piece {
  /** bytes of the file */
  readonly from: number;
  readonly to: number;
  /** whole lines, ended by \n whatever the file ends them by */
  readonly text: string;
}

/** Small enough to stop soon, and for its cells to be gone before the garbage collector looks at them twice. */
const pieceBytes = 256 << 10;
/** A line of two hundred thousand numbers takes 4 MB; nothing that is a table has longer ones. */
export const longestLineBytes = 32 << 20;

/**
 * @param from - where a line begins
 * @param to - where a line ends
 * @throws RimlightError 'scan' - when the file cannot be read there, is no text, or has a line without end
 */
export async function* piecesOf(
  file: TextFile,
  from: number,
  to: number,
  { signal, onProgress }: ReadOptions = {},
): AsyncGenerator<Piece> {
  const { source, encoding, lineEnd } = file;
  let at = from;
  let reach = pieceBytes;
  while (at < to) {
    throwIfAborted(signal, `reading ${source.name}`);
    const end = Math.min(at + reach, to);
    const bytes = await readExactly(source, at, end);
    const whole = end === to ? bytes.length : endOfLastLine(bytes, encoding, lineEnd);
    if (whole === 0) {
      if (reach >= longestLineBytes) throw endlessLine(source.name);
      reach *= 2;
      continue;
    }
    yield { from: at, to: at + whole, text: textOf(bytes.subarray(0, whole), file, at) };
    at += whole;
    reach = pieceBytes;
    onProgress?.((at - from) / (to - from));
  }
}

function textOf(bytes: Uint8Array, { source, encoding }: TextFile, at: number): string {
  const text = decodeText(bytes, encoding);
  // The head was looked at sign by sign; here the zero bytes of binary data are enough, and quick to find.
  if (text.includes('\0')) {
    throw scanError(
      `the bytes from ${at} on are no text`,
      source.name,
      'The file is damaged or of another format: copy it again, or give it its own ending.',
    );
  }
  return withPlainLineEnds(text);
}

export function withPlainLineEnds(text: string): string {
  const plain = text.includes('\r') ? text.replace(/\r\n?/g, '\n') : text;
  // Old DOS programs close a file with Ctrl-Z.
  return plain.endsWith('\u001a') ? plain.slice(0, -1) : plain;
}

export function endlessLine(name: string) {
  return scanError(
    `a line is longer than ${longestLineBytes >> 20} MB`,
    name,
    'Save one row of the table on each line, or the scan as HDF5 or npy.',
  );
}
