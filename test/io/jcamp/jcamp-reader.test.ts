/** JCAMP-DX files: headers, pairs, links. */
import { describe, expect, it } from 'vitest';
import { jcampReader } from '../../../src/io/jcamp/jcamp-reader';
import { fileOf, open, refusal, values } from './four-points';

describe('a spectrum', () => {
  it('has x and y with their units, and what its labels state', async () => {
    const file = await open(
      fileOf({
        $LASER: '532.06 nm',
        '.EXPOSURE': 0.5,
        RESOLUTION: '2.0',
        'SAMPLE DESCRIPTION': 'on\r\nglass',
      }),
    );
    expect(file.format).toBe('JCAMP-DX');
    expect(file.entries).toEqual([
      {
        path: 'y',
        shape: [4],
        type: 'uint8',
        attributes: { units: 'ABSORBANCE', long_name: 'ABSORBANCE' },
      },
      { path: 'x', shape: [4], type: 'uint8', attributes: { units: '1/CM' } },
    ]);
    expect(await values(file, 'x')).toEqual([100, 102, 104, 106]);
    expect(await values(file, 'y')).toEqual([1, 2, 3, 4]);
    expect(file.facts).toMatchObject({
      TITLE: 'four points',
      'DATA TYPE': 'INFRARED SPECTRUM',
      LASER: '532.06 nm',
      EXPOSURE: 0.5,
      RESOLUTION: 2,
      'SAMPLE DESCRIPTION': 'on glass',
    });
    expect(Object.keys(file.facts)).not.toContain('FIRSTX');
    expect(file.notes).toEqual([]);
  });

  it('counts from the laser in a Raman spectrum', async () => {
    const raman = await open(fileOf({ 'DATA TYPE': 'RAMAN SPECTRUM' }));
    expect(raman.entries[1].attributes).toEqual({ units: '1/CM', long_name: 'Raman shift' });
    const light = await open(fileOf({ 'DATA TYPE': 'RAMAN SPECTRUM', XUNITS: 'NANOMETERS' }));
    expect(light.entries[1].attributes).toEqual({ units: 'NANOMETERS' });
    const named = await open(fileOf({ XLABEL: 'Wavelength', YLABEL: 'Counts' }));
    expect(named.entries.map(({ attributes }) => attributes.long_name)).toEqual([
      'Counts',
      'Wavelength',
    ]);
  });

  it('may descend, and has its factors applied', async () => {
    const file = await open(
      fileOf({ FIRSTX: 106, LASTX: 100, XFACTOR: 0.5, YFACTOR: 0.25, FIRSTY: 0.25 }, [
        '212 1 2',
        '204 3 4',
      ]),
    );
    expect(await values(file, 'x')).toEqual([106, 104, 102, 100]);
    expect(await values(file, 'y')).toEqual([0.25, 0.5, 0.75, 1]);
    expect(file.notes).toEqual([]);
  });

  it('reads with labels in any case and spelling, comments, and any line end', async () => {
    const lines = fileOf().map((line) =>
      line
        .replace('##FIRSTX=', '##First_X =')
        .replace('##DATA TYPE', '##data-type')
        .replace('##NPOINTS= 4', '##NPOINTS= 4 $$$$ points')
        .replace('100 1 2', '100 1 2 $$$$ 9 9'),
    );
    for (const end of ['\n', '\r\n', '\r']) {
      const file = await open(['$$ a comment', '', ...lines], end);
      expect(await values(file, 'y')).toEqual([1, 2, 3, 4]);
      expect(await values(file, 'x')).toEqual([100, 102, 104, 106]);
    }
  });

  it('keeps lost values as no data', async () => {
    const file = await open(fileOf({}, ['100 1 ?', '104 3 4']));
    expect(await values(file, 'y')).toEqual([1, Number.NaN, 3, 4]);
    expect(file.entries[0].type).toBe('float64');
  });

  it('reads from the abscissae of its lines where FIRSTX or LASTX is missing', async () => {
    for (const changes of [
      { FIRSTX: null },
      { LASTX: null },
      { FIRSTX: null, LASTX: null },
      { LASTX: null, DELTAX: 2 },
    ]) {
      expect(await values(await open(fileOf(changes)), 'x')).toEqual([100, 102, 104, 106]);
    }
    const none = await refusal(fileOf({ FIRSTX: null, LASTX: null }, ['100 1 2 3 4']));
    expect(none.what).toContain('nothing says where the points lie');
  });

  it('may have one point', async () => {
    const file = await open(fileOf({ NPOINTS: 1, LASTX: 100 }, ['100 7']));
    expect([await values(file, 'x'), await values(file, 'y')]).toEqual([[100], [7]]);
  });

  it('says where the header and the table differ in what does no harm', async () => {
    expect((await open(fileOf({ FIRSTY: 9 }))).notes).toEqual([
      '##FIRSTY= says 9, and the table begins with 1.',
    ]);
    expect((await open(fileOf({ NPOINTS: 5 }))).notes[0]).toContain(
      'says 5, and the table has 4 points',
    );
    expect((await open(fileOf({ XFACTOR: 0.5 }))).notes).toEqual([
      'The abscissae in the table are not divided by XFACTOR, as they should be.',
    ]);
    expect((await open(fileOf().slice(0, -1))).notes).toEqual(['##END= is missing.']);
  });
});

