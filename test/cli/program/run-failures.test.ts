import { existsSync } from 'node:fs';
import { copyFile, mkdir, readdir, readFile, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { demoRecipe, demoScan, outcomeOf, rimlight, start, temporaryFolder } from './program';
import { readArray, readTable } from './results';

const place = temporaryFolder();
/** One worker starts sooner than many, and these scans are small. */
const alone = ['--workers', '1'];
const oneLine = /^rimlight: [^\n]+\. [^\n]+\n$/;

async function recipeFile(name: string, blocks: object): Promise<string> {
  const path = join(place, name);
  await writeFile(path, JSON.stringify({ recipe: 1, ...blocks }));
  return path;
}

/** The demo's, without its peak model: that takes seconds, and is no matter here. */
const { model: _, ...blocks } = JSON.parse(await readFile(demoRecipe, 'utf8'));
const quickRecipe = await recipeFile('quick.json', blocks);

const band = (name: string, from: number, to: number, unit = 'eV') => ({ name, from, to, unit });

describe('several scans', () => {
  it('are done but for those that fail, which are told with their names, and end with 4', async () => {
    const good = join(place, 'good.h5');
    await copyFile(demoScan, good);
    const broken = join(place, 'broken.h5');
    await writeFile(broken, (await readFile(demoScan)).subarray(0, 5000));
    const missing = join(place, 'missing.h5');
    const out = join(place, 'several');
    const words = ['run', ...alone, '--recipe', quickRecipe, '--out', out, broken, good, missing];
    const { code, out: said, err } = await rimlight(...words);
    expect(code).toBe(4);
    expect(said).toBe(`${good}: 32 maps written to ${join(out, 'good')}\n`);
    const lines = err.trimEnd().split('\n');
    expect(lines).toHaveLength(3);
    expect(lines[0]).toMatch(/^rimlight: .*\(.*broken\.h5.*\)\. /);
    expect(lines[1]).toMatch(/^rimlight: .*\(.*missing\.h5.*\)\. /);
    expect(lines[2]).toBe('rimlight: 2 of 3 scans failed; the others are done.');
    expect(await readdir(out)).toEqual(['good']);
  });

  it('with the same name are refused before anything is read', async () => {
    const [one, other] = [join(place, 'one'), join(place, 'other')];
    for (const folder of [one, other]) await mkdir(folder);
    await copyFile(demoScan, join(one, 'scan.h5'));
    await copyFile(demoScan, join(other, 'SCAN.h5'));
    const scans = [join(one, 'scan.h5'), join(other, 'SCAN.h5')];
    const out = join(place, 'same');
    const { code, err } = await rimlight(
      'run',
      ...alone,
      '--recipe',
      quickRecipe,
      '--out',
      out,
      ...scans,
    );
    expect(code).toBe(2);
    expect(err).toContain('would both be written to');
    expect(existsSync(out)).toBe(false);
  });
});

describe('a single scan', () => {
  it('that cannot be read ends with 3 and leaves nothing', async () => {
    const out = join(place, 'nothing');
    const words = ['run', ...alone, '--recipe', quickRecipe, '--out', out, join(place, 'no.h5')];
    const { code, err } = await rimlight(...words);
    expect([code, existsSync(out)]).toEqual([3, false]);
    expect(err).toMatch(oneLine);
  });

  it('for which a band has no meaning ends with 2', async () => {
    const csv = join(place, 'shiftless.csv');
    await writeFile(csv, `x,y,${[500, 510, 520, 530].join(',')}\n0,0,1,2,3,4\n1,0,5,6,7,8\n`);
    const scan = { axis: { kind: 'wavelength', unit: 'nm' } };
    const recipe = await recipeFile('raman.json', { scan, bands: [band('A1', 400, 430, 'cm-1')] });
    const { code, err } = await rimlight('run', ...alone, '--recipe', recipe, '--out', place, csv);
    expect(code).toBe(2);
    expect(err).toContain('need the laser');
    expect(err).toMatch(oneLine);
  });

  it('without counts has maps without uncertainties, in files and table alike', async () => {
    const csv = join(place, 'absorbance.csv');
    await writeFile(csv, `x,y,${[500, 510, 520, 530].join(',')}\n0,0,1,-2,3,4\n1,0,5,6.5,7,8\n`);
    const scan = { axis: { kind: 'wavelength', unit: 'nm' } };
    const recipe = await recipeFile('plain.json', { scan, bands: [band('b', 2.3, 2.5)] });
    const out = join(place, 'plain');
    expect((await rimlight('run', ...alone, '--recipe', recipe, '--out', out, csv)).code).toBe(0);
    const files = await readdir(join(out, 'absorbance', 'maps'));
    expect(files.filter((file) => file.includes('.err'))).toEqual([]);
    const { names } = await readTable(join(out, 'absorbance', 'pixels.csv'));
    expect(names.filter((name) => name.includes('.err'))).toEqual([]);
    expect(files).toContain('band.b.integral.npy');
    expect(existsSync(join(out, 'absorbance', 'blend.png'))).toBe(false);
  });
});

describe('a recipe', () => {
  it.each([
    ['block', { features: { source: 'scan.height' } }, 'the features'],
    ['step', { condition: [{ step: 'despike', method: 'spectral' }] }, 'the despike step'],
  ])(
    'with a %s that this build cannot run is refused, never half run',
    async (name, blocks, title) => {
      const recipe = await recipeFile(`later-${name}.json`, blocks);
      const out = join(place, 'later');
      const { code, err } = await rimlight(
        'run',
        ...alone,
        '--recipe',
        recipe,
        '--out',
        out,
        demoScan,
      );
      expect([code, existsSync(out)]).toEqual([2, false]);
      expect(err).toContain(`this build cannot run ${title} yet`);
    },
  );

  it('whose step is off is run', async () => {
    const blocks = { condition: [{ step: 'despike', method: 'spectral', off: true }] };
    const recipe = await recipeFile('off.json', blocks);
    const words = ['--recipe', recipe, '--out', join(place, 'off'), '--only', 'summary'];
    expect((await rimlight('run', ...alone, ...words, demoScan)).code).toBe(0);
  });

  it('that names a band like a way out of the folder is refused', async () => {
    const recipe = await recipeFile('escape.json', { bands: [band('../../x', 1.9, 2)] });
    const { code, err } = await rimlight(
      'run',
      ...alone,
      '--recipe',
      recipe,
      '--out',
      place,
      demoScan,
    );
    expect(code).toBe(2);
    expect(err).toContain('bands[0].name');
  });
});

describe('a call', () => {
  it('writes only the parts asked for', async () => {
    const out = join(place, 'only');
    const words = ['--recipe', quickRecipe, '--out', out, '--only', 'pixels,h5'];
    expect((await rimlight('run', ...alone, ...words, demoScan)).code).toBe(0);
    expect((await readdir(join(out, 'tent-field'))).sort()).toEqual(['maps.h5', 'pixels.csv']);
  });

  it('cannot write where there is a file in the way', async () => {
    const inTheWay = join(place, 'in-the-way');
    await writeFile(inTheWay, '');
    const words = ['run', ...alone, '--recipe', quickRecipe, '--out', inTheWay, demoScan];
    const { code, err } = await rimlight(...words);
    expect(code).toBe(2);
    expect(err).toMatch(oneLine);
    expect(err).toContain('it cannot be written');
  });
});

describe('a folder that is there already', () => {
  it('loses the maps that the new recipe does not make, and nothing that is not ours', async () => {
    const out = join(place, 'again');
    const maps = join(out, 'tent-field', 'maps');
    const first = await recipeFile('first.json', {
      bands: [band('old', 1.9, 2), band('kept', 1.9, 2)],
    });
    const second = await recipeFile('second.json', { bands: [band('kept', 1.9, 2.01)] });
    expect((await rimlight('run', ...alone, '--recipe', first, '--out', out, demoScan)).code).toBe(
      0,
    );
    await writeFile(join(maps, 'notes.npy'), 'mine');
    expect((await rimlight('run', ...alone, '--recipe', second, '--out', out, demoScan)).code).toBe(
      0,
    );
    const files = await readdir(maps);
    expect(files.filter((name) => name.startsWith('band.old'))).toEqual([]);
    expect(files).toEqual(expect.arrayContaining(['notes.npy', 'band.kept.integral.npy']));
  });
});

describe('a run that is ended', () => {
  /** Enough to write that it can be met in the middle. */
  async function startLongRun(out: string) {
    const scan = join(place, 'large.h5');
    if (!existsSync(scan)) {
      expect((await rimlight('sample', 'tent-field', '--out', scan, '--size', '96x96')).code).toBe(
        0,
      );
    }
    const child = start(['run', ...alone, '--recipe', quickRecipe, '--out', out, scan]);
    const ended = outcomeOf(child);
    const folder = join(out, 'large');
    // The first temporary file says that it is writing.
    for (;;) {
      const names = existsSync(folder) ? await readdir(folder, { recursive: true }) : [];
      if (names.some((name) => name.endsWith('.tmp'))) break;
      if (child.exitCode !== null) throw new Error('it ended before it could be met');
      await new Promise((resolve) => setImmediate(resolve));
    }
    return { child, ended, folder };
  }

  it('by force has every file complete or absent, and the next run tidies up', async () => {
    const out = join(place, 'killed');
    const { child, ended, folder } = await startLongRun(out);
    child.kill('SIGKILL');
    expect((await ended).code).toBe(null);
    const names = await readdir(folder, { recursive: true });
    expect(names).not.toContain('summary.json');
    for (const name of names.filter((one) => one.endsWith('.npy'))) {
      const { shape } = await readArray(join(folder, name));
      expect(shape, name).toEqual([96, 96]);
    }
    if (names.includes('pixels.csv')) {
      expect((await readTable(join(folder, 'pixels.csv'))).rows).toHaveLength(96 * 96);
    }
    const scan = join(place, 'large.h5');
    expect(
      (await rimlight('run', ...alone, '--recipe', quickRecipe, '--out', out, scan)).code,
    ).toBe(0);
    const tidied = await readdir(folder, { recursive: true });
    expect(tidied.filter((name) => name.endsWith('.tmp'))).toEqual([]);
    expect(tidied).toContain('summary.json');
  });

  it('by Ctrl-C puts away what it was writing and ends with 130', async () => {
    const { child, ended, folder } = await startLongRun(join(place, 'stopped'));
    child.kill('SIGINT');
    const { code, err } = await ended;
    expect(code).toBe(130);
    expect(err).toMatch(/^rimlight: .* was stopped\. /);
    const names = await readdir(folder, { recursive: true });
    expect(names.filter((name) => name.endsWith('.tmp'))).toEqual([]);
    expect(names).not.toContain('summary.json');
  });
});
