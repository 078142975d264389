/** Small reads served from pages kept in memory: HDF5 asks for a file's structure in thousands of small pieces. */

const pageBytes = 64 << 10;
const mostPages = 64;

export class CachedReader {
  /** page number → bytes; the page used last stands last */
  private readonly pages = new Map<number, Uint8Array>();

  constructor(
    private readonly readSync: (from: number, to: number) => Uint8Array,
    readonly size: number,
  ) {}

  /**
   * Fills `out` from byte `position` onwards.
   *
   * @returns bytes filled; fewer than asked for only at the end of the file
   */
  readInto(out: Uint8Array, position: number): number {
    const to = Math.min(position + out.length, this.size);
    if (position >= to) return 0;
    if (to - position >= pageBytes) {
      const bytes = this.readSync(position, to);
      out.set(bytes);
      return bytes.length;
    }
    let done = 0;
    while (position + done < to) {
      const at = position + done;
      const page = this.pageAt(Math.floor(at / pageBytes));
      const skip = at % pageBytes;
      const part = page.subarray(skip, Math.min(page.length, skip + to - at));
      if (part.length === 0) break;
      out.set(part, done);
      done += part.length;
    }
    return done;
  }

  private pageAt(number: number): Uint8Array {
    let page = this.pages.get(number);
    if (page === undefined) {
      const from = number * pageBytes;
      page = this.readSync(from, Math.min(from + pageBytes, this.size));
      const [oldest] = this.pages.keys();
      if (this.pages.size >= mostPages && oldest !== undefined) this.pages.delete(oldest);
    } else this.pages.delete(number);
    this.pages.set(number, page);
    return page;
  }
}
