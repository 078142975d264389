/**
 * The checksum of zip members and PNG chunks: CRC-32 with polynomial 0x04c11db7, bits reversed.
 *
 * @see ISO/IEC 15948 (PNG), annex D; ITU-T V.42, section 8.1.1.6.2
 */
const table = Uint32Array.from({ length: 256 }, (_, byte) => {
  let value = byte;
  for (let bit = 0; bit < 8; bit++) value = value & 1 ? 0xedb88320 ^ (value >>> 1) : value >>> 1;
  return value;
});

export class Crc32 {
  private state = 0xffffffff;

  add(bytes: Uint8Array): void {
    let { state } = this;
    for (let i = 0; i < bytes.length; i++) state = table[(state ^ bytes[i]) & 0xff] ^ (state >>> 8);
    this.state = state;
  }

  /** Unsigned; of all bytes added so far. */
  value(): number {
    return (this.state ^ 0xffffffff) >>> 0;
  }
}
