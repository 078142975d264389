/**
 * Writes a tree of groups and datasets as an HDF5 file. Our own writer: no 4 MB library is fetched to
 * save a file, chunks can be shuffled and compressed at once, and no times are stored, so that the
 * same tree always gives the same bytes. Readable by HDF5 1.8 and later.
 */
import { RimlightError } from '../../errors';
import type { CountsArray } from '../../science/scan';
import type { ReadOptions } from '../container';
import { undefinedAddress } from './byte-writer';
import {
  type Chunking,
  chunkStarts,
  defaultChunk,
  encodeChunk,
  type PlacedChunk,
  writeChunkTree,
} from './hdf5-chunks';
import { Hdf5FileWriter } from './hdf5-file-writer';
import {
  attributeMessage,
  chunkedLayout,
  contiguousLayout,
  dataspace,
  datatypeOf,
  fillValueMessage,
  filterMessage,
  groupMessages,
  linkMessage,
  type Message,
  objectHeader,
  stringType,
} from './hdf5-messages';
import type { StringHeap } from './hdf5-strings';

/** A number is written as float64; a typed array keeps its type. */
export type Hdf5Attribute = string | number | readonly string[] | readonly number[] | CountsArray;

export type Hdf5Attributes = Readonly<Record<string, Hdf5Attribute>>;

export interface Hdf5Dataset {
  readonly kind: 'dataset';
  /** Texts are written as variable-length UTF-8, a number as float64. */
  readonly data: CountsArray | string | number | readonly string[];
  /** Omitted: a scalar for one text or number, otherwise one axis. */
  readonly shape?: readonly number[];
  readonly attributes?: Hdf5Attributes;
  /** Lengths of a chunk; omitted: one contiguous block, or about 256 kB a chunk where a filter needs chunks. */
  readonly chunks?: readonly number[];
  /** Deflate level, 1 to 9. */
  readonly gzip?: number;
  readonly shuffle?: boolean;
}

export interface Hdf5Group {
  readonly kind: 'group';
  readonly attributes?: Hdf5Attributes;
  /** Names without "/". */
  readonly children: Readonly<Record<string, Hdf5Node>>;
}

export type Hdf5Node = Hdf5Group | Hdf5Dataset;

/**
 * The whole file in memory.
 *
 * @throws RimlightError 'fault' - when a shape does not match its data or a name is not allowed;
 *   'cancelled' - when stopped
 */
export async function writeHdf5(root: Hdf5Group, options: ReadOptions = {}): Promise<Uint8Array> {
  const writer = new Hdf5FileWriter(options, bytesOf(root));
  collectStrings(root, writer.strings);
  writer.strings.place(writer.append);
  const rootAddress = await writeGroup(writer, root, '');
  return writer.finish(rootAddress);
}

async function writeGroup(writer: Hdf5FileWriter, group: Hdf5Group, path: string): Promise<number> {
  const attributes = attributeMessages(writer, group.attributes, path);
  const links: Message[] = [];
  for (const [name, node] of Object.entries(group.children)) {
    const place = `${path}/${name}`;
    if (name === '' || name === '.' || name.includes('/')) throw badName(place);
    const address =
      node.kind === 'group'
        ? await writeGroup(writer, node, place)
        : await writeDataset(writer, node, place);
    links.push(linkMessage(name, address));
  }
  return writer.append(objectHeader([...groupMessages(), ...links, ...attributes], path || '/'));
}

async function writeDataset(
  writer: Hdf5FileWriter,
  dataset: Hdf5Dataset,
  path: string,
): Promise<number> {
  const attributes = attributeMessages(writer, dataset.attributes, path);
  const { data } = dataset;
  const shape = shapeOf(dataset);
  const values = typeof data === 'string' || isTexts(data) ? null : numbersOf(data);
  const count =
    values?.length ?? (typeof data === 'string' ? 1 : (data as readonly string[]).length);
  if (count !== (shape ?? []).reduce((product, length) => product * length, 1)) {
    throw badShape(path, count, shape);
  }
  const storage =
    values === null
      ? contiguous(writer, writer.strings.references(count))
      : await storeNumbers(writer, values, shape, dataset);
  await writer.advance(values?.byteLength ?? 0);
  return writer.append(
    objectHeader(
      [
        { type: 0x01, body: dataspace(shape) },
        { type: 0x03, body: values === null ? stringType() : datatypeOf(values) },
        ...storage,
        ...attributes,
      ],
      path,
    ),
  );
}

