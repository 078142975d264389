/** Writes a NumPy .npz archive. */
import { type Zippable, zipSync } from 'fflate';

/**
 * @param members - name of each array, as numpy.load will show it, and its .npy file
 * @returns a deflated zip; the same members give the same bytes
 */
export function encodeNpz(members: Readonly<Record<string, Uint8Array>>): Uint8Array {
  const files: Zippable = {};
  for (const [name, bytes] of Object.entries(members)) files[`${name}.npy`] = bytes;
  // The first moment a zip can state; local time on both sides, so no time zone shows.
  return zipSync(files, { level: 6, mtime: new Date(1980, 0, 1) });
}
