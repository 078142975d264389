import { afterAll, describe, expect, it } from 'vitest';
import { planFit } from '../../src/recipe/plan-fit';
import type { PeakModel } from '../../src/recipe/schema';
import type { FitPlan } from '../../src/science/fit/fit-plan';
import type { DerivedMap } from '../../src/science/scan';
import type { OpenScan, ScanFit } from '../../workers/engine';
import { createInProcessEngine } from '../../workers/in-process-engine';
import { createScanEngine } from '../../workers/pool';
import { makeScan, openMade } from './made-scan';
import { mortalWorkers } from './mortal-workers';

const made = makeScan({ ny: 11, nx: 9, nk: 160, type: 'uint16' });

const model: PeakModel = {
  components: [
    { name: 'floor', shape: 'line' },
    { name: 'bump', shape: 'lorentzian' },
    { name: 'extra', shape: 'gaussian', optional: true, centre: 1.86, fwhm: 0.01 },
  ],
};

function planFor({ overview }: OpenScan): FitPlan {
  const { axis, noise, laserEv } = overview.meta;
  return planFit(model, { axis, noise, laserEv, medium: 'air' });
}

const opened = new Map<number, Promise<OpenScan>>();
const engines = [1, 2, 5].map((workers) => ({
  workers,
  engine: createInProcessEngine({ workerCount: workers }),
}));

function openWith(workers: number): Promise<OpenScan> {
  const engine = engines.find((one) => one.workers === workers)?.engine;
  if (engine === undefined) throw new Error(`no engine of ${workers}`);
  const scan = opened.get(workers) ?? openMade(engine, made);
  opened.set(workers, scan);
  return scan;
}

afterAll(() => Promise.all(engines.map(({ engine }) => engine.close())));

function mapOf({ maps }: ScanFit, name: string): DerivedMap {
  const map = maps.find((one) => one.name === name);
  if (map === undefined) throw new Error(`no map ${name}`);
  return map;
}

