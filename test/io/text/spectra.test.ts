/** Text with one row per pixel, and matrices. */
import { describe, expect, it } from 'vitest';
import { entryOf, numbersOf, openText, shapesOf } from './open-text';

const header = 'x,y,600,601.5,603';

describe('one row per pixel', () => {
  it('becomes a cube with its axis and positions', async () => {
    const file = await openText([header, '0,0,1,2,3', '1,0,4,5,6', '0,1,7,8,9', '1,1,10,11,12']);
    expect(shapesOf(file)).toEqual([
      'counts 2 × 2 × 3 uint8',
      'axis 3 float64',
      'x 2 uint8',
      'y 2 uint8',
    ]);
    expect(await numbersOf(file, 'counts')).toEqual([1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11, 12]);
    expect(await numbersOf(file, 'axis')).toEqual([600, 601.5, 603]);
    expect(file.notes).toEqual([]);
    expect(file.format).toBe('text');
  });

  it.each([
    ['y fastest', ['0,0,1', '0,1,3', '1,0,2', '1,1,4']],
    ['serpentine', ['0,0,1', '1,0,2', '1,1,4', '0,1,3']],
    ['shuffled', ['1,1,4', '0,0,1', '0,1,3', '1,0,2']],
    ['bottom up', ['0,1,3', '1,1,4', '0,0,1', '1,0,2']],
  ])('in any order: %s', async (_, rows) => {
    const file = await openText(['x,y,600,601', ...rows.map((row) => `${row},0`)]);
    expect(await numbersOf(file, 'counts')).toEqual([1, 0, 2, 0, 3, 0, 4, 0]);
  });

  it.each([
    ['X (nm),Y (nm)', 'nm', 'nm'],
    ['x_um,y_um', 'um', 'um'],
    ['x [µm],y [µm]', 'µm', 'µm'],
    ['pos_x,pos_y', undefined, undefined],
    ['Stage X / mm,Stage Y / mm', 'mm', 'mm'],
    ['column,row', undefined, undefined],
  ])('has x and y by the headings %s', async (names, x, y) => {
    const file = await openText([`${names},600,601`, '0,0,1,2', '5,0,3,4', '0,7,5,6', '5,7,7,8']);
    expect(entryOf(file, 'counts').shape).toEqual([2, 2, 2]);
    expect(entryOf(file, 'x').attributes.units).toBe(x);
    expect(entryOf(file, 'y').attributes.units).toBe(y);
    expect(await numbersOf(file, 'x')).toEqual([0, 5]);
    expect(await numbersOf(file, 'y')).toEqual([0, 7]);
  });

  it('may have y before x', async () => {
    const file = await openText(['y,x,600,601', '0,0,1,0', '0,1,2,0', '0,2,3,0']);
    expect(entryOf(file, 'counts').shape).toEqual([1, 3, 2]);
    expect(await numbersOf(file, 'counts')).toEqual([1, 0, 2, 0, 3, 0]);
  });

  it('may name its channels with one word and a number', async () => {
    const channels = Array.from({ length: 8 }, (_, k) => `I_${600 + k / 2}`);
    const counts = '1,2,3,4,5,6,7,8';
    const file = await openText([`x,y,${channels.join(',')}`, `0,0,${counts}`, `1,0,${counts}`]);
    expect(await numbersOf(file, 'axis')).toEqual([600, 600.5, 601, 601.5, 602, 602.5, 603, 603.5]);
    expect(entryOf(file, 'counts').attributes).toEqual({ long_name: 'I' });
  });

  it('may write the unit after each axis value', async () => {
    const file = await openText(['x,y,600 nm,601 nm', '0,0,1,2', '1,0,3,4']);
    expect(entryOf(file, 'axis').attributes).toEqual({ units: 'nm' });
    expect(await numbersOf(file, 'axis')).toEqual([600, 601]);
  });

  it('keeps other labels as maps', async () => {
    const file = await openText(['x,y,height_nm,600,601', '0,0,1.5,1,2', '1,0,2.5,3,4']);
    expect(shapesOf(file)).toContain('height_nm 1 × 2 float64');
    expect(entryOf(file, 'height_nm').attributes).toEqual({ units: 'nm' });
    expect(await numbersOf(file, 'height_nm')).toEqual([1.5, 2.5]);
  });

  it('leaves columns of words out and says so', async () => {
    const file = await openText(['x,y,operator,600,601', '0,0,ab,1,2', '1,0,cd,3,4']);
    expect(await numbersOf(file, 'counts')).toEqual([1, 2, 3, 4]);
    expect(file.notes).toEqual(['operator: words, not numbers; left out.']);
  });

  it('takes two columns without a name for x and y, and says so', async () => {
    const file = await openText([',,600,601,602', '0,0,1,2,3', '1,0,4,5,6']);
    expect(entryOf(file, 'counts').shape).toEqual([1, 2, 3]);
    expect(file.notes).toEqual(['The two columns without a name were taken for x and y.']);
  });

  it('gives missing pixels no data, with a note', async () => {
    const file = await openText([
      header,
      '0,0,1,2,3',
      '1,0,4,5,6',
      '0,1,7,8,9',
      '2,1,1,1,1',
      '2,0,2,2,2',
    ]);
    expect(shapesOf(file)[0]).toBe('counts 2 × 3 × 3 float64');
    const counts = await numbersOf(file, 'counts');
    expect(counts.slice(12, 15)).toEqual([Number.NaN, Number.NaN, Number.NaN]);
    expect(counts.slice(15)).toEqual([1, 1, 1]);
    expect(file.notes).toEqual(['1 of 6 pixels are missing in the file and hold no data.']);
  });

  it('keeps scattered points in the order of the file, with a note', async () => {
    const file = await openText([header, '5.2,1.1,1,2,3', '0.3,9.7,4,5,6', '2.2,4.4,7,8,9']);
    expect(shapesOf(file)).toEqual([
      'counts 1 × 3 × 3 uint8',
      'axis 3 float64',
      'x 3 float64',
      'y 3 float64',
    ]);
    expect(await numbersOf(file, 'x')).toEqual([5.2, 0.3, 2.2]);
    expect(file.notes[0]).toContain('scattered');
  });

  it('forms a grid although positions read back from a stage wander', async () => {
    const rows = [0, 1, 2, 3].flatMap((y) =>
      [0, 1, 2].map((x) => {
        const wander = 0.001 * ((7 * x + 5 * y) % 4);
        return `${x * 0.5 + wander},${y * 0.25 - wander},${10 * y + x},0`;
      }),
    );
    const file = await openText(['x_um,y_um,600,601', ...rows]);
    expect(entryOf(file, 'counts').shape).toEqual([4, 3, 2]);
    expect((await numbersOf(file, 'counts')).filter((_, i) => i % 2 === 0)).toEqual([
      0, 1, 2, 10, 11, 12, 20, 21, 22, 30, 31, 32,
    ]);
    expect(file.notes[0]).toContain('wander by up to 0.00');
    expect((await numbersOf(file, 'x'))[2]).toBeCloseTo(1.0015, 6);
  });

  it.each([
    ['uint8', '255', '0'],
    ['int8', '-128', '127'],
    ['uint16', '65535', '256'],
    ['int16', '-129', '300'],
    ['uint32', '4294967295', '0'],
    ['int32', '-2147483648', '65536'],
    ['float64', '4294967296', '0'],
    ['float64', '-1', '4294967295'],
    ['float64', '1.5', '0'],
    ['float64', 'NaN', '1'],
    ['uint16', '1e3', '1200.0'],
  ])('keeps whole numbers in the smallest type: %s for %s and %s', async (type, a, b) => {
    const file = await openText(['x,y,600,601', `0,0,${a},${b}`]);
    expect(entryOf(file, 'counts').type).toBe(type);
    expect(await numbersOf(file, 'counts')).toEqual([Number(a), Number(b)]);
  });

  it('is read in blocks of any axis', async () => {
    const file = await openText([header, '0,0,1,2,3', '1,0,4,5,6', '0,1,7,8,9', '1,1,10,11,12']);
    expect([...(await file.read('counts', [1, 0, 1], [1, 2, 2]))]).toEqual([8, 9, 11, 12]);
    expect([...(await file.read('counts', [0, 1, 0], [2, 1, 1]))]).toEqual([4, 10]);
    expect([...(await file.read('axis', [1], [2]))]).toEqual([601.5, 603]);
    expect([...(await file.read('counts', [0, 0, 0], [0, 2, 3]))]).toEqual([]);
    await expect(file.read('counts', [0, 0, 1], [1, 1, 3])).rejects.toMatchObject({
      kind: 'fault',
    });
    await expect(file.read('nothing', [0], [1])).rejects.toMatchObject({ kind: 'fault' });
  });
});

