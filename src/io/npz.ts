/** NumPy .npz archives: every member a .npy file, stored or deflated, read by blocks without unpacking the rest. */
import { isRimlightError, type RimlightError, throwIfAborted } from '../errors';
import type { ArrayEntry, ByteSource, Container, Reader, ReadOptions } from './container';
import { bytesOfLayout } from './npy';
import { npyHeaderSpan, npyPrefixBytes, parseNpyHeader } from './npy-header';
import { roundedToType } from './round-to-type';
import { scanError } from './scan-error';
import { type ArrayLayout, type ReadRange, StoredArray } from './stored-array';
import { readZipDirectory, type ZipMember } from './zip/zip-directory';
import { openMember } from './zip/zip-member';

export const npzReader: Reader = {
  format: 'npz',
  extensions: ['.npz'],
  sniff: (head) =>
    head[0] === 0x50 && head[1] === 0x4b && [0x0403, 0x0605].includes(head[2] | (head[3] << 8)),
  async open(source, options = {}) {
    try {
      return await openNpz(source, options);
    } catch (error) {
      source.close?.();
      throw error;
    }
  },
};

interface OpenArray {
  readonly layout: ArrayLayout;
  readonly array: StoredArray;
}

async function openNpz(source: ByteSource, options: ReadOptions): Promise<Container> {
  const arrays = new Map<string, OpenArray>();
  const facts: Record<string, number> = {};
  const notes: string[] = [];
  const refused: RimlightError[] = [];
  for (const member of await readZipDirectory(source)) {
    throwIfAborted(options.signal, `opening ${source.name}`);
    if (member.name.endsWith('/')) continue;
    if (!member.name.endsWith('.npy')) {
      notes.push(`Member ${JSON.stringify(member.name)} is no array and was left out.`);
      continue;
    }
    const path = member.name.slice(0, -'.npy'.length);
    try {
      const open = await openArray(source, member);
      if (open.layout.shape.length > 0) arrays.set(path, open);
      else facts[path] = await readScalar(open);
    } catch (error) {
      const reason = refusalOf(error);
      refused.push(reason);
      notes.push(`Member ${JSON.stringify(member.name)} was left out: ${reason.what}.`);
    }
  }
  if (arrays.size === 0) throw refused[0] ?? noArrays(source.name);
  const entries: ArrayEntry[] = [...arrays].map(
    ([
      path,
      {
        layout: { shape, type },
      },
    ]) => ({
      path,
      shape,
      type,
      attributes: {},
    }),
  );
  return {
    format: 'npz',
    entries,
    groups: [],
    facts,
    notes,
    async read(path, start, count, readOptions) {
      const open = arrays.get(path);
      if (open === undefined) throw scanError(`there is no member ${path}`, source.name);
      return open.array.read(start, count, readOptions);
    },
    close: () => source.close?.(),
  };
}

async function openArray(source: ByteSource, member: ZipMember): Promise<OpenArray> {
  const where = `${source.name}: ${member.name}`;
  const layout = await readHeader(await openMember(source, member), member, where);
  const needed = layout.offset + bytesOfLayout(layout, where);
  if (needed > member.bytes) {
    throw scanError(
      `the header promises ${needed} bytes in all, but the member has ${member.bytes}`,
      where,
    );
  }
  // Opened again when it is read, so that no unpacked bytes are held for members only listed.
  let opened: Promise<ReadRange> | null = null;
  const read: ReadRange = async (from, to) => {
    opened ??= openMember(source, member);
    return (await opened)(from, to);
  };
  return { layout, array: new StoredArray(layout, read, where) };
}

async function readHeader(read: ReadRange, member: ZipMember, where: string): Promise<ArrayLayout> {
  const prefix = await read(0, Math.min(npyPrefixBytes, member.bytes));
  const { from, to } = npyHeaderSpan(prefix, where);
  // Asked from the beginning of the text onwards; a version 1 header begins inside the prefix.
  const rest = await read(Math.min(prefix.length, to), to);
  const text = new Uint8Array(to - from);
  text.set(prefix.subarray(from, to));
  text.set(rest, Math.min(prefix.length, to) - from);
  return parseNpyHeader(text, to, where);
}

async function readScalar({ array, layout }: OpenArray): Promise<number> {
  const [value] = await array.read([], []);
  return roundedToType(value, layout.type);
}

/** What is wrong with one member is passed over; anything else stops the opening. */
function refusalOf(error: unknown): RimlightError {
  if (isRimlightError(error) && error.kind === 'scan') return error;
  throw error;
}

function noArrays(name: string): RimlightError {
  return scanError(
    'the archive holds no array',
    name,
    'Give a .npz file written by numpy.savez, or the array itself as .npy.',
  );
}
