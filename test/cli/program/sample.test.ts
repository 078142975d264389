import { readdir, readFile, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { rimlight, temporaryFolder } from './program';

const folder = temporaryFolder();

describe('rimlight sample', () => {
  it('writes a demo scan and its truth, and says so', async () => {
    const out = join(folder, 'new', 'field.h5');
    const {
      code,
      out: said,
      err,
    } = await rimlight('sample', 'tent-field', '--out', out, '--size', '12x9');
    expect([code, err]).toEqual([0, '']);
    expect(said).toBe(
      `${out}, ${join(folder, 'new', 'field.truth.json')}: 12 × 9 pixels, 512 channels, seed 1\n`,
    );
    expect((await readdir(join(folder, 'new'))).sort()).toEqual(['field.h5', 'field.truth.json']);
    const truth = JSON.parse(await readFile(join(folder, 'new', 'field.truth.json'), 'utf8'));
    expect(truth).toMatchObject({ scenario: 'tent-field', seed: 1, shape: { ny: 9, nx: 12 } });
  });

  it('writes the same bytes for the same seed, and others for another', async () => {
    const paths = ['a.npy', 'b.npy', 'c.npy'].map((name) => join(folder, name));
    for (const [index, seed] of ['7', '7', '8'].entries()) {
      const words = ['--out', paths[index]!, '--size', '5x4', '--seed', seed];
      expect((await rimlight('sample', 'twin-layer', ...words)).code).toBe(0);
    }
    const [a, b, c] = await Promise.all(paths.map((path) => readFile(path)));
    expect(Buffer.compare(a!, b!)).toBe(0);
    expect(Buffer.compare(a!, c!)).not.toBe(0);
  });

  it.each(['h5', 'npz'])('writes a .%s file that opens again', async (ending) => {
    const out = join(folder, `again.${ending}`);
    expect((await rimlight('sample', 'tent-field', '--out', out, '--size', '6x4')).code).toBe(0);
    const { code, out: said } = await rimlight('inspect', '--json', out);
    expect(code).toBe(0);
    expect(JSON.parse(said)).toMatchObject({ scan: { shape: { ny: 4, nx: 6, nk: 512 } } });
  });

  it('writes what a .npy file has no room for beside it, where a recipe finds it', async () => {
    const out = join(folder, 'bare.npy');
    expect((await rimlight('sample', 'tent-field', '--out', out, '--size', '6x4')).code).toBe(0);
    const recipe = join(folder, 'bare.recipe.json');
    const axis = { file: 'bare.wavelength_air_nm.npy', kind: 'wavelength', unit: 'nm' };
    const height = { file: 'bare.height_nm.npy', unit: 'nm' };
    await writeFile(recipe, JSON.stringify({ recipe: 1, scan: { axis, height } }));
    const { code, out: said } = await rimlight('inspect', out, '--recipe', recipe, '--json');
    expect(code).toBe(0);
    expect(JSON.parse(said)).toMatchObject({
      scan: { shape: { ny: 4, nx: 6, nk: 512 } },
      resolved: { axis: { file: axis.file }, height: { file: height.file } },
    });
  });

  it.each([
    [['tent-fild', '--out', 'a.h5'], 'there is no demo scan called "tent-fild"'],
    [['tent-field'], '--out is missing'],
    [['tent-field', '--out', 'a.tif'], 'a demo scan cannot be written as "a.tif"'],
    [['tent-field', '--out', 'a.h5', '--size', '64'], '--size is "64"'],
    [['tent-field', '--out', 'a.h5', '--size', '0x4'], '0 is not a possible number of columns'],
    [['tent-field', '--out', 'a.h5', '--seed', '-1'], 'the option --seed needs a value'],
    [['tent-field', '--out', 'a.h5', '--seed', '1.5'], '--seed is "1.5"'],
  ])('refuses %j with 2', async (words, what) => {
    const { code, out, err } = await rimlight('sample', ...words);
    expect([code, out]).toEqual([2, '']);
    expect(err).toContain(`rimlight: ${what}`);
    expect(err.trimEnd().split('\n')).toHaveLength(1);
  });
});