describe('a fit of the whole scan', () => {
  it('has the same bits for any number of workers', async () => {
    const fits = [];
    for (const workers of [1, 2, 5]) {
      const scan = await openWith(workers);
      fits.push(await scan.fit(planFor(scan)));
    }
    const [one, ...others] = fits;
    expect(one.isWhole).toBe(true);
    expect(one.statusCounts[1]).toBe(made.ny * made.nx);
    for (const other of others) expect(other).toEqual(one);
  });

  it('finds the peak that was put in, within its errors, and needs nothing else', async () => {
    const scan = await openWith(2);
    const fit = await scan.fit(planFor(scan));
    const centre = mapOf(fit, 'fit.bump.centre');
    const needed = mapOf(fit, 'fit.extra.needed');
    const chi2r = mapOf(fit, 'fit.chi2r');
    expect(centre.unit).toBe('eV');
    expect(needed.errors).toBeNull();
    for (let pixel = 0; pixel < made.ny * made.nx; pixel++) {
      const counts = made.counts.subarray(pixel * made.nk, (pixel + 1) * made.nk);
      expect(chi2r.values[pixel]).toBeGreaterThan(0.6);
      expect(chi2r.values[pixel]).toBeLessThan(1.5);
      expect(centre.errors?.[pixel]).toBeLessThan(1e-3);
      const top = made.energiesEv[counts.indexOf(Math.max(...counts))];
      expect(Math.abs(centre.values[pixel] - top)).toBeLessThan(0.012);
    }
    const unneeded = needed.values.filter((value) => value <= 0).length;
    expect(unneeded).toBeGreaterThan(0.9 * needed.values.length);
    const area = mapOf(fit, 'fit.extra.area').values;
    for (const [pixel, value] of area.entries()) {
      expect(Number.isNaN(value)).toBe(needed.values[pixel] <= 0);
    }
  });

  it('names its maps as the recipe offers them, each with its error', async () => {
    const scan = await openWith(1);
    const { maps } = await scan.fit(planFor(scan));
    expect(maps.map(({ name }) => name)).toEqual([
      'fit.floor.level',
      'fit.floor.slope',
      'fit.bump.area',
      'fit.bump.centre',
      'fit.bump.fwhm',
      'fit.bump.height',
      'fit.extra.area',
      'fit.extra.centre',
      'fit.extra.fwhm',
      'fit.extra.height',
      'fit.extra.needed',
      'fit.chi2r',
      'fit.status',
      'fit.iterations',
    ]);
    for (const { name, errors } of maps.slice(0, 6)) {
      expect([name, errors?.every((error) => error > 0)]).toEqual([name, true]);
    }
  });

  it('shows the coarse grid first, then everything, with progress that only rises', async () => {
    const scan = await openWith(2);
    const shares: number[] = [];
    const seen: number[] = [];
    await scan.fit(planFor(scan), {
      onProgress: (share) => shares.push(share),
      onMaps: (_, pixels) => seen.push(...pixels),
    });
    expect(shares).toEqual([...shares].sort((a, b) => a - b));
    expect(shares.at(-1)).toBe(1);
    expect([...seen].sort((a, b) => a - b)).toEqual([...Array(made.ny * made.nx).keys()]);
    const nodes = seen.slice(0, 9).map((pixel) => [Math.floor(pixel / made.nx), pixel % made.nx]);
    for (const [y, x] of nodes) {
      expect([2, 6, 10]).toContain(y);
      expect([2, 6, 8]).toContain(x);
    }
  });

  it('keeps what is done when it is stopped, and goes on from there to the same result', async () => {
    const engine = createInProcessEngine({ workerCount: 2 });
    const large = makeScan({ ny: 18, nx: 20, nk: 160 });
    const scan = await openMade(engine, large);
    const plan = planFor(scan);
    const stopper = new AbortController();
    let seen = 0;
    const part = await scan.fit(plan, {
      signal: stopper.signal,
      onMaps: (_, pixels) => {
        seen += pixels.length;
        if (seen > 30) stopper.abort();
      },
    });
    expect(part.isWhole).toBe(false);
    expect(part.statusCounts[0]).toBeGreaterThan(0);
    expect(part.statusCounts[1]).toBe(seen);
    const rest: number[] = [];
    const whole = await scan.fit(plan, {
      previous: part,
      onMaps: (_, pixels) => rest.push(...pixels),
    });
    expect(rest).toHaveLength(18 * 20 - seen);
    expect(whole).toEqual(await scan.fit(plan));
    await engine.close();
  });

  it('is done again by the replacement of a worker that dies under it', async () => {
    const workers = mortalWorkers();
    const engine = createScanEngine({ workerCount: 2, spawn: workers.spawn });
    const scan = await openMade(engine, made);
    let hasDied = false;
    const fit = await scan.fit(planFor(scan), {
      onMaps: () => {
        if (!hasDied) workers.all[1].die('test');
        hasDied = true;
      },
    });
    await engine.close();
    const other = await openWith(1);
    expect(fit).toEqual(await other.fit(planFor(other)));
  });
});

describe('one pixel’s fit', () => {
  it('agrees with the maps, and draws its components', async () => {
    const scan = await openWith(2);
    const plan = planFor(scan);
    const fit = await scan.fit(plan);
    for (const pixel of [
      { y: 0, x: 0 },
      { y: 7, x: 5 },
    ]) {
      const alone = await scan.fitPixel(plan, pixel);
      const from = await scan.fitPixel(plan, pixel, fit);
      const at = pixel.y * made.nx + pixel.x;
      expect(alone.deviance).toBeCloseTo(fit.deviance.values[at], 2);
      expect(from.deviance).toBeCloseTo(alone.deviance, 6);
      const centre = mapOf(fit, 'fit.bump.centre');
      const [one] = from.quantities.filter((q) => q.component === 1 && q.name === 'centre');
      const pull = (one.value - centre.values[at]) / one.error;
      expect(Math.abs(pull)).toBeLessThan(0.01);
      expect(one.error).toBeCloseTo(Math.sqrt(from.covariance[3 * 8 + 3]), 12);
      const [floor, bump, extra] = from.curves;
      expect(bump.isIn && floor.isIn).toBe(true);
      for (let k = 0; k < made.nk; k++) {
        const sum = floor.counts[k] + bump.counts[k] + extra.counts[k];
        expect(from.total[k]).toBeCloseTo(sum, 9);
      }
    }
  });
});
