/** Counts what is read of a source: readers must not take the whole file for a part of it. */
import { memorySource } from '../../src/io/byte-source';
import type { ByteSource } from '../../src/io/container';

export interface SpySource extends ByteSource {
  readonly seen: { bytes: number; calls: number; closed: number };
}

export function spySource(name: string, bytes: Uint8Array): SpySource {
  const source = memorySource(name, bytes);
  const seen = { bytes: 0, calls: 0, closed: 0 };
  const count = (from: number, to: number): void => {
    seen.bytes += Math.max(0, Math.min(to, source.size) - from);
    seen.calls++;
  };
  return {
    ...source,
    seen,
    read(from, to) {
      count(from, to);
      return source.read(from, to);
    },
    readSync(from, to) {
      count(from, to);
      return bytes.slice(from, to);
    },
    close() {
      seen.closed++;
    },
  };
}
