/**
 * Every measured text file beside the checkout: columns, shapes, first and last values as its own
 * description or its own lines have them. Where the folder is missing these count as not run.
 */
import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { memorySource } from '../../../src/io/byte-source';
import type { Container } from '../../../src/io/container';
import { npyReader } from '../../../src/io/npy';
import { textReader } from '../../../src/io/text/text-reader';
import { entryOf, numbersOf, readAll, shapesOf } from './open-text';

const root = fileURLToPath(new URL('../../../../shared/real-data/', import.meta.url));
const isThere = existsSync(root);

const bytesOfFile = (path: string): Uint8Array => new Uint8Array(readFileSync(root + path));

function open(path: string): Promise<Container> {
  return textReader.open(memorySource(path.split('/').at(-1) ?? path, bytesOfFile(path)));
}

/** Lines by the plainest means there are, to hold the reader against. */
function linesOf(path: string, separator: string): string[][] {
  const text = new TextDecoder().decode(bytesOfFile(path));
  const lines = text.split(/\r?\n/).filter((line) => line !== '');
  return lines.map((line) => line.split(separator));
}

const asNumber = (cell: string): number =>
  cell === '' || cell === 'NA' ? Number.NaN : Number(cell);

/** Every column equals the cells under its heading, in order. */
async function checkColumns(path: string, separator = ','): Promise<Container> {
  const file = await open(path);
  const [names, ...rows] = linesOf(path, separator);
  expect(file.entries.map((entry) => entry.path)).toEqual(names.map((name) => name.trim()));
  for (const [i, name] of names.entries()) {
    expect(await numbersOf(file, name.trim())).toEqual(rows.map((cells) => asNumber(cells[i])));
  }
  expect(file.notes).toEqual([]);
  return file;
}

describe.runIf(isThere)('measured text', () => {
  it('is covered here, file by file', () => {
    const files = readdirSync(root, { recursive: true, encoding: 'utf8' }).filter(
      (path) => /\.(csv|tsv|txt|dat)$/.test(path) && !path.endsWith('LICENSE.txt'),
    );
    expect(files).toHaveLength(42);
  });
});

describe.runIf(isThere)('pl-diamond', () => {
  it.each([
    'control_77K',
    'dark_laser_off',
    'fn7112_77K_a',
    'fn7112_77K_b',
    'fn7112_77K_c',
    'fn7112_room',
    'fn7114_77K',
    'no_sample_LN2_cuvette',
  ])('%s has 2910 channels from 535.98 to 746.28 nm', async (name) => {
    const file = await checkColumns(`pl-diamond/${name}.csv`);
    expect(shapesOf(file)).toEqual(['wavelength_nm 2910 float64', 'counts 2910 float64']);
    const axis = await numbersOf(file, 'wavelength_nm');
    expect([axis[0], axis[2909]]).toEqual([535.97554, 746.28246]);
    expect(entryOf(file, 'wavelength_nm').attributes).toEqual({ units: 'nm' });
  });
});

describe.runIf(isThere)('ir-diamond-fn7112', () => {
  it.each([
    ['0001', 0.2836216],
    ['0352', 0.03738556],
  ])(
    'pixel %s has two columns without names, with exponents of three digits',
    async (pixel, first) => {
      const path = `ir-diamond-fn7112/one_pixel_original_${pixel}.csv`;
      const file = await open(path);
      expect(shapesOf(file)).toEqual(['column 1 3527 float64', 'column 2 3527 float64']);
      const axis = await numbersOf(file, 'column 1');
      expect([axis[0], axis[3526]]).toEqual([599.778, 3999.808]);
      expect((await numbersOf(file, 'column 2'))[0]).toBe(first);
      const rows = linesOf(path, ',');
      expect(await numbersOf(file, 'column 2')).toEqual(rows.map(([, cell]) => Number(cell)));
    },
  );
});

describe.runIf(isThere)('raman-reference-532nm', () => {
  const names = [
    ['calcite', 0],
    ['neon_400ms', 190],
    ['neon_5ms', 190],
    ['polystyrene', 0],
    ['silicon_S0B', 190],
    ['silicon_S0B_2021', 0],
    ['silicon_S0N', 190],
    ['silicon_S0P', 190],
    ['silicon_S1N', 190],
    ['silicon_Sil', 190],
    ['srm2242a_glass', 0],
  ] as const;

  it.each(names)(
    '%s has seven columns of 2048, about %i of them without an axis',
    async (name, lost) => {
      const file = await checkColumns(`raman-reference-532nm/${name}.csv`);
      expect(file.entries.map(({ path }) => path)).toEqual([
        'pixel',
        'wavelength_nm',
        'wavenumber_cm1',
        'raman_shift_cm1',
        'dark_counts',
        'raw_counts',
        'raw_minus_dark',
      ]);
      expect(file.entries.every(({ shape }) => shape[0] === 2048)).toBe(true);
      expect(entryOf(file, 'raw_counts').type).toBe('uint16');
      const missing = (await numbersOf(file, 'wavelength_nm')).filter(Number.isNaN).length;
      expect(Math.abs(missing - lost)).toBeLessThanOrEqual(lost === 0 ? 0 : 1);
    },
  );

  it('has the same numbers with decimal commas as with points', async () => {
    const comma = await open('raman-reference-532nm/silicon_S0N_decimal_comma.csv');
    const point = await open('raman-reference-532nm/silicon_S0N.csv');
    expect(comma.entries.map(({ path }) => path)).toEqual(['Raman shift', 'Intensity']);
    const shift = await numbersOf(point, 'raman_shift_cm1');
    const counts = await numbersOf(point, 'raw_minus_dark');
    const count = entryOf(comma, 'Raman shift').shape[0];
    // The twin ends where the axis ends.
    expect(shift.filter((value) => !Number.isNaN(value))).toHaveLength(count);
    expect(await numbersOf(comma, 'Raman shift')).toEqual(shift.slice(0, count));
    expect(await numbersOf(comma, 'Intensity')).toEqual(counts.slice(0, count));
    expect(entryOf(comma, 'Intensity').type).toBe('int32');
    expect(comma.notes).toEqual(['Commas were read as decimal marks.']);
  });
});

