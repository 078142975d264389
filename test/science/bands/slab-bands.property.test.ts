/** Laws of band maps: they are what the definition says, whatever way their sums were made. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { ElementType } from '../../../src/io/container';
import {
  type BandFloor,
  type BandQuantity,
  bandQuantities,
  type EnergyBand,
} from '../../../src/science/bands/band';
import { type BandValues, directBand } from '../../../src/science/bands/direct-band';
import type { QuantityMap } from '../../../src/science/bands/slab-bands';
import { tilePixelsFor } from '../../../src/science/bands/tiled-counts';
import { createRandom } from '../../../src/science/numeric/random';
import type { CountsArray, NoiseModel } from '../../../src/science/scan';
import { createMomentKernel } from '../../../workers/kernel/moment-kernel';
import { energyAt, gratingAxis, poisson, rowsOf, type SlabParts, slabBands } from './made-slab';

const detector: NoiseModel = {
  kind: 'detector',
  detector: { electronsPerCount: 1.6, offsetCounts: 4, readNoiseE: 3, excessNoise: 1.4 },
};
const plainDetector: NoiseModel = {
  kind: 'detector',
  detector: { electronsPerCount: 2.2, offsetCounts: 0, readNoiseE: 3, excessNoise: 1 },
};

interface Case {
  readonly seed: number;
  readonly nk: number;
  readonly type: ElementType;
  readonly noise: NoiseModel;
  /** counts expected per channel at the foot of the peak */
  readonly level: number;
}

const arrays: Partial<Record<ElementType, (values: Float64Array) => CountsArray>> = {
  uint8: (values) => Uint8Array.from(values, (v) => Math.min(255, v)),
  uint16: (values) => Uint16Array.from(values),
  uint32: (values) => Uint32Array.from(values),
  int32: (values) => Int32Array.from(values),
  float32: (values) => Float32Array.from(values),
  float64: (values) => values,
};

const whole: readonly ElementType[] = ['uint8', 'uint16', 'uint32', 'int32', 'float32', 'float64'];

const ny = 3;
const nx = 11;

/** Poisson counts of a wandering peak; float arrays also have missing channels, and stretches of them. */
function makeParts({ seed, nk, type, noise, level }: Case, offset = 0): SlabParts {
  const values = new Float64Array(ny * nx * nk);
  for (let pixel = 0; pixel < ny * nx; pixel++) {
    const random = createRandom(seed, pixel);
    const centre = nk * random.uniform();
    const missing = type.startsWith('float') && pixel % 3 === 0;
    for (let k = 0; k < nk; k++) {
      const z = (k - centre) / (nk / 9);
      const counts = random.poisson(level * (1 + 8 / (1 + z * z))) - offset;
      const isMissing = missing && (random.uniform() < 0.01 || Math.abs(z + 1) < 0.3);
      values[pixel * nk + k] = isMissing ? Number.NaN : counts;
    }
  }
  const counts = arrays[type]?.(values) ?? values;
  return { counts, shape: { ny, nx, nk }, axis: gratingAxis(nk), noise, type };
}

const cases = fc.record({
  seed: fc.integer({ min: 0, max: 1e6 }),
  nk: fc.constantFrom(1, 2, 3, 7, 90, 400, 1024).filter((nk) => nk > 1),
  type: fc.constantFrom(...whole),
  noise: fc.constantFrom(poisson, detector, plainDetector),
  level: fc.constantFrom(0.02, 1, 30, 2000),
});

const bands = fc
  .record({
    from: fc.double({ min: -0.1, max: 1, noNaN: true }),
    width: fc.constantFrom(0.003, 0.04, 0.2, 0.6, 1.3),
    floor: fc.constantFrom<BandFloor>('none', 'ends'),
  })
  .map(({ from, width, floor }) => ({ from, to: from + width, floor }));

function bandOn(
  parts: SlabParts,
  band: { from: number; to: number; floor: BandFloor },
): EnergyBand {
  const { from, to, floor } = band;
  return { fromEv: energyAt(parts.axis, from), toEv: energyAt(parts.axis, to), floor };
}

function spectrumOf({ counts, shape }: SlabParts, pixel: number): Float64Array {
  return Float64Array.from(counts.subarray(pixel * shape.nk, (pixel + 1) * shape.nk));
}

/** What a value may be off by, given what rounding must do to it. */
function allowedOf(
  quantity: BandQuantity,
  kind: 'value' | 'error',
  direct: BandValues,
  parts: SlabParts,
  gross: number,
): number {
  const { edgesEv } = parts.axis;
  const range = edgesEv[edgesEv.length - 1] - edgesEv[0];
  const { value, error } = direct[quantity];
  // A floor may take nearly everything: what is left carries the rounding of the whole.
  const loss = gross / Math.max(Math.abs(direct.integral.value), 1e-12 * gross);
  // Of a spread near 0 the error is a root of what rounding leaves of fourth powers.
  if (kind === 'error') return 1e-9 * loss * Math.abs(error) + 1e-8 * range;
  if (quantity === 'integral' || quantity === 'peak') return 1e-11 * gross;
  return 1e-12 * Math.abs(value) + 1e-11 * range * loss;
}

