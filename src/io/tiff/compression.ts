/** Unpacks the blocks of a TIFF page, never to more than the block can hold. */
import { inflateAtMost } from '../inflate-at-most';
import { asScanError, scanError } from '../scan-error';
import { unpackLzw } from './lzw';

/** TIFF's numbers for ways of packing; each with the most bytes it can make of one. */
const ratios: Readonly<Record<number, number>> = { 1: 1, 5: 2731, 8: 1032, 32946: 1032, 32773: 64 };

const otherNames: Readonly<Record<number, string>> = {
  2: 'fax coding',
  3: 'fax coding',
  4: 'fax coding',
  6: 'JPEG, which changes the numbers',
  7: 'JPEG, which changes the numbers',
  34712: 'JPEG 2000',
  34887: 'LERC',
  34925: 'LZMA',
  50000: 'Zstandard',
  50001: 'WebP, which may change the numbers',
};

export function assertCompression(compression: number, where: string): void {
  if (ratios[compression] !== undefined) return;
  throw scanError(
    `its pixels are packed by ${otherNames[compression] ?? `method ${compression}`}`,
    where,
    'Export the scan without compression, or with Deflate, LZW or PackBits.',
  );
}

export function mostUnpacked(compression: number, packedBytes: number): number {
  return (packedBytes + 64) * (ratios[compression] ?? 1);
}

/**
 * @param expected - bytes of the block when unpacked
 * @returns exactly that many
 * @throws RimlightError 'scan' - when the packed data are damaged or give fewer
 */
export function unpackBlock(
  packed: Uint8Array,
  compression: number,
  expected: number,
  where: string,
): Uint8Array {
  if (expected > mostUnpacked(compression, packed.length)) {
    throw scanError(`${packed.length} packed bytes cannot hold ${expected}`, where);
  }
  let bytes: Uint8Array;
  try {
    bytes = unpack(packed, compression, expected);
  } catch (error) {
    throw asScanError(error, 'the packed data are damaged', where);
  }
  if (bytes.length < expected) {
    throw scanError(`it unpacks to ${bytes.length} bytes where ${expected} are needed`, where);
  }
  return bytes;
}

function unpack(packed: Uint8Array, compression: number, expected: number): Uint8Array {
  if (compression === 5) return unpackLzw(packed, expected);
  if (compression === 32773) return unpackBits(packed, expected);
  if (compression === 8 || compression === 32946) return inflateAtMost(packed, expected);
  return packed.subarray(0, expected);
}

/** PackBits: a count and that many bytes, or a negative count and one byte to repeat (TIFF 6.0, section 9). */
function unpackBits(packed: Uint8Array, expected: number): Uint8Array {
  const out = new Uint8Array(expected);
  let done = 0;
  for (let at = 0; at < packed.length && done < expected; ) {
    const count = (packed[at++] << 24) >> 24;
    if (count >= 0) {
      const run = packed.subarray(at, at + Math.min(count + 1, expected - done));
      out.set(run, done);
      done += run.length;
      at += count + 1;
    } else if (count > -128 && at < packed.length) {
      const to = Math.min(expected, done + 1 - count);
      out.fill(packed[at++], done, to);
      done = to;
    }
  }
  return out.subarray(0, done);
}
