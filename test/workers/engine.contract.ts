/** What every engine does, wherever its workers run. */
import { createHash } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { isRimlightError, type RimlightError } from '../../src/errors';
import { directBand } from '../../src/science/bands/direct-band';
import type { OpenScan, ScanEngine } from '../../workers/engine';
import { everyQuantity, makeScan, openMade, planOf } from './made-scan';

/** The error a promise rejects with. */
export async function errorOf(promise: Promise<unknown>): Promise<RimlightError> {
  const error = await promise.then(
    () => new Error('did not reject'),
    (reason: unknown) => reason,
  );
  if (isRimlightError(error)) return error;
  throw error;
}

export function engineContract(name: string, create: (workers: number) => ScanEngine): void {
  describe(name, () => {
    const made = makeScan();
    let engine: ScanEngine;
    let scan: OpenScan;
    beforeAll(async () => {
      engine = create(2);
      scan = await openMade(engine, made);
    });
    afterAll(() => engine.close());

    it('finds the made scan’s axis, cube and height map', async () => {
      const inspection = await engine.inspect(made.inputs, {});
      expect(inspection.problems).toEqual([]);
      expect(inspection.plan?.meta.shape).toEqual({ ny: made.ny, nx: made.nx, nk: made.nk });
      expect(inspection.plan?.meta.axis.centresEv).toEqual(made.energiesEv);
      expect(inspection.plan?.height).not.toBeNull();
    });

    it('keeps what, where and hint of problems an inspection returns', async () => {
      const wrong = { data: 'nowhere' };
      const { problems, plan } = await engine.inspect(made.inputs, wrong);
      expect(plan).toBeNull();
      expect(problems.length).toBeGreaterThan(0);
      for (const problem of problems) {
        expect(isRimlightError(problem)).toBe(true);
        expect(problem.what).not.toBe('');
        expect(problem.hint).not.toBe('');
      }
    });

    it('previews totals and mean spectrum', async () => {
      const preview = await engine.preview(made.inputs, await planOf(engine, made));
      expect(preview.totals).toEqual(scan.overview.totals.values);
      expect(preview.meanSpectrum).toHaveLength(made.nk);
    });

    it('gives totals, mean and extremes of the counts', () => {
      const { totals, meanSpectrum, minCounts, maxCounts, noDataValues } = scan.overview;
      const pixels = made.ny * made.nx;
      for (let pixel = 0; pixel < pixels; pixel++) {
        let total = 0;
        for (let k = 0; k < made.nk; k++) total += made.counts[pixel * made.nk + k];
        expect(totals.values[pixel]).toBe(total);
      }
      for (let k = 0; k < made.nk; k += 37) {
        let sum = 0;
        for (let pixel = 0; pixel < pixels; pixel++) sum += made.counts[pixel * made.nk + k];
        expect(meanSpectrum[k]).toBe(sum / pixels);
      }
      expect(minCounts).toBe(Math.min(...made.counts));
      expect(maxCounts).toBe(Math.max(...made.counts));
      expect(noDataValues).toBe(0);
    });

    it('gives the height map', () => {
      expect(scan.overview.height).toEqual({ ny: made.ny, nx: made.nx, values: made.heightNm });
    });

    it('gives the spectrum of any pixel, and refuses one off the scan', async () => {
      for (const [y, x] of [
        [0, 0],
        [3, 8],
        [made.ny - 1, 4],
      ]) {
        const from = (y * made.nx + x) * made.nk;
        const expected = Float64Array.from(made.counts.subarray(from, from + made.nk));
        expect(await scan.spectrum({ y, x })).toEqual(expected);
      }
      expect(await errorOf(scan.spectrum({ y: made.ny, x: 0 }))).toMatchObject({ kind: 'fault' });
      expect(await errorOf(scan.spectrum({ y: 0, x: -1 }))).toMatchObject({ kind: 'fault' });
    });

    it('gives the mean spectrum of a mask, NaN for an empty one', async () => {
      const mask = new Uint8Array(made.ny * made.nx);
      expect(await scan.meanSpectrum(mask)).toEqual(new Float64Array(made.nk).fill(Number.NaN));
      mask[5] = 1;
      mask[40] = 1;
      const mean = await scan.meanSpectrum(mask);
      for (let k = 0; k < made.nk; k++) {
        expect(mean[k]).toBe((made.counts[5 * made.nk + k] + made.counts[40 * made.nk + k]) / 2);
      }
      expect(mask[5]).toBe(1);
      expect(await errorOf(scan.meanSpectrum(new Uint8Array(3)))).toMatchObject({ kind: 'fault' });
    });

    it('gives band maps in the order asked, as defined', async () => {
      const band = { fromEv: 1.84, toEv: 1.93, floor: 'none' as const };
      const quantities = ['centroid', 'integral', 'peak_at'] as const;
      const maps = await scan.bandMaps({ band, quantities });
      expect(maps.map(({ quantity }) => quantity)).toEqual(quantities);
      expect(maps.map(({ errors }) => errors === null)).toEqual([false, false, true]);
      const { axis } = scan.plan.meta;
      for (const pixel of [0, 20, made.ny * made.nx - 1]) {
        const counts = made.counts.subarray(pixel * made.nk, (pixel + 1) * made.nk);
        const direct = directBand(counts, axis, band, { kind: 'poisson' });
        for (const { quantity, values } of maps) {
          expect(values[pixel]).toBeCloseTo(direct[quantity].value, 9);
        }
      }
    });

    it('answers an empty list of quantities, and a band off the axis', async () => {
      const band = { fromEv: 5, toEv: 6, floor: 'none' as const };
      expect(await scan.bandMaps({ band, quantities: [] })).toEqual([]);
      const maps = await scan.bandMaps({ band, quantities: everyQuantity });
      for (const { values } of maps) expect(values.every(Number.isNaN)).toBe(true);
    });

    it('hashes a file as everybody does, with progress up to 1', async () => {
      const { scan: source } = made.inputs;
      const shares: number[] = [];
      const hash = await engine.sha256(source, { onProgress: (share) => shares.push(share) });
      const bytes = source.kind === 'memory' ? source.bytes : new Uint8Array();
      expect(hash).toBe(createHash('sha256').update(bytes).digest('hex'));
      expect(shares.at(-1)).toBe(1);
    });

    it('reports progress that only rises and ends at 1', async () => {
      const shares: number[] = [];
      const plan = await planOf(engine, made);
      const again = await engine.open(made.inputs, plan, { onProgress: (s) => shares.push(s) });
      await again.release();
      expect(shares.at(-1)).toBe(1);
      expect(shares).toEqual([...shares].sort((a, b) => a - b));
      expect(shares.filter((share) => share === 1)).toHaveLength(1);
    });

    it('keeps kind, what, where and hint of an error on its way', async () => {
      const bytes =
        made.inputs.scan.kind === 'memory' ? made.inputs.scan.bytes.slice(0, 900) : null;
      const cut = {
        scan: { kind: 'memory' as const, name: 'cut.npz', bytes: bytes ?? new Uint8Array() },
        companions: [],
      };
      const error = await errorOf(engine.inspect(cut, {}));
      expect(error).toMatchObject({ kind: 'scan' });
      expect(error.where).toContain('cut.npz');
      expect(error.what).not.toBe('');
      expect(error.hint).not.toBe('');
    });

    it('rejects what was stopped before it began', async () => {
      const signal = AbortSignal.abort();
      const plan = await planOf(engine, made);
      const source = made.inputs.scan;
      for (const call of [
        engine.inspect(made.inputs, {}, { signal }),
        engine.preview(made.inputs, plan, { signal }),
        engine.open(made.inputs, plan, { signal }),
        engine.sha256(source, { signal }),
      ]) {
        expect(await errorOf(call)).toMatchObject({ kind: 'cancelled' });
      }
    });

    it('answers nothing more of a released scan, and the rest as before', async () => {
      const other = await openMade(engine, makeScan({ seed: 2 }));
      await other.release();
      await other.release();
      expect(await errorOf(other.spectrum({ y: 0, x: 0 }))).toMatchObject({ kind: 'fault' });
      expect(await scan.spectrum({ y: 0, x: 0 })).toHaveLength(made.nk);
    });
  });
}
