/** The demo recipe's model fitted by the program to the demo scan, held to what the scan was made with. */
import { readFile } from 'node:fs/promises';
import { join } from 'node:path';
import { beforeAll, describe, expect, it } from 'vitest';
import { demoRecipe, demoScan, rimlight, temporaryFolder } from './program';
import { readArray, readMap } from './results';

const out = temporaryFolder();
const folder = join(out, 'tent-field');
const truthPath = demoScan.replace(/\.h5$/, '.truth.json');
const peaks = ['exciton', 'localised', 'A1', '2LA'] as const;
type Peak = (typeof peaks)[number];

interface Summary {
  readonly fit: {
    readonly free_parameters: number;
    readonly channels: number;
    readonly status: Readonly<Record<string, number>>;
  };
  readonly timings_s: Readonly<Record<string, number>>;
}

let summary: Summary;

beforeAll(async () => {
  const words = ['--recipe', demoRecipe, '--out', out, '--only', 'maps,summary', demoScan];
  expect((await rimlight('run', ...words)).err).toBe('');
  summary = JSON.parse(await readFile(join(folder, 'summary.json'), 'utf8'));
}, 60_000);

const median = (values: readonly number[]): number => quantile(values, 0.5);

function quantile(values: readonly number[], share: number): number {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[Math.round(share * (sorted.length - 1))]!;
}

/** Fitted value, its error and the scan's truth wherever the fit converged. */
async function fitted(peak: Peak, parameter: 'centre' | 'fwhm' | 'area') {
  const { maps } = JSON.parse(await readFile(truthPath, 'utf8'));
  const known = maps[`${peak}.${parameter}`];
  const name = `fit.${peak}.${parameter}`;
  const { values } = await readMap(folder, name);
  const { values: errors } = await readMap(folder, `${name}.err`);
  const { values: status } = await readMap(folder, 'fit.status');
  const truths: readonly number[] = known.values?.flat() ?? Array.from(values, () => known.value);
  return truths.flatMap((truth, pixel) => {
    const [value, error] = [values[pixel]!, errors[pixel]!];
    const pull = (value - truth) / error;
    return status[pixel] === 1 && !Number.isNaN(pull) ? [{ pixel, value, error, truth, pull }] : [];
  });
}

describe('the demo scan’s model', () => {
  it('converges at every pixel but for those a bound holds, and the summary counts them', async () => {
    const { status } = summary.fit;
    expect(summary.fit).toMatchObject({ free_parameters: 14, channels: 512 });
    expect(status.converged! + status.at_bound!).toBe(4096);
    expect(status.converged).toBeGreaterThan(0.96 * 4096);
    const { values } = await readMap(folder, 'fit.status');
    expect(values.filter((value) => value === 2)).toHaveLength(status.at_bound!);
    expect(summary.timings_s.fit).toBeGreaterThan(0);
  });

  it('leaves nothing but noise: reduced χ² lies where 498 degrees of freedom put it', async () => {
    const { values } = await readMap(folder, 'fit.chi2r');
    const all = [...values].filter((value) => !Number.isNaN(value));
    expect(all).toHaveLength(4096);
    // σ of χ² over its degrees of freedom is √(2/498) = 0.063; rounding adds 1/12 count² to 15 at the least.
    expect(median(all)).toBeGreaterThan(0.94);
    expect(median(all)).toBeLessThan(1.06);
    expect(quantile(all, 0.16)).toBeGreaterThan(0.85);
    expect(quantile(all, 0.84)).toBeLessThan(1.15);
  });

  it('finds the Raman lines where they are, as closely as its errors say', async () => {
    for (const line of ['A1', '2LA'] as const) {
      const pulls = (await fitted(line, 'centre')).map(({ pull }) => pull);
      expect(pulls.length, line).toBeGreaterThan(3900);
      expect(Math.abs(median(pulls)), line).toBeLessThan(0.12);
      const width = (quantile(pulls, 0.8413) - quantile(pulls, 0.1587)) / 2;
      expect(width, line).toBeGreaterThan(0.9);
      expect(width, line).toBeLessThan(1.1);
    }
  });

  it('finds the exciton and the localised states, but for what the detector’s response does', async () => {
    // A response R moves a Gaussian by σ² d ln R/dE: its slope (−1 /eV at the exciton) by 0.2 meV, its fringes of
    // 1.5 % every 37 meV (up to ±2.5 /eV) by as much again. What they leave of the exciton moves the localised more.
    for (const [peak, systematicEv] of [
      ['exciton', 4e-4],
      ['localised', 1e-3],
    ] as const) {
      const centres = await fitted(peak, 'centre');
      const off = centres.map(({ value, truth }) => value - truth);
      expect(Math.abs(median(off)), peak).toBeLessThan(systematicEv);
      const far = centres.filter(
        ({ value, truth, error }) => Math.abs(value - truth) > systematicEv + 4 * error,
      );
      expect(far.length, peak).toBeLessThan(0.02 * centres.length);
      const widths = await fitted(peak, 'fwhm');
      const ratio = median(widths.map(({ value, truth }) => value / truth));
      expect(Math.abs(ratio - 1), peak).toBeLessThan(0.02);
    }
  });

  it('finds the counts under each peak, times the response there', async () => {
    const { values: nm } = await readArray(demoScan, '/entry/scan/wavelength');
    const { values: response } = await readArray(demoScan, '/entry/detector/response');
    const responseAt = (ev: number): number => {
      // hc = 1239.842 eV nm; air of n = 1.00028 is close enough for a smooth curve
      const wanted = 1239.842 / ev / 1.00028;
      const k = nm.findIndex((one) => one >= wanted);
      return response[k]!;
    };
    for (const peak of peaks) {
      const centres = await fitted(peak, 'centre');
      // Beside an exciton forty times as bright, 1.5 % of fringes are as large as what is left of them.
      const least = peak === 'localised' ? 5000 : 0;
      const responses = new Map(centres.map(({ pixel, truth }) => [pixel, responseAt(truth)]));
      const areas = await fitted(peak, 'area');
      const ratios = areas.flatMap(({ pixel, value, truth }) => {
        const share = responses.get(pixel);
        return share === undefined || truth < least ? [] : [value / (truth * share)];
      });
      expect(ratios.length, peak).toBeGreaterThan(500);
      expect(Math.abs(median(ratios) - 1), peak).toBeLessThan(0.06);
    }
  });

  it('gives Raman lines as shifts too, and says how much the localised states are needed', async () => {
    const { maps } = JSON.parse(await readFile(truthPath, 'utf8'));
    const { values: shifts } = await readMap(folder, 'fit.A1.centre_cm1');
    const { values: errors } = await readMap(folder, 'fit.A1.centre_cm1.err');
    const off = maps['A1.shift'].values
      .flat()
      .map((truth: number, pixel: number) => (shifts[pixel]! - truth) / errors[pixel]!)
      .filter((pull: number) => !Number.isNaN(pull));
    expect(Math.abs(median(off))).toBeLessThan(0.12);
    const { values: needed } = await readMap(folder, 'fit.localised.needed');
    const area: readonly number[] = maps['localised.area'].values.flat();
    const bright = [...needed].filter((_, pixel) => area[pixel]! > 5000);
    expect(bright.length).toBeGreaterThan(500);
    expect(bright.every((need) => need > 100)).toBe(true);
  });
});
