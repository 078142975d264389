/** Variable-length strings of an HDF5 file: they lie in global heap collections, the data only refer to them. */
import { ByteWriter } from './byte-writer';
import { stringReferenceBytes } from './hdf5-messages';

/** Smallest collection the library makes (file format specification, III.E). */
const leastCollectionBytes = 4096;
const mostCollectionBytes = 1 << 20;
/** Objects are numbered by 16 bits, 0 being free space. */
const mostObjects = 0xffff;
const headerBytes = 16;

/** Gives every string a place before the file is laid out: ask for references in the order strings were added. */
export class StringHeap {
  private readonly collections: Uint8Array[][] = [];
  private readonly places: (readonly [collection: number, index: number, length: number])[] = [];
  private openBytes = 0;
  private addresses: readonly number[] = [];
  private next = 0;

  add(text: string): void {
    const bytes = new TextEncoder().encode(text);
    if (bytes.length === 0) {
      this.places.push([-1, 0, 0]);
      return;
    }
    const taken = headerBytes + padded(bytes.length);
    const last = this.collections.at(-1);
    const isFull =
      last === undefined ||
      last.length === mostObjects ||
      this.openBytes + taken > mostCollectionBytes;
    const objects = isFull ? [] : last;
    if (isFull) {
      this.collections.push(objects);
      this.openBytes = 0;
    }
    objects.push(bytes);
    this.openBytes += taken;
    this.places.push([this.collections.length - 1, objects.length, bytes.length]);
  }

  /** Writes the collections with `append`, which gives each one's address. */
  place(append: (bytes: Uint8Array) => number): void {
    this.addresses = this.collections.map((objects) => append(collectionBytes(objects)));
  }

  /** References to the next `count` strings. */
  references(count: number): Uint8Array {
    const out = new ByteWriter();
    for (const [collection, index, length] of this.places.slice(this.next, this.next + count)) {
      if (length === 0) out.zeros(stringReferenceBytes);
      else out.u32(length).u64(this.addresses[collection]).u32(index);
    }
    this.next += count;
    return out.take();
  }
}

function collectionBytes(objects: readonly Uint8Array[]): Uint8Array {
  const used = objects.reduce((sum, { length }) => sum + headerBytes + padded(length), headerBytes);
  // Room for the header of the free space that fills the rest.
  const size = Math.max(leastCollectionBytes, used + headerBytes);
  const out = new ByteWriter().ascii('GCOL').u8(1, 0, 0, 0).u64(size);
  objects.forEach((bytes, i) => {
    out
      .u16(i + 1)
      .u16(1)
      .u32(0)
      .u64(bytes.length)
      .raw(bytes)
      .zeros(padded(bytes.length) - bytes.length);
  });
  out
    .u16(0)
    .u16(0)
    .u32(0)
    .u64(size - used);
  return out.zeros(size - out.length).take();
}

function padded(length: number): number {
  return Math.ceil(length / 8) * 8;
}
