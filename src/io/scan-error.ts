/** The errors readers throw: always of kind 'scan', whatever a damaged file led a decoder into. */
import { isRimlightError, RimlightError } from '../errors';

export const damagedHint =
  'Copy or export the file again; if it opens elsewhere, save it in another format.';

/**
 * @param where - file name, then the member, dataset or byte: "map.npz: counts"
 */
export function scanError(
  what: string,
  where: string,
  hint = damagedHint,
  cause?: unknown,
): RimlightError {
  return new RimlightError('scan', { what, where, hint }, cause === undefined ? {} : { cause });
}

/** What a decoder threw as an error about the file; our own errors pass unchanged. */
export function asScanError(error: unknown, what: string, where: string): RimlightError {
  if (isRimlightError(error)) return error;
  const reason = error instanceof Error ? error.message : String(error);
  if (error instanceof RangeError && /alloc|array (buffer )?(length|size)/i.test(reason)) {
    return scanError(
      'there is not enough memory for this much of the file',
      where,
      tooBigHint,
      error,
    );
  }
  return scanError(`${what}: ${oneLine(reason)}`, where, damagedHint, error);
}

export const tooBigHint = 'Crop or bin the scan before opening it, or open a part of it.';

function oneLine(text: string): string {
  const line = text.replace(/\s+/g, ' ').trim();
  return line.length > 200 ? `${line.slice(0, 200)}…` : line;
}
