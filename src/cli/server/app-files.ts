/** The built app's files by their address; nothing outside its folder has one. */
import { realpath, stat } from 'node:fs/promises';
import { join, sep } from 'node:path';

/**
 * The path of the file at an address; null where there is none.
 *
 * Looked up at each request, so that a page can be reloaded after a new build. Links are followed
 * before the folder is checked: none leads out.
 *
 * @param address - decoded path of the request: "/assets/index-3f2a.js"
 */
export async function appFileAt(folder: string, address: string): Promise<string | null> {
  const parts = (address.endsWith('/') ? `${address}index.html` : address).split('/').slice(1);
  if (!address.startsWith('/') || !parts.every(isPlainName)) return null;
  try {
    const root = await realpath(folder);
    const path = await realpath(join(root, ...parts));
    const isInside = path.startsWith(root + sep);
    return isInside && (await stat(path)).isFile() ? path : null;
  } catch {
    return null;
  }
}

/** No "..", no hidden file, nothing a file system could take for more than a name. */
function isPlainName(part: string): boolean {
  return /^[^./\\:\0][^/\\:\0]*$/.test(part);
}

/** Names with a hash of their content never change; everything else is asked for anew. */
export function cacheControlOf(address: string): string {
  return address.startsWith('/assets/') ? 'public, max-age=31536000, immutable' : 'no-cache';
}
