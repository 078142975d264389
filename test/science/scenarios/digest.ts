/** A digest of a made scan, for the tests in Node and in the browser. */
import type { SampleScan } from '../../../src/science/scenarios/scenario';

/** FNV-1a over counts, axis, height and truth, byte by byte, little-endian. */
export function digestOfSample(scan: SampleScan): string {
  let hash = 0x811c9dc5;
  const add = (bytes: Uint8Array) => {
    for (const byte of bytes) hash = Math.imul(hash ^ byte, 0x01000193);
  };
  const addArray = (array: Uint16Array | Float64Array) =>
    add(new Uint8Array(array.buffer, array.byteOffset, array.byteLength));
  for (const array of [scan.counts, scan.wavelengthAirNm, scan.heightNm]) addArray(array);
  for (const array of [scan.darkCounts, scan.response]) addArray(array);
  for (const map of scan.truth.maps) addArray(map.values);
  for (const { y, x, k, counts } of scan.truth.spikes) addArray(Float64Array.of(y, x, k, counts));
  return (hash >>> 0).toString(16).padStart(8, '0');
}
