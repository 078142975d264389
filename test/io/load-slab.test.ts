import { describe, expect, it } from 'vitest';
import { isRimlightError } from '../../src/errors';
import { loadHeight } from '../../src/io/load-height';
import { loadSlab } from '../../src/io/load-slab';
import { previewScan } from '../../src/io/preview';
import type { CountsArray } from '../../src/science/scan';
import { fakeContainer, numbered, ramp } from './fake-container';
import { makePlan } from './make-plan';

describe('loadSlab', () => {
  it('keeps integers in their own type', async () => {
    const plan = makePlan({ shape: { ny: 2, nx: 2, nk: 2 }, order: 'yxk' });
    const container = fakeContainer({
      arrays: { '/counts': { shape: [2, 2, 2], data: Uint16Array.of(1, 2, 3, 4, 5, 6, 7, 65535) } },
    });
    const { counts } = await loadSlab(container, plan, { y0: 1, y1: 2 });
    expect(counts).toEqual(Uint16Array.of(5, 6, 7, 65535));
  });

  it('keeps no data as no data', async () => {
    const plan = makePlan({ shape: { ny: 1, nx: 1, nk: 3 }, order: 'k', channels: [2, 1, 0] });
    const container = fakeContainer({
      arrays: { '/counts': { shape: [3], data: Float32Array.of(1, Number.NaN, 3) } },
    });
    const { counts } = await loadSlab(container, plan, { y0: 0, y1: 1 });
    expect(counts).toEqual(Float32Array.of(3, Number.NaN, 1));
  });

  it('widens when a later block of 64-bit integers needs a larger type', async () => {
    const shape = { ny: 3, nx: 2000, nk: 1000 };
    const plan = makePlan({ shape, order: 'yxk' });
    const blocks: CountsArray[] = [];
    const whole = fakeContainer({
      arrays: { '/counts': { shape: [3, 2000, 1000], data: [], type: 'int64' } },
    });
    const container = {
      ...whole,
      // As a reader does: the smallest type each block fits.
      read: (_path: string, start: readonly number[], count: readonly number[]) => {
        const size = count.reduce((product, length) => product * length, 1);
        const block = start[0] < 2 ? new Uint8Array(size).fill(7) : new Int16Array(size).fill(-300);
        blocks.push(block);
        return Promise.resolve(block);
      },
    };
    const { counts } = await loadSlab(container, plan, { y0: 0, y1: 3 });
    expect(blocks.length).toBe(2);
    expect(counts).toBeInstanceOf(Int16Array);
    expect([counts[0], counts[3_999_999], counts[4_000_000], counts[5_999_999]]).toEqual([
      7, 7, -300, -300,
    ]);
  });

  it('reads in blocks, tells its progress and stops between them', async () => {
    const shape = { ny: 12, nx: 1000, nk: 1000 };
    const plan = makePlan({ shape, order: 'yxk' });
    const data = new Uint8Array(12_000_000);
    const container = fakeContainer({ arrays: { '/counts': { shape: [12, 1000, 1000], data } } });
    const shares: number[] = [];
    await loadSlab(
      container,
      plan,
      { y0: 0, y1: 12 },
      { onProgress: (share) => shares.push(share) },
    );
    expect(shares).toEqual([4 / 12, 8 / 12, 1]);
    expect(container.handedOut.largest).toBeLessThanOrEqual(4 << 20);

    const stopper = new AbortController();
    const stopped = loadSlab(
      container,
      plan,
      { y0: 0, y1: 12 },
      {
        signal: stopper.signal,
        onProgress: () => stopper.abort(),
      },
    );
    await expect(stopped).rejects.toSatisfy(
      (error) => isRimlightError(error) && error.kind === 'cancelled',
    );
  });

  it('takes rows that are not there for a fault', async () => {
    const plan = makePlan({ shape: { ny: 2, nx: 1, nk: 2 }, order: 'yk' });
    const container = fakeContainer({ arrays: { '/counts': numbered(2, 2) } });
    await expect(loadSlab(container, plan, { y0: 1, y1: 3 })).rejects.toThrow('rows 1 to 3');
  });
});

