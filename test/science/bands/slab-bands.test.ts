/** What kept sums must not do: spoil a faint band beside a bright line, or forget which edge they are of. */
import { describe, expect, it } from 'vitest';
import { bandQuantities, type EnergyBand } from '../../../src/science/bands/band';
import { RunningSum } from '../../../src/science/bands/block-sums';
import { directBand } from '../../../src/science/bands/direct-band';
import { createPlainKernel, type MomentKernel } from '../../../src/science/bands/moment-kernel';
import { tilePixelsFor } from '../../../src/science/bands/tiled-counts';
import { createRandom } from '../../../src/science/numeric/random';
import { energyAt, gratingAxis, poisson, type SlabParts, slabBands } from './made-slab';

const shape = { ny: 1, nx: 5, nk: 1024 };
const axis = gratingAxis(shape.nk);

function faintParts(type: 'uint16' | 'float64', change: (counts: Float64Array) => void): SlabParts {
  const random = createRandom(8);
  const counts = Float64Array.from({ length: 5 * 1024 }, () => random.poisson(2));
  change(counts);
  const typed = type === 'uint16' ? Uint16Array.from(counts) : counts;
  return { counts: typed, shape, axis, noise: poisson, type };
}

const band = (from: number, to: number): EnergyBand => ({
  fromEv: energyAt(axis, from),
  toEv: energyAt(axis, to),
  floor: 'none',
});

/** Every quantity of every pixel within a part of its own size of the definition's. */
function expectExact(parts: SlabParts, asked: EnergyBand, allowed: number): void {
  for (const { quantity, values, errors } of slabBands(parts).maps(asked, bandQuantities)) {
    for (let pixel = 0; pixel < shape.nx; pixel++) {
      const counts = parts.counts.subarray(pixel * shape.nk, (pixel + 1) * shape.nk);
      const { value, error } = directBand(counts, axis, asked, poisson)[quantity];
      expect(Math.abs(values[pixel] / value - 1)).toBeLessThan(allowed);
      if (errors !== null) expect(Math.abs(errors[pixel] / error - 1)).toBeLessThan(allowed);
    }
  }
}

describe('a faint band', () => {
  it('is exact beside a line ten thousand times as bright', () => {
    const parts = faintParts('uint16', (counts) => {
      for (let pixel = 0; pixel < 5; pixel++) {
        counts.fill(60_000, pixel * 1024 + 20, pixel * 1024 + 80);
      }
    });
    expectExact(parts, band(0.5, 0.63), 1e-9);
    expectExact(parts, band(0.2, 0.95), 1e-9);
  });

  it.each([1e12, 1e30])('is exact beside channels that hold a fill value of %d', (fill) => {
    const parts = faintParts('float64', (counts) => {
      for (let pixel = 0; pixel < 5; pixel++) {
        counts[pixel * 1024 + 100] = fill;
        // Some cancel in the sum.
        counts[pixel * 1024 + 110] = pixel % 2 === 0 ? fill : -fill;
      }
    });
    expectExact(parts, band(0.3, 0.9), 1e-11);
    expectExact(parts, band(0.01, 0.06), 1e-11);
  });
});

describe('the edges used last', () => {
  /** A kernel that counts how many values it was filled with. */
  function countingKernel(): { readonly kernel: MomentKernel; readonly filled: () => number } {
    const plain = createPlainKernel(tilePixelsFor(shape.nk));
    let filled = 0;
    const fill: MomentKernel['fill'] = (counts) => {
      filled += counts.length;
      return plain.fill(counts);
    };
    return { kernel: { ...plain, fill }, filled: () => filled };
  }

  it('are not made again while one end of a band is dragged', () => {
    const { kernel, filled } = countingKernel();
    const slab = slabBands({ ...faintParts('uint16', () => undefined), kernel });
    const workOf = (from: number, to: number): number => {
      const before = filled();
      slab.maps(band(from, to), ['integral', 'centroid']);
      return filled() - before;
    };
    expect(workOf(0.21, 0.77)).toBeGreaterThan(0);
    expect(workOf(0.21, 0.77)).toBe(0);
    const moved = workOf(0.21, 0.69);
    const back = workOf(0.21, 0.77);
    expect(moved).toBeGreaterThan(0);
    expect(back).toBeGreaterThan(0);
    // A move of the other end makes that end only.
    const other = workOf(0.4, 0.77);
    expect(other).toBeGreaterThan(0);
    expect(workOf(0.4, 0.69)).toBe(moved);
    // Both ends at once: each as before.
    const both = workOf(0.21, 0.77);
    expect(workOf(0.4, 0.69)).toBe(moved + other);
    expect(both).toBeGreaterThan(back);
  });

  it('are known by their channel: a drag by single channels gives what a fresh start gives', () => {
    const parts = faintParts('uint16', () => undefined);
    const slab = slabBands(parts);
    const step = 1 / shape.nk;
    for (const move of [0, 1, 2, 1, 1, 0, 3, 2]) {
      const asked = band(0.2 + move * step, 0.6 + ((move * 5) % 3) * step);
      expect(slab.maps(asked, bandQuantities)).toStrictEqual(
        slabBands(parts).maps(asked, bandQuantities),
      );
    }
  });
});

describe('a running sum', () => {
  // The classical example of what compensation by Kahan's rule loses and Neumaier's keeps.
  it('keeps what a plain sum loses: 1 + 1e100 + 1 − 1e100 = 2', () => {
    const sum = new RunningSum(1);
    const plane = new Float64Array(1);
    for (const term of [1, 1e100, 1, -1e100]) sum.add(Float64Array.of(term), 1, plane, 0);
    expect(plane[0]).toBe(2);
    sum.reset();
    sum.add(Float64Array.of(3), 1, plane, 0);
    expect(plane[0]).toBe(3);
  });
});
