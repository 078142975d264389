/** The blocks of an HDF5 file being written: each gets its address when it is appended, the superblock comes last. */
import { throwIfAborted } from '../../errors';
import type { ReadOptions } from '../container';
import { ByteWriter, undefinedAddress } from './byte-writer';
import { StringHeap } from './hdf5-strings';
import { lookup3 } from './lookup3';

/** Compressing may take seconds: the event loop is let through after this many bytes. */
const bytesBetweenPauses = 8 << 20;
const superblockBytes = 48;

export class Hdf5FileWriter {
  readonly strings = new StringHeap();
  private readonly parts: Uint8Array[] = [];
  private end = superblockBytes;
  private encoded = 0;
  private sincePause = 0;

  constructor(
    private readonly options: ReadOptions,
    private readonly total: number,
  ) {}

  /** Puts bytes at the next address divisible by 8, and gives that address. */
  readonly append = (bytes: Uint8Array): number => {
    const gap = (8 - (this.end % 8)) % 8;
    if (gap > 0) this.parts.push(new Uint8Array(gap));
    const address = this.end + gap;
    this.parts.push(bytes);
    this.end = address + bytes.length;
    return address;
  };

  /** Tells how far we are, lets other work in now and then, and stops when asked. */
  async advance(bytes: number): Promise<void> {
    this.encoded += bytes;
    this.sincePause += bytes;
    if (this.sincePause < bytesBetweenPauses) return;
    this.sincePause = 0;
    this.options.onProgress?.(Math.min(1, this.encoded / this.total));
    await new Promise((resolve) => setTimeout(resolve));
    throwIfAborted(this.options.signal, 'writing HDF5');
  }

  finish(rootAddress: number): Uint8Array {
    const superblock = new ByteWriter()
      .u8(0x89, 0x48, 0x44, 0x46, 0x0d, 0x0a, 0x1a, 0x0a)
      .u8(2, 8, 8, 0)
      .u64(0)
      .u64(undefinedAddress)
      .u64(this.end)
      .u64(rootAddress);
    superblock.u32(lookup3(superblock.take()));
    const file = new Uint8Array(this.end);
    file.set(superblock.take());
    let at = superblockBytes;
    for (const part of this.parts) {
      file.set(part, at);
      at += part.length;
    }
    this.options.onProgress?.(1);
    return file;
  }
}
