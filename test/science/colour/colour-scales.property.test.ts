/** Laws of the colour scales: lightness runs one way, steps are even, hues keep. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { colourScale, namedScales, tableSize } from '../../../src/science/colour/colour-scales';
import { oklabDistance, oklabFromBytes } from '../../../src/science/colour/oklab';
import {
  encodedFromLinear,
  formatHexColour,
  linearFromBytes,
} from '../../../src/science/colour/srgb';

const entriesOf = (table: Uint8Array) =>
  Array.from({ length: table.length / 3 }, (_, i) =>
    oklabFromBytes([table[3 * i]!, table[3 * i + 1]!, table[3 * i + 2]!]),
  );
const names = (kind: string) =>
  namedScales.filter((scale) => scale.kind === kind).map(({ name }) => name);

/** One byte of one part changes lightness by at most this: rounding, not design. */
const byteStep = 0.006;

describe('sequential scales', () => {
  it.each(names('sequential'))('%s grows lighter from entry to entry', (name) => {
    const entries = entriesOf(colourScale(name).table);
    expect(entries).toHaveLength(tableSize);
    // Over 16 entries, since bytes cannot tell the darkest sixteen apart.
    for (let i = 16; i < entries.length; i++) {
      expect(entries[i]!.lightness).toBeGreaterThan(entries[i - 16]!.lightness);
      expect(entries[i]!.lightness).toBeGreaterThan(entries[i - 1]!.lightness - byteStep);
    }
  });

  it.each(names('sequential'))('%s spans at least half of all lightness', (name) => {
    const entries = entriesOf(colourScale(name).table);
    expect(entries.at(-1)!.lightness - entries[0]!.lightness).toBeGreaterThan(0.5);
  });

  it.each(['viridis', 'cividis', 'grey'])('%s takes even steps', (name) => {
    const entries = entriesOf(colourScale(name).table);
    const steps = Array.from({ length: 15 }, (_, i) =>
      oklabDistance(entries[17 * i]!, entries[17 * (i + 1)]!),
    );
    // A rainbow's steps differ tenfold; these scales were made even in another space (CAM02-UCS), so threefold.
    expect(Math.max(...steps) / Math.min(...steps)).toBeLessThan(3);
  });
});

describe('ramps', () => {
  it('go from black to their colour, with the cube of the share of its light', () => {
    const part = fc.integer({ min: 0, max: 255 });
    fc.assert(
      fc.property(part, part, part, (red, green, blue) => {
        const { table } = colourScale(formatHexColour([red, green, blue]));
        expect([...table.subarray(0, 3)]).toEqual([0, 0, 0]);
        expect([...table.subarray(-3)]).toEqual([red, green, blue]);
        // OKLab is linear in the cube root of light (Ottosson 2020): equal steps of it are cubes of light.
        linearFromBytes([red, green, blue]).forEach((light, which) => {
          for (let i = 0; i < tableSize; i += 15) {
            const wanted = 255 * encodedFromLinear((i / 255) ** 3 * light);
            // half a byte of rounding, and the ten digits of the matrices
            expect(Math.abs(table[3 * i + which]! - wanted)).toBeLessThan(0.51);
          }
        });
      }),
    );
  });
});

describe('diverging scales', () => {
  const diverging = names('diverging');

  it.each(diverging)('%s is neutral at zero, wherever zero lies', (name) => {
    fc.assert(
      fc.property(fc.double({ min: 0.02, max: 0.98, noNaN: true }), (zero) => {
        const entries = entriesOf(colourScale(name, zero).table);
        const { a, b } = entries[Math.round(zero * 255)]!;
        expect(Math.hypot(a, b)).toBeLessThan(0.012);
      }),
    );
  });

  it.each(diverging)('%s looks equally strong at equal distances from zero', (name) => {
    const entries = entriesOf(colourScale(name, 0.5).table);
    for (let i = 0; i < 128; i++) {
      const below = entries[i]!;
      const above = entries[255 - i]!;
      expect(Math.abs(below.lightness - above.lightness)).toBeLessThan(byteStep);
      const chroma = Math.hypot(below.a, below.b) - Math.hypot(above.a, above.b);
      expect(Math.abs(chroma)).toBeLessThan(0.012);
    }
  });

  it.each(diverging)('%s has lightness run one way along each arm', (name) => {
    const entries = entriesOf(colourScale(name, 0.5).table).slice(128);
    const sign = Math.sign(entries.at(-1)!.lightness - entries[0]!.lightness);
    for (let i = 8; i < entries.length; i++)
      expect(sign * (entries[i]!.lightness - entries[i - 8]!.lightness)).toBeGreaterThan(0);
  });

  it.each(diverging)('%s gives the nearer limit only what its distance deserves', (name) => {
    const whole = entriesOf(colourScale(name, 0.5).table);
    const lopsided = entriesOf(colourScale(name, 0.25).table);
    // With zero at a quarter, low is a third as far from zero as high.
    const third = whole[Math.round(127.5 - 127.5 / 3)]!;
    expect(oklabDistance(lopsided[0]!, third)).toBeLessThan(0.012);
    expect(oklabDistance(lopsided.at(-1)!, whole.at(-1)!)).toBeLessThan(0.003);
  });
});
