/**
 * LZW as TIFF uses it: codes of 9 to 12 bits, highest bit first, widened one code early.
 *
 * @see Adobe, TIFF Revision 6.0 (1992), section 13
 */

const clearCode = 256;
const endCode = 257;
const firstFree = 258;
const mostCodes = 4096;

/**
 * @param most - stops after this many bytes
 * @returns what was unpacked, at most `most` bytes; fewer when the codes end or make no sense
 */
export function unpackLzw(packed: Uint8Array, most: number): Uint8Array {
  const out = new Uint8Array(most);
  // A code is an earlier stretch of the output: where it began, and how long it is.
  const starts = new Int32Array(mostCodes);
  const lengths = new Int32Array(mostCodes);
  let next = firstFree;
  let width = 9;
  let done = 0;
  let previousAt = -1;
  let previousLength = 0;
  let bits = 0;
  let held = 0;
  let at = 0;
  while (done < most) {
    while (held < width && at < packed.length) {
      bits = ((bits << 8) | packed[at++]) & 0xffffff;
      held += 8;
    }
    if (held < width) break;
    held -= width;
    const code = (bits >>> held) & ((1 << width) - 1);
    if (code === endCode) break;
    if (code === clearCode) {
      next = firstFree;
      width = 9;
      previousAt = -1;
      continue;
    }
    const at0 = done;
    if (code < clearCode) out[done++] = code;
    else if (code < next) done = repeat(out, starts[code], lengths[code], done);
    else if (code === next && previousAt >= 0) {
      // The code being defined by this very step: the previous stretch and its first byte again.
      done = repeat(out, previousAt, previousLength + 1, done);
    } else break;
    if (previousAt >= 0 && next < mostCodes) {
      starts[next] = previousAt;
      lengths[next] = previousLength + 1;
      next++;
    }
    previousAt = at0;
    previousLength = done - at0;
    if (next >= 2047) width = 12;
    else if (next >= 1023) width = 11;
    else width = next >= 511 ? 10 : 9;
  }
  return out.subarray(0, done);
}

/** Copies within the output, byte by byte because the stretches may overlap. */
function repeat(out: Uint8Array, from: number, length: number, done: number): number {
  const to = Math.min(out.length, done + length);
  for (let i = done, j = from; i < to; i++, j++) out[i] = out[j];
  return to;
}