describe('spectra with one label', () => {
  it('become a line of spectra', async () => {
    const file = await openText(['gate_volts,600,601,602', '-1,1,2,3', '0.5,4,5,6']);
    expect(shapesOf(file)).toEqual([
      'counts 1 × 2 × 3 uint8',
      'axis 3 uint16',
      'gate_volts 2 float64',
    ]);
    expect(entryOf(file, 'gate_volts').attributes).toEqual({ units: 'V' });
    expect(await numbersOf(file, 'gate_volts')).toEqual([-1, 0.5]);
  });

  it('may have an empty corner', async () => {
    const file = await openText([',600,601,602', '0,1,2,3', '1,4,5,6']);
    expect(shapesOf(file)).toEqual(['counts 1 × 2 × 3 uint8', 'axis 3 uint16', 'column 1 2 uint8']);
  });

  it('may have a word before each row', async () => {
    const file = await openText(['name,600,601,602', 'a,5,1,9', 'b,4,7,2', 'c,3,1,2']);
    expect(shapesOf(file)).toEqual(['counts 1 × 3 × 3 uint8', 'axis 3 uint16']);
    expect(await numbersOf(file, 'counts')).toEqual([5, 1, 9, 4, 7, 2, 3, 1, 2]);
  });
});

describe('spectra in columns', () => {
  it('become channels × spectra, by the numbers in their headings', async () => {
    const names = Array.from({ length: 8 }, (_, i) => `run ${i + 1}`);
    const rows = [600, 601, 602].map((nm) => [nm, ...names.map((_, i) => nm - 600 + i)].join('\t'));
    const file = await openText([['wavelength_nm', ...names].join('\t'), ...rows], 'runs.tsv');
    expect(shapesOf(file)).toEqual(['counts 3 × 8 uint8', 'wavelength_nm 3 uint16', 'run 8 uint8']);
    expect([...(await file.read('counts', [1, 0], [1, 3]))]).toEqual([1, 2, 3]);
    expect(file.notes).toEqual([
      'The 8 columns after wavelength_nm were taken for one spectrum each.',
    ]);
  });

  it('whatever they are called, where there are very many', async () => {
    const names = Array.from({ length: 300 }, (_, i) =>
      String.fromCharCode(97 + (i % 26), 97 + i / 26),
    );
    const rows = [600, 601].map((nm) => [nm, ...names.map((_, i) => i)].join(','));
    const file = await openText([['nm', ...names].join(','), ...rows]);
    expect(shapesOf(file)).toEqual(['counts 2 × 300 uint16', 'nm 2 uint16']);
  });
});

