/** Chunked storage of an HDF5 dataset: cutting, shuffling, compressing, and the tree that finds the chunks. */
import { zlibSync } from 'fflate';
import type { CountsArray } from '../../science/scan';
import { ByteWriter, undefinedAddress } from './byte-writer';

export interface Chunking {
  readonly shape: readonly number[];
  readonly chunk: readonly number[];
  readonly shuffle: boolean;
  /** 0 is none */
  readonly gzip: number;
}

export interface PlacedChunk {
  /** first index on each axis */
  readonly start: readonly number[];
  readonly bytes: number;
  readonly address: number;
}

/** Half the greatest number of children a chunk tree's node may have; fixed by the superblock's version. */
const treeK = 32;

/** About 256 kB a chunk, whole along the fastest axes: a row of pixels, or part of one. */
export function defaultChunk(shape: readonly number[], elementBytes: number): readonly number[] {
  const most = Math.max(1, Math.floor((256 << 10) / elementBytes));
  let left = most;
  return shape
    .toReversed()
    .map((length) => {
      const take = Math.max(1, Math.min(length, left));
      left = Math.floor(left / take);
      return take;
    })
    .toReversed();
}

/** First indices of all chunks, fastest axis last. */
export function* chunkStarts({ shape, chunk }: Chunking): Generator<readonly number[]> {
  const start = shape.map(() => 0);
  for (;;) {
    yield start.slice();
    let axis = shape.length - 1;
    while (axis >= 0) {
      start[axis] += chunk[axis];
      if (start[axis] < shape[axis]) break;
      start[axis] = 0;
      axis--;
    }
    if (axis < 0) return;
  }
}

/** One chunk as stored; what reaches past the array's end is zero. */
export function encodeChunk(
  data: CountsArray,
  start: readonly number[],
  { shape, chunk, shuffle, gzip }: Chunking,
): Uint8Array {
  const raw = cutChunk(data, start, { shape, chunk });
  const shuffled = shuffle ? shuffled8(raw, data.BYTES_PER_ELEMENT) : raw;
  return gzip > 0 ? zlibSync(shuffled, { level: levelOf(gzip) }) : shuffled;
}

function cutChunk(
  data: CountsArray,
  start: readonly number[],
  { shape, chunk }: { readonly shape: readonly number[]; readonly chunk: readonly number[] },
): Uint8Array {
  const size = data.BYTES_PER_ELEMENT;
  const source = new Uint8Array(data.buffer, data.byteOffset, data.byteLength);
  const out = new Uint8Array(chunk.reduce((product, length) => product * length, size));
  const last = shape.length - 1;
  const rowBytes = Math.min(chunk[last], shape[last] - start[last]) * size;
  const rows = chunk.slice(0, last).reduce((product, length) => product * length, 1);
  for (let row = 0; row < rows; row++) {
    let rest = row;
    let offset = start[last];
    let stride = shape[last];
    let isInside = true;
    for (let axis = last - 1; axis >= 0; axis--) {
      const index = start[axis] + (rest % chunk[axis]);
      rest = Math.floor(rest / chunk[axis]);
      isInside &&= index < shape[axis];
      offset += index * stride;
      stride *= shape[axis];
    }
    if (!isInside) continue;
    out.set(source.subarray(offset * size, offset * size + rowBytes), row * chunk[last] * size);
  }
  return out;
}

/** All first bytes of the elements, then all second bytes, …: neighbours alike compress better. */
function shuffled8(raw: Uint8Array, size: number): Uint8Array {
  if (size === 1) return raw;
  const count = raw.length / size;
  const out = new Uint8Array(raw.length);
  for (let byte = 0; byte < size; byte++) {
    const plane = byte * count;
    for (let i = 0; i < count; i++) out[plane + i] = raw[i * size + byte];
  }
  return out;
}

function levelOf(gzip: number): 1 | 2 | 3 | 4 | 5 | 6 | 7 | 8 | 9 {
  const levels = [1, 2, 3, 4, 5, 6, 7, 8, 9] as const;
  return levels[Math.min(9, Math.max(1, Math.round(gzip))) - 1];
}

/**
 * Version 1 B-tree of the chunks (file format specification, III.A.1), written with `append`.
 *
 * @returns address of its root
 */
export function writeChunkTree(
  chunks: readonly PlacedChunk[],
  chunk: readonly number[],
  elementBytes: number,
  append: (bytes: Uint8Array) => number,
): number {
  let nodes: readonly TreeNode[] = chunks.map(({ start, bytes, address }) => ({
    first: { start, bytes },
    address,
  }));
  const lastChunk = chunks[chunks.length - 1];
  const end: TreeKey = { start: lastChunk.start.map((from, axis) => from + chunk[axis]), bytes: 0 };
  for (let level = 0; ; level++) {
    nodes = writeLevel(nodes, level, { end, elementBytes, rank: chunk.length }, append);
    if (nodes.length === 1) return nodes[0].address;
  }
}

interface TreeKey {
  readonly start: readonly number[];
  readonly bytes: number;
}

interface TreeNode {
  readonly first: TreeKey;
  readonly address: number;
}

function writeLevel(
  children: readonly TreeNode[],
  level: number,
  { end, elementBytes, rank }: { end: TreeKey; elementBytes: number; rank: number },
  append: (bytes: Uint8Array) => number,
): readonly TreeNode[] {
  const most = 2 * treeK;
  const nodeBytes = 24 + most * 8 + (most + 1) * (8 + 8 * (rank + 1));
  const groups = Array.from({ length: Math.ceil(children.length / most) }, (_, i) =>
    children.slice(i * most, (i + 1) * most),
  );
  // Nodes of a level are written one after another, so a neighbour's address is known beforehand.
  let firstAddress = 0;
  return groups.map((group, i) => {
    const node = new ByteWriter().ascii('TREE').u8(1, level).u16(group.length);
    const neighbour = (step: number): number | bigint =>
      i + step < 0 || i + step >= groups.length
        ? undefinedAddress
        : firstAddress + (i + step) * nodeBytes;
    const write = (left: number | bigint, right: number | bigint): Uint8Array => {
      node.u64(left).u64(right);
      for (const { first, address } of group) writeKey(node, first, 0).u64(address);
      const next = groups[i + 1]?.[0].first;
      if (next === undefined) writeKey(node, end, elementBytes);
      else writeKey(node, next, 0);
      return node.zeros(nodeBytes - node.length).take();
    };
    if (i > 0)
      return { first: group[0].first, address: append(write(neighbour(-1), neighbour(1))) };
    // The first node's own address is not known yet; its right neighbour follows it.
    firstAddress = append(new Uint8Array(0));
    return { first: group[0].first, address: append(write(undefinedAddress, neighbour(1))) };
  });
}

function writeKey(node: ByteWriter, { start, bytes }: TreeKey, last: number): ByteWriter {
  node.u32(bytes).u32(0);
  for (const from of start) node.u64(from);
  return node.u64(last);
}
