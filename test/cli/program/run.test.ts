import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { readdir, readFile } from 'node:fs/promises';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { decode } from 'fast-png';
import { beforeAll, describe, expect, it } from 'vitest';
import { version } from '../../../package.json';
import { pathSource } from '../../../src/io/node-source';
import { bandEnergies } from '../../../src/recipe/band-energies';
import { parseRecipe } from '../../../src/recipe/validate';
import { bandQuantities } from '../../../src/science/bands/band';
import { createInProcessEngine } from '../../../workers/in-process-engine';
import { demoRecipe, demoScan, rimlight, temporaryFolder } from './program';
import { readArray, readMap, readTable } from './results';

const out = temporaryFolder();
const folder = join(out, 'tent-field');
const recipeText = await readFile(demoRecipe, 'utf8');
const names = ['tail', 'shoulder', 'exciton', 'A1', '2LA'];
const peakNames = ['area', 'centre', 'fwhm', 'height'];
const fittedNames = [
  ...['floor.level', 'floor.slope', 'localised.needed', 'A1.centre_cm1', '2LA.centre_cm1'],
  ...['exciton', 'localised', 'A1', '2LA'].flatMap((peak) =>
    peakNames.map((name) => `${peak}.${name}`),
  ),
  ...['chi2r', 'status', 'iterations'],
];

beforeAll(async () => {
  const ran = await rimlight(
    'run',
    '--recipe',
    demoRecipe,
    '--out',
    out,
    '--workers',
    '2',
    demoScan,
  );
  expect(ran).toEqual({
    code: 0,
    out: `${demoScan}: 56 maps written to ${folder}\n`,
    err: '',
  });
}, 60_000);

async function recipe() {
  const result = parseRecipe(recipeText);
  if (!result.ok) throw new Error('the demo recipe is not valid');
  return result.recipe;
}

