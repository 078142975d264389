/** Unpacks zlib data up to a limit, so that a small file cannot fill the memory. */
import { Unzlib } from 'fflate';

/** At most 16 MB come out of one step, since deflate gives at most 1032 bytes for one. */
const stepBytes = 16 << 10;

/**
 * @returns the first `most` bytes, or fewer when the data end before
 * @throws Error - when the packed data are damaged
 */
export function inflateAtMost(packed: Uint8Array, most: number): Uint8Array {
  const out = new Uint8Array(most);
  let done = 0;
  const stream = new Unzlib((piece) => {
    const part = piece.subarray(0, most - done);
    out.set(part, done);
    done += part.length;
  });
  for (let at = 0; at < packed.length && done < most; at += stepBytes) {
    const to = Math.min(at + stepBytes, packed.length);
    stream.push(packed.subarray(at, to), to === packed.length);
  }
  return out.subarray(0, done);
}
