/**
 * Looks at the blocks of a file's structure before the library does: some damaged ones send it round in
 * circles for ever (a global heap with a free object of no length), or make it ask for all memory there
 * is (a local heap longer than the file).
 *
 * @see HDF5 File Format Specification, version 3.0, III.D (local heaps) and III.E (global heap)
 */
import { scanError } from '../scan-error';
import type { CachedReader } from './cached-reader';

const globalHeap = 0x4c4f4347;
const localHeap = 0x50414548;
const objectHeaderBytes = 16;

export class StructureGuard {
  private readonly sound = new Set<number>();
  private readonly isUsual: boolean;

  constructor(
    private readonly reader: CachedReader,
    private readonly name: string,
  ) {
    this.isUsual = hasLongLengths(reader);
  }

  /**
   * @param bytes - what was read at byte `at`
   * @throws RimlightError 'scan' - when a block begins there that the library could not cope with
   */
  check(bytes: Uint8Array, at: number): void {
    if (!this.isUsual || bytes.length < objectHeaderBytes) return;
    const view = viewOf(bytes);
    const signature = view.getUint32(0, true);
    if (signature !== globalHeap && signature !== localHeap) return;
    if (this.sound.has(at)) return;
    const size = Number(view.getBigUint64(8, true));
    const isSound =
      size <= this.reader.size &&
      (signature === localHeap || (at + size <= this.reader.size && this.isSoundHeap(at, size)));
    if (!isSound) {
      const where = `${this.name}, byte ${at}`;
      throw scanError('a list of texts in the file is damaged', where);
    }
    this.sound.add(at);
  }

  /** Whether going from object to object comes to an end. */
  private isSoundHeap(at: number, size: number): boolean {
    const heap = new Uint8Array(size);
    if (this.reader.readInto(heap, at) < size) return false;
    const view = viewOf(heap);
    let next = objectHeaderBytes;
    while (next + objectHeaderBytes <= size) {
      const length = Number(view.getBigUint64(next + 8, true));
      const isFree = view.getUint16(next, true) === 0;
      const step = isFree ? length : objectHeaderBytes + Math.ceil(length / 8) * 8;
      if (!(step >= objectHeaderBytes && next + step <= size)) return false;
      next += step;
    }
    return true;
  }
}

/** All files met have lengths of 8 bytes; others are left to the library. */
function hasLongLengths(reader: CachedReader): boolean {
  const head = new Uint8Array(16);
  for (let at = 0; at + head.length <= reader.size; at = at === 0 ? 512 : 2 * at) {
    reader.readInto(head, at);
    if (viewOf(head).getUint32(0, true) !== 0x46444889) continue;
    return head[8] <= 1 ? head[14] === 8 : head[10] === 8;
  }
  return false;
}

function viewOf(bytes: Uint8Array): DataView {
  return new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
}
