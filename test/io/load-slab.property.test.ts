/** However the cube lies in the file, the slab is the same. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { blocksOf, loadSlab, placementOf, regionOf } from '../../src/io/load-slab';
import { placeBlock } from '../../src/io/place-block';
import { fakeContainer } from './fake-container';
import { makePlan } from './make-plan';

const orders = ['yxk', 'ykx', 'xyk', 'xky', 'kyx', 'kxy', 'xk', 'kx', 'yk', 'ky', 'k'] as const;

interface Case {
  readonly order: (typeof orders)[number];
  readonly ny: number;
  readonly nx: number;
  /** channels in the file */
  readonly fileChannels: number;
  /** file channel of each channel in the slab */
  readonly channels: readonly number[];
  readonly serpentine: boolean;
}

const cases: fc.Arbitrary<Case> = fc
  .record({
    order: fc.constantFrom(...orders),
    ny: fc.integer({ min: 1, max: 5 }),
    nx: fc.integer({ min: 1, max: 5 }),
    fileChannels: fc.integer({ min: 2, max: 9 }),
    isDescending: fc.boolean(),
    left: fc.array(fc.nat(8), { maxLength: 3 }),
    serpentine: fc.boolean(),
  })
  .map(({ order, ny, nx, fileChannels, isDescending, left, serpentine }) => {
    const kept = Array.from({ length: fileChannels }, (_, k) => k).filter((k) => !left.includes(k));
    const channels = kept.length >= 2 ? kept : [0, 1];
    return {
      order,
      ny: order.includes('y') ? ny : 1,
      nx: order.includes('x') ? nx : 1,
      fileChannels,
      channels: isDescending ? [...channels].reverse() : channels,
      serpentine,
    };
  });

/** What pixel (y, x) of the scan holds at a file channel: a number that no other place has. */
const valueAt = (y: number, x: number, fileChannel: number): number =>
  y * 10_000 + x * 100 + fileChannel;

/** The file's values, written as its order and serpentine rows ask. */
function fileOf({ order, ny, nx, fileChannels, serpentine }: Case): Float64Array {
  const lengths = { y: ny, x: nx, k: fileChannels };
  const shape = [...order].map((letter) => lengths[letter as 'y' | 'x' | 'k']);
  const data = new Float64Array(ny * nx * fileChannels);
  for (let i = 0; i < data.length; i++) {
    const index = { y: 0, x: 0, k: 0 };
    let rest = i;
    for (let axis = shape.length - 1; axis >= 0; axis--) {
      index[order[axis] as 'y' | 'x' | 'k'] = rest % shape[axis];
      rest = Math.floor(rest / shape[axis]);
    }
    const x = serpentine && index.y % 2 === 1 ? nx - 1 - index.x : index.x;
    data[i] = valueAt(index.y, x, index.k);
  }
  return data;
}

describe('loadSlab', () => {
  it('gives counts[y][x][k] for any order, direction, gaps and serpentine rows, whole or in parts', async () => {
    await fc.assert(
      fc.asyncProperty(cases, fc.nat(), fc.nat(), async (one, a, b) => {
        const { order, ny, nx, channels, fileChannels, serpentine } = one;
        const plan = makePlan({
          shape: { ny, nx, nk: channels.length },
          order,
          channels,
          fileChannels,
          serpentine,
        });
        const container = fakeContainer({
          arrays: { '/counts': { shape: plan.cube.fileShape, data: fileOf(one) } },
        });
        const y0 = a % ny;
        const y1 = y0 + 1 + (b % (ny - y0));
        const slab = await loadSlab(container, plan, { y0, y1 });
        const expected: number[] = [];
        for (let y = y0; y < y1; y++) {
          for (let x = 0; x < nx; x++) for (const k of channels) expected.push(valueAt(y, x, k));
        }
        expect([...slab.counts]).toEqual(expected);
        expect(slab.shape).toEqual({ ny: y1 - y0, nx, nk: channels.length });
      }),
      { numRuns: 400 },
    );
  });

  it('puts blocks of any size where the whole would be', async () => {
    await fc.assert(
      fc.asyncProperty(cases, fc.integer({ min: 1, max: 40 }), async (one, most) => {
        const { order, ny, nx, channels, fileChannels, serpentine } = one;
        const shape = { ny, nx, nk: channels.length };
        const plan = makePlan({ shape, order, channels, fileChannels, serpentine });
        const container = fakeContainer({
          arrays: { '/counts': { shape: plan.cube.fileShape, data: fileOf(one) } },
        });
        const whole = await loadSlab(container, plan, { y0: 0, y1: ny });
        const region = regionOf(plan.cube, { y0: 0, y1: ny });
        const out = new Float64Array(whole.counts.length).fill(-1);
        for (const block of blocksOf(region.start, region.count, most)) {
          expect(block.count.reduce((product, length) => product * length, 1)).toBeLessThanOrEqual(
            most,
          );
          const values = await container.read('/counts', block.start, block.count);
          placeBlock(values, block, placementOf(plan.cube, shape, 0), out);
        }
        expect([...out]).toEqual([...whole.counts]);
      }),
      { numRuns: 300 },
    );
  });
});
