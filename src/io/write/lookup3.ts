/** The checksum of HDF5 metadata blocks. */

/**
 * Jenkins' lookup3 hash (`hashlittle`, initial value 0).
 *
 * @returns 32 bits, unsigned
 * @see B. Jenkins, lookup3.c (2006), public domain; named by the HDF5 file format specification, version 3, section III.C
 */
export function lookup3(bytes: Uint8Array): number {
  let a = (0xdeadbeef + bytes.length) | 0;
  let b = a;
  let c = a;
  let at = 0;
  let left = bytes.length;
  const word = (from: number): number =>
    (bytes[from] ?? 0) |
    ((bytes[from + 1] ?? 0) << 8) |
    ((bytes[from + 2] ?? 0) << 16) |
    ((bytes[from + 3] ?? 0) << 24);
  while (left > 12) {
    a = (a + word(at)) | 0;
    b = (b + word(at + 4)) | 0;
    c = (c + word(at + 8)) | 0;
    a = ((a - c) | 0) ^ turn(c, 4);
    c = (c + b) | 0;
    b = ((b - a) | 0) ^ turn(a, 6);
    a = (a + c) | 0;
    c = ((c - b) | 0) ^ turn(b, 8);
    b = (b + a) | 0;
    a = ((a - c) | 0) ^ turn(c, 16);
    c = (c + b) | 0;
    b = ((b - a) | 0) ^ turn(a, 19);
    a = (a + c) | 0;
    c = ((c - b) | 0) ^ turn(b, 4);
    b = (b + a) | 0;
    at += 12;
    left -= 12;
  }
  if (left === 0) return c >>> 0;
  // Bytes past the end count as zero.
  a = (a + word(at)) | 0;
  b = (b + word(at + 4)) | 0;
  c = (c + word(at + 8)) | 0;
  c = ((c ^ b) - turn(b, 14)) | 0;
  a = ((a ^ c) - turn(c, 11)) | 0;
  b = ((b ^ a) - turn(a, 25)) | 0;
  c = ((c ^ b) - turn(b, 16)) | 0;
  a = ((a ^ c) - turn(c, 4)) | 0;
  b = ((b ^ a) - turn(a, 14)) | 0;
  c = ((c ^ b) - turn(b, 24)) | 0;
  return c >>> 0;
}

function turn(value: number, bits: number): number {
  return (value << bits) | (value >>> (32 - bits));
}
