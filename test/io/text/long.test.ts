/** Text in long rows: x, y, axis, counts. */
import { describe, expect, it } from 'vitest';
import { entryOf, numbersOf, openText, shapesOf } from './open-text';

const names = 'x_um,y_um,raman_shift_cm1,counts';

describe('long rows', () => {
  const rows = [0, 1].flatMap((y) =>
    [0, 1, 2].flatMap((x) =>
      [520, 521].map((axis) => `${x},${y},${axis},${100 * y + 10 * x + axis - 520}`),
    ),
  );
  const counts = [0, 1, 10, 11, 20, 21, 100, 101, 110, 111, 120, 121];

  it('become a cube with its axis and positions', async () => {
    const file = await openText([names, ...rows]);
    expect(shapesOf(file)).toEqual([
      'counts 2 × 3 × 2 uint8',
      'axis 2 uint16',
      'x 3 uint8',
      'y 2 uint8',
    ]);
    expect(await numbersOf(file, 'counts')).toEqual(counts);
    expect(entryOf(file, 'axis').attributes).toEqual({
      units: 'cm-1',
      long_name: 'raman_shift_cm1',
    });
    expect(entryOf(file, 'x').attributes).toEqual({ units: 'um', long_name: 'x_um' });
  });

  it.each([
    [
      'axis slowest',
      [...rows.filter((_, i) => i % 2 === 0), ...rows.filter((_, i) => i % 2 === 1)],
    ],
    ['backwards', rows.toReversed()],
    ['shuffled', rows.map((_, i) => rows[(5 * i + 3) % rows.length])],
  ])('in any order: %s', async (_, shuffled) => {
    const file = await openText([names, ...shuffled]);
    const axis = await numbersOf(file, 'axis');
    const cube = await numbersOf(file, 'counts');
    const upward = axis[0] < axis[1] ? cube : cube.map((__, i) => cube[i ^ 1]);
    expect(upward).toEqual(counts);
  });

  it('need no header', async () => {
    const file = await openText(
      ['0 0 600 5', '0 0 601 6', '0 0 602 7', '1 0 600 8', '1 0 601 9', '1 0 602 10'],
      'scan.dat',
    );
    expect(shapesOf(file)).toEqual([
      'counts 1 × 2 × 3 uint8',
      'axis 3 uint16',
      'x 2 uint8',
      'y 1 uint8',
    ]);
  });

  it('need no header along one quantity either', async () => {
    const lines = ['-1 600 5', '-1 601 6', '-1 602 7', '0 600 8', '0 601 9', '0 602 10'];
    const file = await openText(lines, 'scan.dat');
    expect(shapesOf(file)).toEqual(['counts 1 × 2 × 3 uint8', 'axis 3 uint16', 'column 1 2 int8']);
    const one = await openText(lines.slice(0, 3), 'scan.dat');
    expect(shapesOf(one)).toEqual(['column 1 3 int8', 'column 2 3 uint16', 'column 3 3 uint8']);
  });

  it('keep further axes as vectors and further values as cubes', async () => {
    const file = await openText([
      'x,y,pixel,wavelength_nm,raw_counts,dark_counts',
      '0,0,0,600.0,5,1',
      '0,0,1,600.5,6,1',
      '1,0,0,600.0,7,2',
      '1,0,1,600.5,8,1',
    ]);
    expect(shapesOf(file)).toEqual([
      'raw_counts 1 × 2 × 2 uint8',
      'dark_counts 1 × 2 × 2 uint8',
      'wavelength_nm 2 float64',
      'axis 2 uint8',
      'x 2 uint8',
      'y 1 uint8',
    ]);
    expect(await numbersOf(file, 'wavelength_nm')).toEqual([600, 600.5]);
    expect(await numbersOf(file, 'dark_counts')).toEqual([1, 1, 2, 1]);
  });

  it('keep the name of values that are not counts', async () => {
    const file = await openText(['x,y,energy_eV,absorbance', '0,0,1.5,0.1', '0,0,1.6,0.2']);
    expect(shapesOf(file)[0]).toBe('absorbance 1 × 1 × 2 float64');
  });

  it('may run along one quantity that is no place', async () => {
    const file = await openText([
      'gate_volts,wavelength_nm,counts',
      ...[-1, 0, 1].flatMap((volts) => [600, 601, 602].map((nm) => `${volts},${nm},${nm + volts}`)),
    ]);
    expect(shapesOf(file)).toEqual([
      'counts 1 × 3 × 3 uint16',
      'axis 3 uint16',
      'gate_volts 3 int8',
    ]);
    expect((await numbersOf(file, 'counts')).slice(0, 4)).toEqual([599, 600, 601, 600]);
  });

  it('leave rows without an axis value out and say how many', async () => {
    const file = await openText([names, '0,0,520,1', '0,0,,2', '1,0,520,3', '1,0,NA,4']);
    expect(await numbersOf(file, 'counts')).toEqual([1, 3]);
    expect(file.notes).toEqual(['2 rows without an axis value were left out.']);
  });

  it('keep no data as no data', async () => {
    const file = await openText([names, '0,0,520,NA', '0,0,521,2', '1,0,520,3', '1,0,521,']);
    expect(await numbersOf(file, 'counts')).toEqual([Number.NaN, 2, 3, Number.NaN]);
  });

  it('give pixels without rows no data', async () => {
    const file = await openText([names, ...rows.filter((row) => !row.startsWith('1,1,'))]);
    expect(shapesOf(file)[0]).toBe('counts 2 × 3 × 2 float64');
    expect((await numbersOf(file, 'counts')).slice(8, 10)).toEqual([Number.NaN, Number.NaN]);
    expect(file.notes[0]).toContain('1 of 6 pixels');
  });
});

describe('long rows are refused', () => {
  const refused = async (lines: readonly string[]) => {
    const error = await openText([names, ...lines]).then(
      () => null,
      (caught: unknown) => caught,
    );
    expect(error).toMatchObject({ kind: 'scan' });
    return error as { what: string; where: string };
  };

  it('where a point has fewer channels than the others', async () => {
    const error = await refused(['0,0,520,1', '0,0,521,1', '4,0,520,1']);
    expect(error.what).toBe('the point at x = 4, y = 0 has 1 channel, and the axis has 2');
    expect(error.where).toBe('table.csv: line 4');
  });

  it('where a point has an axis of its own', async () => {
    const error = await refused(['0,0,520,1', '0,0,521,1', '4,0,520,1', '4,0,521.5,1']);
    expect(error.what).toContain('the point at x = 4, y = 0 has an axis of its own');
    expect(error.what).toContain('521.5');
    expect(error.where).toBe('table.csv: line 5');
  });

  it('where a channel comes twice', async () => {
    const twice = ['0,0,520,1', '0,0,521,1', '4,0,521,1', '4,0,521,1'];
    expect((await refused(twice)).what).toBe(
      'a second row has the axis value 521 at the same point',
    );
    expect((await refused(['0,0,520,1', '0,0,520,1', '1,0,520,1'])).what).toContain('2 channels');
  });

  it('where a row has no position', async () => {
    expect((await refused(['0,0,520,1', '0,0,521,1', 'NaN,0,520,1'])).where).toContain('line 4');
  });
});
