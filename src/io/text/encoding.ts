/** Bytes as text: UTF-8 with or without its mark, UTF-16 by its mark, otherwise Latin-1. */

/** `windows-1252` is Latin-1 with the printable signs that text from Windows has in its gaps. */
export type TextEncoding = 'utf-8' | 'utf-16le' | 'utf-16be' | 'windows-1252';

export interface EncodingFound {
  readonly encoding: TextEncoding;
  /** bytes of the byte order mark */
  readonly markBytes: number;
}

/** @param head - the first bytes; a character cut at the end is no fault */
export function encodingOf(head: Uint8Array): EncodingFound {
  if (head[0] === 0xef && head[1] === 0xbb && head[2] === 0xbf) {
    return { encoding: 'utf-8', markBytes: 3 };
  }
  if (head[0] === 0xff && head[1] === 0xfe) return { encoding: 'utf-16le', markBytes: 2 };
  if (head[0] === 0xfe && head[1] === 0xff) return { encoding: 'utf-16be', markBytes: 2 };
  return { encoding: isUtf8(head) ? 'utf-8' : 'windows-1252', markBytes: 0 };
}

function isUtf8(head: Uint8Array): boolean {
  try {
    new TextDecoder('utf-8', { fatal: true }).decode(head, { stream: true });
    return true;
  } catch {
    return false;
  }
}

/**
 * Whole lines of a file as text. Where a file that began as UTF-8 is not UTF-8 later on, that part is
 * read as Latin-1: digits are the same in both.
 */
export function decodeText(bytes: Uint8Array, encoding: TextEncoding): string {
  if (encoding === 'utf-8') {
    try {
      return new TextDecoder('utf-8', { fatal: true, ignoreBOM: true }).decode(bytes);
    } catch {
      return new TextDecoder('windows-1252').decode(bytes);
    }
  }
  return new TextDecoder(encoding, { ignoreBOM: true }).decode(bytes);
}

/** Bytes that text decoded from this encoding took in the file. */
export function bytesOfText(text: string, encoding: TextEncoding): number {
  if (encoding === 'windows-1252') return text.length;
  return encoding === 'utf-8' ? new TextEncoder().encode(text).length : 2 * text.length;
}

export type LineEnd = '\n' | '\r';

/** Where the last whole line ends: bytes up to and with its line end; 0 when there is none. */
export function endOfLastLine(bytes: Uint8Array, encoding: TextEncoding, lineEnd: LineEnd): number {
  const code = lineEnd.charCodeAt(0);
  if (encoding === 'utf-8' || encoding === 'windows-1252') return bytes.lastIndexOf(code) + 1;
  const low = encoding === 'utf-16le' ? 0 : 1;
  for (let at = (bytes.length & ~1) - 2; at >= 0; at -= 2) {
    if (bytes[at + low] === code && bytes[at + 1 - low] === 0) return at + 2;
  }
  return 0;
}

/** Control characters that no text file has; tab, line ends, form feed and a closing Ctrl-Z are allowed. */
export function isBinary(text: string): boolean {
  for (let i = 0; i < text.length; i++) {
    const code = text.charCodeAt(i);
    if (code < 0x20 && code !== 0x1a && (code < 0x09 || code > 0x0d)) return true;
  }
  return false;
}
