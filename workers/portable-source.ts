/** Source handles that any environment can open: a Blob, bytes in memory. Paths are Node's business. */
import { RimlightError } from '../src/errors';
import { blobSource, memorySource } from '../src/io/byte-source';
import type { ByteSource } from '../src/io/container';
import type { SourceHandle } from './engine';

/** @throws RimlightError 'usage' - for a path */
export async function portableSource(handle: SourceHandle): Promise<ByteSource> {
  switch (handle.kind) {
    case 'blob':
      return blobSource(handle.name, handle.blob);
    case 'memory':
      return memorySource(handle.name, handle.bytes);
    case 'path':
      throw new RimlightError('usage', {
        what: 'a path cannot be opened here',
        where: handle.path,
        hint: 'Open the file itself.',
      });
  }
}
