import { copyFile, mkdir, readFile, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { demoRecipe, demoScan, outcomeOf, rimlight, start, temporaryFolder } from './program';

const folder = temporaryFolder();

async function file(name: string, content: string | Uint8Array): Promise<string> {
  const path = join(folder, name);
  await writeFile(path, content);
  return path;
}

describe('rimlight inspect', () => {
  it('tells shape, axes, each guess with its reason, counts and what else could be meant', async () => {
    const { code, out, err } = await rimlight('inspect', demoScan);
    expect([code, err]).toEqual([0, '']);
    expect(out).toMatch(/^tent-field\.h5 \(HDF5\)\n\nScan\n {2}pixels {6}64 columns × 64 rows\n/);
    expect(out).toMatch(/ {2}channels {4}512, 1\.\d+ eV to 2\.\d+ eV/);
    expect(out).toMatch(/ {2}columns {5}step 15 nm\n {2}rows {8}step 15 nm\n/);
    for (const title of ['Read as', 'Counts']) expect(out).toContain(`\n${title}\n`);
    expect(out).toMatch(/ {2}noise {7}Poisson\n {14}from the file: whole numbers/);
    expect(out).toMatch(/ {2}per channel \d+ to \d+\n/);
    expect(out).toMatch(/\n {14}or vacuum: /);
  });

  it('takes what a recipe states instead of a guess', async () => {
    const { code, out } = await rimlight('inspect', demoScan, '--recipe', demoRecipe);
    expect(code).toBe(0);
    expect(out).toMatch(/ {2}noise {7}detector.*\n {14}stated by the recipe: offset 300 counts/);
  });

  it('gives the same as JSON, with a scan block that guesses nothing any more', async () => {
    const { code, out, err } = await rimlight('inspect', '--json', demoScan);
    expect([code, err]).toEqual([0, '']);
    const found = JSON.parse(out);
    expect(Object.keys(found)).toEqual([
      ...['file', 'format', 'scan', 'guesses', 'resolved', 'counts', 'warnings', 'problems'],
    ]);
    expect(found).toMatchObject({
      file: 'tent-field.h5',
      format: 'HDF5',
      scan: {
        shape: { ny: 64, nx: 64, nk: 512 },
        x: { unit: 'nm', pitch: 15 },
        exposure_s: 0.5,
        noise: 'poisson',
      },
      counts: { pixels: 4096, step: 1, no_data_values: 0 },
      problems: [],
    });
    const { lowest, lower_quartile, median, upper_quartile, highest } = found.counts.per_pixel;
    const rising = [lowest, lower_quartile, median, upper_quartile, highest];
    expect(rising.toSorted((a, b) => a - b)).toEqual(rising);
    const recipe = await file('resolved.json', JSON.stringify({ recipe: 1, scan: found.resolved }));
    const again = JSON.parse(
      (await rimlight('inspect', '--json', demoScan, '--recipe', recipe)).out,
    );
    expect(again.scan).toEqual(found.scan);
    expect(again.resolved).toEqual(found.resolved);
    const guessed = again.guesses.filter(({ source }: { source: string }) => source === 'guess');
    expect(guessed).toEqual([]);
  });

  it('prints what it found of a scan that cannot be read, what is in the way, and ends with 3', async () => {
    const path = await file('bare.csv', 'x,y,100,200,300\n0,0,1,2,3\n1,0,4,5,6\n');
    const { code, out, err } = await rimlight('inspect', path);
    expect(code).toBe(3);
    expect(out).toMatch(/^bare\.csv \(text\)\n/);
    expect(out).toContain('\nRead as\n');
    expect(out).toContain('\nIn the way\n');
    expect(err).toMatch(/^rimlight: .+ \(bare\.csv[^)]*\)\. .+\n$/);
    const asJson = await rimlight('inspect', path, '--json');
    expect(asJson.code).toBe(3);
    const found = JSON.parse(asJson.out);
    expect(found).toMatchObject({ scan: null, resolved: null, counts: null });
    expect(found.problems.length).toBeGreaterThan(0);
  });

  it('refuses what is no scan with 3 and one line', async () => {
    const whole = await readFile(demoScan);
    await mkdir(join(folder, 'a-folder'));
    for (const path of [
      await file('cut.h5', whole.subarray(0, whole.length / 3)),
      await file('empty.npy', ''),
      await file('text.h5', 'this is a letter, not a scan\n'),
      await file(
        'noise.bin',
        Uint8Array.from({ length: 4096 }, (_, i) => (i * 7919) % 251),
      ),
      join(folder, 'a-folder'),
      join(folder, 'nowhere.h5'),
    ]) {
      const { code, err } = await rimlight('inspect', path);
      expect([path, code]).toEqual([path, 3]);
      expect(err).toMatch(/^rimlight: [^\n]+ \([^\n]+\)\. [^\n]+\n$/);
      expect(err).not.toMatch(/\n\s+at /);
    }
  });

  it('refuses a wrong recipe, or one whose files are missing, with 2', async () => {
    const wrong = await file('wrong.json', '{ "recipe": 1, "scan": { "order": "xyz" } }');
    const lost = await file(
      'lost.json',
      '{ "recipe": 1, "scan": { "axis": { "file": "no.npy" } } }',
    );
    for (const [recipe, what] of [
      [wrong, 'order is "xyz"'],
      [lost, 'the file "no.npy" cannot be read: there is no such file'],
    ] as const) {
      const { code, out, err } = await rimlight('inspect', demoScan, '--recipe', recipe);
      expect([code, out]).toEqual([2, '']);
      expect(err).toContain(what);
      expect(err).toContain(recipe);
    }
  });

  it('looks for a recipe’s files in the recipe’s own folder', async () => {
    const place = join(folder, 'elsewhere');
    await mkdir(join(place, 'axes'), { recursive: true });
    await copyFile(demoScan, join(place, 'scan.h5'));
    await writeFile(
      join(place, 'axes', 'axis.csv'),
      Array.from({ length: 512 }, (_, k) => `${500 + k / 8}`).join('\n'),
    );
    const scan = {
      data: '/entry/scan/counts',
      axis: { file: 'axes/axis.csv', kind: 'wavelength', unit: 'nm' },
    };
    await writeFile(join(place, 'r.json'), JSON.stringify({ recipe: 1, scan }));
    const words = ['inspect', join(place, 'scan.h5'), '--recipe', join(place, 'r.json'), '--json'];
    const { code, out, err } = await outcomeOf(start(words, folder));
    expect([code, err]).toEqual([0, '']);
    const { axis } = JSON.parse(out).scan;
    // hc / λ with λ = 500 nm in air is 2.479 eV: NIST ASD's air-vacuum conversion adds 0.14 nm.
    expect(axis.to_eV).toBeCloseTo(1239.841984 / 500.1394, 4);
  });

  it('ends quietly when its reader goes away', async () => {
    const child = start(['inspect', '--json', demoScan]);
    child.stdout?.destroy();
    const { code, err } = await outcomeOf(child);
    expect([code, err]).toEqual([0, '']);
  });
});