function expectAlike(maps: readonly QuantityMap[], parts: SlabParts, band: EnergyBand): void {
  for (let pixel = 0; pixel < ny * nx; pixel++) {
    const counts = spectrumOf(parts, pixel);
    const direct = directBand(counts, parts.axis, band, parts.noise);
    const gross = counts.reduce((sum, c) => sum + (Number.isNaN(c) ? 0 : Math.abs(c)), 1);
    for (const { quantity, values, errors } of maps) {
      const check = (kind: 'value' | 'error', got: number): void => {
        const want = direct[quantity][kind];
        const allowed = allowedOf(quantity, kind, direct, parts, gross);
        const isAlike =
          (Number.isNaN(got) && Number.isNaN(want)) || Math.abs(got - want) <= allowed;
        const place = { quantity, kind, pixel };
        expect(isAlike ? place : { ...place, got, want, allowed }).toEqual(place);
      };
      check('value', values[pixel]);
      if (errors !== null) check('error', errors[pixel]);
    }
  }
}

describe('band maps from kept sums', () => {
  it('are the definition’s, for any counts, type, noise model, band and floor', () => {
    fc.assert(
      fc.property(cases, fc.array(bands, { minLength: 1, maxLength: 4 }), (one, some) => {
        const parts = makeParts(one);
        const slab = slabBands(parts);
        for (const band of some.map((each) => bandOn(parts, each))) {
          expectAlike(slab.maps(band, bandQuantities), parts, band);
        }
      }),
      { numRuns: 150 },
    );
  });

  it('are the definition’s where values are negative and there is no noise model', () => {
    const negative = cases.map((one) => ({ ...one, type: 'float64' as const }));
    fc.assert(
      fc.property(negative, bands, (one, each) => {
        const parts = makeParts({ ...one, noise: { kind: 'none' } }, one.level * 2);
        const band = bandOn(parts, each);
        // A running sum may cross N/2 several times, and rounding may choose among crossings that touch it.
        const quantities = bandQuantities.filter((name) => name !== 'median');
        const maps = slabBands(parts).maps(band, quantities);
        for (const { errors } of maps) expect(errors).toBeNull();
        expectAlike(maps, parts, band);
      }),
      { numRuns: 60 },
    );
  });

  it('keep the same bits whatever was asked before and together', () => {
    fc.assert(
      fc.property(
        cases,
        fc.array(bands, { minLength: 2, maxLength: 6 }),
        fc.subarray([...bandQuantities], { minLength: 1 }),
        (one, some, quantities) => {
          const parts = makeParts(one);
          const dragged = slabBands(parts);
          let last: readonly QuantityMap[] = [];
          for (const each of some) last = dragged.maps(bandOn(parts, each), quantities);
          const band = bandOn(parts, some[some.length - 1] ?? { from: 0, to: 1, floor: 'none' });
          const all = slabBands(parts).maps(band, bandQuantities);
          const expected = quantities.map((name) => all.find((map) => map.quantity === name));
          expect(last).toStrictEqual(expected);
        },
      ),
      { numRuns: 60 },
    );
  });

  it('keep the same bits however rows are shared out', () => {
    fc.assert(
      fc.property(cases, bands, fc.integer({ min: 1, max: ny - 1 }), (one, each, cut) => {
        const parts = makeParts(one);
        const band = bandOn(parts, each);
        const together = slabBands(parts).maps(band, bandQuantities);
        const upper = slabBands(rowsOf(parts, 0, cut)).maps(band, bandQuantities);
        const lower = slabBands(rowsOf(parts, cut, ny)).maps(band, bandQuantities);
        for (const [index, { values, errors }] of together.entries()) {
          const join = (a: Float64Array | null = null, b: Float64Array | null = null) =>
            Float64Array.of(...(a ?? []), ...(b ?? []));
          expect(join(upper[index]?.values, lower[index]?.values)).toStrictEqual(values);
          expect(join(upper[index]?.errors, lower[index]?.errors)).toStrictEqual(
            errors ?? new Float64Array(0),
          );
        }
      }),
      { numRuns: 60 },
    );
  });

  it('keep the same bits in WebAssembly', () => {
    fc.assert(
      fc.property(cases, bands, (one, each) => {
        const parts = makeParts(one);
        const band = bandOn(parts, each);
        const { nk } = parts.shape;
        const kernel = createMomentKernel(tilePixelsFor(nk), nk);
        const fast = slabBands({ ...parts, kernel }).maps(band, bandQuantities);
        expect(fast).toStrictEqual(slabBands(parts).maps(band, bandQuantities));
      }),
      { numRuns: 60 },
    );
  });

  it('scale with the counts: twice the counts, twice the integral, the same energies, bit for bit', () => {
    fc.assert(
      fc.property(cases, bands, (one, each) => {
        const parts = { ...makeParts({ ...one, type: 'float64' }), noise: poisson };
        const band = bandOn(parts, each);
        const quadruple = { ...parts, counts: parts.counts.map((c: number) => 4 * c) };
        const single = slabBands(parts).maps(band, bandQuantities);
        const scaled = slabBands(quadruple).maps(band, bandQuantities);
        for (const [index, { quantity, values, errors }] of single.entries()) {
          const isCounts = quantity === 'integral' || quantity === 'peak';
          const times = (by: number) => (array: Float64Array) => array.map((v) => by * v);
          expect(scaled[index]?.values).toStrictEqual(times(isCounts ? 4 : 1)(values));
          // Errors of counts grow with their root, those of energies fall with it.
          if (errors === null) continue;
          expect(scaled[index]?.errors).toStrictEqual(times(isCounts ? 2 : 0.5)(errors));
        }
      }),
      { numRuns: 60 },
    );
  });
});
