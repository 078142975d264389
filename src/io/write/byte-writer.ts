/** Little-endian numbers and text one after another into growing memory: what binary headers are made with. */

/** Address and length "undefined" in HDF5: all bits set. */
export const undefinedAddress = 0xffffffffffffffffn;

export class ByteWriter {
  private bytes = new Uint8Array(256);
  private view = new DataView(this.bytes.buffer);
  private used = 0;

  get length(): number {
    return this.used;
  }

  u8(...values: readonly number[]): this {
    for (const value of values) {
      const at = this.grow(1);
      this.view.setUint8(at, value);
    }
    return this;
  }

  u16(value: number): this {
    const at = this.grow(2);
    this.view.setUint16(at, value, true);
    return this;
  }

  u32(value: number): this {
    const at = this.grow(4);
    this.view.setUint32(at, value, true);
    return this;
  }

  u64(value: number | bigint): this {
    const at = this.grow(8);
    this.view.setBigUint64(at, BigInt(value), true);
    return this;
  }

  raw(bytes: Uint8Array): this {
    const at = this.grow(bytes.length);
    this.bytes.set(bytes, at);
    return this;
  }

  ascii(text: string): this {
    return this.raw(new TextEncoder().encode(text));
  }

  zeros(count: number): this {
    this.grow(count);
    return this;
  }

  /** A copy of what was written. */
  take(): Uint8Array {
    return this.bytes.slice(0, this.used);
  }

  private grow(by: number): number {
    const at = this.used;
    this.used += by;
    if (this.used > this.bytes.length) {
      const wider = new Uint8Array(Math.max(this.used, this.bytes.length * 2));
      wider.set(this.bytes.subarray(0, at));
      this.bytes = wider;
      this.view = new DataView(wider.buffer);
    }
    return at;
  }
}
