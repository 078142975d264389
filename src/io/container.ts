/**
 * What every reader gives: a file as a list of named N-dimensional arrays that can be read by
 * blocks. Guessing which of them is the scan is the business of `src/io/detect`, once for all formats.
 */
import type { CountsArray } from '../science/scan';

/** Bytes by range, wherever they are: a browser File, a path, memory. */
export interface ByteSource {
  /** file name without folder */
  readonly name: string;
  readonly size: number;
  /** Bytes from ≤ i < to; shorter only at the end of the file. */
  read(from: number, to: number): Promise<Uint8Array>;
  /** The same without waiting, where the platform can: memory, files in Node, a Blob inside a worker. HDF5 reads so. */
  readonly readSync?: (from: number, to: number) => Uint8Array;
  /** Lets go of the file. A container calls it when it is closed, or when it could not be opened. */
  readonly close?: () => void;
  /** For readers that must see a file system (HDF5): what to mount. */
  readonly origin:
    | { readonly kind: 'blob'; readonly blob: Blob }
    | { readonly kind: 'path'; readonly path: string }
    | { readonly kind: 'memory'; readonly bytes: Uint8Array };
}

/** Element types as stored; 64-bit integers and half floats are read into a wider or safe type. */
export type ElementType =
  | 'uint8'
  | 'int8'
  | 'uint16'
  | 'int16'
  | 'uint32'
  | 'int32'
  | 'uint64'
  | 'int64'
  | 'float16'
  | 'float32'
  | 'float64'
  | 'bool';

export type AttributeValue = string | number | readonly string[] | readonly number[];

export interface ArrayEntry {
  /** HDF5 path ("/entry/counts"), npz member ("counts"), column name; "" for a file that is one array */
  readonly path: string;
  readonly shape: readonly number[];
  readonly type: ElementType;
  /** `units`, `long_name`, … as found */
  readonly attributes: Readonly<Record<string, AttributeValue>>;
}

/** A group with its attributes, where the format has groups (HDF5: NX_class, signal, axes, default). */
export interface GroupEntry {
  readonly path: string;
  readonly attributes: Readonly<Record<string, AttributeValue>>;
}

export type FormatName = 'HDF5' | 'npy' | 'npz' | 'TIFF' | 'text' | 'JCAMP-DX';

export interface ReadOptions {
  readonly signal?: AbortSignal;
  /** share done, 0 to 1 */
  readonly onProgress?: (share: number) => void;
}

export interface Container {
  readonly format: FormatName;
  readonly entries: readonly ArrayEntry[];
  readonly groups: readonly GroupEntry[];
  /** Scalars and texts worth showing or using as evidence: { "laser": "532.06 nm" }. */
  readonly facts: Readonly<Record<string, string | number>>;
  /** What the reader did that the user should know, one sentence each ("189 rows without an axis value were left out"). */
  readonly notes: readonly string[];
  /**
   * A block of one array in C order of the array's own axes.
   *
   * @param start - first index on each axis, length = rank
   * @param count - number of indices on each axis
   * @returns product(count) values; 64-bit integers as Float64Array (or a smaller type where all fit), float16 as Float32Array, bool as Uint8Array
   * @throws RimlightError 'scan' - when the file is truncated or damaged there
   */
  read(
    path: string,
    start: readonly number[],
    count: readonly number[],
    options?: ReadOptions,
  ): Promise<CountsArray>;
  close(): void;
}

export interface Reader {
  readonly format: FormatName;
  /** lower case, with the dot */
  readonly extensions: readonly string[];
  /** Whether the first bytes (up to 4 kB) are this format's; the name is a hint only. */
  sniff(head: Uint8Array, name: string): boolean;
  /** @throws RimlightError 'scan' - when the file is not what it says, damaged, unsafe or absurd */
  open(source: ByteSource, options?: ReadOptions): Promise<Container>;
}
