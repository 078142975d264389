/** The command line on measured scans, where they lie beside the checkout (see DEVELOPERS.md); not run elsewhere. */
import { existsSync } from 'node:fs';
import { readdir, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { rimlight, temporaryFolder } from './program';
import { readArray, readMap, readTable } from './results';

const measured = fileURLToPath(new URL('../../../../shared/real-data', import.meta.url));
const out = temporaryFolder();

async function recipeFile(name: string, blocks: object): Promise<string> {
  const path = join(out, name);
  await writeFile(path, JSON.stringify({ recipe: 1, ...blocks }));
  return path;
}

describe.runIf(existsSync(measured))('a measured scan', () => {
  it('has the same band maps from HDF5, npy and text, and no uncertainties where it is not counts', async () => {
    const folder = join(measured, 'raman-emulsion');
    const bands = [{ name: 'line', from: 1420, to: 1480, unit: 'cm-1' }];
    // Which laser it was is not documented; bands in shift come out the same with any.
    const laser = { value: 785, unit: 'nm' };
    const axis = { kind: 'shift', unit: 'cm-1' };
    const file = join(folder, 'axis_shift_cm1.csv');
    for (const [name, stated] of [
      ['emulsion_nxdata.h5', { laser }],
      ['emulsion_rows.tsv', { laser, axis }],
      ['emulsion_yxk.npy', { laser, axis: { ...axis, file } }],
    ] as const) {
      const recipe = await recipeFile(`${name}.json`, { scan: stated, bands });
      const ran = await rimlight('run', '--recipe', recipe, '--out', out, join(folder, name));
      expect([name, ran.code, ran.err]).toEqual([name, 0, '']);
    }
    const [fromHdf5, fromText, fromNpy] = await Promise.all(
      ['emulsion_nxdata', 'emulsion_rows', 'emulsion_yxk'].map((stem) =>
        readMap(join(out, stem), 'band.line.integral'),
      ),
    );
    expect(fromHdf5?.shape).toEqual([60, 60]);
    const scale = Math.max(...fromNpy!.values);
    fromNpy?.values.forEach((value, pixel) => {
      expect(Math.abs(fromHdf5!.values[pixel]! - value)).toBeLessThan(1e-9 * scale);
      expect(Math.abs(fromText!.values[pixel]! - value)).toBeLessThan(1e-9 * scale);
    });
    const files = await readdir(join(out, 'emulsion_yxk', 'maps'));
    expect(files.filter((name) => name.includes('.err'))).toEqual([]);
    // Summed here from the array itself.
    const cube = Float64Array.from((await readArray(join(folder, 'emulsion_yxk.npy'))).values);
    const total = (await readMap(join(out, 'emulsion_yxk'), 'scan.total')).values;
    for (const pixel of [0, 59, 1830, 3599]) {
      const sum = cube.subarray(pixel * 253, (pixel + 1) * 253).reduce((a, b) => a + b, 0);
      expect(total[pixel]).toBeCloseTo(sum, 5);
    }
  });

  it('of a line against gate voltage keeps the volts of its columns', async () => {
    const scan = join(measured, 'pl-mose2ws2-gate-sweeps', 'density_sweep.npz');
    const bands = [{ name: 'low', from: 1.55, to: 1.6, unit: 'eV' }];
    const recipe = await recipeFile('sweep.json', { bands });
    const { code, err } = await rimlight('run', '--recipe', recipe, '--out', out, scan);
    expect([code, err]).toEqual([0, '']);
    const { names, rows } = await readTable(join(out, 'density_sweep', 'pixels.csv'));
    const volts = rows.map((row) => row[names.indexOf('gate_volts_V')]!);
    const { values } = await readArray(scan, 'gate_volts');
    expect(volts).toEqual([...values]);
    expect((await readMap(join(out, 'density_sweep'), 'band.low.centroid')).shape).toEqual([
      1, 261,
    ]);
  });

  it('whose axis counts detector pixels is refused for that reason', async () => {
    const scan = join(measured, 'raman-five-instruments', 'E_532nm_neon_pixel_axis.csv');
    const { code, err } = await rimlight('inspect', scan);
    expect(code).toBe(3);
    expect(err).toMatch(/^rimlight: .*counts detector pixels.*\n$/);
  });
});
