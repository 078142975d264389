/** Goes through an HDF5 file's groups, each once, however links lead back to them. */
import { isRimlightError } from '../../errors';
import type { ArrayEntry, AttributeValue, GroupEntry } from '../container';
import { bytesOfType } from '../dtype';
import { shapeText, valuesOf } from '../shape';
import type { Hdf5File } from './file';
import { elementTypeOf, type Metadata } from './values';

export interface Hdf5Contents {
  readonly entries: readonly ArrayEntry[];
  readonly groups: readonly GroupEntry[];
  readonly facts: Readonly<Record<string, string | number>>;
  readonly notes: readonly string[];
}

const mostObjects = 20_000;
const mostDepth = 64;
const mostFacts = 500;
const mostFactLength = 1000;
/** A packed chunk is unpacked as a whole, in the library's memory of 2 GiB. */
const mostChunkBytes = 2 ** 30;
/** Deflate gives at most 1032 bytes for one. */
const mostRatio = 1032;

/** @param size - bytes of the file */
export function walkHdf5(file: Hdf5File, size: number): Hdf5Contents {
  return new Walk(file, size).run();
}

class Walk {
  private readonly entries: ArrayEntry[] = [];
  private readonly groups: GroupEntry[] = [];
  private readonly facts: Record<string, string | number> = {};
  private readonly notes: string[] = [];
  private readonly left = {
    external: [] as string[],
    broken: [] as string[],
    virtual: [] as string[],
    damaged: [] as string[],
  };
  /** identity → path under which a group was listed */
  private readonly seen = new Map<string, string>();
  private objects = 0;

  constructor(
    private readonly file: Hdf5File,
    private readonly size: number,
  ) {}

  run(): Hdf5Contents {
    const open = ['/'];
    for (let path = open.pop(); path !== undefined; path = open.pop()) {
      const children = this.group(path);
      // The last pushed is taken first: reversed, groups come in the file's order.
      open.push(...children.toReversed());
    }
    this.noteLeftOut();
    const { entries, groups, facts, notes } = this;
    return { entries, groups, facts, notes };
  }

  /** Lists a group and what is directly in it; gives the groups in it. */
  private group(path: string): readonly string[] {
    const groups: string[] = [];
    try {
      const identity = this.file.identityOf(path);
      const known = this.seen.get(identity);
      if (known !== undefined) {
        this.notes.push(`${path} is the same group as ${known} and is listed there.`);
        return [];
      }
      this.seen.set(identity, path);
      this.groups.push({ path, attributes: this.file.attributesOf(path) });
      for (const name of this.file.namesIn(path)) {
        const child = path === '/' ? `/${name}` : `${path}/${name}`;
        if (++this.objects > mostObjects) break;
        if (this.child(child) === 'group') groups.push(child);
      }
    } catch (error) {
      this.passOver(error, path);
    }
    return path.split('/').length > mostDepth ? [] : groups;
  }

  private child(path: string): 'group' | 'other' {
    try {
      const kind = this.file.kindOf(path);
      if (kind === 'group') return 'group';
      if (kind === 'external') this.left.external.push(path);
      else if (kind === 'broken') this.left.broken.push(path);
      else if (kind === 'dataset') this.dataset(path);
    } catch (error) {
      this.passOver(error, path);
    }
    return 'other';
  }

  private dataset(path: string): void {
    const metadata = this.file.metadataOf(path);
    const { shape } = metadata;
    if (shape === null) return;
    const type = elementTypeOf(metadata);
    if (type === null || (shape.length <= 1 && metadata.total_size === 1)) {
      this.fact(path, metadata);
      return;
    }
    // Unfound parts would read as the fill value, which is no data of anybody's.
    if (metadata.virtual_sources?.some(({ file_name }) => file_name !== '.') === true) {
      this.left.virtual.push(path);
      return;
    }
    const bytes = valuesOf(shape, path) * bytesOfType[type];
    const chunkBytes =
      metadata.chunks === null ? 0 : valuesOf(metadata.chunks, path) * bytesOfType[type];
    if (chunkBytes > mostChunkBytes) {
      this.notes.push(`${path} was left out: its chunks of ${chunkBytes} bytes are too large.`);
      return;
    }
    if (bytes > (this.size + 4096) * mostRatio) {
      this.notes.push(
        `${path} was left out: it claims ${shapeText(shape)} values, which a file of ${this.size} bytes cannot hold.`,
      );
      return;
    }
    this.entries.push({ path, shape, type, attributes: this.file.attributesOf(path) });
  }

  /** Single numbers and short texts, with their unit where one is given: "532.06 nm". */
  private fact(path: string, metadata: Metadata): void {
    if (Object.keys(this.facts).length >= mostFacts || metadata.total_size > 16) return;
    const value = this.file.smallValueOf(path, metadata);
    if (value === null) return;
    const one = typeof value === 'object' && value.length === 1 ? value[0] : value;
    if (typeof one === 'object') {
      const text = one.join(', ');
      if (text.length <= mostFactLength) this.facts[path] = text;
      return;
    }
    if (typeof one === 'string' && one.length > mostFactLength) return;
    const unit = unitOf(this.file.attributesOf(path));
    this.facts[path] = unit === '' ? one : `${one} ${unit}`;
  }

  /** What is wrong with one object is passed over; the rest may be sound. */
  private passOver(error: unknown, path: string): void {
    if (!isRimlightError(error) || error.kind !== 'scan' || this.file.isBroken) throw error;
    const list = path !== '/' && this.file.isSoftLink(path) ? this.left.broken : this.left.damaged;
    list.push(path);
  }

  private noteLeftOut(): void {
    const { external, broken, virtual, damaged } = this.left;
    const say = (paths: readonly string[], one: string, many: string): void => {
      if (paths.length === 0) return;
      const more = paths.length > 3 ? ', …' : '';
      this.notes.push(`${paths.slice(0, 3).join(', ')}${more} ${paths.length === 1 ? one : many}.`);
    };
    say(
      external,
      'leads to another file and was not followed',
      'lead to other files and were not followed',
    );
    say(
      virtual,
      'is put together from other files and was left out',
      'are put together from other files and were left out',
    );
    say(broken, 'leads nowhere', 'lead nowhere');
    say(damaged, 'is damaged and was left out', 'are damaged and were left out');
    if (this.objects > mostObjects)
      this.notes.push(`Only the first ${mostObjects} objects were listed.`);
  }
}

function unitOf(attributes: Readonly<Record<string, AttributeValue>>): string {
  const unit = attributes.units ?? attributes.unit;
  if (typeof unit === 'string') return unit;
  return typeof unit === 'object' && unit.length === 1 ? String(unit[0]) : '';
}
