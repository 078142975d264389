/** A damaged file of any format is read, or refused in a sentence: it never hangs and is never a fault of ours. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { isRimlightError } from '../../src/errors';
import { readVariant } from './read-variant';
import { type Variant, variants } from './scan-variants';

/** A share of the file, evenly: fc.double would choose tiny numbers nearly always. */
const place = fc.nat(9999).map((at) => at / 10_000);

/** Bytes changed, a piece cut out or doubled, the end cut off. */
const damage = fc.oneof(
  fc.record({
    kind: fc.constant('change'),
    at: place,
    bytes: fc.uint8Array({ minLength: 1, maxLength: 6 }),
  }),
  fc.record({
    kind: fc.constant('cut'),
    at: place,
    bytes: fc.uint8Array({ minLength: 1, maxLength: 40 }),
  }),
  fc.record({
    kind: fc.constant('end'),
    at: place,
    bytes: fc.constant(new Uint8Array(0)),
  }),
);

function damaged(
  bytes: Uint8Array,
  { kind, at, bytes: other }: { kind: string; at: number; bytes: Uint8Array },
): Uint8Array {
  // Squared: headers stand at the front, and there damage is the most telling.
  const from = Math.floor(at * at * (bytes.length - 1));
  if (kind === 'end') return bytes.slice(0, from);
  if (kind === 'cut')
    return Uint8Array.from([...bytes.subarray(0, from), ...bytes.subarray(from + other.length)]);
  const changed = bytes.slice();
  changed.set(other.subarray(0, bytes.length - from), from);
  return changed;
}

const formats = ['npy', 'npz', 'HDF5', 'TIFF', 'text', 'JCAMP-DX'] as const;

describe('a damaged file', () => {
  it.each(formats)('of %s is read or refused for a reason', async (format) => {
    const intact = variants.filter(({ name }) => name.startsWith(format));
    expect(intact.length).toBeGreaterThan(0);
    let refused = 0;
    await fc.assert(
      fc.asyncProperty(fc.constantFrom(...intact), damage, async (variant: Variant, how) => {
        try {
          await readVariant({ ...variant, bytes: damaged(variant.bytes, how) });
        } catch (error) {
          refused++;
          expect(isRimlightError(error) ? error.kind : String(error)).toMatch(/^(scan|recipe)$/);
          expect(isRimlightError(error) && error.hint.length > 0 && error.what.length > 0).toBe(
            true,
          );
          expect(String(error)).not.toMatch(/undefined|\[object/);
        }
      }),
      { numRuns: 150 },
    );
    expect(refused).toBeGreaterThan(5);
  });
});
