/** Reads a window of one TIFF page: only the strips or tiles it touches, and of unpacked ones only the rows. */
import { readExactly } from '../byte-source';
import { bytesOfType } from '../dtype';
import { scanError } from '../scan-error';
import { unpackBlock } from './compression';
import type { TiffBytes } from './fields';
import type { Page } from './page';
import { restoreRows } from './predictor';

/** Half-open ranges. */
export interface PageWindow {
  readonly samples: readonly [from: number, to: number];
  readonly rows: readonly [from: number, to: number];
  readonly columns: readonly [from: number, to: number];
}

export class PageReader {
  private places: { offsets: readonly number[]; byteCounts: readonly number[] } | null = null;
  /** the block unpacked last: rows of a page are often asked for one after another */
  private kept: { index: number; bytes: Uint8Array } | null = null;

  constructor(
    private readonly bytes: TiffBytes,
    private readonly page: Page,
    private readonly where: string,
  ) {}

  /** Lets go of what was kept for the next window. */
  forget(): void {
    this.kept = null;
    this.places = null;
  }

  /**
   * @param out - the window in order sample, row, column, little-endian; overwritten
   */
  async readWindow(window: PageWindow, out: Uint8Array): Promise<void> {
    const { page } = this;
    const [s0, s1] = window.samples;
    const across = Math.ceil(page.width / page.blockWidth);
    const down = Math.ceil(page.height / page.blockHeight);
    const planes = page.isPlanar ? Array.from({ length: s1 - s0 }, (_, i) => s0 + i) : [0];
    for (const plane of planes) {
      for (
        let row = blockOf(window.rows[0], page.blockHeight);
        row * page.blockHeight < window.rows[1];
        row++
      ) {
        for (
          let column = blockOf(window.columns[0], page.blockWidth);
          column * page.blockWidth < window.columns[1];
          column++
        ) {
          const index = (plane * down + row) * across + column;
          await this.copyBlock({ index, row, column, plane }, window, out);
        }
      }
    }
  }

  private async copyBlock(
    { index, row, column, plane }: BlockPlace,
    window: PageWindow,
    out: Uint8Array,
  ): Promise<void> {
    const { page } = this;
    const size = bytesOfType[page.type];
    const perPixel = page.isPlanar ? 1 : page.samples;
    const top = row * page.blockHeight;
    const left = column * page.blockWidth;
    const rows: Range = [
      Math.max(window.rows[0], top),
      Math.min(window.rows[1], top + page.blockHeight),
    ];
    const columns: Range = [
      Math.max(window.columns[0], left),
      Math.min(window.columns[1], left + page.blockWidth),
    ];
    const { bytes, firstRow } = await this.rowsOfBlock(index, top, rows);
    const samples: readonly number[] = page.isPlanar
      ? [plane]
      : Array.from(
          { length: window.samples[1] - window.samples[0] },
          (_, i) => window.samples[0] + i,
        );
    const outColumns = window.columns[1] - window.columns[0];
    const outRows = window.rows[1] - window.rows[0];
    for (const sample of samples) {
      for (let y = rows[0]; y < rows[1]; y++) {
        const from =
          ((y - top - firstRow) * page.blockWidth + (columns[0] - left)) * perPixel +
          (page.isPlanar ? 0 : sample);
        const to =
          ((sample - window.samples[0]) * outRows + (y - window.rows[0])) * outColumns +
          (columns[0] - window.columns[0]);
        copyValues(
          bytes,
          from * size,
          perPixel * size,
          out,
          to * size,
          columns[1] - columns[0],
          size,
        );
      }
    }
  }

  /** Unpacked, little-endian rows of a block that include the ones asked for; `firstRow` counts from the block's top. */
  private async rowsOfBlock(
    index: number,
    top: number,
    rows: Range,
  ): Promise<{ readonly bytes: Uint8Array; readonly firstRow: number }> {
    if (this.kept?.index === index) return { bytes: this.kept.bytes, firstRow: 0 };
    const { page } = this;
    const size = bytesOfType[page.type];
    const values = page.blockWidth * (page.isPlanar ? 1 : page.samples);
    const rowBytes = values * size;
    // The last strip ends with the page; tiles are always whole.
    const blockRows = page.isTiled
      ? page.blockHeight
      : Math.min(page.blockHeight, page.height - top);
    const { offset, byteCount } = await this.placeOf(index, blockRows * rowBytes);
    const where = `${this.where}, byte ${offset}`;
    const layout = {
      values,
      samples: page.isPlanar ? 1 : page.samples,
      bytesPerSample: size,
      isLittleEndian: this.bytes.isLittleEndian,
      predictor: page.predictor,
    };
    const { source } = this.bytes;
    if (page.compression === 1 && page.predictor === 1) {
      const firstRow = rows[0] - top;
      const from = offset + firstRow * rowBytes;
      const to = offset + (rows[1] - top) * rowBytes;
      if (to > offset + byteCount) throw tooShort(byteCount, blockRows * rowBytes, where);
      const bytes = await readExactly(source, from, to, where);
      restoreRows(bytes, layout);
      return { bytes, firstRow };
    }
    const packed = await readExactly(source, offset, offset + byteCount, where);
    const bytes = unpackBlock(packed, page.compression, blockRows * rowBytes, where);
    restoreRows(bytes, layout);
    this.kept = { index, bytes };
    return { bytes, firstRow: 0 };
  }

  private async placeOf(
    index: number,
    expected: number,
  ): Promise<{ readonly offset: number; readonly byteCount: number }> {
    const { page, bytes } = this;
    this.places ??= {
      offsets: await bytes.numbers(page.offsets),
      byteCounts: page.byteCounts === null ? [] : await bytes.numbers(page.byteCounts),
    };
    const { offsets, byteCounts } = this.places;
    const offset = offsets[index];
    // Old writers left the counts out where nothing is packed.
    const byteCount = byteCounts[index] ?? (page.compression === 1 ? expected : undefined);
    if (offset === undefined || byteCount === undefined) {
      throw scanError(`it says of ${offsets.length} blocks only where they lie`, this.where);
    }
    if (!Number.isSafeInteger(offset + byteCount) || offset + byteCount > bytes.source.size) {
      throw scanError(
        `its pixels should lie at bytes ${offset} to ${offset + byteCount}, but the file ends at ${bytes.source.size}`,
        this.where,
        'It was cut off: copy it again, or repeat the export.',
      );
    }
    return { offset, byteCount };
  }
}

type Range = readonly [from: number, to: number];

interface BlockPlace {
  readonly index: number;
  readonly row: number;
  readonly column: number;
  readonly plane: number;
}

function blockOf(at: number, length: number): number {
  return Math.floor(at / length);
}

/** `count` values of `size` bytes, `stride` bytes apart in `bytes`, side by side into `out`. */
function copyValues(
  bytes: Uint8Array,
  from: number,
  stride: number,
  out: Uint8Array,
  to: number,
  count: number,
  size: number,
): void {
  if (stride === size) {
    out.set(bytes.subarray(from, from + count * size), to);
    return;
  }
  for (let i = 0; i < count; i++) {
    for (let byte = 0; byte < size; byte++)
      out[to + i * size + byte] = bytes[from + i * stride + byte];
  }
}

function tooShort(there: number, needed: number, where: string) {
  return scanError(`a block of pixels has ${there} bytes where ${needed} are needed`, where);
}