describe('pairs', () => {
  it.each([
    ['one a line', ['100, 1', '103.5, 2', '104, ?', '110, 4.5E-1']],
    ['many a line', ['100,1 103.5,2; 104,?;110,.45']],
    ['set apart by blanks', ['100 1', ' 103.5\t2 ', '104 ?', '110 0.45']],
  ])('%s', async (_, table) => {
    for (const form of ['##XYPOINTS= (XY..XY)', '##XYDATA=(XY..XY)']) {
      const file = await open(fileOf({ LASTX: 110 }, table, form));
      expect(await values(file, 'x')).toEqual([100, 103.5, 104, 110]);
      expect(await values(file, 'y')).toEqual([1, 2, Number.NaN, 0.45]);
      expect(file.notes).toEqual([]);
    }
  });

  it('have their factors applied, and differences from the header said', async () => {
    const file = await open(
      fileOf(
        { XFACTOR: 2, YFACTOR: 0.5, NPOINTS: 3, LASTX: 400 },
        ['50, 8', '60, 4'],
        '##XYPOINTS= (XY..XY)',
      ),
    );
    expect(await values(file, 'x')).toEqual([100, 120]);
    expect(await values(file, 'y')).toEqual([4, 2]);
    expect(file.notes).toEqual([
      '##NPOINTS= says 3, and the table has 2 points.',
      '##LASTX= says 400, and the table has 120 there.',
    ]);
  });

  it('are refused when one is incomplete or no number', async () => {
    const form = '##XYPOINTS= (XY..XY)';
    const odd = await refusal(fileOf({}, ['100, 1', '102'], form));
    expect(odd.what).toBe('the last point has an abscissa and no ordinate');
    expect(odd.where).toBe('a.jdx: line 16');
    expect((await refusal(fileOf({}, ['100, one'], form))).what).toBe('“one” is not a number');
  });
});

describe('linked blocks', () => {
  const link = (...blocks: readonly (readonly string[])[]) => [
    '##TITLE= session',
    '##JCAMP-DX= 5.00',
    '##DATA TYPE= LINK',
    `##BLOCKS= ${blocks.length}`,
    '##$LASER= 785 nm',
    ...blocks.flat(),
    '##END=',
  ];

  it('give the first spectrum as x and y, the others beside it, with a note', async () => {
    const second = fileOf({ TITLE: 'other', YUNITS: 'COUNTS' }, ['100 5 6', '104 7 8']);
    const file = await open(link(fileOf(), second));
    expect(file.entries.map(({ path }) => path)).toEqual(['y', 'x', 'y 2', 'x 2']);
    expect(await values(file, 'y')).toEqual([1, 2, 3, 4]);
    expect(await values(file, 'y 2')).toEqual([5, 6, 7, 8]);
    expect(file.facts).toMatchObject({ TITLE: 'four points', LASER: '785 nm' });
    expect(file.notes[0]).toContain('The file holds 2 spectra (1 “four points”, 2 “other”)');
  });

  it('may hold other things beside one spectrum', async () => {
    const peaks = [
      '##TITLE= peaks',
      '##DATA TYPE= INFRARED PEAK TABLE',
      '##PEAK TABLE= (XY..XY)',
      '100, 1',
      '##END=',
    ];
    const file = await open(link(peaks, fileOf()));
    expect(file.entries.map(({ path }) => path)).toEqual(['y', 'x']);
    expect(file.notes).toEqual([]);
  });
});

describe('the reader', () => {
  it('knows its files by their first label', () => {
    const sniff = (text: string) => jcampReader.sniff(new TextEncoder().encode(text), 'a.txt');
    expect(sniff('##TITLE= a')).toBe(true);
    expect(sniff('\ufeff \r\n## title = a')).toBe(true);
    expect(sniff('# TITLE= a')).toBe(false);
    expect(sniff('x,y\n1,2')).toBe(false);
  });
});