describe('a matrix of numbers without names', () => {
  it('is rows × columns', async () => {
    const rows = Array.from({ length: 4 }, (_, y) =>
      Array.from({ length: 20 }, (__, x) => (y - 1) * x).join('\t'),
    );
    const file = await openText(rows, 'height.tsv');
    expect(shapesOf(file)).toEqual([' 4 × 20 int8']);
    expect((await numbersOf(file, '')).slice(0, 3)).toEqual([-0, -1, -2].map((one) => one + 0));
    expect([...(await file.read('', [2, 18], [2, 2]))]).toEqual([18, 19, 36, 38]);
  });

  it('may be narrow, as long as it is no spectrum', async () => {
    const surface = ['1.5 2.5 1.0', '1.2 2.0 1.1', '1.7 2.9 0.4', '1.0 2.2 0.9'];
    expect(shapesOf(await openText(surface, 'height.txt'))).toEqual([' 4 × 3 float64']);
    const tilted = ['1 2 3 4', '2 3 4 5', '3 4 5 6'];
    expect(shapesOf(await openText(tilted, 'height.txt'))).toEqual([' 3 × 4 uint8']);
    const spectrum = ['600 5 1', '601 7 1', '602 2 1'];
    expect(shapesOf(await openText(spectrum, 'a.txt'))).toEqual([
      'column 1 3 uint16',
      'column 2 3 uint8',
      'column 3 3 uint8',
    ]);
  });
});