describe.runIf(isThere)('raman-five-instruments', () => {
  it.each([
    ['A_785nm_acetonitrile', 'raman_shift_cm1', 3513.15, 87.8957],
    ['A_785nm_algae', 'raman_shift_cm1', 3513.15, 87.8957],
    ['B_785nm_acetonitrile', 'raman_shift_cm1', 3199.438477, 100.34082],
    ['B_785nm_glass_slide', 'raman_shift_cm1', 1808.186523, 712.416016],
    ['C_785nm_acetonitrile', 'wavelength_nm', 799.84, 1100.76],
    ['C_785nm_algae', 'wavelength_nm', 799.84, 1100.76],
    ['D_532nm_acetonitrile', 'Pixel', -601.2798364891678, 4764.790902088604],
    ['D_532nm_algae', 'Pixel', -601.2798364891678, 4764.790902088604],
    ['E_532nm_acetonitrile_pixel_axis', 'Pixels #', 0, 2047],
    ['E_532nm_algae_pixel_axis', 'Pixel', 0, 2047],
    ['E_532nm_neon_pixel_axis', 'Pixels #', 0, 2047],
  ])('%s runs from first to last of %s', async (name, axis, first, last) => {
    const file = await checkColumns(`raman-five-instruments/${name}.csv`);
    const values = await numbersOf(file, axis);
    expect([values[0], values.at(-1)]).toEqual([first, last]);
  });

  it('C has no data in its first ten pixels', async () => {
    for (const name of ['acetonitrile', 'algae']) {
      const file = await open(`raman-five-instruments/C_785nm_${name}.csv`);
      const counts = await numbersOf(file, 'counts');
      expect(counts.findIndex((value) => !Number.isNaN(value))).toBe(10);
      expect(counts.filter(Number.isNaN)).toHaveLength(10);
    }
  });

  it.each([
    ['B_785nm_algae_3_points_long', 3],
    ['B_785nm_algae_CC-124_MN_10_points_long', 10],
    ['B_785nm_algae_CC-124_TAP_10_points_long', 10],
    ['B_785nm_algae_CC-125_MN_10_points_long', 10],
    ['B_785nm_algae_CC-125_TAP_10_points_long', 10],
    ['B_785nm_algae_CC-1373_MN_10_points_long', 10],
    ['B_785nm_algae_CC-1373_TAP_10_points_long', 9],
  ])('%s has %i scattered points of 1015 channels', async (name, points) => {
    const path = `raman-five-instruments/${name}.tsv`;
    const file = await open(path);
    expect(shapesOf(file)).toEqual([
      `counts 1 × ${points} × 1015 float64`,
      'axis 1015 float64',
      `x ${points} float64`,
      `y ${points} float64`,
    ]);
    const rows = linesOf(path, '\t').slice(1);
    expect(await numbersOf(file, 'counts')).toEqual(rows.map((cells) => Number(cells[3])));
    expect(await numbersOf(file, 'axis')).toEqual(
      rows.slice(0, 1015).map((cells) => Number(cells[2])),
    );
    const firsts = rows.filter((_, i) => i % 1015 === 0);
    expect(await numbersOf(file, 'x')).toEqual(firsts.map(([x]) => Number(x)));
    expect(await numbersOf(file, 'y')).toEqual(firsts.map(([, y]) => Number(y)));
    expect(entryOf(file, 'axis').attributes.units).toBe('cm-1');
    expect(entryOf(file, 'x').attributes.units).toBe('um');
    expect(file.notes).toHaveLength(1);
  });
});

describe.runIf(isThere)('raman-emulsion', () => {
  it('has an axis of 253 values in a file of its own', async () => {
    const file = await checkColumns('raman-emulsion/axis_shift_cm1.csv');
    expect(shapesOf(file)).toEqual(['raman_shift_cm1 253 uint16']);
    const axis = await numbersOf(file, 'raman_shift_cm1');
    expect(axis).toEqual(Array.from({ length: 253 }, (_, k) => 1010 + 3 * k));
  });

  it('is a map of 60 × 60 × 253, with the numbers of its npy twin', async () => {
    const file = await open('raman-emulsion/emulsion_rows.tsv');
    expect(shapesOf(file)).toEqual([
      'counts 60 × 60 × 253 float64',
      'axis 253 uint16',
      'x 60 uint8',
      'y 60 uint8',
    ]);
    expect(file.notes).toEqual([]);
    const counts = await readAll(file, 'counts');
    const twin = await npyReader.open(
      memorySource('emulsion_yxk.npy', bytesOfFile('raman-emulsion/emulsion_yxk.npy')),
    );
    const expected = await twin.read('', [0, 0, 0], [60, 60, 253]);
    // One number of the npy file is not the double nearest to its six digits: −0.060533 at pixel 1383.
    const others = Array.from(counts.keys()).filter((i) => counts[i] !== expected[i]);
    expect(others).toEqual([1383 * 253 + 226]);
    expect(counts[others[0]]).toBe(-0.060533);
    expect(Math.abs(counts[others[0]] - expected[others[0]])).toBeLessThan(1e-17);
    const rows = linesOf('raman-emulsion/emulsion_rows.tsv', '\t').slice(1);
    expect(Array.from(counts)).toEqual(rows.flatMap((cells) => cells.slice(2).map(Number)));
  });
});
