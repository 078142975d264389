/** Undoes what a TIFF writer did to make rows compress better, and brings samples to little-endian order. */
import { swapBytes } from '../dtype';

export interface RowLayout {
  /** samples side by side in one row: pixels × samples of a pixel in this block */
  readonly values: number;
  /** samples of a pixel in this block */
  readonly samples: number;
  readonly bytesPerSample: number;
  readonly isLittleEndian: boolean;
  readonly predictor: number;
}

/**
 * In place, row by row.
 *
 * @see Adobe, TIFF Revision 6.0 (1992), section 14 (predictor 2); TIFF Technical Note 3 (2005, predictor 3)
 */
export function restoreRows(bytes: Uint8Array, layout: RowLayout): void {
  const { values, bytesPerSample, isLittleEndian, predictor } = layout;
  const rowBytes = values * bytesPerSample;
  // Predictor 3 has an order of its own, the same in all files.
  if (predictor !== 3 && !isLittleEndian) swapBytes(bytes, bytesPerSample);
  if (predictor === 1) return;
  for (let at = 0; at + rowBytes <= bytes.length; at += rowBytes) {
    const row = bytes.subarray(at, at + rowBytes);
    if (predictor === 2) addDifferences(row, layout);
    else joinBytes(row, layout);
  }
}

function addDifferences(row: Uint8Array, { samples, bytesPerSample }: RowLayout): void {
  if (bytesPerSample === 8) {
    addLong(row, samples);
    return;
  }
  const values = intsOf(row, bytesPerSample);
  for (let i = samples; i < values.length; i++) values[i] += values[i - samples];
}

function addLong(row: Uint8Array, samples: number): void {
  const values = new BigUint64Array(row.buffer, row.byteOffset, row.length / 8);
  for (let i = samples; i < values.length; i++) values[i] += values[i - samples];
}

/** Rows begin at a multiple of the sample's size, because blocks begin at 0. */
function intsOf(row: Uint8Array, bytesPerSample: number): Uint8Array | Uint16Array | Uint32Array {
  const count = row.length / bytesPerSample;
  if (bytesPerSample === 4) return new Uint32Array(row.buffer, row.byteOffset, count);
  return bytesPerSample === 2 ? new Uint16Array(row.buffer, row.byteOffset, count) : row;
}

/** All highest bytes of the row come first, then all second ones, …, each as the difference to the one before. */
function joinBytes(row: Uint8Array, { values, samples, bytesPerSample }: RowLayout): void {
  for (let i = samples; i < row.length; i++) row[i] += row[i - samples];
  const apart = row.slice();
  for (let byte = 0; byte < bytesPerSample; byte++) {
    const plane = (bytesPerSample - 1 - byte) * values;
    for (let i = 0; i < values; i++) row[i * bytesPerSample + byte] = apart[plane + i];
  }
}
