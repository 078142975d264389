/** The Range header of HTTP (RFC 9110, section 14): which bytes of a file are asked for. */

export type ByteRange =
  | { readonly kind: 'whole' }
  /** first ≤ i ≤ last */
  | { readonly kind: 'part'; readonly first: number; readonly last: number }
  | { readonly kind: 'unsatisfiable' };

/**
 * Reads a Range header against a file of `size` bytes. Several ranges at once, another unit or a
 * malformed header give the whole file, as the standard allows (14.2).
 */
export function parseByteRange(header: string | undefined, size: number): ByteRange {
  const match = /^bytes=(\d*)-(\d*)$/i.exec(header?.trim() ?? '');
  if (match === null) return { kind: 'whole' };
  const [, from, to] = match;
  if (from === '' && to === '') return { kind: 'whole' };
  const lastByte = size - 1;
  if (from === '') {
    const length = Number(to);
    if (length === 0 || size === 0) return { kind: 'unsatisfiable' };
    return { kind: 'part', first: Math.max(0, size - length), last: lastByte };
  }
  const first = Number(from);
  const last = to === '' ? lastByte : Math.min(Number(to), lastByte);
  if (to !== '' && Number(to) < first) return { kind: 'whole' };
  return first > lastByte ? { kind: 'unsatisfiable' } : { kind: 'part', first, last };
}