describe('previewScan', () => {
  it('totals every pixel of a small scan and means its spectra, leaving out no data', async () => {
    const plan = makePlan({ shape: { ny: 2, nx: 2, nk: 2 }, order: 'kyx', channels: [1, 0] });
    const data = Float64Array.of(1, 2, 3, Number.NaN, 10, 20, Number.NaN, Number.NaN);
    const container = fakeContainer({ arrays: { '/counts': { shape: [2, 2, 2], data } } });
    const preview = await previewScan(container, plan);
    expect(preview).toEqual({
      ny: 2,
      nx: 2,
      step: 1,
      totals: Float64Array.of(11, 22, 3, Number.NaN),
      meanSpectrum: Float64Array.of(15, 2),
    });
  });

  it('undoes serpentine rows', async () => {
    const plan = makePlan({ shape: { ny: 2, nx: 3, nk: 2 }, order: 'yxk', serpentine: true });
    const container = fakeContainer({ arrays: { '/counts': numbered(2, 3, 2) } });
    const { totals } = await previewScan(container, plan);
    expect([...totals]).toEqual([1, 5, 9, 21, 17, 13]);
  });

  it.each(['yxk', 'xyk', 'ykx'])(
    'reads a bounded part of a large scan kept as %s',
    async (order) => {
      // 130 MB of 16-bit counts if it were in memory; values follow from their place.
      const shape = { ny: 256, nx: 256, nk: 1024 };
      const plan = makePlan({ shape, order });
      const { fileShape, yAxis, xAxis } = plan.cube;
      const whole = fakeContainer({
        arrays: { '/counts': { shape: fileShape, data: [], type: 'uint16' } },
      });
      let read = 0;
      const container = {
        ...whole,
        read: (_path: string, start: readonly number[], count: readonly number[]) => {
          const block = new Uint16Array(count[0] * count[1] * count[2]);
          read += block.length;
          const strides = [count[1] * count[2], count[2], 1];
          for (let i = 0; i < block.length; i++) {
            const at = [0, 1, 2].map(
              (axis) => start[axis] + (Math.floor(i / strides[axis]) % count[axis]),
            );
            block[i] = at[yAxis] + at[xAxis];
          }
          return Promise.resolve(block);
        },
      };
      const preview = await previewScan(container, plan);
      expect(read * 2).toBeLessThanOrEqual(64 << 20);
      expect([preview.step, preview.ny, preview.nx]).toEqual([2, 128, 128]);
      expect(preview.totals[3 * 128 + 5]).toBe((6 + 10) * 1024);
      expect(preview.meanSpectrum[100]).toBeCloseTo(254, 9);
    },
  );

  it('goes once through a stack of pages rather than many times through each', async () => {
    const shape = { ny: 256, nx: 256, nk: 1024 };
    const plan = makePlan({ shape, order: 'kyx' });
    const whole = fakeContainer({
      arrays: { '/counts': { shape: plan.cube.fileShape, data: [], type: 'uint16' } },
    });
    const pages = new Set<number>();
    const container = {
      ...whole,
      read: (_path: string, start: readonly number[], count: readonly number[]) => {
        for (let k = start[0]; k < start[0] + count[0]; k++) {
          expect(pages.has(k)).toBe(false);
          pages.add(k);
        }
        return Promise.resolve(new Uint16Array(count[0] * count[1] * count[2]).fill(1));
      },
    };
    const preview = await previewScan(container, plan);
    expect(pages.size).toBe(1024);
    expect([preview.step, preview.totals.length, preview.totals[77]]).toEqual([2, 128 * 128, 1024]);
  });

  it('refuses a scan without a single value', async () => {
    const plan = makePlan({ shape: { ny: 1, nx: 1, nk: 2 }, order: 'k' });
    const data = Float64Array.of(Number.NaN, Number.NaN);
    const container = fakeContainer({ arrays: { '/counts': { shape: [2], data } } });
    await expect(previewScan(container, plan)).rejects.toThrow('holds no data');
  });
});

describe('loadHeight', () => {
  const shape = { ny: 2, nx: 3, nk: 2 };
  const withHeight = (shiftPx: readonly [number, number], unitNm = 1, order = 'yxk') => ({
    ...makePlan({ shape, order }),
    height: { file: null, path: '/height', unitNm, shiftPx },
  });
  const container = fakeContainer({
    arrays: { '/height': { shape: [2, 3], data: Float64Array.of(0, 1, 2, 10, 11, Number.NaN) } },
  });

  it('gives nanometres on the scan’s pixels', async () => {
    const { values } = await loadHeight(withHeight([0, 0], 1000), container);
    expect([...values]).toEqual([0, 1000, 2000, 10_000, 11_000, Number.NaN]);
  });

  it('reads the single page of a TIFF', async () => {
    const page = fakeContainer({
      format: 'TIFF',
      arrays: { '/height': { shape: [1, 2, 3], data: ramp(6, 0, 1) } },
    });
    expect([...(await loadHeight(withHeight([0, 0]), page)).values]).toEqual([0, 1, 2, 3, 4, 5]);
  });

  it('turns a map kept as columns × rows', async () => {
    const turned = fakeContainer({
      arrays: { '/height': { shape: [3, 2], data: Float64Array.of(0, 10, 1, 11, 2, 12) } },
    });
    const { values } = await loadHeight(withHeight([0, 0], 1, 'xyk'), turned);
    expect([...values]).toEqual([0, 1, 2, 10, 11, 12]);
  });

  it('takes each height from where the map lies, between pixels by interpolation', async () => {
    const whole = await loadHeight(withHeight([1, 0]), container);
    expect([...whole.values]).toEqual([1, 2, Number.NaN, 11, Number.NaN, Number.NaN]);
    const half = await loadHeight(withHeight([0.5, 0]), container);
    expect([...half.values]).toEqual([0.5, 1.5, Number.NaN, 10.5, Number.NaN, Number.NaN]);
  });
});
