/** Numbers and texts of a TIFF file's fields, read through small pages kept in memory. */
import { readExactly } from '../byte-source';
import type { ByteSource } from '../container';
import { scanError } from '../scan-error';

/** Where a field's values lie. */
export interface Field {
  readonly type: number;
  readonly count: number;
  readonly at: number;
}

/** Bytes of each type of field, by its number; 0 for unknown ones (TIFF 6.0, section 2; 13, 16 to 18 are later). */
const typeBytes: Readonly<Record<number, number>> = {
  1: 1,
  2: 1,
  3: 2,
  4: 4,
  5: 8,
  6: 1,
  7: 1,
  8: 2,
  9: 4,
  10: 8,
  11: 4,
  12: 8,
  13: 4,
  16: 8,
  17: 8,
  18: 8,
};

export function fieldBytes(type: number): number {
  return typeBytes[type] ?? 0;
}

const pageBytes = 4096;
const mostPages = 256;
/** One strip per row of a large page is still far below this. */
const mostValues = 1 << 22;

export class TiffBytes {
  private readonly pages = new Map<number, Uint8Array>();
  readonly name: string;

  constructor(
    readonly source: ByteSource,
    readonly isLittleEndian: boolean,
    readonly isBig: boolean,
  ) {
    this.name = source.name;
  }

  /** Exactly these bytes. */
  async read(from: number, to: number): Promise<Uint8Array> {
    if (to - from > pageBytes) return readExactly(this.source, from, to);
    const out = new Uint8Array(to - from);
    for (let at = from; at < to; ) {
      const page = await this.page(Math.floor(at / pageBytes));
      const part = page.subarray(at % pageBytes, (at % pageBytes) + to - at);
      if (part.length === 0) return readExactly(this.source, from, to);
      out.set(part, at - from);
      at += part.length;
    }
    return out;
  }

  async uint16(at: number): Promise<number> {
    return (await this.view(at, 2)).getUint16(0, this.isLittleEndian);
  }

  async uint32(at: number): Promise<number> {
    return (await this.view(at, 4)).getUint32(0, this.isLittleEndian);
  }

  async uint64(at: number): Promise<number> {
    const value = Number((await this.view(at, 8)).getBigUint64(0, this.isLittleEndian));
    if (!Number.isSafeInteger(value)) {
      throw scanError('an offset or length is absurd', `${this.name}, byte ${at}`);
    }
    return value;
  }

  offset(at: number): Promise<number> {
    return this.isBig ? this.uint64(at) : this.uint32(at);
  }

  /** Whole numbers of a field; a fraction (types 5 and 10) as its quotient. */
  async numbers(field: Field): Promise<readonly number[]> {
    const { type, count, at } = field;
    const size = fieldBytes(type);
    if (count > mostValues) {
      throw scanError(`a field claims to have ${count} values`, `${this.name}, byte ${at}`);
    }
    const bytes = await this.read(at, at + count * size);
    const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
    return Array.from({ length: count }, (_, i) => this.value(view, type, i * size));
  }

  /** ASCII by the book; UTF-8 in practice. Up to the first zero. */
  async text(field: Field, most: number): Promise<string> {
    if (field.type !== 2) return '';
    const bytes = await this.read(field.at, field.at + Math.min(field.count, most));
    const end = bytes.indexOf(0);
    return new TextDecoder().decode(end < 0 ? bytes : bytes.subarray(0, end)).trim();
  }

  private value(view: DataView, type: number, at: number): number {
    const little = this.isLittleEndian;
    switch (type) {
      case 3:
        return view.getUint16(at, little);
      case 4:
      case 13:
        return view.getUint32(at, little);
      case 5:
        return view.getUint32(at, little) / view.getUint32(at + 4, little);
      case 8:
        return view.getInt16(at, little);
      case 9:
        return view.getInt32(at, little);
      case 10:
        return view.getInt32(at, little) / view.getInt32(at + 4, little);
      case 11:
        return view.getFloat32(at, little);
      case 12:
        return view.getFloat64(at, little);
      case 16:
      case 18:
        return Number(view.getBigUint64(at, little));
      case 17:
        return Number(view.getBigInt64(at, little));
      case 6:
        return view.getInt8(at);
      default:
        return view.getUint8(at);
    }
  }

  private async view(at: number, length: number): Promise<DataView> {
    const bytes = await this.read(at, at + length);
    return new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  }

  private async page(number: number): Promise<Uint8Array> {
    let page = this.pages.get(number);
    if (page === undefined) {
      const from = number * pageBytes;
      const { size } = this.source;
      page =
        from >= size
          ? new Uint8Array(0)
          : await readExactly(this.source, from, Math.min(from + pageBytes, size));
      const [oldest] = this.pages.keys();
      if (this.pages.size >= mostPages && oldest !== undefined) this.pages.delete(oldest);
      this.pages.set(number, page);
    }
    return page;
  }
}
