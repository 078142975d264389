/** One open HDF5 file: the library's calls, each with its outcome checked. */
import { isRimlightError, type RimlightError } from '../../errors';
import type { AttributeValue, ByteSource } from '../container';
import { asScanError, scanError } from '../scan-error';
import { type Hdf5Library, loadHdf5, type MountedFile } from './library';
import { isSmallValue, type Metadata, readValue } from './values';

export type ObjectKind = 'group' | 'dataset' | 'broken' | 'external' | 'other';

export class Hdf5File {
  private constructor(
    readonly name: string,
    private readonly library: Hdf5Library,
    private readonly mounted: MountedFile,
    private readonly id: bigint,
  ) {}

  /** @throws RimlightError 'scan' - when it is no HDF5 file or is damaged */
  static async open(source: ByteSource): Promise<Hdf5File> {
    const library = await loadHdf5();
    const mounted = await library.mount(source);
    const { module } = library;
    const refuse = (cause?: unknown): RimlightError => {
      mounted.unmount();
      return refusal('the HDF5 file could not be opened', source.name, library, mounted, cause);
    };
    let id: bigint;
    try {
      id = module.open(mounted.path, module.H5F_ACC_RDONLY, false, -1, -1);
    } catch (error) {
      throw refuse(error);
    }
    if (id < 0n) throw refuse();
    return new Hdf5File(source.name, library, mounted, id);
  }

  close(): void {
    try {
      this.library.module.close_file(this.id);
    } finally {
      this.mounted.unmount();
    }
  }

  kindOf(path: string): ObjectKind {
    const { module } = this.library;
    const type = this.call(path, () => module.get_type(this.id, path));
    if (type === module.H5G_GROUP) return 'group';
    if (type === module.H5G_DATASET) return 'dataset';
    if (type === module.H5G_LINK || type === -1) return 'broken';
    return type === module.H5G_UDLINK ? 'external' : 'other';
  }

  namesIn(path: string): readonly string[] {
    return this.call(path, () => this.library.module.get_names(this.id, path, false));
  }

  /** The same for every path that leads to the same object: its place in the file. */
  identityOf(path: string): string {
    const { module } = this.library;
    const reference = this.call(path, () => module.create_object_reference(this.id, path));
    const place = Array.from(reference).join('.');
    return /[1-9]/.test(place) ? place : path;
  }

  metadataOf(path: string): Metadata {
    return this.call(path, () => this.library.module.get_dataset_metadata(this.id, path));
  }

  filtersOf(path: string): readonly { readonly id: number; readonly name: string }[] {
    return this.call(path, () => this.library.module.get_dataset_filters(this.id, path));
  }

  attributesOf(path: string): Readonly<Record<string, AttributeValue>> {
    const { module } = this.library;
    const names = this.call(path, () => module.get_attribute_names(this.id, path));
    const attributes: Record<string, AttributeValue> = {};
    for (const name of names) {
      const value = this.call(path, () => {
        const metadata = module.get_attribute_metadata(this.id, path, name);
        if (!isSmallValue(metadata)) return null;
        return readValue(module, metadata, {
          read: (pointer) => module.get_attribute_data(this.id, path, name, pointer),
          reclaim: (pointer) => module.reclaim_vlen_memory(this.id, path, name, pointer),
        });
      });
      if (value !== null) attributes[name] = value;
    }
    return attributes;
  }

  /** A dataset that is one short value or a few; null where it is something else. */
  smallValueOf(path: string, metadata: Metadata): AttributeValue | null {
    if (!isSmallValue(metadata)) return null;
    const { module } = this.library;
    return this.call(path, () =>
      readValue(module, metadata, {
        read: (pointer) => module.get_dataset_data(this.id, path, null, null, null, pointer),
        reclaim: (pointer) => module.reclaim_vlen_memory(this.id, path, '', pointer),
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
    const { module } = this.library;
    const where = `${this.name}: ${path}`;
    return this.call(path, () => {
      const pointer = module._malloc(Math.max(8, bytes));
      if (pointer === 0) {
        throw scanError(`there is no memory left for ${bytes} bytes`, where, 'Close other scans.');
      }
      try {
        const status = module.get_dataset_data(
          this.id,
          path,
          count.map(BigInt),
          start.map(BigInt),
          start.map(() => 1n),
          BigInt(pointer),
        );
        if (status < 0) throw this.refusalAt(path);
        return module.HEAPU8.slice(pointer, pointer + bytes);
      } finally {
        module._free(pointer);
      }
    });
  }

  private refusalAt(path: string, cause?: unknown): RimlightError {
    const where = `${this.name}: ${path}`;
    return refusal('the data could not be read', where, this.library, this.mounted, cause);
  }

  /** Whatever the library throws becomes an error about the file. */
  private call<T>(path: string, run: () => T): T {
    try {
      return run();
    } catch (error) {
      throw isRimlightError(error) ? error : this.refusalAt(path, error);
    } finally {
      this.library.takeComplaints();
    }
  }
}

function refusal(
  what: string,
  where: string,
  library: Hdf5Library,
  mounted: MountedFile,
  cause: unknown,
): RimlightError {
  const complaints = library.takeComplaints();
  const failure = mounted.takeFailure();
  if (failure !== null) return asScanError(failure, 'the file could not be read', where);
  const reason = reasonOf(complaints) ?? (cause instanceof Error ? cause.message : null);
  return scanError(reason === null ? what : `${what}: ${reason}`, where, undefined, cause);
}

/** The innermost of the library's complaints: "#004: H5F.c line 12 in H5F_open(): truncated file: eof = …". */
function reasonOf(complaints: readonly string[]): string | null {
  const reasons = complaints
    .map((line) => /^\s*#\d+: .*?\(\): (.*)$/.exec(line)?.[1].trim())
    .filter((reason) => reason !== undefined);
  return reasons.at(-1) ?? null;
}
