import { describe, expect, it } from 'vitest';
import type { ElementType } from '../../../src/io/container';
import { blockLayout, isCoarse } from '../../../src/science/bands/block-layout';
import type { CountsArray, NoiseModel } from '../../../src/science/scan';
import { elementContexts } from '../../../workers/element-context';
import { gratingAxis, poisson, slabBands } from './made-slab';

const detector: NoiseModel = {
  kind: 'detector',
  detector: { electronsPerCount: 1, offsetCounts: 300, readNoiseE: 3, excessNoise: 1 },
};

const arrays: readonly (readonly [ElementType, new (length: number) => CountsArray])[] = [
  ['uint8', Uint8Array],
  ['uint16', Uint16Array],
  ['int16', Int16Array],
  ['uint32', Uint32Array],
  ['int32', Int32Array],
  ['float32', Float32Array],
  ['float64', Float64Array],
  // 64-bit integers are held in what their numbers need: a byte here.
  ['uint64', Uint8Array],
  ['int64', Int8Array],
];

describe('the memory of kept sums', () => {
  it('is under a quarter of the counts, for every type, noise model and number of channels', () => {
    let kept = 0;
    for (const [type, ArrayOf] of arrays) {
      for (const noise of [poisson, detector]) {
        for (const nk of [2, 64, 320, 700, 1024, 2048, 4100]) {
          const shape = { ny: 4, nx: 25, nk };
          const counts = new ArrayOf(100 * nk);
          const slab = slabBands({ counts, shape, axis: gratingAxis(nk), noise, type });
          if (slab.data.sums !== null) {
            kept++;
            expect(slab.sumsBytes).toBeLessThan(0.25 * counts.byteLength);
            continue;
          }
          // Without sums only a flag and a scale for each pixel of types that need them.
          expect(slab.sumsBytes).toBeLessThanOrEqual(9 * 100);
        }
      }
    }
    expect(kept).toBeGreaterThan(60);
  });
});

describe('the layout of kept sums', () => {
  const need = { nk: 1024, hasOwnVariance: false, ...elementContexts.uint16 };

  it('ends at the end of the axis, in blocks of equal length but the last', () => {
    const layout = blockLayout(need);
    const edges = Array.from(layout?.edges ?? []);
    expect(edges.at(-1)).toBe(1024);
    const lengths = edges.map((edge, index) => edge - (edges[index - 1] ?? 0));
    expect(new Set(lengths.slice(0, -1)).size).toBe(1);
    expect(lengths.at(-1)).toBeLessThanOrEqual(lengths[0] ?? 0);
    expect(edges.length).toBeGreaterThan(10);
  });

  it('keeps fourth moments at some edges, the last among them', () => {
    const layout = blockLayout(need);
    if (layout === null) throw new Error('no layout');
    const coarse = Array.from(layout.edges).filter((_, index) => isCoarse(layout, index));
    expect(coarse.at(-1)).toBe(1024);
    expect(coarse.length).toBeLessThan(layout.edges.length / 2);
  });

  it('is none where there are few channels', () => {
    expect(blockLayout({ ...need, nk: 100 })).toBeNull();
    expect(blockLayout({ ...need, nk: 1 })).toBeNull();
  });

  it('is coarser where variances need sums of their own, and never finer than pays', () => {
    const own = blockLayout({ ...need, hasOwnVariance: true });
    expect(own?.edges.length).toBeLessThan(blockLayout(need)?.edges.length ?? 0);
    const wide = blockLayout({ ...need, ...elementContexts.float64 });
    expect(wide?.edges[0]).toBeGreaterThanOrEqual(32);
  });
});
