/** One open HDF5 file: the library's calls, each with its outcome checked. */
import { isRimlightError, type RimlightError } from '../../errors';
import type { AttributeValue, ByteSource } from '../container';
import { asScanError, scanError, tooBigHint } from '../scan-error';
import { type H5Module, type Hdf5Library, loadHdf5, type MountedFile } from './library';
import { isSmallValue, type Metadata, readValue } from './values';

export type ObjectKind = 'group' | 'dataset' | 'broken' | 'external' | 'other';

/** An instance of the library that has this file open. */
interface Session {
  readonly library: Hdf5Library;
  readonly mounted: MountedFile;
  readonly id: bigint;
}

export class Hdf5File {
  private constructor(
    private readonly source: ByteSource,
    private session: Session,
  ) {}

  /** @throws RimlightError 'scan' - when it is no HDF5 file or is damaged */
  static async open(source: ByteSource): Promise<Hdf5File> {
    return new Hdf5File(source, await openSession(source));
  }

  get name(): string {
    return this.source.name;
  }

  /** A damaged file has broken the library's instance that holds this one; not necessarily this one did. */
  get isBroken(): boolean {
    return this.session.library.isBroken;
  }

  /** Another file may have broken the instance. */
  get isAlone(): boolean {
    return this.session.library.filesSeen === 1;
  }

  /** Opens the file again in a fresh instance where the old one is broken. */
  async revive(): Promise<void> {
    if (this.isBroken) this.session = await openSession(this.source);
  }

  close(): void {
    const { library, mounted, id } = this.session;
    try {
      if (!library.isBroken) library.module.close_file(id);
      mounted.unmount();
    } catch (error) {
      library.noteThrow(error);
    }
    library.noteClose();
  }

  kindOf(path: string): ObjectKind {
    return this.call(path, (module, id) => {
      const type = module.get_type(id, path);
      if (type === module.H5G_GROUP) return 'group';
      if (type === module.H5G_DATASET) return 'dataset';
      if (type === module.H5G_LINK || type === -1) return 'broken';
      return type === module.H5G_UDLINK ? 'external' : 'other';
    });
  }

  /** Whether the name stands for a path; of one that leads nowhere the library may claim any kind. */
  isSoftLink(path: string): boolean {
    return this.call(path, (module, id) => typeof module.get_symbolic_link(id, path) === 'string');
  }

  namesIn(path: string): readonly string[] {
    return this.call(path, (module, id) => module.get_names(id, path, false));
  }

  /** The same for every path that leads to the same object: its place in the file. */
  identityOf(path: string): string {
    const reference = this.call(path, (module, id) => module.create_object_reference(id, path));
    const place = Array.from(reference).join('.');
    return /[1-9]/.test(place) ? place : path;
  }

  metadataOf(path: string): Metadata {
    return this.call(path, (module, id) => module.get_dataset_metadata(id, path));
  }

  filtersOf(path: string): readonly { readonly id: number; readonly name: string }[] {
    return this.call(path, (module, id) => module.get_dataset_filters(id, path));
  }

  /** The short ones: texts, numbers and lists of them. */
  attributesOf(path: string): Readonly<Record<string, AttributeValue>> {
    const names = this.call(path, (module, id) => module.get_attribute_names(id, path));
    const attributes: Record<string, AttributeValue> = {};
    for (const name of names) {
      const value = this.call(path, (module, id) => {
        const metadata = module.get_attribute_metadata(id, path, name);
        if (!isSmallValue(metadata)) return null;
        return readValue(module, metadata, {
          read: (pointer) => module.get_attribute_data(id, path, name, pointer),
          reclaim: (pointer) => module.reclaim_vlen_memory(id, path, name, pointer),
        });
      });
      if (value !== null) attributes[name] = value;
    }
    return attributes;
  }

  /** A dataset that is one short value or a few; null where it is something else. */
  smallValueOf(path: string, metadata: Metadata): AttributeValue | null {
    if (!isSmallValue(metadata)) return null;
    return this.call(path, (module, id) =>
      readValue(module, metadata, {
        read: (pointer) => module.get_dataset_data(id, path, null, null, null, pointer),
        reclaim: (pointer) => module.reclaim_vlen_memory(id, path, '', pointer),
      }),
    );
  }

  /**
   * A block of a dataset of numbers, little-endian.
   *
   * @param bytes - length of the block
   */
  readBlock(
    path: string,
    start: readonly number[],
    count: readonly number[],
    bytes: number,
  ): Uint8Array {
    return this.call(path, (module, id) => {
      const pointer = module._malloc(Math.max(8, bytes));
      if (pointer === 0) {
        const where = `${this.name}: ${path}`;
        throw scanError(`there is no memory left for ${bytes} bytes`, where, tooBigHint);
      }
      try {
        const counts = count.map(BigInt);
        const starts = start.map(BigInt);
        const strides = start.map(() => 1n);
        const to = BigInt(pointer);
        const status = module.get_dataset_data(id, path, counts, starts, strides, to);
        if (status < 0) throw this.refusalAt(path);
        return module.HEAPU8.slice(pointer, pointer + bytes);
      } finally {
        module._free(pointer);
      }
    });
  }

  private refusalAt(path: string, cause?: unknown): RimlightError {
    return refusal('the data could not be read', `${this.name}: ${path}`, this.session, cause);
  }

  /** Whatever the library throws becomes an error about the file. */
  private call<T>(path: string, run: (module: H5Module, id: bigint) => T): T {
    const { library, id } = this.session;
    try {
      return run(library.module, id);
    } catch (error) {
      if (isRimlightError(error)) throw error;
      library.noteThrow(error);
      throw this.refusalAt(path, error);
    } finally {
      library.takeComplaints();
    }
  }
}

async function openSession(source: ByteSource): Promise<Session> {
  const library = await loadHdf5();
  try {
    return await openIn(library, source);
  } catch (error) {
    if (!library.isBroken || library.filesSeen === 1) throw error;
    // An earlier damaged file may be to blame: once more in a fresh instance.
    return openIn(await loadHdf5(), source);
  }
}

async function openIn(library: Hdf5Library, source: ByteSource): Promise<Session> {
  const mounted = await library.mount(source);
  const { module } = library;
  let cause: unknown;
  try {
    const id = module.open(mounted.path, module.H5F_ACC_RDONLY, false, -1, -1);
    if (id >= 0n) return { library, mounted, id };
  } catch (error) {
    library.noteThrow(error);
    cause = error;
  }
  mounted.unmount();
  library.noteClose();
  const what = 'the HDF5 file could not be opened';
  throw refusal(what, source.name, { library, mounted }, cause);
}

function refusal(
  what: string,
  where: string,
  { library, mounted }: Pick<Session, 'library' | 'mounted'>,
  cause?: unknown,
): RimlightError {
  const complaints = library.takeComplaints();
  const failure = mounted.takeFailure();
  if (failure !== null) return asScanError(failure, 'the file could not be read', where);
  const reason = library.isBroken
    ? 'it is damaged in a way that stopped the HDF5 library'
    : (reasonOf(complaints) ?? (cause instanceof Error ? cause.message : null));
  return scanError(reason === null ? what : `${what}: ${reason}`, where, undefined, cause);
}

/** The innermost of the library's complaints: "#004: H5F.c line 12 in H5F_open(): truncated file: eof = …". */
function reasonOf(complaints: readonly string[]): string | null {
  const reasons = complaints
    .map((line) => /^\s*#\d+: .*?\(\): (.*)$/.exec(line)?.[1].trim())
    .filter((reason) => reason !== undefined);
  return reasons.at(-1) ?? null;
}
