import { describe, expect, it } from 'vitest';
import { lookup3 } from '../../../src/io/write/lookup3';
import { Crc32 } from '../../../src/io/zip/crc32';

const ascii = (text: string): Uint8Array => new TextEncoder().encode(text);

describe('checksums', () => {
  it.each([
    // B. Jenkins, lookup3.c, driver5(): hashlittle("", 0) and hashlittle("Four score…", 0), from memory.
    ['', 0xdeadbeef],
    ['Four score and seven years ago', 0x17770551],
  ])('lookup3 of %j', (text, hash) => {
    expect(lookup3(ascii(text))).toBe(hash);
  });

  it.each([
    // Check value of CRC-32/ISO-HDLC: the catalogue of parametrised CRC algorithms (G. Cook), from memory; zlib agrees.
    ['123456789', 0xcbf43926],
    ['', 0],
    ['IEND', 0xae426082], // the last chunk of every PNG: ISO/IEC 15948, from memory
  ])('CRC-32 of %j', (text, value) => {
    const crc = new Crc32();
    crc.add(ascii(text));
    expect(crc.value()).toBe(value);
  });

  it('CRC-32 goes on from piece to piece', () => {
    const crc = new Crc32();
    crc.add(ascii('1234'));
    crc.add(ascii('56789'));
    expect(crc.value()).toBe(0xcbf43926);
  });
});