function storeNumbers(
  writer: Hdf5FileWriter,
  values: CountsArray,
  shape: readonly number[] | null,
  { chunks, gzip = 0, shuffle = false }: Hdf5Dataset,
): Promise<readonly Message[]> | readonly Message[] {
  const wantsChunks = chunks !== undefined || gzip > 0 || shuffle;
  if (!wantsChunks || shape === null || shape.length === 0 || values.length === 0) {
    return contiguous(writer, new Uint8Array(values.buffer, values.byteOffset, values.byteLength));
  }
  const chunk = chunks ?? defaultChunk(shape, values.BYTES_PER_ELEMENT);
  if (chunk.length !== shape.length || !chunk.every((length) => length >= 1)) {
    throw badShape('chunks', values.length, chunk);
  }
  return chunked(writer, values, { shape, chunk, gzip, shuffle });
}

function contiguous(writer: Hdf5FileWriter, bytes: Uint8Array): readonly Message[] {
  const address = bytes.length === 0 ? undefinedAddress : writer.append(bytes);
  return [fillValueMessage(false), contiguousLayout(address, bytes.length)];
}

async function chunked(
  writer: Hdf5FileWriter,
  values: CountsArray,
  chunking: Chunking,
): Promise<readonly Message[]> {
  const { chunk, gzip, shuffle } = chunking;
  const size = values.BYTES_PER_ELEMENT;
  const chunkBytes = chunk.reduce((product, length) => product * length, size);
  const placed: PlacedChunk[] = [];
  for (const start of chunkStarts(chunking)) {
    const bytes = encodeChunk(values, start, chunking);
    placed.push({ start, bytes: bytes.length, address: writer.append(bytes) });
    await writer.advance(chunkBytes);
  }
  const tree = writeChunkTree(placed, chunk, size, writer.append);
  const filters = gzip > 0 || shuffle ? [filterMessage(size, { gzip, shuffle })] : [];
  return [fillValueMessage(true), chunkedLayout(tree, chunk, size), ...filters];
}

function attributeMessages(
  writer: Hdf5FileWriter,
  attributes: Hdf5Attributes | undefined,
  path: string,
): readonly Message[] {
  return Object.entries(attributes ?? {}).map(([name, value]) => {
    if (name === '') throw badName(`${path}@`);
    if (typeof value === 'string' || isTexts(value)) {
      const texts = typeof value === 'string' ? [value] : value;
      const space = dataspace(typeof value === 'string' ? null : [texts.length]);
      const data = writer.strings.references(texts.length);
      return attributeMessage(name, { datatype: stringType(), space, data });
    }
    const values = numbersOf(value);
    const space = dataspace(typeof value === 'number' ? null : [values.length]);
    const data = new Uint8Array(values.buffer, values.byteOffset, values.byteLength);
    return attributeMessage(name, { datatype: datatypeOf(values), space, data });
  });
}

/** In the order they are referred to when writing: a node's attributes, then its data or children. */
function collectStrings(node: Hdf5Node, strings: StringHeap): void {
  const values: Hdf5Attribute[] = Object.values(node.attributes ?? {});
  if (node.kind === 'dataset') values.push(node.data);
  for (const value of values) {
    if (typeof value === 'string') strings.add(value);
    else if (isTexts(value)) for (const text of value) strings.add(text);
  }
  if (node.kind === 'dataset') return;
  for (const child of Object.values(node.children)) collectStrings(child, strings);
}

function bytesOf(node: Hdf5Node): number {
  if (node.kind === 'group') {
    return Object.values(node.children).reduce((sum, child) => sum + bytesOf(child), 1);
  }
  return ArrayBuffer.isView(node.data) ? node.data.byteLength : 16;
}

function shapeOf({ data, shape }: Hdf5Dataset): readonly number[] | null {
  if (shape !== undefined) return shape;
  return typeof data === 'string' || typeof data === 'number' ? null : [data.length];
}

/** An empty list counts as numbers. */
function isTexts(value: Hdf5Attribute): value is readonly string[] {
  return Array.isArray(value) && typeof value[0] === 'string';
}

function numbersOf(value: Exclude<Hdf5Attribute, string | readonly string[]>): CountsArray {
  if (typeof value === 'number') return Float64Array.of(value);
  return ArrayBuffer.isView(value) ? value : Float64Array.from(value);
}

function badName(place: string): RimlightError {
  return new RimlightError('fault', {
    what: 'an HDF5 name is empty or contains "/"',
    where: place,
    hint: 'Please report this.',
  });
}

function badShape(place: string, count: number, shape: readonly number[] | null): RimlightError {
  return new RimlightError('fault', {
    what: `${count} values do not fill the shape (${(shape ?? []).join(', ')})`,
    where: place,
    hint: 'Please report this.',
  });
}