describe('the folder of a run', () => {
  it('holds every file of the contract and nothing else', async () => {
    expect((await readdir(folder)).sort()).toEqual([
      ...['blend.png', 'maps', 'maps.h5', 'pixels.csv', 'summary.json'],
    ]);
    const bandFiles = names.flatMap((name) =>
      bandQuantities.map((quantity) => `band.${name}.${quantity}.npy`),
    );
    const files = await readdir(join(folder, 'maps'));
    const values = files.filter((file) => !file.endsWith('.err.npy'));
    const fitFiles = fittedNames.map((name) => `fit.${name}.npy`);
    const scanFiles = ['scan.height.npy', 'scan.total.npy'];
    expect(values.sort()).toEqual([...bandFiles, ...fitFiles, ...scanFiles].sort());
    expect(files).toContain('band.tail.integral.err.npy');
    expect(files).toContain('scan.total.err.npy');
    expect(files).not.toContain('scan.height.err.npy');
  });

  it('has maps as float64 (ny, nx) that equal the engine’s own, bit for bit', async () => {
    const engine = createInProcessEngine({
      toByteSource: (handle) => pathSource(handle.kind === 'path' ? handle.path : handle.name),
    });
    const scan = { kind: 'path' as const, name: 'tent-field.h5', path: demoScan };
    const inputs = { scan, companions: [] };
    const { plan } = await engine.inspect(inputs, (await recipe()).scan ?? {});
    if (plan === null) throw new Error('the demo scan cannot be read');
    const open = await engine.open(inputs, plan);
    const bands = bandEnergies(await recipe(), plan.meta.laserEv, 'air');
    for (const [index, band] of bands.entries()) {
      const maps = await open.bandMaps({ band, quantities: bandQuantities });
      for (const { quantity, values, errors } of maps) {
        const name = `band.${names[index]}.${quantity}`;
        const written = await readMap(folder, name);
        expect(written.shape, name).toEqual([64, 64]);
        expect(written.values, name).toEqual(values);
        if (errors !== null) {
          expect((await readMap(folder, `${name}.err`)).values, name).toEqual(errors);
        }
      }
    }
    await engine.close();
  });

  it('has integrals and centroids as the contract defines them, summed here channel by channel', async () => {
    const { values: counts } = await readArray(demoScan, '/entry/scan/counts');
    const { axis } = JSON.parse((await rimlight('inspect', '--json', demoScan)).out).scan;
    const { values: nm } = await readArray(demoScan, '/entry/scan/wavelength');
    const centres = Array.from(nm, (air) => 1239.8419843320025 / vacuumNm(air));
    expect(centres[0]).toBeCloseTo(axis.to_eV, 8);
    const edges = centres.slice(1).map((centre, k) => (centre + centres[k]!) / 2);
    const upper = [2 * centres[0]! - edges[0]!, ...edges];
    const lower = [...edges, 2 * centres.at(-1)! - edges.at(-1)!];
    const share = centres.map((_, k) => {
      const inside = Math.min(upper[k]!, 1.925) - Math.max(lower[k]!, 1.865);
      return Math.max(0, inside) / (upper[k]! - lower[k]!);
    });
    const integral = (await readMap(folder, 'band.tail.integral')).values;
    const error = (await readMap(folder, 'band.tail.integral.err')).values;
    const centroid = (await readMap(folder, 'band.tail.centroid')).values;
    for (const pixel of [0, 63, 64, 2080, 4095]) {
      let [sum, moment, variance] = [0, 0, 0];
      share.forEach((f, k) => {
        const c = counts[pixel * 512 + k]!;
        sum += f * c;
        moment += f * c * centres[k]!;
        variance += f * f * (Math.max(c - 300, 0) + 3.2 * 3.2);
      });
      expect(integral[pixel]! / sum).toBeCloseTo(1, 6);
      expect(error[pixel]! / Math.sqrt(variance)).toBeCloseTo(1, 6);
      expect(centroid[pixel]).toBeCloseTo(moment / sum, 6);
    }
  });

  it('has the same maps in maps.h5, with units, errors, the recipe and the scan’s SHA-256', async () => {
    const h5 = join(folder, 'maps.h5');
    const files = await readdir(join(folder, 'maps'));
    for (const file of files) {
      const name = file.replace(/(\.err)?\.npy$/, '');
      const array = file.endsWith('.err.npy') ? 'data_errors' : 'data';
      const inside = await readArray(h5, `/entry/${name}/${array}`);
      const beside = await readArray(join(folder, 'maps', file));
      expect(inside, file).toEqual(beside);
    }
  });

  it('has a table with one row a pixel and the maps as columns', async () => {
    const { names: columns, rows } = await readTable(join(folder, 'pixels.csv'));
    expect(columns.slice(0, 6)).toEqual(['y', 'x', 'y_nm', 'x_nm', 'scan.total', 'scan.total.err']);
    expect(rows).toHaveLength(4096);
    expect(rows[65]?.slice(0, 4)).toEqual([1, 1, 15, 15]);
    for (const name of ['scan.total', 'band.A1.centroid', 'band.A1.centroid.err']) {
      const { values } = await readMap(folder, name);
      expect(Float64Array.from(rows, (row) => row[columns.indexOf(name)]!)).toEqual(values);
    }
  });

  it('has a summary with the scan, the recipe, quartiles, versions and times', async () => {
    const summary = JSON.parse(await readFile(join(folder, 'summary.json'), 'utf8'));
    const bytes = await readFile(demoScan);
    expect(summary).toMatchObject({
      program: { name: 'rimlight', version },
      scan: {
        file: 'tent-field.h5',
        bytes: bytes.length,
        sha256: createHash('sha256').update(bytes).digest('hex'),
        shape: { ny: 64, nx: 64, nk: 512 },
        noise: 'detector',
      },
      recipe: { file: 'tent-field.recipe.json', title: 'Tent field, first look' },
      workers: 2,
    });
    expect(Object.keys(summary.timings_s)).toEqual(['read', 'maps', 'fit', 'hash', 'write']);
    expect(Array.isArray(summary.warnings)).toBe(true);
    const { values } = await readMap(folder, 'band.tail.integral');
    const sorted = [...values].sort((a, b) => a - b);
    const { unit, pixels, median, lower_quartile, upper_quartile } =
      summary.maps['band.tail.integral'];
    expect([unit, pixels]).toEqual(['counts', 4096]);
    expect(median).toBeCloseTo((sorted[2047]! + sorted[2048]!) / 2, 6);
    expect(sorted.filter((value) => value < lower_quartile)).toHaveLength(1024);
    expect(sorted.filter((value) => value > upper_quartile)).toHaveLength(1024);
  });

  it('has a blend of the scan’s size that is no single colour', async () => {
    const { width, height, data, channels } = decode(await readFile(join(folder, 'blend.png')));
    expect([width, height]).toEqual([64, 64]);
    const colours = new Set<string>();
    for (let at = 0; at < data.length; at += channels) colours.add(data.slice(at, at + 3).join());
    expect(colours.size).toBeGreaterThan(100);
  });

  it('is read by h5py and NumPy as we read it, where Python has them', () => {
    const python = '/usr/bin/python3';
    if (spawnSync(python, ['-c', 'import h5py']).status !== 0) return;
    const script = fileURLToPath(new URL('results-check.py', import.meta.url));
    const said = spawnSync(python, [script, folder], { encoding: 'utf8' });
    expect(`${said.stdout}${said.stderr}`).toBe(
      `${createHash('sha256').update(recipeText).digest('hex')}\nas expected\n`,
    );
  });
});

describe('numbers', () => {
  it('do not depend on the number of workers, nor on the run', async () => {
    const other = join(out, 'three');
    const words = ['--recipe', demoRecipe, '--out', other, '--workers', '3'];
    expect((await rimlight('run', ...words, demoScan)).code).toBe(0);
    const place = join(other, 'tent-field');
    for (const file of ['maps.h5', 'pixels.csv', 'blend.png']) {
      const [first, second] = [
        await readFile(join(folder, file)),
        await readFile(join(place, file)),
      ];
      expect(Buffer.compare(first, second), file).toBe(0);
    }
  });
});

/** Air to vacuum by Ciddor (1996) for standard air, as NIST ASD uses: λ_vac = n λ_air. From memory. */
function vacuumNm(airNm: number): number {
  const s2 = (1000 / airNm) ** 2;
  let vacuum = airNm;
  for (let round = 0; round < 4; round++) {
    const sigma2 = round === 0 ? s2 : (1000 / vacuum) ** 2;
    const n = 1 + 0.05792105 / (238.0185 - sigma2) + 0.00167917 / (57.362 - sigma2);
    vacuum = n * airNm;
  }
  return vacuum;
}
