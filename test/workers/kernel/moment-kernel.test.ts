/** The moment sums in WebAssembly against the plain ones: the same bits, from any type and size. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { createPlainKernel, type MomentKernel } from '../../../src/science/bands/moment-kernel';
import { createRandom } from '../../../src/science/numeric/random';
import type { CountsArray } from '../../../src/science/scan';
import { createMomentKernel } from '../../../workers/kernel/moment-kernel';
import { momentModuleBytes } from '../../../workers/kernel/moment-module';

const arrays: readonly (new (length: number) => CountsArray)[] = [
  Uint8Array,
  Int8Array,
  Uint16Array,
  Int16Array,
  Uint32Array,
  Int32Array,
  Float32Array,
  Float64Array,
];

const tilePixels = 60;
const nk = 300;

/** Counts over the whole range of their type. */
function filled(ArrayOf: new (length: number) => CountsArray, length: number, seed: number) {
  const random = createRandom(seed);
  const counts = new ArrayOf(length);
  const isFloat = counts instanceof Float32Array || counts instanceof Float64Array;
  for (let i = 0; i < length; i++) counts[i] = isFloat ? 1e3 * random.normal() : random.uint32();
  return counts;
}

function resultsOf(
  kernel: MomentKernel,
  counts: CountsArray,
  run: { readonly pixels: number; readonly k0: number; readonly k1: number },
  energies: Float64Array,
): readonly number[][] {
  const input = kernel.fill(counts).slice(0, counts.length);
  const cut = (planes: readonly Float64Array[]) =>
    planes.map((plane) => Array.from(plane.subarray(0, run.pixels)));
  return [Array.from(input), ...cut(kernel.low(run, energies)), ...cut(kernel.high(run, energies))];
}

describe('the moment kernel', () => {
  it('is a valid module of some hundred bytes', () => {
    const bytes = momentModuleBytes();
    expect(WebAssembly.validate(bytes)).toBe(true);
    expect(bytes.length).toBeLessThan(2000);
  });

  it('runs in WebAssembly here, not in plain code', () => {
    expect(createMomentKernel(tilePixels, nk).kind).toBe('vectors');
  });

  it('gives the plain code’s bits for every type, number of pixels and run of channels', () => {
    const kernel = createMomentKernel(tilePixels, nk);
    fc.assert(
      fc.property(
        fc.constantFrom(...arrays),
        fc.integer({ min: 1, max: tilePixels }),
        fc.integer({ min: 0, max: nk - 1 }),
        fc.integer({ min: 0, max: 80 }),
        fc.integer(),
        (ArrayOf, pixels, k0, channels, seed) => {
          const run = { pixels, k0, k1: Math.min(nk, k0 + channels) };
          const counts = filled(ArrayOf, pixels * (run.k1 - k0), Math.abs(seed));
          const random = createRandom(Math.abs(seed), 1);
          const energies = Float64Array.from({ length: nk }, () => random.normal());
          expect(resultsOf(kernel, counts, run, energies)).toStrictEqual(
            resultsOf(createPlainKernel(tilePixels), counts, run, energies),
          );
        },
      ),
      { numRuns: 200 },
    );
  });

  it('keeps its results right when its memory has to grow', () => {
    const kernel = createMomentKernel(tilePixels, nk);
    const energies = Float64Array.from({ length: nk }, (_, k) => k / 7 - 20);
    for (const channels of [1, 50, 300, 2]) {
      const run = { pixels: tilePixels, k0: 0, k1: channels };
      const counts = filled(Uint16Array, tilePixels * channels, channels);
      expect(resultsOf(kernel, counts, run, energies)).toStrictEqual(
        resultsOf(createPlainKernel(tilePixels), counts, run, energies),
      );
    }
  });

  it('uses the energies it is given, also after others', () => {
    const kernel = createMomentKernel(tilePixels, nk);
    const run = { pixels: 2, k0: 3, k1: 5 };
    const one = new Float64Array(nk).fill(1);
    const two = new Float64Array(nk).fill(2);
    kernel.fill(Uint16Array.of(1, 2, 3, 4));
    expect(Array.from(kernel.low(run, one)[1].subarray(0, 2))).toEqual([4, 6]);
    expect(Array.from(kernel.low(run, two)[1].subarray(0, 2))).toEqual([8, 12]);
    expect(Array.from(kernel.low(run, one)[1].subarray(0, 2))).toEqual([4, 6]);
    expect(Array.from(kernel.high(run, two)[1].subarray(0, 2))).toEqual([64, 96]);
  });
});
